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
  const auto board = board_of("RA VCC A 10k\nRT A 0 10k\nRB VCC B 10k\nRU B 0 10k\n",
                              converter("\"A\"") + ntc("RT") + "[rail.VCC]\nvolts = 3.3\nohms = 100\n");
  CHECK(drawn(board, board.at("A")) == "VCC > RA > A > RT > 0; load RB RU");
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
  CHECK(picture("RT VCC B 10k\nR1 PIN X 1k\nR2 X Y 1k\n") ==
        "no resistive way leads from it to a rail; net Y is no rail: if it is meant to be one, declare [rail.\"Y\"] "
        "volts");
}

TEST_CASE("an input on a rail has no divider, and the rail is named") {
  CHECK(picture("RT VCC 0 10k\nL1 PIN VCC 1u\n") == "it is tied to rail VCC");
  CHECK(picture("RT VCC 0 10k\nR0 PIN 0 0\n") == "it is tied to rail 0");
}

TEST_CASE("an input whose arms lead to one rail has no divider, and the rail is named") {
  CHECK(picture("R1 PIN 0 10k\nRT PIN 0 10k\n") == "its network reaches no rail but 0");
  CHECK(picture("RT PIN VCC 10k\n") == "both its arms lead to one rail, VCC");
}

TEST_CASE("a net that would be a rail if it were declared is named") {
  const std::string up = "; net +3V3 is no rail: if it is meant to be one, declare [rail.\"+3V3\"] volts";
  CHECK(picture("R1 +3V3 PIN 10k\nRT PIN 0 10k\n") == "its network reaches no rail but 0" + up);
  CHECK(picture("R1 +3V3 PIN 10k\nRT PIN 0 10k\nR2 +3V3 B 1k\nR3 B 0 1k\nR4 +3V3 C 1k\nR5 C 0 1k\n") ==
        "its network reaches no rail but 0" + up);
  CHECK(picture("RT VCC PIN 10k\nR1 PIN -5V 10k\n") ==
        "both its arms lead to one rail, VCC; net -5V is no rail: if it is meant to be one, declare [rail.\"-5V\"] "
        "volts");
}

TEST_CASE("a sensor whose far end leads nowhere is not audited, and the net is named") {
  const auto board = board_of(supply + "R1 VCC PIN 10k\nR2 PIN 0 10k\nRT PIN B 10k\n", declared);
  CHECK(board.only().not_audited ==
        test::Texts{"net B, the far end of sensor RT, leads to no rail, so nothing flows through the sensor: if it is "
                    "meant to be a rail, declare [rail.\"B\"] volts"});
  CHECK_FALSE(board.only().sensor.has_value());
  CHECK(board.only().lower.empty());
}

TEST_CASE("a sensor whose far end leads on through a switch or transistor is not audited, and the part is named") {
  const std::string part =
      GENERATE(as<std::string>{}, "M1 S G 0 0 NM\n.model NM NMOS(VTO=1)\n",
               "M1 S G 0 0 NM\nR7 S T 10\n.model NM NMOS\n", "S1 S 0 G 0 SW\n.model SW SW(VT=1 RON=1)\n");
  const auto board = board_of(supply + "R1 VCC PIN 10k\nRT PIN S 10k\nV2 G 0 5\n" + part, declared);
  CHECK(board.only().not_audited ==
        test::Texts{"the far end of sensor RT leads to net S and on through " + part.substr(0, 2) +
                    " only; this version takes resistances, rails and current sources for arms"});
  CHECK(board.only().no_divider.empty());
}

TEST_CASE("a pull-up that leads on through a part that is no arm is not audited, and the part is named") {
  const auto board_with = [](const std::string& netlist) {
    return board_of(supply + "RT PIN 0 10k\nR1 P PIN 10k\n" + netlist, declared);
  };
  const auto switched = board_with("M1 P G VCC VCC PM\nV2 G 0 0\n.model PM PMOS(VTO=-1)\n");
  CHECK(switched.only().not_audited == test::Texts{"R1 leads to net P and on through M1 only; this version takes "
                                                   "resistances, rails and current sources for arms"});
  const auto buffered = board_with("R7 VCC Q 1k\nR8 Q 0 1k\nE1 P 0 Q 0 1\n");
  CHECK(buffered.only().not_audited == test::Texts{"R1 leads to net P and on through E1 only; this version takes "
                                                   "resistances, rails and current sources for arms"});
}

TEST_CASE("a light pull-up before a heavy attenuator is an arm: at its own node it weighs as much") {
  const auto board = board_of("V1 V24 0 24\nR1 V24 A 10k\nRT A 0 10k\nR2 A PIN 150k\nR3 PIN 0 10k\n",
                              "[converter.ADC]\nbits = 12\nhigh = 3.3\ninputs = [\"PIN\"]\n" + ntc("RT"));
  CHECK(drawn(board, board.only()) == "V24 > R1 > PIN > RT R2 R3 > 0");
  const auto& candidates = board.only().candidates;
  REQUIRE(candidates.size() == 2);
  CHECK(candidates[0].arm);
  CHECK_FALSE(candidates[0].only_way);
  CHECK(candidates[0].weight_volts < candidates[1].weight_volts / 10);
  CHECK(candidates[0].share > 0.5);
  // 24 V over 10k and 10k || 160k, and 1/16 of that (voltage divider rule).
  const double tap = 24 * (1 / (1 / 10e3 + 1 / 160e3)) / (10e3 + 1 / (1 / 10e3 + 1 / 160e3)) / 16;
  CHECK(board.bare_volts(board.only(), 3)[1] == Approx(tap).epsilon(1e-12));
}

TEST_CASE("the fixed resistor of a divider before a heavy attenuator is an arm on either side and before a bias") {
  const auto of = [](const std::string& netlist) {
    const auto board = board_of("V1 V24 0 24\nV2 VB 0 1.65\n" + netlist + "R2 A PIN 150k\n",
                                "[converter.ADC]\nbits = 12\nhigh = 3.3\ninputs = [\"PIN\"]\n" + ntc("RT"));
    return drawn(board, board.only());
  };
  CHECK(of("RT V24 A 10k\nR1 A 0 10k\nR3 PIN 0 10k\n") == "V24 > RT R2 > PIN > R1 R3 > 0");
  CHECK(of("RT V24 A 10k\nRL V24 A 22k\nR1 A 0 10k\nR3 PIN 0 10k\n") == "V24 > RT RL R2 > PIN > R1 R3 > 0");
  CHECK(of("R1 V24 A 10k\nRT A 0 10k\nR3 PIN VB 10k\n") == "V24 > R1 > PIN > RT R3 R2 > 0");
}

TEST_CASE("a wire-break pull-up before a heavy attenuator stays load") {
  const auto board =
      board_of("V1 V24 0 24\nRT CON 0 10k\nR9 V24 CON 1MEG\nR8 CON T 10\nR1 V24 T 10k\nR2 T PIN 150k\nR3 PIN 0 10k\n",
               "[converter.ADC]\nbits = 12\nhigh = 3.3\ninputs = [\"PIN\"]\n" + ntc("RT"));
  CHECK(test::list(board.only().load) == "R9");
  CHECK(board.only().candidates.front().of_swing < 0.05);
}

TEST_CASE("how much of the swing a load moves is told with it") {
  // At 32.56 kohm (0 degC) the tap is seen through 7.65 kohm: 100 kohm behind it takes 7.1 % (voltage divider rule).
  const auto board = board_of(supply + "R1 VCC T 10k\nRT T 0 10k\nR2 T PIN 100\nR3 PIN 0 100k\n", declared);
  const auto& load = board.only().candidates.back();
  CHECK(test::list(load.branches) == "R3");
  CHECK_FALSE(load.arm);
  CHECK(load.weight_volts == Approx(0.18).epsilon(0.05));
  CHECK(load.of_swing > 0.1);
}

TEST_CASE("resistors in parallel from the tap to another input are load, not arm and sense path at once") {
  const auto board = board_of(supply + "R1 VCC A 10k\nRT A 0 10k\nR5 A P1 1k\nR6 A P2 2k\nR7 A P2 2k\n",
                              converter("\"P1\", \"P2\"") + ntc("RT"));
  CHECK(drawn(board, board.at("P1")) == "VCC > R1 > A > RT > 0; sense R5; load R6 R7");
  CHECK(drawn(board, board.at("P2")) == "VCC > R1 > A > RT > 0; sense R6 R7; load R5");
}

TEST_CASE("a resistor under a link is load, and listed once") {
  CHECK(picture("R1 VCC A 10k\nRT A 0 10k\nR5 A B 1k\nR0 A B 0\nR6 B PIN 1k\n") ==
        "VCC > R1 > A > RT > 0; sense R0 R6; load R5");
}

TEST_CASE("an input joined to a rail behind a resistance by a link has no divider") {
  const auto board = board_of("R1 VCC A 10k\nRT A 0 10k\nR2 A PIN 22k\nR0 PIN VCC 0\n",
                              declared + "[rail.VCC]\nvolts = 3.3\nohms = 1\n");
  CHECK(board.only().no_divider == "it is tied to rail VCC");
}

TEST_CASE("an input behind a follower is not taken for one that nothing drives") {
  const std::string draws = GENERATE(as<std::string>{}, "C1 PIN 0 10n\n", "R3 PIN 0 100k\n");
  const auto board = board_of(supply + "R1 VCC A 10k\nRT A 0 10k\nE1 B 0 A 0 1\nR2 B PIN 1k\n" + draws, declared);
  CHECK(board.only().no_divider.empty());
  CHECK(board.only().not_audited ==
        test::Texts{"sensor RT moves it through E1; this version follows a sensor along resistances to the pin only"});
}

TEST_CASE("an input that a source drives which nothing moves, and no rail, has no divider") {
  CHECK(picture("RT VCC 0 10k\nR1 VCC A 10k\nR2 A 0 10k\nE1 B 0 A 0 1\nR3 B PIN 1k\n") ==
        "no resistive way leads from it to a rail, and nothing declared moves what drives it");
}

TEST_CASE("two dividers on a buffered supply are not audited, and the buffer is named") {
  const auto board =
      board_of(supply +
                   "R8 VCC Q 10k\nR9 Q 0 10k\nE1 EXC 0 Q 0 1\nR1 EXC A 10k\nRT A 0 10k\nR2 EXC B 10k\nRU "
                   "B 0 10k\n",
               converter("\"A\"") + ntc("RT") + ntc("RU"));
  CHECK(board.only().not_audited ==
        test::Texts{"R1 leads to net EXC and on through E1; this version takes resistances, rails and current sources "
                    "for arms"});
}

TEST_CASE("an end of the range between tap and pin is refused") {
  const auto board =
      board_of(supply + "R1 VCC T 10k\nRT T 0 10k\nR2 T REF 10\nR3 REF PIN 220\n",
               "[converter.ADC]\nbits = 12\nlow = \"REF\"\nhigh = \"VCC\"\ninputs = [\"PIN\"]\n" + ntc("RT"));
  CHECK(board.only().not_audited ==
        test::Texts{
            "net REF, an end of its range, lies between tap and pin: what the divider reads cannot be told there"});
}

TEST_CASE("the heaviest of the pull-ups below the share is the arm, lighter ones are load") {
  const std::string lineariser = "R1 C 0 10k\nRT C 0 10k\n";
  CHECK(picture("R2 VCC A 220k\nR9 A PIN 1k\nR3 A C 1k\n" + lineariser) == "VCC > R2 > A > R3 R1 RT > 0; sense R9");
  CHECK(picture("R2 VCC A 220k\nR9 A PIN 1k\nR3 A D 500\nR4 D C 500\nR8 VCC D 2.2MEG\n" + lineariser) ==
        "VCC > R2 > A > R3 R4 R1 RT > 0; sense R9; load R8");
}

TEST_CASE("a role on any part of a branch is the branch's") {
  const std::string light = "R1 VCC PIN 1k\nRT A 0 10k\nR2 A PIN 100\nR3A A M 150k\nR3B M VCC 150k\n";
  CHECK(picture(light) == "VCC > R1 > PIN > RT R2 > 0; load R3A R3B");
  CHECK(picture(light, "[part.R3B]\nrole = \"arm\"\n") == "VCC > R1 R3A R3B > PIN > RT R2 > 0");
  const std::string heavy = "R1 VCC PIN 1k\nRT A 0 10k\nR2 A PIN 100\nR3A A M 1500\nR3B M VCC 1500\n";
  CHECK(picture(heavy) == "VCC > R1 R3A R3B > PIN > RT R2 > 0");
  for (const std::string part : {"R3A", "R3B"}) {
    const auto board = board_of(supply + heavy, declared + "[part." + part + "]\nrole = \"load\"\n");
    CHECK(drawn(board, board.only()) == "VCC > R1 > PIN > RT R2 > 0; load R3A R3B");
    CHECK(board.only().candidates.front().declared);
    CHECK_FALSE(board.only().candidates.front().arm);
  }
}

TEST_CASE("a role of load on a part behind a branch leaves the rest of the branch an arm") {
  CHECK(picture("R1 VCC M 1k\nR2 M PIN 1k\nR3 M 0 100k\nRT PIN 0 10k\n", "[part.R3]\nrole = \"load\"\n") ==
        "VCC > R1 R2 > PIN > RT > 0; load R3");
}

TEST_CASE("a role of load on the only way from the sensor to the pin is refused") {
  const auto board =
      board_of(supply + "R1 VCC PIN 1k\nRT A 0 10k\nR2 A PIN 100\n", declared + "[part.R2]\nrole = \"load\"\n");
  CHECK(board.only().not_audited ==
        test::Texts{"sensor RT moves it through R2; this version follows a sensor along resistances to the pin only"});
}

TEST_CASE("the role of a stand-in for an instance is that of the instance") {
  CHECK(picture("R1 VCC PIN 10k\nRT PIN 0 10k\nXL PIN 0 BOX\n.subckt BOX A B\nR1 A B 1k\n.ends\n",
                "[part.XL]\nmodel = \"resistor\"\nohms = \"20k\"\nrole = \"load\"\n") ==
        "VCC > R1 > PIN > RT > 0; load XL");
}

TEST_CASE("what else hangs on a swept rail with ohms is no arm and no tap") {
  const auto board = board_of(
      supply + "R1 VBAT PIN 10k\nR2 PIN 0 10k\nR3 VBAT 0 3\n",
      converter("\"PIN\"") + "[rail.VBAT]\nohms = 50\n[sensor.VBAT]\nkind = \"voltage\"\nfrom = 3\nto = 3.3\n");
  CHECK(drawn(board, board.only()) == "VBAT > R1 > PIN > R2 > 0; load R3");
}

TEST_CASE("resistors parallel to the sense path are the sense path") {
  CHECK(picture("R1 VCC T 1k\nRT T 0 10k\nR2 T PIN 1k\nR3 T M 1k\nR4 M PIN 1k\nR5 PIN 0 5MEG\n") ==
        "VCC > R1 > T > RT > 0; sense R2 R3 R4; load R5");
}

TEST_CASE("an ammeter of 0 V in the lower arm is a part of it") {
  const auto board = board_of(supply + "R1 VCC PIN 10k\nRT PIN A 10k\nVS A 0 0\nF1 0 PIN VS 0.2\n", declared);
  CHECK(board.only().not_audited.empty());
  CHECK(drawn(board, board.only()) == "VCC > R1 > PIN > RT VS > 0; load F1");
  // At 10 kohm: (3.3 - v)/10k + 0.2 v/10k = v/10k (Kirchhoff's current law).
  CHECK(board.pin_volts(board.only(), 3)[1] == Approx(3.3 / 1.8).epsilon(1e-12));
}

TEST_CASE("a sensor's own model of a source that follows its ammeter to ground is audited") {
  const auto board = board_of(
      supply +
          "R1 VCC PIN 10k\nXT PIN 0 BEAD R=1k\n.subckt BEAD P N PARAMS: R=1\nE1 P M VALUE={I(VS)*R}\nVS M N 0\n.ends\n",
      converter("\"PIN\"") + "[sensor.XT]\nkind = \"parameter\"\nsweep = \"R\"\nfrom = 5000\nto = 15000\n");
  CHECK(board.only().not_audited.empty());
  CHECK(drawn(board, board.only()) == "VCC > R1 > PIN > XT > 0");
  REQUIRE(board.only().sensor_form);
  CHECK(board.only().sensor_form->source_ohms == Approx(10e3).epsilon(1e-12));
}

TEST_CASE("a pull-up from a supply behind a resistance that others share is on the supply's side") {
  const auto board = board_of("V1 V33 0 3.3\nRF V33 VCC 0.2\nR1 VCC A 10k\nRT A 0 10k\nR2 VCC B 10k\nR3 B 0 10k\n",
                              converter("\"A\"") + ntc("RT"));
  CHECK(drawn(board, board.at("A")) == "V33 > RF R1 > A > RT R2 R3 > 0");
}
