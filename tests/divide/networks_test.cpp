// The two networks of an input: what loads the whole one, and what is watched in both.
#include <algorithm>
#include <cmath>

#include <catch2/catch.hpp>

#include "tests/divide/division.hpp"

using test::board_of;
using test::converter;
using test::drawn;
using test::ntc;

namespace {

std::size_t count(const model::ProbedNetwork& probed, model::BranchOrigin origin) {
  const auto& branches = probed.network.branches;
  return static_cast<std::size_t>(std::count_if(
      branches.begin(), branches.end(), [origin](const model::Branch& branch) { return branch.origin == origin; }));
}

}  // namespace

TEST_CASE("every input on a network brings its leakage and its input resistance, in the whole network alone") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC T 10k\nRT T 0 10k\nR2 T A 1k\nR3 T B 1k\nR4 VCC C 1k\n",
                              converter("\"A\", \"B\", \"C\"") + "leakage = \"1uA\"\ninput_resistance = \"1M\"\n" +
                                  ntc("RT") + "[input.B]\nleakage = \"2uA\"\n");
  const auto& divider = board.at("A");
  CHECK(divider.whole.leakage_amperes == std::vector{1e-6, 2e-6});
  CHECK(divider.whole.leakages.size() == 2);
  CHECK(count(divider.whole, model::BranchOrigin::leakage) == 2);
  CHECK(count(divider.whole, model::BranchOrigin::input_resistance) == 2);
  CHECK(count(divider.bare, model::BranchOrigin::leakage) == 0);
  CHECK(count(divider.bare, model::BranchOrigin::input_resistance) == 0);
}

TEST_CASE("a leakage points from ground into the input's node, so that a positive one pushes it up") {
  const auto board =
      board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n", converter("\"A\"") + "leakage = \"1uA\"\n" + ntc("RT"));
  const auto& whole = board.only().whole;
  REQUIRE(whole.leakages.size() == 1);
  const auto& branch = whole.network.branches[whole.leakages[0].index()];
  CHECK(branch.nodes[0] == model::ground_node);
  CHECK(branch.nodes[1] == whole.probe);
  CHECK(std::get<model::CurrentSource>(branch.part).amperes.value == 0);
}

TEST_CASE("an end of the range on an ideal rail is no node to watch, its volts are known") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n", converter("\"A\"") + ntc("RT"));
  CHECK_FALSE(board.only().whole.high.valid());
  CHECK(board.only().input.nominal_high == 3.3);
}

TEST_CASE("an end of the range across a resistor of the same chain is watched in both networks") {
  const auto board =
      board_of("V1 VCC 0 3.3\nR0 VCC REF 1k\nR1 REF A 10k\nRT A LOW 10k\nR3 LOW 0 1k\n",
               "[converter.ADC]\nbits = 12\nlow = \"LOW\"\nhigh = \"REF\"\ninputs = [\"A\"]\n" + ntc("RT"));
  CHECK(drawn(board, board.only()) == "VCC > R0 R1 > A > RT R3 > 0");
  for (const auto* probed : {&board.only().whole, &board.only().bare}) {
    CHECK(probed->high.valid());
    CHECK(probed->low.valid());
    CHECK(probed->high != probed->probe);
  }
}

TEST_CASE("an end of the range with a divider of its own leaves the bare divider solvable") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\nR5 VCC REF 1k\nR6 REF 0 2k\n",
                              "[converter.ADC]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\"]\n" + ntc("RT"));
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0");
  CHECK(board.only().whole.high.valid());
  CHECK(std::isnan(board.only().input.nominal_high));  // not known before it is solved
  CHECK(board.pin_volts(board.only(), 3)[1] == Approx(1.65).epsilon(1e-12));
  CHECK(board.bare_volts(board.only(), 3)[1] == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("an end of the range on a swept rail is watched") {
  const auto board = board_of("R1 VCC A 10k\nR2 A 0 10k\n",
                              converter("\"A\"") + "[sensor.VCC]\nkind = \"voltage\"\nfrom = 3\nto = 3.6\n");
  CHECK(board.only().whole.high.valid());
  CHECK(board.only().bare.high.valid());
  CHECK(board.only().input.nominal_high == 3.6);
}

TEST_CASE("the sensor's branch and its two ends are known in both networks") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n", converter("\"A\"") + ntc("RT"));
  for (const auto* probed : {&board.only().whole, &board.only().bare}) {
    REQUIRE(probed->sensor.valid());
    CHECK(probed->network.branches[probed->sensor.index()].origin == model::BranchOrigin::sensor);
    CHECK(probed->sensor_plus == probed->probe);
    CHECK(probed->sensor_minus == model::ground_node);
    REQUIRE(probed->swept.size() == 1);
    CHECK(probed->swept[0].branch == probed->sensor);
    CHECK(probed->swept[0].quantity == model::SweptQuantity::ohms);
  }
}

TEST_CASE("a follower's output is another network than its input") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC T 10k\nRT T 0 10k\nE1 B 0 T 0 1\nR2 B A 1k\nR3 A 0 1MEG\n",
                              converter("\"A\", \"T\"") + "input_resistance = \"1M\"\n" + ntc("RT"));
  // The input resistance of 1 Mohm at T loads the sensor's divider; that at A stands behind the follower.
  const double at_tap = board.pin_volts(board.at("T"), 3)[1];
  CHECK(at_tap == Approx(3.3 / 10e3 / (2 / 10e3 + 1 / 1e6)).epsilon(1e-12));
}

TEST_CASE("what the networks look like does not depend on the order of the cards") {
  const auto one =
      board_of("V1 VCC 0 3.3\nR1 VCC T 10k\nRT T 0 10k\nR2 T A 1k\nR3 A 0 1MEG\n", converter("\"A\"") + ntc("RT"));
  const auto other =
      board_of("R3 A 0 1MEG\nR2 A T 1k\nRT 0 T 10k\nR1 T VCC 10k\nV1 VCC 0 3.3\n", converter("\"A\"") + ntc("RT"));
  CHECK(drawn(one, one.only()) == "VCC > R1 > T > RT > 0; sense R2; load R3");
  CHECK(drawn(other, other.only()) == drawn(one, one.only()));
  CHECK(other.pin_volts(other.only(), 3)[0] == Approx(one.pin_volts(one.only(), 3)[0]).epsilon(1e-12));
}
