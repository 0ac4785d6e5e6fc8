// Boards that cannot be audited, in whole or in part: each says why, and none passes for done.
#include <catch2/catch.hpp>

#include "tests/audit/board.hpp"

using Catch::Contains;
using test::Board;
using test::converter;
using test::input;
using test::ntc;
using test::rules;

namespace {

const std::string half = "title\nV1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n";

void check_refused(const Board& board, const std::string& why) {
  for (const auto& run : {board.trace(), board.audit()}) {
    CHECK_FALSE(run.report.done_in_whole);
    CHECK(run.report.inputs.empty());
    CHECK_THAT(run.diagnostics, Contains("error: " + why));
  }
}

}  // namespace

TEST_CASE("a netlist that is not there is one line that names it") {
  const auto run = audit::audit_board("/nowhere/board.cir", {}, nullptr);
  CHECK_FALSE(run.report.done_in_whole);
  CHECK(run.report.netlist == "/nowhere/board.cir");
  CHECK_THAT(run.diagnostics, Catch::StartsWith("/nowhere/board.cir: error: ") && Catch::EndsWith("\n"));
  CHECK(std::count(run.diagnostics.begin(), run.diagnostics.end(), '\n') == 1);
}

TEST_CASE("a netlist without cards is refused") {
  const std::string text = GENERATE(as<std::string>{}, "", "title\n", "title\n* remark\n");
  check_refused(Board(text, converter("\"A\"")), "the netlist has no cards");
}

TEST_CASE("a netlist of which no card can be read is refused") {
  check_refused(Board("title\nR1 A 0 {1+}\nR2 A 0 {2*}\n", converter("\"A\"")), "no card of the netlist could be read");
}

TEST_CASE("a board without a declared converter is refused, and told what to declare") {
  check_refused(
      Board(half),
      "no converter is declared, so there is no input to audit: declare [converter.NAME] with bits, high and inputs");
}

TEST_CASE("a choice of inputs that leaves none on a board is no fault of the board") {
  Board board(half, converter("\"A\"") + ntc("RT"));
  board.options.only = {"B*"};
  const auto run = board.audit();
  CHECK(run.report.inputs.empty());
  CHECK(run.report.done_in_whole);
  CHECK(run.diagnostics.empty());
}

TEST_CASE("a choice of inputs audits those and no other") {
  Board board(half + "R2 VCC B 10k\nRU B 0 10k\n", converter("\"A\", \"B\"") + ntc("RT") + ntc("RU"));
  board.options.only = {"b"};
  const auto run = board.audit();
  REQUIRE(run.report.inputs.size() == 1);
  CHECK(input(run, "B").audited);
}

TEST_CASE("a trace names the divider and has neither curve nor finding") {
  const Board board(half, converter("\"A\"") + ntc("RT"));
  const auto run = board.trace();
  CHECK(run.report.done_in_whole);
  const auto& traced = input(run, "A");
  CHECK_FALSE(traced.audited);
  CHECK_FALSE(traced.sweep.has_value());
  CHECK(traced.findings.empty());
  CHECK(run.report.findings.empty());
  CHECK(traced.divider.bare_form.has_value());
  CHECK(run.report.net_names.at(traced.divider.tap) == "A");
}

TEST_CASE("an input behind a part without a model is not audited, its neighbour is") {
  const Board board(half + "R2 VCC B 10k\nRU B 0 10k\nXU3 A 0 C OPAMP\n",
                    converter("\"A\", \"B\"") + ntc("RT") + ntc("RU"));
  const auto run = board.audit();
  CHECK_FALSE(input(run, "A").audited);
  CHECK_THAT(rules(input(run, "A").findings), Contains("not-audited"));
  CHECK_FALSE(input(run, "A").sweep.has_value());
  CHECK(input(run, "B").audited);
}

TEST_CASE("an input without a divider or a sensor is a result: the finding") {
  const Board board("title\nV1 VCC 0 3.3\nR1 VCC A 10k\nR2 A 0 10k\nC1 B 0 1n\n", converter("\"A\", \"B\""));
  const auto run = board.audit();
  CHECK(input(run, "A").audited);
  CHECK(rules(input(run, "A").findings) == "no-sensor");
  CHECK(input(run, "B").audited);
  CHECK(rules(input(run, "B").findings) == "no-divider");
}

TEST_CASE("a sweep whose expression has no value says where, and the input is not audited") {
  const Board board("title\n.param X=1k\nV1 VCC 0 3.3\nR1 VCC A 10k\nRS A 0 {X-5k}\n",
                    converter("\"A\"") + "[sensor.RS]\nkind = \"parameter\"\nsweep = \"X\"\nfrom = 5000\nto = 6000\n");
  const auto run = board.audit();
  CHECK_FALSE(input(run, "A").audited);
  REQUIRE(input(run, "A").divider.not_audited.size() == 1);
  CHECK_THAT(input(run, "A").divider.not_audited[0], Contains("5000"));
}

TEST_CASE("what a board as a whole has to say is in its findings: cards, includes, assumptions") {
  const Board board("title\nV1 VCC 0 3.3\nR1 VCC A 10k\nRT A AGND 10k\nR9 VCC X {1+}\n.include none.inc\n",
                    converter("\"A\"") + ntc("RT"));
  const auto run = board.audit();
  CHECK(input(run, "A").audited);
  CHECK_THAT(rules(run.report.findings),
             Contains("unreadable-card") && Contains("missing-include") && Contains("assumed-value"));
}
