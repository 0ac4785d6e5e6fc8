// What a reviewer wants beside the curve: ceilings, a better resistor, source resistance, the largest load.
#include <cmath>

#include <catch2/catch.hpp>

#include "tests/audit/board.hpp"

using test::Board;
using test::converter;
using test::input;
using test::ntc;

namespace {

// The sensor RS of 1 to 9 kohm, a declared number in steps of 4 kohm.
const std::string sensor = "[sensor.RS]\nkind = \"parameter\"\nsweep = \"X\"\nfrom = 1000\nto = 9000\n";

model::Figures figures(const std::string& netlist, const std::string& declarations) {
  const Board board("title\n.param X=1k\n" + netlist, declarations);
  const auto run = board.audit();
  const auto& audited = input(run, "A");
  INFO(run.diagnostics);
  REQUIRE(audited.audited);
  return audited.figures;
}

}  // namespace

TEST_CASE("the best span is that of the geometric mean, and the resistor that reaches it is named") {
  // k = 9: (3 - 1)/(3 + 1) = 1/2 at sqrt(1k 9k) = 3 kohm (computed from the swing of a divider, (sqrt k - 1)/(sqrt k +
  // 1)).
  const auto found = figures("V1 VCC 0 3.3\nR1 VCC A 1k\nRS A 0 {X}\n", converter("\"A\"") + sensor);
  CHECK(found.span_best.value_or(0) == Approx(0.5).epsilon(1e-9));
  CHECK(found.span_reachable.value_or(0) == Approx(0.5).epsilon(1e-4));
  CHECK(found.best_part == "R1");
  CHECK(found.best_ohms == Approx(3000).epsilon(0.05));
}

TEST_CASE("a monitored rail can use no more of the range than it swings") {
  const auto found = figures("V1 VCC 0 3.3\nR1 BATT A 30k\nR2 A 0 10k\n",
                             converter("\"A\"") + "[sensor.BATT]\nkind = \"voltage\"\nfrom = 3\nto = 12\n");
  CHECK(found.span_best.value_or(0) == Approx(0.75).epsilon(1e-12));
}

TEST_CASE("a monitored rail can use more of a range that begins above ground") {
  // By hand: 15 V at the top of 1 to 2.5 V puts 9 V at 1.5 V, so 1 V of 1.5 V is used.
  const auto found = figures("R1 BATT A 30k\nR2 A 0 5k\n",
                             "[converter.ADC]\nbits = 12\nlow = 1\nhigh = 2.5\ninputs = [\"A\"]\n[sensor.BATT]\nkind = "
                             "\"voltage\"\nfrom = 9\nto = 15\n");
  CHECK(found.span_best.value_or(0) == Approx(2.0 / 3).epsilon(1e-12));
}

TEST_CASE("where an end of the range is a net of the chain, ceiling and one-port form are those of the reading") {
  // A/REFP = X/(R1 + X) whatever R0: open 1, short 0, source resistance R1 (by hand). In the middle of the sweep, at
  // 5 kohm, REFP is 3.3 V x 6/9 = 2.2 V: those are the volts that a reading of 1 is given as.
  const Board board("title\n.param X=1k\nV1 VCC 0 3.3\nR0 VCC REFP 3k\nR1 REFP A 1k\nRS A 0 {X}\n",
                    "[converter.ADC]\nbits = 12\nhigh = \"REFP\"\ninputs = [\"A\"]\n" + sensor);
  const auto run = board.audit();
  const auto& audited = input(run, "A");
  CHECK(audited.figures.span_use.value_or(0) == Approx(0.4).epsilon(1e-9));
  CHECK(audited.figures.span_best.value_or(0) == Approx(0.5).epsilon(1e-9));
  REQUIRE(audited.divider.bare_form);
  CHECK(audited.divider.bare_form->open_volts == Approx(2.2).epsilon(1e-9));
  CHECK(audited.divider.bare_form->short_volts == Approx(0).margin(1e-12));
  CHECK(audited.divider.bare_form->source_ohms == Approx(1000).epsilon(1e-9));
  // Each of the sweep's bare volts gives its resistance back: Rx = Rs (Vshort - V)/(V - Vopen).
  for (std::size_t i = 0; i < audited.sweep->at.size(); ++i) {
    const double volts = audited.sweep->bare_volts[i];
    CHECK(1000 * (0 - volts) / (volts - 2.2) == Approx(audited.sweep->at[i]).epsilon(1e-9));
  }
}

TEST_CASE("where the low end of the range is the divider's foot the ceiling is that of the quotient") {
  // u = (A - LO)/(9 - LO) = 3.3 X/(9 (R1 + X) + 5.7 R2) (by hand): open 3.3/9, short 0; k = 9 uses half of that at
  // best.
  const auto found = figures("V1 VCC 0 3.3\nR1 VCC A 10k\nRS A LO {X}\nR2 LO 0 100k\n",
                             "[converter.ADC]\nbits = 12\nlow = \"LO\"\nhigh = 9\ninputs = [\"A\"]\n" + sensor);
  CHECK(found.span_best.value_or(0) == Approx(3.3 / 9 / 2).epsilon(1e-9));
  CHECK(found.span_best.value_or(0) > found.span_use.value_or(1));
}

TEST_CASE("a reading without a one-port form has no ceiling") {
  const auto found = figures("V1 VCC 0 3.3\nR1 VCC A 10k\nRS A 0 {X}\n",
                             "[converter.ADC]\nbits = 12\nhigh = \"A\"\ninputs = [\"A\"]\n" + sensor);
  CHECK_FALSE(found.span_best.has_value());
}

TEST_CASE("the source resistance at the pin is the largest of the sweep, sense path included") {
  // 9 kohm parallel to 1 kohm is 900 ohm, and 100 ohm of the sense path behind it (Thevenin).
  const auto found = figures("V1 VCC 0 3.3\nR1 VCC T 1k\nRS T 0 {X}\nR2 T A 100\n", converter("\"A\"") + sensor);
  CHECK(found.pin_source_ohms.value_or(0) == Approx(1000).epsilon(1e-9));
}

TEST_CASE("what loads the divider most is named") {
  const std::string board = "V1 VCC 0 3.3\nR1 VCC T 1k\nRS T 0 {X}\nR2 T A 100\n";
  CHECK(figures(board + "R3 A 0 100k\n", converter("\"A\"") + "input_resistance = \"10M\"\n" + sensor)
            .largest_load.name == "R3");
  CHECK(figures(board + "R3 A 0 10MEG\n", converter("\"A\"") + "input_resistance = \"100k\"\n" + sensor)
            .largest_load.name == "the input resistance");
  CHECK(figures(board + "R3 A 0 10MEG\n", converter("\"A\"") + "leakage = \"100uA\"\n" + sensor).largest_load.name ==
        "leakage");
  CHECK(figures(board + "R3 A 0 10MEG\n", "[converter.ADC]\nbits = 12\nhigh = 3.3\ninputs = [\"A\"]\n" + sensor +
                                              "[rail.VCC]\nvolts = 3.3\nohms = 50\n")
            .largest_load.name == "the source resistance of a rail");
}

TEST_CASE("clamps are named together where they load the divider most") {
  const std::string clamped =
      "V1 VCC 0 3.3\nR1 VCC T 1k\nRS T 0 {X}\nR2 T A 100\nR3 A 0 10MEG\nD1 A 0 DZ\nD2 A 0 DZ\n.model DZ D(IS=1e-12)\n";
  CHECK(figures(clamped, converter("\"A\"") + sensor).largest_load.name == "D1, D2");
}

TEST_CASE("a divider that nothing loads names no load") {
  CHECK(figures("V1 VCC 0 3.3\nR1 VCC A 1k\nRS A 0 {X}\n", converter("\"A\"") + sensor).largest_load.name.empty());
}

TEST_CASE("a stand-in of a resistor is named as load like any part") {
  CHECK(figures("V1 VCC 0 3.3\nR1 VCC T 1k\nRS T 0 {X}\nR2 T A 100\nXU3 A 0 CHIP\n"
                "",
                converter("\"A\"") + sensor + "[part.XU3]\nmodel = \"resistor\"\nohms = \"20k\"\nrole = \"load\"\n")
            .largest_load.name == "XU3");
}

TEST_CASE("what is ratiometric to the range loads nothing") {
  // The rail sags by its source resistance, and the range with it: only the input resistance is left.
  const auto found = figures("R1 VCC T 10k\nRS T 0 {X}\nR3 T A 20k\nR9 VCC 0 1k\n",
                             "[rail.VCC]\nvolts = 5\nohms = 50\n[converter.ADC]\nbits = 16\nhigh = \"VCC\"\ninputs = "
                             "[\"A\"]\ninput_resistance = \"5M\"\n" +
                                 sensor);
  CHECK(found.largest_load.kind == model::LoadKind::input_resistance);
  CHECK(found.largest_load_measurand.kind == model::LoadKind::input_resistance);
}

TEST_CASE("a rail that sags under the range alone is named before leakage that moves less") {
  // The range's rail gives 3.3 V x 2k/2.1k = 3.143 V: 5 % of the reading. 1 uA through at most 10k||9k is 4.7 mV.
  const auto found = figures("V1 VCC 0 5\nR1 VCC A 10k\nRS A 0 {X}\nR3 P3 0 2k\n",
                             "[rail.P3]\nvolts = 3.3\nohms = 100\n[converter.ADC]\nbits = 12\nhigh = "
                             "\"P3\"\ninputs = [\"A\"]\nleakage = \"1uA\"\n" +
                                 sensor);
  // The sag is as much R3's as the rail's: without either there is none.
  CHECK((found.largest_load.kind == model::LoadKind::rail_resistance || found.largest_load.name == "R3"));
}
