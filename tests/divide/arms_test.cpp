// Which parts are the arms, which the sense path, which the load.
#include <catch2/catch.hpp>

#include "tests/divide/division.hpp"

using test::board_of;
using test::converter;
using test::drawn;
using test::ntc;

namespace {

const std::string supply = "V1 VCC 0 3.3\n";
const std::string declared = converter("\"PIN\"") + ntc("RT");

// The picture of input PIN of a board with supply.
std::string picture(const std::string& netlist, const std::string& more = {}) {
  const auto board = board_of(supply + netlist, declared + more);
  return drawn(board, board.only());
}

// A wire-break pull-up of 1 Mohm at the connector, before the 10 kohm pull-up that feeds the sensor.
const std::string wire_break = "R9 VCC CON 1MEG\nRT CON 0 10k\nR8 CON T 10\nR1 VCC T 10k\nR2 T PIN 1k\n";

}  // namespace

TEST_CASE("a sensor to ground is the lower arm, one to the supply the upper") {
  const auto below = board_of(supply + "R1 VCC PIN 10k\nRT PIN 0 10k\n", declared);
  CHECK(drawn(below, below.only()) == "VCC > R1 > PIN > RT > 0");
  CHECK(below.only().sensor_arm == model::Arm::lower);
  const auto above = board_of(supply + "R1 PIN 0 10k\nRT PIN VCC 10k\n", declared);
  CHECK(drawn(above, above.only()) == "VCC > RT > PIN > R1 > 0");
  CHECK(above.only().sensor_arm == model::Arm::upper);
}

TEST_CASE("the one-port form of a plain divider is the supply behind the resistor") {
  // V = V+ Rx/(R + Rx): open the supply, shorted nothing, seen through R (voltage divider rule).
  const auto board = board_of(supply + "R1 VCC PIN 4.7k\nRT PIN 0 10k\n", declared);
  REQUIRE(board.only().bare_form);
  CHECK(board.only().bare_form->open_volts == Approx(3.3).epsilon(1e-12));
  CHECK(board.only().bare_form->short_volts == Approx(0).margin(1e-12));
  CHECK(board.only().bare_form->source_ohms == Approx(4700).epsilon(1e-12));
}

TEST_CASE("split arms belong to the arms on the sensor's side of the tap") {
  CHECK(picture("R1A VCC M 4k\nR1B M T 6k\nR2 T P 1k\nRT P N 10k\nR3 N 0 500\nR4 T PIN 2k\n") ==
        "VCC > R1A R1B > T > R2 RT R3 > 0; sense R4");
  CHECK(picture("RT VCC P 10k\nR2 P T 1k\nR3 T N 4k\nR5 N 0 6k\nR4 T PIN 2k\n") ==
        "VCC > RT R2 > T > R3 R5 > 0; sense R4");
}

TEST_CASE("what is parallel to the sensor belongs to its arm") {
  CHECK(picture("R1 VCC PIN 10k\nRT PIN 0 10k\nRP PIN 0 22k\n") == "VCC > R1 > PIN > RT RP > 0");
  CHECK(picture("R1 VCC PIN 10k\nRT PIN 0 10k\nRP PIN M 11k\nRQ M 0 11k\n") == "VCC > R1 > PIN > RT RP RQ > 0");
  CHECK(picture("R1 VCC PIN 10k\nRT PIN N 10k\nRP PIN N 22k\nR3 N 0 1k\n") == "VCC > R1 > PIN > RT RP R3 > 0");
}

TEST_CASE("what is parallel to a part of the walk before the tap belongs to the arms") {
  CHECK(picture("RT VCC P 10k\nR2 P PIN 1k\nR4 P Q 2k\nR5 Q PIN 2k\nR1 PIN 0 10k\n") ==
        "VCC > RT R2 R4 R5 > PIN > R1 > 0");
}

TEST_CASE("parallel resistors between tap and pin are both the sense path") {
  CHECK(picture("R1 VCC T 10k\nRT T 0 10k\nR2 T PIN 1k\nR3 T PIN 1k\n") == "VCC > R1 > T > RT > 0; sense R2 R3");
}

TEST_CASE("a T attenuator is arms: both its legs count") {
  const auto board = board_of(supply + "RT VCC S 10k\nR1 S M 10k\nR2 M 0 10k\nR3 M PIN 10k\nR4 PIN 0 10k\n", declared);
  CHECK(drawn(board, board.only()) == "VCC > RT R1 R3 > PIN > R2 R4 > 0");
  REQUIRE(board.only().candidates.size() == 2);
  CHECK(board.only().candidates[0].arm);
  CHECK(board.only().candidates[1].arm);
}

TEST_CASE("a wire-break pull-up before the pull-up is load") {
  const auto board = board_of(supply + wire_break, declared);
  CHECK(drawn(board, board.only()) == "VCC > R1 > T > RT R8 > 0; sense R2; load R9");
  const auto& candidates = board.only().candidates;
  REQUIRE(candidates.size() == 2);
  CHECK(board.net(candidates[0].net) == "CON");
  CHECK_FALSE(candidates[0].arm);
  CHECK(board.net(candidates[1].net) == "T");
  CHECK(candidates[1].arm);
  CHECK(test::list(candidates[0].branches) == "R9");
  CHECK(candidates[0].weight_volts < candidates[1].weight_volts / 10);
}

TEST_CASE("the smallest weight that counts as an arm is declared as the ambiguous tap's limit") {
  CHECK(picture(wire_break, "[limit]\nambiguous_tap = 0.0001\n") == "VCC > R9 R1 > T > RT R8 > 0; sense R2");
}

TEST_CASE("a weak pull-down behind the filter is load") {
  CHECK(picture("R1 VCC T 10k\nRT T 0 10k\nR2 T PIN 1k\nC1 PIN 0 100n\nR3 PIN 0 10MEG\n") ==
        "VCC > R1 > T > RT > 0; sense R2; load C1 R3");
}

TEST_CASE("a bleeder behind the resistance of a monitored rail is load") {
  const auto board =
      board_of(supply + "R1 BATT T 30k\nR2 T 0 10k\nR3 T PIN 1k\nR9 BATT 0 100k\n",
               converter("\"PIN\"") +
                   "[rail.BATT]\nohms = 1\nvolts = 12\n[sensor.BATT]\nkind = \"voltage\"\nfrom = 9\nto = 15\n");
  CHECK(drawn(board, board.only()) == "BATT > R1 > T > R2 > 0; sense R3; load R9");
}

TEST_CASE("a ferrite between tap and pin is in the sense path, and the tap is the net where the arms meet") {
  CHECK(picture("R1 VCC A 10k\nRT A 0 10k\nL1 A PIN 1u\n") == "VCC > R1 > A > RT > 0; sense L1");
  CHECK(picture("R1 VCC A 10k\nRT A 0 10k\nL1 A P 1u\nR2 P PIN 1k\n") == "VCC > R1 > A > RT > 0; sense L1 R2");
}

TEST_CASE("a declared role makes a load of an arm's candidate") {
  const std::string loaded = "R1 VCC T 10k\nRT T 0 10k\nR2 T PIN 1\nR3 PIN 0 20k\n";
  CHECK(picture(loaded) == "VCC > R1 > PIN > RT R2 R3 > 0");
  const auto board = board_of(supply + loaded, declared + "[part.R3]\nrole = \"load\"\n");
  CHECK(drawn(board, board.only()) == "VCC > R1 > T > RT > 0; sense R2; load R3");
  CHECK(board.only().candidates.back().declared);
}

TEST_CASE("a declared role makes an arm of what would be load") {
  CHECK(picture(wire_break, "[part.R9]\nrole = \"arm\"\n") == "VCC > R9 R1 > T > RT R8 > 0; sense R2");
}

TEST_CASE("a role of load on one of two parallel branches takes that one out of the arms") {
  CHECK(picture("R1 VCC PIN 10k\nR2 VCC PIN 1MEG\nRT PIN 0 10k\n", "[part.R2]\nrole = \"load\"\n") ==
        "VCC > R1 > PIN > RT > 0; load R2");
}

TEST_CASE("two dividers on a rail with ohms are each other's load, not each other's arms") {
  const auto board =
      board_of("RA VCC A 10k\nRT A 0 10k\nRB VCC B 10k\nRU B 0 10k\n",
               converter("\"A\", \"B\"") + ntc("RT") + ntc("RU") + "[rail.VCC]\nvolts = 3.3\nohms = 100\n");
  CHECK(drawn(board, board.at("A")) == "VCC > RA > A > RT > 0; load RB RU");
  CHECK(drawn(board, board.at("B")) == "VCC > RB > B > RU > 0; load RA RT");
}

TEST_CASE("a current source feeds the sensor in place of an upper resistor") {
  const auto board = board_of(supply + "I1 0 PIN 100u\nRT PIN 0 10k\n", declared);
  CHECK(test::list(board.only().upper) == "I1");
  CHECK(test::list(board.only().lower) == "RT");
  CHECK(board.pin_volts(board.only(), 3)[1] == Approx(1).epsilon(1e-9));
  CHECK_FALSE(board.only().bare_form.has_value());
}

TEST_CASE("an input without a resistive way to a rail has no divider") {
  CHECK(picture("RT VCC B 10k\nC1 PIN 0 1u\n") == "no resistive way leads from it to a rail");
  CHECK(picture("RT VCC B 10k\nR1 PIN X 1k\nR2 X Y 1k\n") == "no resistive way leads from it to a rail");
}

TEST_CASE("an input on a rail has no divider, and the rail is named") {
  CHECK(picture("RT VCC 0 10k\nL1 PIN VCC 1u\n") == "it is tied to rail VCC");
  CHECK(picture("RT VCC 0 10k\nR0 PIN 0 0\n") == "it is tied to rail 0");
}

TEST_CASE("an input whose arms lead to one rail has no divider, and the rail is named") {
  CHECK(picture("R1 PIN 0 10k\nRT PIN 0 10k\n") == "both its arms lead to one rail, 0");
  CHECK(picture("RT PIN VCC 10k\n") == "both its arms lead to one rail, VCC");
}
