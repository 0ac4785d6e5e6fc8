// Sensors: what a declaration names, what it replaces, and which inputs it moves.
#include <catch2/catch.hpp>

#include "tests/divide/division.hpp"

using test::board_of;
using test::converter;
using test::drawn;
using test::ntc;
using test::Texts;

namespace {

const std::string top = "V1 VCC 0 3.3\nR1 VCC A 10k\n";
const std::string input = converter("\"A\"");

std::string parameter(const std::string& name, const std::string& sweep) {
  return "[sensor." + name + "]\nkind = \"parameter\"\nsweep = \"" + sweep + "\"\nfrom = 5000\nto = 15000\n";
}

std::string voltage(const std::string& rail) {
  return "[sensor." + rail + "]\nkind = \"voltage\"\nfrom = 9\nto = 15\n";
}

// At 25 degC (10 kohm) or in the middle of a swept parameter.
double middle(const test::Board& board) {
  return board.pin_volts(board.only(), 3)[1];
}

}  // namespace

TEST_CASE("the declared law stands in for the sensor's value in the netlist, or for none") {
  const std::string value = GENERATE(as<std::string>{}, "47k", "0", "NTC", "");
  const auto board = board_of(top + "RT A 0 " + value + "\n", input + ntc("RT"));
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0");
  CHECK(board.only().unmodelled.empty());
  CHECK(board.only().not_audited.empty());
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("the declared law stands in for all that an instance of two pins holds") {
  const auto board =
      board_of(top + "XRT A 0 BEAD\n.subckt BEAD P N\nR1 P M 1k\nR2 M N 1k\nC1 M N 1n\n.ends\n", input + ntc("XRT"));
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > XRT > 0");
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("an instance of an unknown subcircuit may be a sensor: it needs no model then") {
  const auto board = board_of(top + "XRT A 0 NTC10K\n", input + ntc("XRT"));
  CHECK(board.only().not_audited.empty());
  CHECK(board.only().sensor_name == "XRT");
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("a resistance sensor of three pins is refused at its place") {
  const auto element = board_of(top + "Q1 VCC A 0 QN\n.model QN NPN\n", input + ntc("Q1"));
  CHECK(element.said == Texts{"tap.toml:5:9: error: sensor \"Q1\" has 3 pins; a ntc has two"});
  const auto instance =
      board_of(top + "XP VCC A 0 POT\n.subckt POT A B C\nR1 A B 1k\nR2 B C 1k\n.ends\n", input + ntc("XP"));
  CHECK(instance.said == Texts{"tap.toml:5:9: error: sensor \"XP\" has 3 pins; a ntc has two"});
}

TEST_CASE("a sensor off the board hangs between two nets and is reported by its label") {
  const auto board = board_of(top, input + ntc("AIR", "between = [\"0\", \"A\"]\n"));
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > AIR > 0");
  CHECK(board.only().sensor_name == "AIR");
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("a sensor with both ends on one net is refused at its place") {
  CHECK(board_of(top + "RT A A 10k\n", input + ntc("RT")).said ==
        Texts{"tap.toml:5:9: error: both ends of sensor \"RT\" are on one net"});
}

TEST_CASE("a sensor with both ends on one node moves nothing") {
  const auto board = board_of(top + "RT A B 10k\nL1 A B 1u\nR2 B 0 10k\n", input + ntc("RT"));
  CHECK(board.said.empty());
  CHECK(board.only().no_sensor);
  CHECK(board.only().not_audited.empty());
}

TEST_CASE("a parameter of an instance moves that instance and no other") {
  const auto board = board_of(
      "V1 VCC 0 3.3\nR1 VCC A 10k\nR2 VCC B 10k\nXA A 0 BEAD R=1k\nXB B 0 BEAD R=10k\n.subckt BEAD P N PARAMS: R=1\nR1 "
      "P N {R}\n.ends\n",
      converter("\"A\", \"B\"") + parameter("XA", "R"));
  CHECK(drawn(board, board.at("A")) == "VCC > R1 > A > XA > 0");
  CHECK(board.pin_volts(board.at("A"), 3)[1] == Approx(1.65).epsilon(1e-12));
  CHECK(board.at("B").no_sensor);
}

TEST_CASE("a .param moves the element that is the sensor, wherever it stands in its expression") {
  const auto board = board_of(".param X=1k\n" + top + "RS A 0 {X/2+5k}\n", input + parameter("RS", "x"));
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RS > 0");
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("a parameter that moves two resistances moves both") {
  const auto board =
      board_of(".param X=1k\nV1 VCC 0 3.3\nR1 VCC A {20k-X}\nRS A 0 {X}\n", input + parameter("RS", "X"));
  REQUIRE(board.only().whole.swept.size() == 2);
  const auto volts = board.pin_volts(board.only(), 3);
  CHECK(volts[0] == Approx(3.3 / 4).epsilon(1e-12));
  CHECK(volts[2] == Approx(3.3 * 3 / 4).epsilon(1e-12));
  CHECK_FALSE(board.only().bare_form.has_value());
}

TEST_CASE("a parameter that is neither the instance's nor a .param is an error at the word") {
  CHECK(board_of(top + "XA A 0 BEAD R=1k\n.subckt BEAD P N PARAMS: R=1\nR1 P N {R}\n.ends\n",
                 input + parameter("XA", "TEMP"))
            .said == Texts{"tap.toml:7:9: error: \"TEMP\" is no parameter of XA and no .param of the netlist"});
}

TEST_CASE("a parameter of an instance that is not there is an error with the nearest part") {
  CHECK(board_of(top + "XA A 0 BEAD R=1k\n.subckt BEAD P N PARAMS: R=1\nR1 P N {R}\n.ends\n",
                 input + parameter("XAA", "R"))
            .said ==
        Texts{"tap.toml:5:9: error: sensor \"XAA\" is no element or instance of the netlist; did you mean \"XA\"?"});
}

TEST_CASE("two sensors that move one input are refused, both named") {
  const auto board = board_of(top + "RT A 0 10k\nRU A 0 10k\n", input + ntc("RT") + ntc("RU"));
  CHECK(board.only().not_audited == Texts{"2 sensors move it (RT, RU); this version sweeps one"});
  CHECK_FALSE(board.only().sensor.has_value());
}

TEST_CASE("a sensor of another network is no second one") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\nR2 VCC B 10k\nRU B 0 10k\n",
                              converter("\"A\", \"B\"") + ntc("RT") + ntc("RU"));
  CHECK(board.at("A").sensor_name == "RT");
  CHECK(board.at("B").sensor_name == "RU");
}

TEST_CASE("an input with arms and no declared sensor has nothing that varies") {
  const auto board = board_of(top + "R2 A 0 10k\n", input);
  CHECK(board.only().no_sensor);
  CHECK(board.only().no_divider.empty());
  CHECK(board.only().not_audited.empty());
}

TEST_CASE("a swept rail needs no declaration besides and stands above the tap") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 BATT A 30k\nR2 A 0 10k\n", input + voltage("BATT"));
  CHECK(drawn(board, board.only()) == "BATT > R1 > A > R2 > 0");
  CHECK(board.only().sensor_arm == model::Arm::upper);
  CHECK(middle(board) == Approx(3).epsilon(1e-12));
  CHECK_FALSE(board.only().bare_form.has_value());
}

TEST_CASE("a swept rail that has a source or a declaration in the netlist is swept all the same") {
  const std::string source = GENERATE(as<std::string>{}, "", "V2 BATT 0 12\n");
  const std::string rail = GENERATE(as<std::string>{}, "", "[rail.BATT]\nvolts = 12\n");
  const auto board = board_of("V1 VCC 0 3.3\nR1 BATT A 30k\nR2 A 0 10k\n" + source, input + voltage("BATT") + rail);
  CHECK(board.only().not_audited.empty());
  const auto volts = board.pin_volts(board.only(), 3);
  CHECK(volts[0] == Approx(2.25).epsilon(1e-12));
  CHECK(volts[2] == Approx(3.75).epsilon(1e-12));
}

TEST_CASE("ground cannot be swept") {
  CHECK(board_of(top, input + "[sensor.GND]\nkind = \"voltage\"\nfrom = 0\nto = 1\n").said ==
        Texts{"tap.toml:5:9: error: ground cannot be swept"});
}

TEST_CASE("a sensor on a rail that a monitor sweeps is audited with the rail at rest") {
  const std::string at_rest = GENERATE(as<std::string>{}, "V2 BATT 0 12\n", "");
  const std::string rail = at_rest.empty() ? "[rail.BATT]\nvolts = 12\n" : "";
  const auto board = board_of("V1 VCC 0 3.3\n" + at_rest + "R1 BATT M 30k\nR2 M 0 10k\nR3 BATT A 10k\nRT A 0 10k\n",
                              converter("\"A\", \"M\"") + voltage("BATT") + ntc("RT") + rail);
  CHECK(board.at("M").sensor_name == "BATT");
  const auto& divider = board.at("A");
  CHECK(divider.not_audited.empty());
  CHECK(divider.sensor_name == "RT");
  CHECK(drawn(board, divider) == "BATT > R3 > A > RT > 0");
  CHECK(board.pin_volts(divider, 3)[1] == Approx(6).epsilon(1e-12));
}

TEST_CASE("a sensor on a rail that a monitor sweeps and that nobody gives a voltage is not audited") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 BATT M 30k\nR2 M 0 10k\nR3 BATT A 10k\nRT A 0 10k\n",
                              converter("\"A\", \"M\"") + voltage("BATT") + ntc("RT"));
  CHECK(board.at("M").not_audited.empty());
  CHECK(board.at("A").not_audited.size() == 1);
}

TEST_CASE("a swept rail that only loads a sensor's divider gives way to the sensor") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\nR2 A PIN 1k\nR9 PIN BATT 10MEG\n",
                              converter("\"PIN\"") + voltage("BATT") + ntc("RT") + "[rail.BATT]\nvolts = 12\n");
  CHECK(board.only().not_audited.empty());
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0; sense R2; load R9");
}
