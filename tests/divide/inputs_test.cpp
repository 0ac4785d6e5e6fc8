// Converter inputs: which nets they are, and which keys each ends up with.
#include <catch2/catch.hpp>

#include "tests/divide/division.hpp"

using test::board_of;
using test::converter;
using test::ntc;
using test::Texts;

namespace {

const std::string two = "V1 VCC 0 3.3\nR1 VCC A1 10k\nR2 VCC A2 10k\nR3 A1 0 1k\nR4 A2 0 1k\n";

}  // namespace

TEST_CASE("a count of inputs other than the expected one is an error at the expectation") {
  const auto board = board_of(two, converter("\"A*\"") + "expect_inputs = 3\n");
  CHECK(board.said == Texts{"tap.toml:5:17: error: converter \"ADC\" has 2 inputs here, 3 are expected"});
  CHECK(board.division.dividers.empty());
  CHECK(board_of(two, converter("\"A*\"") + "expect_inputs = 2\n").said.empty());
}

TEST_CASE("a net that two converters claim is an error at the second claim") {
  const auto board = board_of(two, converter("\"A1\"") + "[converter.B]\nbits = 8\nhigh = 5\ninputs = [\"A*\"]\n");
  CHECK(board.said == Texts{"tap.toml:8:11: error: net \"A1\" is an input of converter \"ADC\" already"});
}

TEST_CASE("a net that a converter names twice is one input") {
  const auto board = board_of(two, converter("\"A1\", \"A*\", \"?1\"") + "expect_inputs = 2\n");
  CHECK(board.said.empty());
  CHECK(board.division.dividers.size() == 2);
}

TEST_CASE("an input has its converter's keys, its own over them, and defaults for the rest") {
  const auto board = board_of(
      two,
      "[converter.U1]\nbits = 10\nlow = 0.5\nhigh = \"VCC\"\nleakage = \"100nA\"\ninput_resistance = \"10M\"\n"
      "offset_error = \"2 LSB\"\ninputs = [\"A1\", \"A2\"]\n[input.A2]\nbits = 16\nhigh = 5\ninput_resistance = "
      "\"1M\"\n");
  const model::Input& first = board.at("A1").input;
  CHECK(first.converter == "U1");
  CHECK(first.bits == 10);
  CHECK(first.nominal_low == 0.5);
  CHECK(first.nominal_high == 3.3);
  CHECK(first.gain == 1);
  CHECK(first.leakage == Approx(1e-7));
  CHECK(first.input_resistance == 1e7);
  CHECK(first.offset_error.value == 2);
  const model::Input& second = board.at("A2").input;
  CHECK(second.bits == 16);
  CHECK(second.nominal_low == 0.5);
  CHECK(second.nominal_high == 5);
  CHECK(second.input_resistance == 1e6);
  CHECK(second.leakage == Approx(1e-7));
}

TEST_CASE("limits and levels of an input come behind those of the board, where the later one wins") {
  const auto board = board_of(two, converter("\"A*\"") + "[limit]\nspan_use = 0.4\n[input.A1]\nlimit.span_use = 0.3\n");
  const auto& nearer = board.at("A1").input.limits;
  REQUIRE(nearer.size() == 2);
  CHECK(nearer.back().limit.value == 0.3);
  REQUIRE(board.at("A2").input.limits.size() == 1);
  CHECK(board.at("A2").input.limits.back().limit.value == 0.4);
}

TEST_CASE("globs of names choose which inputs are divided") {
  CHECK(board_of(two, converter("\"A*\""), {"?2"}).only().input.name == "A2");
  CHECK(board_of(two, converter("\"A*\""), {"a1", "A2"}).division.dividers.size() == 2);
  CHECK(board_of(two, converter("\"A*\""), {"Z*"}).division.dividers.empty());
}

TEST_CASE("an input that is not chosen still loads the network that it is on") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A1 10k\nRT A1 0 10k\nR2 A1 A2 10k\n",
                              converter("\"A1\", \"A2\"") + "input_resistance = \"10k\"\n" + ntc("RT"), {"A1"});
  // 10 kohm parallel to 10 kohm parallel to 20 kohm under 10 kohm: 4/(4 + 10) of 3.3 V (voltage divider rule).
  CHECK(board.pin_volts(board.only(), 3)[1] == Approx(3.3 * 4 / 14).epsilon(1e-12));
}

TEST_CASE("a supply that is no net is an error with the nearest one, once for all inputs") {
  CHECK(board_of(two, converter("\"A*\"") + "supply = \"VCCC\"\n").said ==
        test::Texts{"tap.toml:5:10: error: no net \"VCCC\" in the netlist; did you mean \"VCC\"?"});
}
