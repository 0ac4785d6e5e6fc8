// span-use and span-efficiency.
#include <limits>

#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using base::Level;
using fixtures::findings_of;
using fixtures::set_limit;
using fixtures::sound_input;
using model::RuleId;

namespace {

// Readings of 43, 37 and 31 % at -40, 25 and 125 degC.
model::AuditedInput poor_span() {
  auto input = sound_input();
  const auto points = fixtures::solved({-40, 25, 125}, {0.43, 0.37, 0.31}, input.divider.input);
  input.sweep = judge::curve_of(input.divider.input, points, "temperature", "degC");
  input.figures = judge::figures_of(input.divider, points, *input.sweep);
  return input;
}

void set_reach(model::AuditedInput& input, double best, double reachable) {
  input.figures.span_best = best;
  input.figures.span_reachable = reachable;
  input.figures.best_part = "R7";
  input.figures.best_ohms = 14200;
}

}  // namespace

TEST_CASE("span-use: a poor swing is a warning that says the ceiling and what one resistor reaches") {
  auto input = poor_span();
  set_reach(input, 0.84, 0.813);
  const auto found = findings_of(RuleId::span_use, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::warning);
  CHECK(*found[0].value == Approx(0.12));
  CHECK(*found[0].limit == 0.5);
  CHECK(found[0].unit == "fraction");
  CHECK_FALSE(found[0].at);
  CHECK(found[0].message ==
        "the reading uses 12 % of the range, from 31 % at 125 degC to 43 % at -40 degC, where 50 % is the least "
        "accepted; "
        "84 % can be reached with this sensor; R7 = 14.2 kohm reaches 81.3 %");
}

TEST_CASE("span-use: where even the ceiling is below the limit it is a note that no single resistor reaches it") {
  auto input = poor_span();
  set_reach(input, 0.24, 0.23);
  const auto found = findings_of(RuleId::span_use, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::note);
  CHECK(found[0].message ==
        "the reading uses 12 % of the range, from 31 % at 125 degC to 43 % at -40 degC, where 50 % is the least "
        "accepted; "
        "no value of a single resistor reaches it: R7 = 14.2 kohm reaches 23 %, so it takes gain or a smaller "
        "reference");
  input.figures.span_reachable.reset();
  CHECK(findings_of(RuleId::span_use, input)
            .at(0)
            .message.ends_with("accepted; 24 % is the most between the readings of an open and a shorted sensor, so it "
                               "takes gain or a smaller reference"));
}

TEST_CASE("span-use: a ceiling of exactly the limit is within reach") {
  auto input = poor_span();
  set_reach(input, 0.5, 0.4);
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::warning);
}

TEST_CASE("span-use: without advice the sentence ends at the limit") {
  CHECK(findings_of(RuleId::span_use, poor_span()).at(0).message ==
        "the reading uses 12 % of the range, from 31 % at 125 degC to 43 % at -40 degC, where 50 % is the least "
        "accepted");
}

TEST_CASE("span-use: of a watched rail it speaks of the rail's range") {
  auto input = poor_span();
  input.sweep->sensor_ohms.clear();
  input.sweep->unit = "V";
  input.sweep->at = {9, 12, 16};
  input.figures.span_best = 0.55;
  CHECK(
      findings_of(RuleId::span_use, input).at(0).message ==
      "the reading uses 12 % of the range, from 31 % at 16 V to 43 % at 9 V, where 50 % is the least accepted; 55 % is "
      "the most any divider reaches over this range of the rail");
  input.figures.span_best = 0.4375;
  CHECK(findings_of(RuleId::span_use, input).at(0).message ==
        "the reading uses 12 % of the range, from 31 % at 16 V to 43 % at 9 V, where 50 % is the least accepted; no "
        "divider reaches it: 43.8 % is the most over this range of the rail, so it takes a converter range that begins "
        "nearer to the lowest reading");
}

TEST_CASE("span-use: exactly the limit passes and a hair less does not, told with digits that differ") {
  auto input = poor_span();
  input.figures.span_use = 0.5;
  CHECK(findings_of(RuleId::span_use, input).empty());
  input.figures.span_use = 0.49999;
  const auto found = findings_of(RuleId::span_use, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].message.find("uses 49.999 % of the range") != std::string::npos);
}

TEST_CASE("span-use: the swing is told as the converter clips it") {
  auto input = poor_span();
  input.sweep->pin_volts = {4.0, 3.0, 2.5};
  input.figures.span_use = 0.242;
  CHECK(findings_of(RuleId::span_use, input).at(0).message.find("from 75.8 % at 125 degC to 100 % at -40 degC") !=
        std::string::npos);
}

TEST_CASE("span-use: on a range that runs downwards the smaller reading is told first") {
  auto input = sound_input();
  input.divider.input = fixtures::converter_input(12, 0, -5);
  const auto points = fixtures::solved({-40, 25, 125}, {0.43, 0.37, 0.31}, input.divider.input);
  input.sweep = judge::curve_of(input.divider.input, points, "temperature", "degC");
  input.figures = judge::figures_of(input.divider, points, *input.sweep);
  CHECK(*input.figures.span_use == Approx(0.12));
  CHECK(findings_of(RuleId::span_use, input).at(0).message.find("from 31 % at 125 degC to 43 % at -40 degC") !=
        std::string::npos);
}

TEST_CASE("span-use: names out of the netlist are harmless in the advice") {
  auto input = poor_span();
  set_reach(input, 0.84, 0.8);
  input.figures.best_part = "R\x1b[31m";
  CHECK(findings_of(RuleId::span_use, input).at(0).message.find("; R\\x1b[31m = 14.2 kohm") != std::string::npos);
}

TEST_CASE("span-efficiency: a swing far below what one resistor reaches is a warning") {
  auto input = sound_input();
  input.figures.span_use = 0.6;
  set_reach(input, 0.9, 0.8);
  set_limit(input, "span-efficiency", 0.8);
  const auto found = findings_of(RuleId::span_efficiency, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::warning);
  CHECK(*found[0].value == Approx(0.75));
  CHECK(*found[0].limit == 0.8);
  CHECK(found[0].unit == "fraction");
  CHECK(
      found[0].message ==
      "the reading uses 60 % of the range, which is 75 % of what another resistor value would reach, where 80 % is the "
      "least accepted; R7 = 14.2 kohm reaches 80 %");
}

TEST_CASE("span-efficiency: exactly the limit passes") {
  auto input = sound_input();
  input.figures.span_use = 0.6;
  set_reach(input, 0.9, 0.75);
  set_limit(input, "span-efficiency", 0.6 / 0.75);
  CHECK(findings_of(RuleId::span_efficiency, input).empty());
  set_limit(input, "span-efficiency", 0.81);
  CHECK(findings_of(RuleId::span_efficiency, input).size() == 1);
}

TEST_CASE("span-efficiency: it is not judged where no resistor can be varied, or none reaches anything") {
  auto input = sound_input();
  CHECK(findings_of(RuleId::span_efficiency, input).empty());
  input.figures.span_reachable = 0;
  CHECK(findings_of(RuleId::span_efficiency, input).empty());
}

TEST_CASE("span-efficiency: it is silent beside span-use, and speaks where span-use is off") {
  auto input = poor_span();
  set_reach(input, 0.9, 0.8);
  CHECK(findings_of(RuleId::span_efficiency, input).empty());
  fixtures::set_level(input, "span-use", std::nullopt);
  CHECK(findings_of(RuleId::span_efficiency, input).size() == 1);
}

TEST_CASE("span-efficiency: it speaks beside a span-use that only notes that its limit is out of reach") {
  auto input = poor_span();
  set_reach(input, 0.40, 0.38);
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::note);
  CHECK(findings_of(RuleId::span_efficiency, input).at(0).level == Level::warning);
}

TEST_CASE("span-use: one resistor that also moves the ends may reach beyond the ceiling, and then counts") {
  auto input = poor_span();
  set_reach(input, 0.40, 0.55);
  const auto found = findings_of(RuleId::span_use, input);
  CHECK(found.at(0).level == Level::warning);
  CHECK(found.at(0).message.ends_with("is the least accepted; R7 = 14.2 kohm reaches 55 %"));
}

TEST_CASE("span-use: gain is asked for only where the sensor itself cannot do it") {
  // k = 1000: (sqrt k - 1)/(sqrt k + 1) = 93.9 %, with more than one resistor changed; k = 4: 33.3 %.
  auto input = poor_span();
  set_reach(input, 0.24, 0.23);
  input.sweep->sensor_ohms = {100e3, 10e3, 100};
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::note);
  CHECK(findings_of(RuleId::span_use, input)
            .at(0)
            .message.ends_with("no value of a single resistor reaches it: R7 = 14.2 kohm reaches 23 %; the sensor "
                               "itself allows 93.9 % of a full swing, so more than one value must "
                               "change"));
  input.sweep->sensor_ohms = {400, 200, 100};
  CHECK(findings_of(RuleId::span_use, input).at(0).message.ends_with(", so it takes gain or a smaller reference"));
}

TEST_CASE(
    "span-use: a part that would better be left out or be a link is told beside the resistor that sets the span") {
  auto input = poor_span();
  set_reach(input, 0.40, 0.38);
  input.figures.other = model::Offer{"R8", std::numeric_limits<double>::infinity(), 0.61};
  auto found = findings_of(RuleId::span_use, input);
  CHECK(found.at(0).level == Level::warning);
  CHECK(found.at(0).message.ends_with("; R7 = 14.2 kohm reaches 38 %, without R8 it reaches 61 %"));
  input.figures.other = model::Offer{"R8", 0, 0.61};
  found = findings_of(RuleId::span_use, input);
  CHECK(found.at(0).message.ends_with("; R7 = 14.2 kohm reaches 38 %, R8 as a link reaches 61 %"));
}

TEST_CASE("span-efficiency: what leaving a part out would reach does not count") {
  auto input = sound_input();
  input.figures.span_use = 0.6;
  set_reach(input, 0.65, 0.61);
  input.figures.other = model::Offer{"R8", std::numeric_limits<double>::infinity(), 0.9};
  CHECK(findings_of(RuleId::span_efficiency, input).empty());
}

TEST_CASE("span-use: a reading that stands still is told as that, and no value is offered") {
  auto input = poor_span();
  set_reach(input, 1e-16, 1e-16);
  input.figures.span_use = 1e-16;
  for (double& volts : input.sweep->pin_volts) volts = 1.65;
  auto found = findings_of(RuleId::span_use, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::warning);
  CHECK(found[0].message.rfind("the reading stays at 50 % from ", 0) == 0);
  CHECK(
      found[0].message.ends_with(", so nothing can be read from it; what the sensor moves does not reach the reading"));
  input.sweep->sensor_ohms.clear();
  input.divider.input.high = model::NetId{3};
  CHECK(findings_of(RuleId::span_use, input)
            .at(0)
            .message.ends_with("the converter's range follows the rail: it takes a range that stands still"));
}
