// What stands in the way of an audit: parts without a model and cards that cannot be read.
#include <catch2/catch.hpp>

#include "divide/touch.hpp"
#include "tests/divide/division.hpp"

using test::board_of;
using test::converter;
using test::drawn;
using test::ntc;
using test::Texts;

namespace {

const std::string half = "V1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n";  // lines 2 to 4
const std::string declared = converter("\"A\"") + ntc("RT");

test::Board broken(const std::string& netlist) {
  return board_of(half + netlist, declared, {}, true);
}

Texts unread(const std::string& line) {
  return {"the card at board.cir:" + line +
          " could not be read and names a net of its network: expected a number, a name or a bracket, found the end"};
}

}  // namespace

TEST_CASE("a part without a model on the tap stops the audit, and the sentence says what to declare") {
  const auto board = board_of(half + "XU3 A 0 B OPAMP\n", declared);
  CHECK(board.only().not_audited ==
        Texts{"what XU3 does is not known, and it is in the way: declare a stand-in for it"});
  REQUIRE(board.only().unmodelled.size() == 1);
  CHECK_FALSE(board.only().unmodelled[0].taken_as_open);
}

TEST_CASE("a part without a model anywhere on the input's network stops the audit") {
  CHECK(board_of(half + "R2 A PIN 1k\nR3 PIN FAR 1MEG\nXU3 FAR 0 B OPAMP\n", declared).only().not_audited.size() == 1);
}

TEST_CASE("a part without a model behind a rail, or on another network, stops nothing") {
  CHECK(board_of(half + "XU3 VCC 0 B OPAMP\n", declared).only().not_audited.empty());
}

// Class letters of IEEE 315.
TEST_CASE("connectors, test points, diodes and capacitors without a model are taken as open") {
  const std::string card =
      GENERATE(as<std::string>{}, "J1 A 0 B PLUG", "P2 A 0 PLUG", "TP3 A PAD", "D1 A VCC CLAMP", "C1 A 0");
  INFO(card);
  const auto board = board_of(half + card + "\n", declared);
  CHECK(board.only().not_audited.empty());
  if (card[0] != 'C') {  // a capacitor is open by nature
    REQUIRE(board.only().unmodelled.size() == 1);
    CHECK(board.only().unmodelled[0].taken_as_open);
    CHECK(board.net(board.only().unmodelled[0].net) == "A");
  }
}

TEST_CASE("the class letters of a designator decide, not its first letter and not its path") {
  CHECK(divide::is_taken_as_open("J1", 'j'));
  CHECK(divide::is_taken_as_open("tp12", 't'));
  CHECK(divide::is_taken_as_open("X1.X2.D3", 'd'));
  CHECK(divide::is_taken_as_open("XJ1", 'x'));
  CHECK(divide::is_taken_as_open("X1.XTP3", 'x'));
  CHECK_FALSE(divide::is_taken_as_open("XU1", 'x'));
  CHECK_FALSE(divide::is_taken_as_open("X1", 'x'));
  CHECK_FALSE(divide::is_taken_as_open("PS1", 'p'));
  CHECK_FALSE(divide::is_taken_as_open("DS1", 'd'));
  CHECK_FALSE(divide::is_taken_as_open("D1.U2", 'u'));
  CHECK_FALSE(divide::is_taken_as_open("U7", 'u'));
  CHECK_FALSE(divide::is_taken_as_open("", '?'));
  CHECK_FALSE(divide::is_taken_as_open("1", '1'));
}

TEST_CASE("a stand-in of open takes the part away") {
  const auto board = board_of(half + "XU3 A 0 B OPAMP\n", declared + "[part.XU3]\nmodel = \"open\"\n");
  CHECK(board.only().not_audited.empty());
  CHECK(board.only().unmodelled.empty());
}

TEST_CASE("a stand-in of open takes a modelled part away too") {
  const auto board = board_of(half + "R2 A 0 10k\n", declared + "[part.R2]\nmodel = \"open\"\n");
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0");
}

TEST_CASE("a stand-in of a resistor counts with its ohms") {
  const auto board = board_of(half + "XU3 A 0 CHIP\n",
                              declared + "[part.XU3]\nmodel = \"resistor\"\nohms = \"5k\"\nrole = \"load\"\n");
  CHECK(board.only().not_audited.empty());
  CHECK(board.pin_volts(board.only(), 3)[1] == Approx(3.3 / 4).epsilon(1e-12));
  CHECK(board.bare_volts(board.only(), 3)[1] == Approx(1.65).epsilon(1e-12));
  CHECK(drawn(board, board.only()) == "VCC > R1 > A > RT > 0; load XU3");
}

TEST_CASE("a stand-in of a resistor for a part of three pins is refused at its place") {
  CHECK(board_of(half + "XU3 A 0 B OPAMP\n", declared + "[part.XU3]\nmodel = \"resistor\"\nohms = \"5k\"\n").said ==
        Texts{"tap.toml:12:9: error: part \"XU3\" has 3 pins; a resistor has two"});
}

TEST_CASE("the declared converter needs no model") {
  const std::string own = "[converter.XU1]\nbits = 12\nhigh = \"VCC\"\ninputs = [\"A\"]\n" + ntc("RT");
  CHECK(board_of(half + "XU1 A VCC 0 CHIP\n", own).only().not_audited.empty());
  CHECK(board_of(half + "XU1 A VCC 0 CHIP\nXU2 A VCC 0 CHIP\n", own).only().not_audited.size() == 1);
}

TEST_CASE("an unreadable card that names a net of the network stops the audit, and its line is named") {
  CHECK(broken("R9 A 0 {47k*}\n").only().not_audited == unread("5"));
  CHECK(broken("R2 A PIN 1k\nR9 pin 0 {47k*}\n").only().not_audited == unread("6"));
}

TEST_CASE("an unreadable card that names no net of the network stops nothing") {
  CHECK(broken("R9 VCC B {47k*}\n").only().not_audited.empty());
}

TEST_CASE("an unreadable card on continued lines is known by all of them") {
  CHECK(broken("R9 B\n+ A\n+ {47k*}\n").only().not_audited == unread("5"));
  CHECK(broken("R9 B\n+A {47k*}\n").only().not_audited == unread("5"));
}

TEST_CASE("an unreadable card inside a subcircuit is found by the inner name of a net") {
  CHECK(broken("X1 A BOX\n.subckt BOX P\nR1 P INNER 1k\nR2 INNER 0 {47k*}\n.ends\n").only().not_audited == unread("8"));
}

TEST_CASE("an unreadable card inside a subcircuit is found by the name of the port that its net comes in by") {
  CHECK(broken("X1 A BOX\n.subckt BOX P\nR2 P 0 {47k*}\n.ends\n").only().not_audited == unread("7"));
}

TEST_CASE("an input with several obstacles names them all") {
  CHECK(broken("R9 A 0 {47k*}\nXU3 A 0 B OPAMP\nXU4 A 0 B OPAMP\n").only().not_audited ==
        Texts{"what XU3, XU4 do is not known, and they are in the way: declare a stand-in for each", unread("5")[0]});
}

TEST_CASE("a source in the network that follows the current of a rail's source stops the audit") {
  CHECK(
      board_of(half + "F1 0 A V1 0.01\n", declared).only().not_audited ==
      Texts{"F1 follows the current of V1, which feeds a whole rail: let it follow a source of 0 V in the branch that "
            "it means"});
}

TEST_CASE("the voltage of the divider's own rail is in its network") {
  const auto board = board_of("V1 VCC 0 3V3\nV2 VDD 0 1V8\nR1 VCC A 4.7k\nRT A 0 10k\n", declared);
  REQUIRE(board.only().suspects.size() == 1);
  CHECK(board.names.text(board.circuit.elements[board.only().suspects[0].element.index()].name) == "V1");
}

TEST_CASE("a suspect value is told where it stands in the input's network and nowhere else") {
  const auto board = board_of("V1 VCC 0 3.3\nR1 VCC A 4k7\nRT A 0 10k\nR9 VCC 0 2k2\n", declared);
  REQUIRE(board.only().suspects.size() == 1);
  CHECK(board.names.text(board.circuit.elements[board.only().suspects[0].element.index()].name) == "R1");
}
