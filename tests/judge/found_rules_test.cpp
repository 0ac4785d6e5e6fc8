// no-divider, no-sensor, not-audited, unmodelled-part, suspect-value, ambiguous-tap: what was found on the board.
#include <limits>

#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using base::Level;
using fixtures::all_findings;
using fixtures::findings_of;
using fixtures::sound_input;
using model::RuleId;

namespace {

// Figures that every rule of the sweep would object to.
model::AuditedInput bad_figures() {
  auto input = sound_input();
  input.figures.span_use = 0;
  input.figures.gap_low = -1;
  input.figures.gap_high = 0;
  input.figures.load_error_lsb = 1e3;
  input.figures.engine_gap_lsb = 1e3;
  return input;
}

model::AuditedInput with_candidates(double first, double second) {
  auto input = sound_input();
  model::TapCandidate a;
  a.net = model::NetId{1};
  a.weight_volts = first;
  a.arm = true;
  a.branches = {{"R3", {}}};
  model::TapCandidate b = a;
  b.net = model::NetId{2};
  b.weight_volts = second;
  b.share = second / first;
  b.branches = {{"X1.R5", {}}, {"R6", {}}};
  input.divider.candidates = {b, a};
  return input;
}

}  // namespace

TEST_CASE("no-divider: an input without a divider is an error with the reason, and nothing else is said of it") {
  auto input = bad_figures();
  input.divider.no_divider = "no resistor leads from ADC_AIR to a rail";
  const auto found = all_findings(input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].rule == RuleId::no_divider);
  CHECK(found[0].level == Level::error);
  CHECK(found[0].message == "there is no divider at this input: no resistor leads from ADC_AIR to a rail");
}

TEST_CASE("no-divider: such an input is a result and stays audited without a sweep") {
  auto input = sound_input();
  input.divider.no_divider = "none";
  input.sweep.reset();
  judge::judge_input(input, nullptr);
  CHECK(input.audited);
  CHECK(input.findings.size() == 1);
}

TEST_CASE("no-sensor: a divider in which nothing varies is a warning that names its parts") {
  auto input = bad_figures();
  input.divider.no_sensor = true;
  input.divider.upper = {{"R1", {}}};
  input.divider.lower = {{"R2", {}}, {"X1.R3", {}}};
  const auto found = all_findings(input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].rule == RuleId::no_sensor);
  CHECK(found[0].level == Level::warning);
  CHECK(
      found[0].message ==
      "nothing in this divider varies (R1, R2 and X1.R3), so there is no span to judge; declare the part that does as "
      "[sensor.NAME] with its kind and range, a rail that is watched as kind = \"voltage\"");
}

TEST_CASE("no-sensor: without a divider the missing divider is all that is said") {
  auto input = sound_input();
  input.divider.no_sensor = true;
  input.divider.no_divider = "none";
  CHECK(findings_of(RuleId::no_sensor, input).empty());
}

TEST_CASE("not-audited: each reason is an error of its own, and no rule of the sweep speaks") {
  auto input = bad_figures();
  input.audited = false;
  input.divider.not_audited = {"the simulator ran out of time after 20 s", "a card on TAP could not be read"};
  input.divider.no_divider = "none";
  input.divider.no_sensor = true;
  const auto found = all_findings(input);
  REQUIRE(found.size() == 2);
  CHECK(found[0].rule == RuleId::not_audited);
  CHECK(found[0].level == Level::error);
  CHECK(found[0].message == "this input is not audited: the simulator ran out of time after 20 s");
  CHECK(found[1].message == "this input is not audited: a card on TAP could not be read");
}

TEST_CASE("not-audited: an input that claims a result without a sweep is not audited") {
  auto input = sound_input();
  input.sweep.reset();
  judge::judge_input(input, nullptr);
  CHECK_FALSE(input.audited);
  REQUIRE(input.findings.size() == 1);
  CHECK(input.findings[0].message == "this input is not audited: no sweep was solved");
}

TEST_CASE("not-audited: an input without result and without reason still says so") {
  auto input = sound_input();
  input.audited = false;
  CHECK(all_findings(input).at(0).message == "this input is not audited: no result came back, and no reason with it");
}

TEST_CASE("not-audited: what a reason quotes from the netlist is harmless on a terminal") {
  auto input = sound_input();
  input.audited = false;
  input.divider.not_audited = {"net \x1b[2J"};
  CHECK(all_findings(input).at(0).message == "this input is not audited: net \\x1b[2J");
}

TEST_CASE("unmodelled-part: a part that is taken as open is a note at its card, once for all nets that it touches") {
  const fixtures::SmallBoard board;
  auto input = sound_input();
  input.divider.unmodelled.resize(2);
  for (auto& touch : input.divider.unmodelled) {
    touch.element = board.j1;
    touch.taken_as_open = true;
  }
  input.divider.unmodelled[0].net = board.tap;
  input.divider.unmodelled[1].net = board.conn;
  const auto found = findings_of(RuleId::unmodelled_part, input, nullptr, board.view());
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::note);
  CHECK(found[0].message == "J1 touches TAP and CONN and has no value: it is taken as open");
  CHECK(found[0].where.begin.offset == 13);
  CHECK(found[0].where.length == 16);
}

TEST_CASE("unmodelled-part: any other part is an error that says which stand-in to declare, beside not-audited") {
  const fixtures::SmallBoard board;
  auto input = sound_input();
  input.audited = false;
  input.divider.not_audited = {"X1.U7 has no model"};
  input.divider.unmodelled.resize(1);
  input.divider.unmodelled[0].element = board.u7;
  input.divider.unmodelled[0].net = board.tap;
  judge::judge_input(input, nullptr, board.view());
  REQUIRE(input.findings.size() == 2);
  CHECK(input.findings[0].rule == RuleId::not_audited);
  CHECK(input.findings[1].level == Level::error);
  CHECK(input.findings[1].message ==
        "X1.U7 touches TAP and has no model \"opamp\" in the netlist: what it draws is unknown, so the input is not "
        "audited until a stand-in is declared, such as [part.\"X1.U7\"] model = \"open\"");
  CHECK(input.findings[1].where.begin.offset == 30);
}

TEST_CASE("unmodelled-part: a part that the view does not know is still told") {
  auto input = sound_input();
  input.divider.unmodelled.resize(1);
  input.divider.unmodelled[0].taken_as_open = true;
  const auto found = findings_of(RuleId::unmodelled_part, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].message == "a part touches a net and has no model: it is taken as open");
  CHECK(found[0].where.begin.offset == 7);
}

TEST_CASE("unmodelled-part: an input whose parts all have models has none") {
  CHECK(findings_of(RuleId::unmodelled_part, sound_input()).empty());
}

TEST_CASE("suspect-value: both readings are given, at the value itself") {
  // SPICE's reading of 4k7 measured with ngspice 39
  const fixtures::SmallBoard board;
  auto input = sound_input();
  input.divider.suspects = {{board.r1, board.literal, 4700, 4000}};
  const auto found = findings_of(RuleId::suspect_value, input, nullptr, board.view());
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::note);
  CHECK(found[0].message == "\"4k7\" of R1 is 4.7 kohm to the builder of the board, but SPICE reads 4 kohm");
  CHECK(found[0].where.begin.offset == 9);
}

TEST_CASE("suspect-value: mega and milli are told apart by more than a letter's case") {
  const fixtures::SmallBoard board;
  auto input = sound_input();
  input.divider.suspects = {{board.r1, board.literal, 1e6, 1e-3}};
  const auto found = findings_of(RuleId::suspect_value, input, nullptr, board.view());
  REQUIRE(found.size() == 1);
  CHECK(found[0].message == "\"4k7\" of R1 is 1 megohm to the builder of the board, but SPICE reads 1 milliohm");
}

TEST_CASE("suspect-value: a value in which SPICE sees no number says so, on inputs without result too") {
  auto input = sound_input();
  input.audited = false;
  input.divider.suspects = {{{}, {}, 0.1, std::numeric_limits<double>::quiet_NaN()}};
  const auto found = findings_of(RuleId::suspect_value, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].message == "the value of a part is 0.1 to the builder of the board, but SPICE reads no number");
}

TEST_CASE("ambiguous-tap: two arms at two nodes are named, the heavier first") {
  const fixtures::SmallBoard board;
  const auto found = findings_of(RuleId::ambiguous_tap, with_candidates(1.2, 0.3), nullptr, board.view());
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::note);
  CHECK(*found[0].value == Approx(0.25));
  CHECK(*found[0].limit == 0.1);
  CHECK(found[0].unit == "fraction");
  CHECK(found[0].message ==
        "more than one node counts as an arm (10 % of the heaviest, each at its own node, is enough): without its "
        "branches the pin moves: R3 at "
        "TAP by 1.2 V, X1.R5 and R6 at CONN by 300 mV; where firmware does not reckon with one, say [part.\"X1.R5\"] "
        "role "
        "= \"load\"");
}

TEST_CASE("ambiguous-tap: exactly the limit makes an arm, and a raised limit silences the note") {
  auto input = with_candidates(2, 0.5);
  fixtures::set_limit(input, "ambiguous-tap", 0.25);
  CHECK(findings_of(RuleId::ambiguous_tap, input).size() == 1);
  fixtures::set_limit(input, "ambiguous-tap", 0.26);
  CHECK(findings_of(RuleId::ambiguous_tap, input).empty());
}

TEST_CASE("ambiguous-tap: an arm below the limit that alone leads to a second rail is told as what it is") {
  const fixtures::SmallBoard board;
  auto input = with_candidates(1.2, 0.06);
  CHECK(findings_of(RuleId::ambiguous_tap, input, nullptr, board.view()).empty());
  for (auto& candidate : input.divider.candidates) candidate.only_way = candidate.weight_volts == 0.06;
  const auto found = findings_of(RuleId::ambiguous_tap, input, nullptr, board.view());
  REQUIRE(found.size() == 1);
  CHECK(*found[0].value == Approx(0.05));
  CHECK(found[0].message ==
        "without its branches the pin moves: X1.R5 and R6 at CONN by 60 mV, R3 at TAP by 1.2 V; the first is below the "
        "10 % of the heaviest that makes an arm, and counts as one because nothing else leads to a second rail; where "
        "that is right, say [part.\"X1.R5\"] role = \"arm\"");
}

TEST_CASE("ambiguous-tap: what is taken for load and moves the reading by more than a twentieth of its swing is told") {
  const fixtures::SmallBoard board;
  auto input = with_candidates(1.2, 0.06);
  auto& load = input.divider.candidates[0];
  load.arm = false;
  load.of_swing = 0.05;
  CHECK(findings_of(RuleId::ambiguous_tap, input, nullptr, board.view()).empty());
  load.of_swing = 0.08;
  const auto found = findings_of(RuleId::ambiguous_tap, input, nullptr, board.view());
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::note);
  CHECK(*found[0].value == Approx(0.05));
  CHECK(found[0].message ==
        "taken for load, though without its branches the pin moves: X1.R5 and R6 at CONN by 60 mV (8 % of its swing); "
        "where firmware reckons with one, say [part.\"X1.R5\"] role = \"arm\"");
  load.declared = true;
  CHECK(findings_of(RuleId::ambiguous_tap, input, nullptr, board.view()).empty());
}

TEST_CASE("ambiguous-tap: one arm is no question, nor is one whose role is declared") {
  auto load = with_candidates(1.2, 0.3);
  load.divider.candidates[0].arm = false;
  CHECK(findings_of(RuleId::ambiguous_tap, load).empty());
  auto declared = with_candidates(1.2, 0.3);
  declared.divider.candidates[0].declared = true;
  CHECK(findings_of(RuleId::ambiguous_tap, declared).empty());
}

TEST_CASE("no-sensor: of many parts five are named and the others counted") {
  auto input = sound_input();
  input.divider.no_sensor = true;
  for (const char* name : {"R1", "R2", "R3", "R4", "R5", "R6"}) input.divider.upper.push_back({name, {}});
  CHECK(all_findings(input).at(0).message.find("(R1, R2, R3, R4, R5 and R6)") != std::string::npos);
  input.divider.lower = {{"R7", {}}};
  CHECK(all_findings(input).at(0).message.find("(R1, R2, R3, R4, R5 and 2 more)") != std::string::npos);
}

TEST_CASE(
    "unmodelled-part: why there is no model is said with the word that the card has, and without one of letters") {
  using Why = model::Unmodelled::Why;
  const auto message = [](Why why, char letter) {
    fixtures::SmallBoard board;
    board.circuit.elements[board.u7.index()].letter = letter;
    std::get<model::Unmodelled>(board.circuit.elements[board.u7.index()].part).why = why;
    auto input = sound_input();
    input.divider.unmodelled.resize(1);
    input.divider.unmodelled[0] = {board.u7, board.tap, false};
    const auto found = findings_of(RuleId::unmodelled_part, input, nullptr, board.view());
    return found.empty() ? std::string() : found[0].message.substr(0, found[0].message.find(": what it draws"));
  };
  CHECK(message(Why::unknown_letter, 'u') == "X1.U7 touches TAP and has no model here (it is \"opamp\")");
  CHECK(message(Why::unsupported, 'e') == "X1.U7 touches TAP and has no model here (it is \"opamp\")");
  CHECK(message(Why::no_value, 'r') == "X1.U7 touches TAP and has no value: \"opamp\" is no model here and no number");
  CHECK(message(Why::no_value, 'v') == "X1.U7 touches TAP and has no value: \"opamp\" is no number");
  CHECK(message(Why::parameter_name, 'r') ==
        "X1.U7 touches TAP and has no value: the parameter \"opamp\" stands without braces");
  CHECK(message(Why::bad_value, 'r') == "X1.U7 touches TAP and has no value: \"opamp\" is no number");
  // Its card's error is told at the card and as the reason why the input is not audited.
  CHECK(message(Why::broken_card, 'r').empty());
}
