// Small boards through every stage and the real worker.
#include <catch2/catch.hpp>

#include "tests/audit/board.hpp"

using test::Board;
using test::converter;
using test::input;
using test::ntc;
using test::rules;

TEST_CASE("an input is audited: its curve, codes and figures are those of the divider") {
  const Board board("title\nV1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n", converter("\"A\"") + ntc("RT"));
  const auto run = board.audit();
  CHECK(run.report.done_in_whole);
  const auto& audited = input(run, "A");
  CHECK(audited.audited);
  REQUIRE(audited.sweep);
  // At 25 degC the sensor equals the resistor: half the supply, code floor(4096/2 + 1/2) (voltage divider rule).
  CHECK(audited.sweep->at == std::vector{0.0, 25.0, 50.0});
  CHECK(audited.sweep->pin_volts[1] == Approx(1.65).epsilon(1e-9));
  CHECK(audited.sweep->bare_volts[1] == Approx(1.65).epsilon(1e-9));
  CHECK(audited.sweep->sensor_ohms[1] == Approx(10e3).epsilon(1e-12));
  CHECK(audited.sweep->code[1] == 2048);
  CHECK(audited.figures.pin_source_ohms.has_value());
}

TEST_CASE("a swept rail that is the converter's reference too reads the same all over") {
  const Board board("title\nR1 VCC A 10k\nR2 A 0 10k\n",
                    converter("\"A\"") + "[sensor.VCC]\nkind = \"voltage\"\nfrom = 3\nto = 3.6\n");
  const auto run = board.audit();
  const auto& audited = input(run, "A");
  REQUIRE(audited.sweep);
  CHECK(audited.sweep->code == std::vector<long long>{2048, 2048, 2048});
}

TEST_CASE("a reference with a divider of its own is read at every point") {
  const Board board("title\nV1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\nR5 VCC REF 1k\nR6 REF 0 2k\n",
                    "[converter.ADC]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\"]\n" + ntc("RT"));
  const auto run = board.audit();
  const auto& audited = input(run, "A");
  CHECK(audited.audited);
  REQUIRE(audited.sweep);
  // REF is 2.2 V, the tap 1.65 V at 25 degC: three quarters of the range (voltage divider rule).
  CHECK(audited.sweep->code[1] == 3072);
  CHECK(audited.divider.input.nominal_high == Approx(2.2).epsilon(1e-9));
  CHECK(audited.sweep->pin_volts[1] == Approx(1.65).epsilon(1e-9));
  CHECK(audited.figures.load_error_lsb.value_or(1) == Approx(0).margin(1e-6));
}

TEST_CASE("a reference across a resistor of the sensor's own chain cancels the chain's current") {
  const Board board("title\nV1 VCC 0 3.3\nR0 VCC REF 1k\nR1 REF A 10k\nRT A 0 10k\n",
                    "[converter.ADC]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\"]\n" + ntc("RT"));
  const auto run = board.audit();
  const auto& audited = input(run, "A");
  REQUIRE(audited.sweep);
  // Between REF and ground 10 kohm stand over 10 kohm: one half, whatever R0 drops (voltage divider rule).
  CHECK(audited.sweep->code[1] == 2048);
  CHECK(audited.divider.input.nominal_high == Approx(3.3 * 20 / 21).epsilon(1e-9));
  CHECK(audited.sweep->pin_volts[1] == Approx(3.3 * 10 / 21).epsilon(1e-9));
  CHECK(audited.figures.load_error_lsb.value_or(1) == Approx(0).margin(1e-6));
}

TEST_CASE("a sensor that a ferrite shorts moves nothing, and that is the finding") {
  const Board board("title\nV1 VCC 0 3.3\nR1 VCC A 10k\nR2 A 0 10k\nRT A B 10k\nL1 A B 1u\n",
                    converter("\"A\"") + ntc("RT"));
  const auto run = board.audit();
  CHECK(rules(input(run, "A").findings) == "no-sensor");
}

TEST_CASE(
    "findings of an input point to its sensor's card, else to the divider's first part, else to the declaration") {
  const std::string two =
      "title\nV1 VCC 0 3.3\nR1 VCC A 1meg\nRT A 0 10k\nR2 VCC B 1meg\nR3 B 0 10k\nC1 C 0 1n\n"
      "R4 VCC D 1meg\nX1 D 0 BEAD\n.subckt BEAD a b\nR1 a b 10k\n.ends\n";
  const auto run = Board(two, converter("\"A\", \"B\", \"C\", \"D\"") + ntc("RT") + ntc("X1")).audit();
  const auto line = [&run](std::string_view name) {
    const auto& finding = input(run, name).findings.front();
    return run.report.sources[finding.where.begin.source].name.substr(run.report.netlist.size() - 9) + ':' +
           std::to_string(run.report.sources.position(finding.where.begin).line);
  };
  CHECK(line("A") == "board.cir:4");
  CHECK(line("B") == "board.cir:5");
  CHECK(line("D") == "board.cir:9");
  CHECK(input(run, "C").findings.front().where.begin.source != input(run, "A").findings.front().where.begin.source);
}
