#include <cmath>
#include <limits>

#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using base::Level;
using fixtures::findings_of;
using fixtures::set_level;
using fixtures::set_limit;
using fixtures::sound_input;
using model::RuleId;

namespace {

model::AuditedInput poor_span() {
  auto input = sound_input();
  input.figures.span_use = 0.4;
  return input;
}

}  // namespace

TEST_CASE("A limit is the rule's default, then the board's, then the input's") {
  auto input = poor_span();
  CHECK(judge::limit_of(input.divider.input, RuleId::span_use) == 0.5);
  set_limit(input, "span-use", 0.45);
  CHECK(judge::limit_of(input.divider.input, RuleId::span_use) == 0.45);
  CHECK(findings_of(RuleId::span_use, input).at(0).limit == 0.45);
  set_limit(input, "rail-gap", 0.01);
  set_limit(input, "span-use", 0.3);
  CHECK(judge::limit_of(input.divider.input, RuleId::span_use) == 0.3);
  CHECK(findings_of(RuleId::span_use, input).empty());
}

TEST_CASE("A rule whose limit comes from other declarations has none of its own") {
  CHECK(std::isnan(judge::limit_of(fixtures::converter_input(), RuleId::load_error)));
}

TEST_CASE("A level is the rule's, then the board's, then the input's") {
  auto input = poor_span();
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::warning);
  set_level(input, "span-use", Level::error);
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::error);
  set_level(input, "span-use", Level::note);
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::note);
}

TEST_CASE("A declared level counts where the rule itself would say another") {
  auto input = poor_span();
  input.figures.span_best = 0.45;
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::note);
  set_level(input, "span-use", Level::error);
  CHECK(findings_of(RuleId::span_use, input).at(0).level == Level::error);
}

TEST_CASE("A rule that is off finds nothing, and one that an input turns on again does") {
  auto input = poor_span();
  set_level(input, "span-use", std::nullopt);
  CHECK(findings_of(RuleId::span_use, input).empty());
  set_level(input, "span-use", Level::warning);
  CHECK(findings_of(RuleId::span_use, input).size() == 1);
}

TEST_CASE("The levels of the board hold for findings of the board") {
  judge::BoardFacts facts;
  facts.unreadable = {{fixtures::place(3), fixtures::place(3), "", 0}};
  facts.assumptions = {"net GND is ground"};
  facts.levels = {fixtures::level("unreadable-card", Level::error), fixtures::level("assumed-value", std::nullopt)};
  const auto found = fixtures::board_findings(facts);
  REQUIRE(found.size() == 1);
  CHECK(found[0].rule == RuleId::unreadable_card);
  CHECK(found[0].level == Level::error);
}

TEST_CASE("A sound input has no finding at all") {
  CHECK(fixtures::all_findings(sound_input()).empty());
}

TEST_CASE("Findings come in the order of the table of rules, behind those that were there") {
  auto input = sound_input();
  input.figures.engine_gap_lsb = 1;
  input.figures.gap_low = 0.001;
  input.figures.span_use = 0.4;
  input.findings.emplace_back();
  judge::judge_input(input, nullptr);
  REQUIRE(input.findings.size() == 4);
  CHECK(input.findings[0].rule == RuleId::not_audited);
  CHECK(input.findings[1].rule == RuleId::span_use);
  CHECK(input.findings[2].rule == RuleId::rail_gap);
  CHECK(input.findings[3].rule == RuleId::engine_gap);
}

TEST_CASE("A finding stands at the input's declaration where it has no place of its own") {
  CHECK(findings_of(RuleId::span_use, poor_span()).at(0).where.begin.offset == 7);
}

TEST_CASE("A reading that is no number is never a pass: the input is not audited and says why") {
  for (const auto spoil : {0, 1, 2, 3}) {
    auto input = sound_input();
    std::vector<double>* volts[] = {&input.sweep->pin_volts, &input.sweep->pin_low, &input.sweep->pin_high,
                                    &input.sweep->bare_volts};
    (*volts[spoil])[1] = std::numeric_limits<double>::quiet_NaN();
    judge::judge_input(input, nullptr);
    CHECK_FALSE(input.audited);
    CHECK_FALSE(input.sweep);
    CHECK_FALSE(input.figures.span_use);
    REQUIRE(input.findings.size() == 1);
    CHECK(
        input.findings[0].message ==
        "this input is not audited: the reading at 25 degC is no number: the ends of the converter's range meet there, "
        "or a voltage could not be had");
  }
}

TEST_CASE("A leaked reading without number is not dropped from the envelope") {
  auto points = fixtures::solved({0, 1}, {0.2, 0.8}, fixtures::converter_input());
  points.leakage_high = fixtures::volts({1, std::numeric_limits<double>::quiet_NaN()});
  const auto sweep = judge::curve_of(fixtures::converter_input(), points, "x", "");
  CHECK(std::isnan(sweep.pin_high[1]));
}

TEST_CASE("A closed form without number is never a pass") {
  auto input = sound_input();
  auto points = fixtures::solved({-40, 25, 125}, {0.9, 0.5, 0.1}, input.divider.input);
  points.closed_form = fixtures::volts({1, std::numeric_limits<double>::quiet_NaN(), 1});
  input.figures = judge::figures_of(input.divider, points, *input.sweep);
  judge::judge_input(input, nullptr);
  CHECK_FALSE(input.audited);
}
