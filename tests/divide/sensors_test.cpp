// Sensors: what a declaration names, what it replaces, and which inputs it moves.
#include <catch2/catch.hpp>

#include "divide/sweep_values.hpp"
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

Texts several(const std::string& said) {
  return {said +
          "; this version sweeps one: leave out the [sensor.NAME] of those that may stand still at the netlist's "
          "values, or declare them for a run of their own (--with)"};
}

// Not audited for one reason.
std::string why(const test::Board& board, const std::string& input_name) {
  const auto& divider = board.at(input_name);
  REQUIRE(divider.not_audited.size() == 1);
  CHECK_FALSE(divider.sensor.has_value());
  return divider.not_audited.front();
}

// A 12-bit converter from 0 to 3.3 V, whatever the rails do.
std::string fixed_range(const std::string& inputs) {
  return "[converter.ADC]\nbits = 12\nhigh = 3.3\ninputs = [" + inputs + "]\n";
}

// Two thermistors, each with a divider of its own, on one rail with a source resistance.
const std::string shared_rail = "RA VCC A 10k\nRT A 0 10k\nRB VCC B 1k\nRU B 0 1k\n";
const std::string rail_with_ohms = "[rail.VCC]\nvolts = 3.3\nohms = 100\n";

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
  CHECK(element.said == Texts{"tap.toml:5:9: error: sensor \"Q1\" has 3 pins; one of kind \"ntc\" has two"});
  const auto instance =
      board_of(top + "XP VCC A 0 POT\n.subckt POT A B C\nR1 A B 1k\nR2 B C 1k\n.ends\n", input + ntc("XP"));
  CHECK(instance.said == Texts{"tap.toml:5:9: error: sensor \"XP\" has 3 pins; one of kind \"ntc\" has two"});
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
  CHECK(board.only().not_audited == several("2 sensors move it (RT, RU)"));
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

TEST_CASE("sensors that share the drop of a rail are told apart by none: each input refuses, and the rail is named") {
  const auto board = board_of(shared_rail, fixed_range("\"A\", \"B\"") + ntc("RT") + ntc("RU") + rail_with_ohms);
  CHECK(Texts{why(board, "A")} == several("2 sensors move it (RT; RU through rail VCC)"));
  CHECK(Texts{why(board, "B")} == several("2 sensors move it (RT through rail VCC; RU)"));
}

TEST_CASE("a second sensor counts whether or not an input is declared on its divider") {
  const auto board = board_of(shared_rail, fixed_range("\"A\"") + ntc("RT") + ntc("RU") + rail_with_ohms);
  CHECK(Texts{why(board, "A")} == several("2 sensors move it (RT; RU through rail VCC)"));
}

TEST_CASE("a sensor on a rail with ohms whose monitor is audited is a second one") {
  const auto board = board_of("R1 VBAT A 10k\nR2 A 0 10k\nR3 VBAT X 1k\nRT X 0 1k\n",
                              "[converter.ADC]\nbits = 12\nhigh = 3.3\ninputs = [\"A\"]\n" + ntc("RT") +
                                  "[sensor.VBAT]\nkind = \"voltage\"\nfrom = 3\nto = 3.3\n[rail.VBAT]\nohms = 100\n");
  CHECK(Texts{why(board, "A")} == several("2 sensors move it (RT through rail VBAT; VBAT)"));
}

TEST_CASE("a sensor that draws from the tap through a controlled source is a second one, and the source is named") {
  const auto board =
      board_of(top + "RT A 0 10k\nG1 B 0 A 0 0.1m\nR2 VCC B 1k\nRU B 0 1k\n",
               "[converter.ADC]\nbits = 12\nhigh = \"VCC\"\ninputs = [\"A\", \"B\"]\n" + ntc("RT") + ntc("RU"));
  CHECK(board.at("A").not_audited.empty());
  CHECK(Texts{why(board, "B")} == several("2 sensors move it (RT through G1; RU)"));
}

TEST_CASE("a sensor in the network of the range's end is a second one") {
  const auto board = board_of(top + "RT A 0 10k\nR3 VCC REF 1k\nR4 REF X 10k\nRU X 0 10k\n",
                              "[converter.ADC]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\"]\n" + ntc("RT") + ntc("RU"));
  CHECK(Texts{why(board, "A")} == several("2 sensors move it (RT; RU through REF, an end of its range)"));
}

TEST_CASE("a parameter that moves another divider on the rail is a second sensor") {
  const auto board = board_of(
      "RA VCC A 1k\nRT A 0 10k\nRB VCC B 1k\nX2 B 0 BEAD R=10k\n.subckt BEAD P N PARAMS: R=1\nR1 P N "
      "{R}\n.ends\n",
      fixed_range("\"A\"") + ntc("RT") + parameter("X2", "R") + rail_with_ohms);
  CHECK(Texts{why(board, "A")} == several("2 sensors move it (RT; X2 through rail VCC)"));
}

TEST_CASE("a sensor that acts through a controlled source alone is not audited, and the source is named") {
  const auto board = board_of(top + "RT A 0 10k\nG1 B 0 A 0 1m\nR2 VCC B 1k\n", converter("\"A\", \"B\"") + ntc("RT"));
  CHECK(why(board, "B") ==
        "sensor RT moves it through G1; this version follows a sensor along resistances to the pin only");
  CHECK_FALSE(board.at("B").no_sensor);
}

TEST_CASE("a sensor that acts through the drop of a rail alone is not audited, and the rail is named") {
  const auto board = board_of("R0 VCC A 10k\nRT A 0 10k\nR1 VCC PIN 2k\nR2 PIN 0 10k\n",
                              fixed_range("\"PIN\"") + ntc("RT") + rail_with_ohms);
  CHECK(why(board, "PIN") ==
        "sensor RT moves it through rail VCC; this version follows a sensor along resistances to the pin only");
}

TEST_CASE("a sensor that moves an end of the range alone is not audited") {
  const auto board = board_of(top + "R2 A 0 10k\nR3 VCC REF 1k\nRT REF 0 10k\n",
                              "[converter.ADC]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\"]\n" + ntc("RT"));
  CHECK(why(board, "A") ==
        "sensor RT moves it through REF, an end of its range; this version follows a sensor along resistances to the "
        "pin only");
}

TEST_CASE("a parameter that moves nothing of the part it is declared for is an error at the word") {
  const std::string netlist =
      ".param TT=20\n" + top +
      "XS A 0 BEAD R=1k\nR5 A 0 {1k*TT}\nRS A 0 1k\n.subckt BEAD P N PARAMS: R=1\nR1 P N {R}\n.ends\n";
  CHECK(board_of(netlist, input + parameter("XS", "TT")).said ==
        Texts{"tap.toml:7:9: error: \"TT\" moves nothing of XS"});
  CHECK(board_of(netlist, input + parameter("RS", "TT")).said ==
        Texts{"tap.toml:7:9: error: \"TT\" moves nothing of RS"});
}

TEST_CASE("a part of the netlist takes no ends from its declaration") {
  CHECK(board_of(top + "RT A 0 10k\n", input + ntc("RT", "between = [\"A\", \"0\"]\n")).said ==
        Texts{"tap.toml:5:9: error: \"RT\" is an element of the netlist: leave out \"between\", or give the sensor "
              "another name"});
  CHECK(board_of(top + "XT A 0 BEAD\n.subckt BEAD P N\nR1 P N 1k\n.ends\n",
                 input + ntc("XT", "between = [\"A\", \"0\"]\n"))
            .said == Texts{"tap.toml:5:9: error: \"XT\" is an instance of the netlist: leave out \"between\", or give "
                           "the sensor another name"});
}

TEST_CASE("the arms of a divider in which nothing varies are named") {
  const auto board = board_of(top + "R2 A 0 10k\nR3 A PIN 1k\n", converter("\"PIN\""));
  CHECK(board.only().no_sensor);
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > R2 > 0; sense R3");
  const auto pulled = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\n", input);
  CHECK(pulled.only().no_sensor);
  CHECK(test::list(pulled.only().upper) == "R1");
}

TEST_CASE("a resistance whose value is 0 somewhere in its sweep is named") {
  const auto board = board_of(".param x=0.5\n" + top + "RS A B {x*10k}\nRB B 0 {(1-x)*10k}\n",
                              input + "[sensor.RS]\nkind = \"parameter\"\nsweep = \"x\"\nfrom = 0\nto = 1\n");
  const auto& sensor = board.sheet.sensors[*board.only().sensor];
  const auto swept =
      divide::swept_values(board.only().whole, board.circuit, sensor, divide::measurands(sensor, 3).value());
  REQUIRE_FALSE(swept.ok());
  CHECK(swept.error() == "the resistance of RS is 0 ohm at 0");
}

// Where a rail feeds the sensor's divider alone and is the converter's range, every voltage of the linear network goes
// with the rail (superposition), and the reading does not.
TEST_CASE("a sensor on a rail that a monitor sweeps and that is the range is audited with the rail at rest") {
  const std::string at_rest = GENERATE(as<std::string>{}, "V2 BATT 0 12\n", "");
  const std::string ohms = GENERATE(as<std::string>{}, "ohms = 5\n", "");
  if (!at_rest.empty() && !ohms.empty()) return;
  const std::string rail = at_rest.empty() ? "[rail.BATT]\nvolts = 12\n" + ohms : "";
  const auto board =
      board_of(at_rest + "R1 BATT M 30k\nR2 M 0 10k\nR3 BATT A 10k\nRT A 0 10k\n",
               "[converter.ADC]\nbits = 12\nhigh = \"BATT\"\ninputs = [\"A\"]\n" + voltage("BATT") + ntc("RT") + rail);
  const auto& divider = board.at("A");
  CHECK(divider.not_audited.empty());
  CHECK(divider.sensor_name == "RT");
  CHECK(divider.held == Texts{"BATT at rest"});
  if (ohms.empty()) {
    CHECK(drawn(board, divider) == "BATT > R3 > A > RT > 0");
    CHECK(board.pin_volts(divider, 3)[1] == Approx(6).epsilon(1e-12));
  }
}

TEST_CASE("a leakage counts as it would where the rail that is the range stands lowest") {
  // 1 uA at 9 V moves the reading as 12/9 of it at 12 V.
  const auto board =
      board_of("V2 BATT 0 12\nR1 BATT M 30k\nR2 M 0 10k\nR3 BATT A 10k\nRT A 0 10k\n",
               "[converter.ADC]\nbits = 12\nhigh = \"BATT\"\nleakage = \"1uA\"\ninputs = [\"A\", \"M\"]\n" +
                   voltage("BATT") + ntc("RT"));
  REQUIRE(board.at("A").whole.leakage_amperes.size() == 1);
  CHECK(board.at("A").whole.leakage_amperes[0] == Approx(1e-6 * 12 / 9).epsilon(1e-9));
  CHECK(board.at("M").whole.leakage_amperes[0] == Approx(1e-6).epsilon(1e-12));
  CHECK(board.at("A").leakage_where == "BATT at 9 V");
  CHECK(board.at("M").leakage_where.empty());
}

TEST_CASE("a leakage counts no less than at rest where the sweep of the rail lies above that") {
  const auto board = board_of("V2 BATT 0 6\nR1 BATT M 30k\nR2 M 0 10k\nR3 BATT A 10k\nRT A 0 10k\n",
                              "[converter.ADC]\nbits = 12\nhigh = \"BATT\"\nleakage = \"1uA\"\ninputs = [\"A\"]\n" +
                                  voltage("BATT") + ntc("RT"));
  CHECK(board.at("A").whole.leakage_amperes[0] == Approx(1e-6).epsilon(1e-12));
  CHECK(board.at("A").leakage_where.empty());
}

// Two dividers on one source, whatever that source is, are each in proportion to it (superposition).
TEST_CASE("sensors that share what is also the range are each audited, the others at the middle of their ranges") {
  struct Case {
    std::string netlist, more;
  };
  const std::string dividers = "R3 REF A 10k\nRT A 0 10k\nR4 REF B 1k\nRU B 0 1k\n";
  const auto one = GENERATE_COPY(values<Case>({
      {dividers, "[rail.REF]\nvolts = 3.3\nohms = 0.2\n"},
      {"V1 VCC 0 5\nR1 VCC REF 1k\nR2 REF 0 2k\n" + dividers, ""},
  }));
  const auto board = board_of(one.netlist, "[converter.ADC]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\", \"B\"]\n" +
                                               ntc("RT") + ntc("RU") + one.more);
  for (const std::string name : {"A", "B"}) {
    const auto& divider = board.at(name);
    CHECK(divider.not_audited.empty());
    CHECK(divider.sensor_name == (name == "A" ? "RT" : "RU"));
    CHECK(divider.whole.swept.size() == 1);
    CHECK(divider.held == Texts{name == "A" ? "RU at 25 degC" : "RT at 25 degC"});
  }
  // The pin's volts over those of its range: 1/2 at 10 kohm (voltage divider rule), wherever RU stands.
  if (one.more.empty()) return;
  const auto volts = board.pin_volts(board.at("A"), 3);
  CHECK(volts[1] == Approx(1.65).epsilon(1e-3));
}

TEST_CASE("a sensor whose effect through the rail cancels in a fixed divider leaves that one without a sensor") {
  const auto board = board_of("R0 VCC A 10k\nRT A 0 10k\nR1 VCC PIN 2k\nR2 PIN 0 10k\n",
                              converter("\"PIN\"") + ntc("RT") + rail_with_ohms);
  CHECK(board.only().no_sensor);
  CHECK(board.only().not_audited.empty());
}

TEST_CASE("a leakage counts as where the other sensors on a soft reference pull it lowest") {
  // REF is 5 V behind 10k, loaded by 20k and by RU under 10k: lowest at RU's least ohms. 1 uA into A moves A/REF by
  // 1u * (10k || RT) / REF, and by what it lifts REF itself: none, but for what RT takes.
  const auto board = board_of(
      "V1 VCC 0 5\nR1 VCC REF 1k\nR2 REF 0 2k\nR3 REF A 10k\nRT A 0 10k\nR4 REF B 10k\nRU B 0 10k\n",
      "[converter.ADC]\nbits = 12\nhigh = \"REF\"\nleakage = \"1nA\"\ninputs = [\"A\"]\n" + ntc("RT") + ntc("RU"));
  const auto& divider = board.only();
  REQUIRE(divider.whole.leakage_amperes.size() == 1);
  CHECK(divider.whole.leakage_amperes[0] > 1e-9 * 1.005);
  CHECK(divider.whole.leakage_amperes[0] < 1e-9 * 1.03);
}

TEST_CASE("of many sensors on a rail the first are named, by the way they come in") {
  std::string netlist = "R1 VCC A 10k\nRT A 0 10k\n";
  std::string sensors = ntc("RT");
  for (const std::string n : {"1", "2", "3", "4", "5", "6", "7"}) {
    netlist += "RA" + n + " VCC N" + n + " 1k\nRS" + n + " N" + n + " 0 1k\n";
    sensors += ntc("RS" + n);
  }
  const auto board = board_of(netlist, fixed_range("\"A\"") + sensors + rail_with_ohms);
  CHECK(Texts{why(board, "A")} ==
        several("8 sensors move it (RT; RS1, RS2, RS3, RS4, RS5 and 2 more through rail VCC)"));
}

TEST_CASE("a parameter that moves another resistor of a fixed divider is named with that resistor") {
  const auto board =
      board_of(".param P=1k\nRS N3 N2 {P}\nR1 VCC A 1500\nR2 VCC N1 68k\nR3 N1 N2 68k\nR4 N1 N3 100\nR5 A 0 {70k-P}\n",
               fixed_range("\"A\"") + parameter("RS", "P") + rail_with_ohms);
  CHECK(why(board, "A") ==
        "sensor RS moves it through R5; this version follows a sensor along resistances to the pin only");
}

TEST_CASE("a parameter that moves a rail which is the range leaves another sensor on it alone") {
  const std::string netlist = ".param x=3.3\nV1 V 0 {x}\nR1 V A 10k\nRT A 0 10k\nR2 V B 10k\nRB B 0 {x*1k}\n";
  const std::string sensors = ntc("RT") + "[sensor.RB]\nkind = \"parameter\"\nsweep = \"x\"\nfrom = 3\nto = 3.6\n";
  const auto with = [&](const std::string& high) {
    return board_of(netlist, "[converter.ADC]\nbits = 12\nhigh = " + high + "\ninputs = [\"A\"]\n" + sensors);
  };
  const auto cancels = with("\"V\"");
  CHECK(cancels.only().not_audited.empty());
  CHECK(cancels.pin_volts(cancels.only(), 3)[1] == Approx(1.65).epsilon(1e-12));
  CHECK(Texts{why(with("3.3"), "A")} == several("2 sensors move it (RT; RB through rail V)"));
}

TEST_CASE("a rail that a monitor sweeps is a second sensor where the reading goes with it") {
  const std::string fed = "V1 VCC 0 3.3\nV2 BATT 0 12\nR3 BATT A 10k\nRT A 0 10k\n";
  const auto with = [&](const std::string& netlist, const std::string& ends) {
    return board_of(netlist,
                    "[converter.ADC]\nbits = 12\n" + ends + "inputs = [\"A\"]\n" + voltage("BATT") + ntc("RT"));
  };
  const Texts both = several("2 sensors move it (BATT, RT)");
  CHECK(Texts{why(with(fed, "high = 12\n"), "A")} == both);
  CHECK(Texts{why(with(fed, "high = \"VCC\"\n"), "A")} == both);
  CHECK(Texts{why(with(fed, "low = 1\nhigh = \"BATT\"\n"), "A")} == both);
  CHECK(Texts{why(with(fed + "R4 A VCC 100k\n", "high = \"BATT\"\n"), "A")} == both);
  CHECK(Texts{why(with(fed + "I1 0 A 1u\n", "high = \"BATT\"\n"), "A")} == both);
  CHECK(Texts{why(with(fed + "D1 A BATT DC\n.model DC D\n", "high = \"BATT\"\n"), "A")} == both);
  CHECK(with(fed, "high = \"BATT\"\n").at("A").not_audited.empty());
}

TEST_CASE("a rail that a monitor sweeps and that is an end of the range alone is a second sensor") {
  const auto board =
      board_of("V1 VCC 0 12\nV2 BATT 0 12\nR3 VCC A 10k\nRT A 0 10k\n",
               "[converter.ADC]\nbits = 12\nhigh = \"BATT\"\ninputs = [\"A\"]\n" + voltage("BATT") + ntc("RT"));
  CHECK(Texts{why(board, "A")} == several("2 sensors move it (BATT through BATT, an end of its range; RT)"));
}

TEST_CASE("a sensor on a rail that a monitor sweeps and that nobody gives a voltage is not audited") {
  const auto board =
      board_of("R1 BATT M 30k\nR2 M 0 10k\nR3 BATT A 10k\nRT A 0 10k\n",
               "[converter.ADC]\nbits = 12\nhigh = \"BATT\"\ninputs = [\"A\", \"M\"]\n" + voltage("BATT") + ntc("RT"));
  CHECK(board.at("M").not_audited.empty());
  CHECK(board.at("A").not_audited == Texts{"rail BATT has no voltage: declare [rail.\"BATT\"] volts"});
}

TEST_CASE("a swept rail that loads a sensor's divider is a second sensor") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\nR2 A PIN 1k\nR9 PIN BATT 10MEG\n",
                              converter("\"PIN\"") + voltage("BATT") + ntc("RT") + "[rail.BATT]\nvolts = 12\n");
  CHECK(Texts{why(board, "PIN")} == several("2 sensors move it (BATT, RT)"));
}
