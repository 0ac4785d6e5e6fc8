// Names of the sheet and what they mean in the netlist: each that means nothing is an error at its place.
#include "divide/names.hpp"

#include <catch2/catch.hpp>

#include "tests/divide/division.hpp"

using test::board_of;
using test::converter;
using test::drawn;
using test::ntc;
using test::Texts;

namespace {

const std::string half = "V1 VCC 0 3.3\nR1 VCC ADC_TEMP 10k\nRT ADC_TEMP 0 10k\n";
const std::string half_declared = converter("\"ADC_TEMP\"") + ntc("RT");  // ten lines

Texts errors_of(const std::string& declarations) {
  const auto board = board_of(half, declarations);
  CHECK(board.division.dividers.empty());
  return board.said;
}

}  // namespace

TEST_CASE("names match without regard to case, and are reported as the netlist spells them") {
  const auto board =
      board_of("V1 Vcc 0 3.3\nR1 VCC Adc_In 10k\nRt ADC_IN 0 10k\n", converter("\"adc_IN\"") + ntc("rT"));
  CHECK(board.only().input.name == "Adc_In");
  CHECK(board.only().sensor_name == "Rt");
  CHECK(drawn(board, board.only()) == "Vcc > R1 > Adc_In > Rt > 0");
}

TEST_CASE("names inside an instance are joined with a point") {
  const auto board = board_of("V1 VCC 0 3.3\nX1 VCC HALF\n.subckt HALF P\nR1 P OUT 10k\nRT OUT 0 10k\n.ends\n",
                              converter("\"x1.out\"") + ntc("\"X1.rt\""));
  CHECK(board.only().input.name == "X1.OUT");
  CHECK(drawn(board, board.only()) == "VCC > X1.R1 > X1.OUT > X1.RT > 0");
}

TEST_CASE("a glob takes every net that fits, in the netlist's order") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC AIN_2 1k\nR2 VCC AIN_1 1k\nR3 VCC AIN_10 1k\nR4 VCC BIN_1 1k\n",
                              converter("\"ain_?\""));
  REQUIRE(board.division.dividers.size() == 2);
  CHECK(board.division.dividers[0].input.name == "AIN_2");
  CHECK(board.division.dividers[1].input.name == "AIN_1");
}

TEST_CASE("only * and ? are special in a glob") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC D[0] 1k\nR2 VCC D0 1k\n", converter("\"D[0]\""));
  CHECK(board.only().input.name == "D[0]");
  CHECK(board_of("V1 VCC 0 3.3\nR2 VCC D0 1k\n", converter("\"D[0]\"")).said.size() == 1);
}

TEST_CASE("a glob of inputs does not take ground for one") {
  const auto board =
      board_of("V1 1 0 3.3\nR1 1 2 1k\n", "[converter.ADC]\nbits = 12\nhigh = \"1\"\ninputs = [\"?\"]\n");
  for (const auto& divider : board.division.dividers) CHECK(divider.input.name != "0");
}

TEST_CASE("the keys of an exact [input] win over those of a glob, whichever stands first") {
  const std::string glob = "[input.\"ADC_*\"]\nleakage = \"1uA\"\ngain = 2\n";
  const std::string exact = "[input.ADC_TEMP]\nleakage = \"2uA\"\n";
  const auto [first, second] = GENERATE_COPY(std::pair{glob, exact}, std::pair{exact, glob});
  const auto board = board_of(half, half_declared + first + second);
  CHECK(board.only().input.leakage == 2e-6);
  CHECK(board.only().input.gain == 2);
}

TEST_CASE("the role of an exact [part] wins over that of a glob, whichever stands first") {
  const std::string glob = "[part.\"R*\"]\nrole = \"load\"\n";
  const std::string exact = "[part.R1]\nrole = \"arm\"\n[part.R3]\nrole = \"arm\"\n";
  const auto [first, second] = GENERATE_COPY(std::pair{glob, exact}, std::pair{exact, glob});
  const auto board = board_of(half + "R2 VCC ADC_TEMP 10k\nR3 VCC ADC_TEMP 10k\n", half_declared + first + second);
  CHECK(drawn(board, board.only()) == "VCC > R1 R3 > ADC_TEMP > RT > 0; load R2");
}

TEST_CASE("a misspelt input is an error at its place with the nearest net") {
  CHECK(errors_of(converter("\"ADC_TMEP\"")) == Texts{"tap.toml:4:11: error: converter \"ADC\": no net of the netlist "
                                                      "is or fits \"ADC_TMEP\"; did you mean \"ADC_TEMP\"?"});
}

TEST_CASE("a glob that fits nothing is an error") {
  CHECK(errors_of(converter("\"ADC_TEMP\", \"Q_*\"")) ==
        Texts{"tap.toml:4:23: error: converter \"ADC\": no net of the netlist is or fits \"Q_*\""});
}

TEST_CASE("a misspelt sensor is an error at its place with the nearest part") {
  CHECK(errors_of(converter("\"ADC_TEMP\"") + ntc("RTT")) ==
        Texts{"tap.toml:5:9: error: sensor \"RTT\" is no element or instance of the netlist; did you mean \"RT\"?"});
}

TEST_CASE("a misspelt part is an error at its place with the nearest part") {
  CHECK(
      errors_of(half_declared + "[part.RTT]\nrole = \"load\"\n") ==
      Texts{"tap.toml:11:7: error: part \"RTT\" matches no element or instance of the netlist; did you mean \"RT\"?"});
}

TEST_CASE("a misspelt rail is an error at its place with the nearest net") {
  CHECK(errors_of(half_declared + "[rail.VCCC]\nvolts = 5\n") ==
        Texts{"tap.toml:11:7: error: rail \"VCCC\" is no net of the netlist; did you mean \"VCC\"?"});
}

TEST_CASE("a swept rail that is misspelt is an error at its place with the nearest net") {
  CHECK(errors_of(converter("\"ADC_TEMP\"") + "[sensor.VCCC]\nkind = \"voltage\"\nfrom = 3\nto = 4\n") ==
        Texts{"tap.toml:5:9: error: rail \"VCCC\" is no net of the netlist; did you mean \"VCC\"?"});
}

TEST_CASE("an [input] that is no input is an error at its place with the nearest input") {
  CHECK(errors_of(half_declared + "[input.ADC_TMEP]\ngain = 2\n") ==
        Texts{"tap.toml:11:8: error: \"ADC_TMEP\" is no input of any converter; did you mean \"ADC_TEMP\"?"});
  CHECK(errors_of(half_declared + "[input.VCC]\ngain = 2\n") ==
        Texts{"tap.toml:11:8: error: \"VCC\" is no input of any converter"});
}

TEST_CASE("an end of the range that is no net is an error at its place with the nearest net") {
  CHECK(errors_of("[converter.ADC]\nbits = 12\nhigh = \"VCCC\"\ninputs = [\"ADC_TEMP\"]\n") ==
        Texts{"tap.toml:3:8: error: no net \"VCCC\" in the netlist; did you mean \"VCC\"?"});
}

TEST_CASE("an end of a sensor off the board that is no net is an error at its place with the nearest net") {
  CHECK(errors_of(converter("\"ADC_TEMP\"") + ntc("AIR", "between = [\"ADC_TEM\", \"0\"]\n")) ==
        Texts{"tap.toml:11:12: error: sensor \"AIR\": no net \"ADC_TEM\" in the netlist; did you mean \"ADC_TEMP\"?"});
}

TEST_CASE("several wrong names are all said at once") {
  CHECK(errors_of(converter("\"Q9\"") + ntc("RTT") + "[rail.VCCC]\nvolts = 5\n").size() == 3);
}

TEST_CASE("ground is known by each of its names") {
  const std::string name = GENERATE(as<std::string>{}, "0", "GND", "gnd", "/GND", "GND!");
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\n",
                              converter("\"A\"") + ntc("AIR", "between = [\"A\", \"" + name + "\"]\n"));
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > AIR > 0");
}

TEST_CASE("a part of a name that says ground makes no net a ground") {
  CHECK(divide::is_ground_name("Vss"));
  CHECK_FALSE(divide::is_ground_name("AGND2"));
  CHECK_FALSE(divide::is_ground_name("X1.AGND"));
  CHECK_FALSE(divide::is_ground_name(""));
}

TEST_CASE("ground is never offered as the net that was meant") {
  CHECK(test::board_of("", test::converter("\"A\"")).said ==
        test::Texts{"tap.toml:4:11: error: converter \"ADC\": no net of the netlist is or fits \"A\""});
}
