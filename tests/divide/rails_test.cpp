// Rails: nodes held at a known voltage, by a declaration or by a source.
#include <cmath>

#include <catch2/catch.hpp>

#include "tests/divide/division.hpp"

using test::board_of;
using test::converter;
using test::drawn;
using test::ntc;
using test::Texts;

namespace {

const std::string half = "R1 VCC A 10k\nRT A 0 10k\n";
const std::string half_declared = converter("\"A\"") + ntc("RT");

// Volts of input A at 25 degC, where the sensor is 10 kohm: half of what the rails are apart.
double middle(const test::Board& board) {
  return board.pin_volts(board.at("A"), 3)[1];
}

}  // namespace

TEST_CASE("a source from a net to ground makes the net a rail at its voltage") {
  const auto board = board_of("V1 VCC 0 3.3\n" + half, half_declared);
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0");
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
  CHECK(board.only().input.nominal_high == 3.3);
}

TEST_CASE("a source with its minus end up holds its rail below ground") {
  const auto board = board_of("V1 VCC 0 5\nV2 0 VEE 5\nR1 VCC A 10k\nRT A VEE 10k\n", half_declared);
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > VEE");
  CHECK(middle(board) == Approx(0).margin(1e-12));
}

TEST_CASE("a source of negative volts makes a lower rail") {
  const auto board = board_of("V1 VCC 0 5\nV2 VEE 0 -3\nR1 VCC A 10k\nRT A VEE 10k\n", half_declared);
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > VEE");
  CHECK(middle(board) == Approx(1).epsilon(1e-12));
}

TEST_CASE("sources chained on a rail make rails in any order of the cards") {
  const auto board = board_of("V2 VCC MID 1.3\nV1 MID 0 2\n" + half, half_declared);
  CHECK(board.only().input.nominal_high == 3.3);
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("a declared rail wins over a source of the netlist") {
  const auto board = board_of("V1 VCC 0 3.3\n" + half, half_declared + "[rail.VCC]\nvolts = 5\n");
  CHECK(board.only().not_audited.empty());
  CHECK(middle(board) == Approx(2.5).epsilon(1e-12));
}

TEST_CASE("a rail may be declared where no source feeds it") {
  const auto board = board_of(half, half_declared + "[rail.VCC]\nvolts = 5\n");
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0");
  CHECK(middle(board) == Approx(2.5).epsilon(1e-12));
}

TEST_CASE("two sources that hold one net at different voltages stop the audit, and the sentence names source and net") {
  const auto board = board_of("V1 VCC 0 3.3\nV2 VCC 0 5\n" + half, half_declared);
  CHECK(board.only().not_audited == Texts{"V2 and another source hold VCC at different voltages"});
}

TEST_CASE("two sources that agree are one rail") {
  const auto board = board_of("V1 VCC 0 3.3\nV2 VCC 0 3.3\n" + half, half_declared);
  CHECK(board.only().not_audited.empty());
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("sources that agree but for the last bits of a sum are no conflict") {
  const std::string last = GENERATE(as<std::string>{}, "V3 VCC 0 3.3\n", "V3 OUT 0 3.3\nV4 OUT VCC 0\n");
  const auto board = board_of("V1 MID 0 1.1\nV2 VCC MID 2.2\n" + last + half, half_declared);
  CHECK(board.only().not_audited.empty());
}

TEST_CASE("a source of zero volts across a link between its own ends is no conflict") {
  const auto board = board_of("V1 IN 0 3.3\nV2 IN VCC 0\nR0 IN VCC 0\n" + half, half_declared);
  CHECK(board.only().not_audited.empty());
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("a conflict on a rail that an input's network does not meet leaves that input alone") {
  const auto board = board_of("V1 VCC 0 3.3\nV2 X 0 5\nV3 X 0 6\nR9 X 0 1k\n" + half, half_declared);
  CHECK(board.only().not_audited.empty());
}

TEST_CASE("a rail with ohms stands behind them in the whole network and not in the bare divider") {
  const auto board = board_of("V1 VCC 0 3.3\n" + half, half_declared + "[rail.VCC]\nvolts = 3.3\nohms = 20000\n");
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0");
  CHECK(middle(board) == Approx(3.3 / 4).epsilon(1e-12));
  CHECK(board.bare_volts(board.only(), 3)[1] == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("all that hangs on a rail with ohms shares its drop") {
  const auto board = board_of("R9 VCC 0 10k\n" + half, half_declared + "[rail.VCC]\nvolts = 3\nohms = 10000\n");
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0; load R9");
  // 10k parallel to 20k under 10k of the rail: 3 V * 6.667/16.667, half of it at the tap (voltage divider rule).
  CHECK(middle(board) == Approx(0.6).epsilon(1e-12));
}

TEST_CASE("a ferrite or a zero-ohm link carries a rail to the net behind it") {
  const std::string link = GENERATE(as<std::string>{}, "L1 VIN VCC 1u\n", "R0 VIN VCC 0\n");
  const auto board = board_of("V1 VIN 0 3.3\n" + link + half, half_declared);
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
  CHECK(board.only().input.nominal_high == 3.3);
}

TEST_CASE("one node may not be declared as two rails with different volts") {
  const auto board =
      board_of("L1 VIN VCC 1u\n" + half, half_declared + "[rail.VIN]\nvolts = 5\n[rail.VCC]\nvolts = 3.3\n");
  CHECK(board.said ==
        Texts{"tap.toml:13:7: error: rail \"VCC\" is joined to rail \"VIN\" by shorts: declare one of them"});
  CHECK(board.division.dividers.empty());
}

TEST_CASE("one node declared twice with the same volts is one rail") {
  const auto board =
      board_of("L1 VIN VCC 1u\n" + half, half_declared + "[rail.VIN]\nvolts = 3.3\n[rail.VCC]\nvolts = 3.3\n");
  CHECK(board.said.empty());
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE(
    "a rail that a parameter sets has no nominal volts before it is solved, and stands on its side by its sweep") {
  const auto board = board_of(".param x=2\nV1 V 0 5\nV2 REF 0 {x}\nR1 V A 10k\nRB A 0 {x*5k}\n",
                              "[converter.ADC]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\"]\n[sensor.RB]\nkind = "
                              "\"parameter\"\nsweep = \"x\"\nfrom = 1\nto = 3\n");
  CHECK(std::isnan(board.only().input.nominal_high));
  CHECK(board.only().whole.high.valid());
}

TEST_CASE("a rail whose source is an expression is the upper one by its volts over the sweep") {
  const auto board = board_of(".param x=3.3\nV1 V 0 {x}\nR1 V A 10k\nR2 A 0 10k\n",
                              "[converter.ADC]\nbits = 12\nhigh = 3.3\ninputs = [\"A\"]\n[sensor.V1]\nkind = "
                              "\"parameter\"\nsweep = \"x\"\nfrom = 3\nto = 3.6\n");
  CHECK(drawn(board, board.only()) == "V > R1 > A > R2 > 0");
  CHECK(board.pin_volts(board.only(), 3)[2] == Approx(1.8).epsilon(1e-12));
}

TEST_CASE("a net named like a ground is taken for ground, and the assumption is said") {
  const std::string name = GENERATE(as<std::string>{}, "AGND", "DGND", "VSS", "agnd", "/AGND");
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A " + name + " 10k\n", half_declared);
  CHECK(board.assumed() == Texts{"net " + name + " is taken for ground by its name"});
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0");
  CHECK(middle(board) == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("a net named like a ground that has a source of its own is not taken for ground") {
  const auto board = board_of("V1 VCC 0 3.3\nV2 AGND 0 0.3\nR1 VCC A 10k\nRT A AGND 10k\n", half_declared);
  CHECK(board.assumed().empty());
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > AGND");
  CHECK(middle(board) == Approx(1.8).epsilon(1e-12));
}

TEST_CASE("a net named like a ground that is declared as a rail is not taken for ground") {
  const auto board =
      board_of("V1 VCC 0 3.3\nR1 VCC A 10k\nRT A VSS 10k\n", half_declared + "[rail.VSS]\nvolts = -3.3\n");
  CHECK(board.assumed().empty());
  CHECK(middle(board) == Approx(0).margin(1e-12));
}

TEST_CASE("a net with a ground's name inside a subcircuit is not taken for ground") {
  const auto board = board_of(
      "V1 VCC 0 3.3\nX1 VCC A HALF\nRT A 0 10k\n.subckt HALF P Q\nR1 P AGND 5k\nR2 AGND Q 5k\n.ends\n", half_declared);
  CHECK(board.assumed().empty());
  CHECK(drawn(board, board.only()) == "VCC > X1.R1 X1.R2 > A > RT > 0");
}
