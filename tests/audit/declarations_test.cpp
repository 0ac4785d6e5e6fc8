// Declarations from three places, of which the later wins.
#include <catch2/catch.hpp>

#include "tests/audit/board.hpp"

using Catch::Contains;
using test::Board;
using test::converter;
using test::input;
using test::ntc;

namespace {

const std::string half = "V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n";

std::string bits(int count) {
  return "[converter.ADC]\nbits = " + std::to_string(count) + "\n";
}

}  // namespace

TEST_CASE("declarations stand in the netlist, beside it and in files given, and the later place wins") {
  Board board("title\n*| [converter.ADC]\n*| bits = 8\n*| high = \"VCC\"\n*| inputs = [\"A\"]\n" + half);
  CHECK(input(board.trace(), "A").divider.input.bits == 8);
  board.add("board.tap.toml", bits(10));
  CHECK(input(board.trace(), "A").divider.input.bits == 10);
  board.options.with = {board.add("one.toml", bits(14)), board.add("two.toml", bits(16))};
  CHECK(input(board.trace(), "A").divider.input.bits == 16);
}

TEST_CASE("a file of declarations that is not there ends the audit of the board, and is named") {
  Board board("title\n" + half, converter("\"A\""));
  board.options.with = {board.netlist() + ".none.toml"};
  const auto run = board.trace();
  CHECK_FALSE(run.report.done_in_whole);
  CHECK(run.report.inputs.empty());
  CHECK_THAT(run.diagnostics, Contains("board.cir.none.toml"));
}

TEST_CASE("declarations with an error are said at their place and nothing is audited by them") {
  const Board board("title\n" + half, converter("\"A\"") + "bitz = 3\n");
  const auto run = board.audit();
  CHECK_FALSE(run.report.done_in_whole);
  CHECK(run.report.inputs.empty());
  CHECK_THAT(run.diagnostics, Contains("board.tap.toml:5:1: error:"));
}

TEST_CASE("a name that the netlist has not ends the audit of the board") {
  const Board board("title\n" + half, converter("\"A\"") + ntc("RTT"));
  const auto run = board.audit();
  CHECK_FALSE(run.report.done_in_whole);
  CHECK(run.report.inputs.empty());
  CHECK_THAT(run.diagnostics, Contains("board.tap.toml:5:9: error:") && Contains("did you mean \"RT\"?"));
}

TEST_CASE("a key that no rule looks at is listed as not checked") {
  const Board board("title\n" + half, converter("\"A\"") + "acquisition_time = \"2.5us\"\n" + ntc("RT"));
  const auto run = board.trace();
  REQUIRE(run.report.not_checked.size() == 1);
  CHECK_THAT(run.report.not_checked[0], Contains("converter.ADC.acquisition_time"));
}

TEST_CASE("includes are read below the folder of the netlist, or below the root that is given") {
  Board board("title\n.include part.inc\nV1 VCC 0 3.3\n", converter("\"A\"") + ntc("RT"));
  board.add("part.inc", "R1 VCC A 10k\nRT A 0 10k\n");
  CHECK(input(board.trace(), "A").divider.sensor_name == "RT");
  board.options.root = "/nonexistent-root";
  const auto run = board.trace();
  CHECK(run.report.inputs.empty());
  CHECK_THAT(run.diagnostics, Contains("board.cir:2:"));
}
