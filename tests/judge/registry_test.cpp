#include <map>

#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using fixtures::all_findings;
using fixtures::board_findings;
using fixtures::sound_input;
using model::ConditionKind;
using model::RuleId;

namespace {

model::AuditedInput with(void (*change)(model::AuditedInput&)) {
  auto input = sound_input();
  change(input);
  return input;
}

judge::BoardFacts facts_of_everything() {
  judge::BoardFacts facts;
  facts.unreadable = {{fixtures::place(1), fixtures::place(1), "", 0}};
  facts.missing_includes = {{fixtures::place(2), "clamp.lib: no such file"}};
  facts.assumptions = {"net AGND is ground"};
  facts.suspects = {{fixtures::place(3), 2}};
  return facts;
}

// A scene in which the rule has a finding. A rule of the table without one here fails the test below.
model::FindingList scene(RuleId rule) {
  switch (rule) {
    case RuleId::no_divider:
      return all_findings(with([](auto& input) { input.divider.no_divider = "no resistor leads to a rail"; }));
    case RuleId::no_sensor:
      return all_findings(with([](auto& input) { input.divider.no_sensor = true; }));
    case RuleId::not_audited:
      return all_findings(with([](auto& input) { input.audited = false; }));
    case RuleId::unmodelled_part:
      return all_findings(with([](auto& input) { input.divider.unmodelled.emplace_back(); }));
    case RuleId::ambiguous_tap:
      return all_findings(with([](auto& input) {
        input.divider.candidates.resize(2);
        for (auto& candidate : input.divider.candidates) candidate.arm = true;
      }));
    case RuleId::span_use:
      return all_findings(with([](auto& input) { input.figures.span_use = 0.1; }));
    case RuleId::span_efficiency:
      return all_findings(with([](auto& input) {
        input.figures.span_use = 0.6;
        input.figures.span_reachable = 0.9;
      }));
    case RuleId::rail_gap:
      return all_findings(with([](auto& input) { input.figures.gap_low = 0.01; }));
    case RuleId::off_scale:
      return all_findings(with([](auto& input) { input.figures.gap_low = -0.1; }));
    case RuleId::load_error:
      return all_findings(with([](auto& input) { input.figures.load_error_lsb = 9; }));
    case RuleId::engine_gap:
      return all_findings(with([](auto& input) { input.figures.engine_gap_lsb = 1; }));
    case RuleId::suspect_value:
    case RuleId::assumed_value:
    case RuleId::unreadable_card:
    case RuleId::missing_include:
      return board_findings(facts_of_everything());
  }
  return {};
}

}  // namespace

TEST_CASE("Every rule of the table has a finding in some scene") {
  for (const model::RuleText& text : model::rules) {
    INFO(text.name);
    bool found = false;
    for (const model::Finding& finding : scene(text.id)) found = found || finding.rule == text.id;
    CHECK(found);
  }
}

TEST_CASE("No message is empty, ends in a full stop, or holds a control character") {
  for (const model::RuleText& text : model::rules)
    for (const model::Finding& finding : scene(text.id)) {
      INFO(finding.message);
      REQUIRE_FALSE(finding.message.empty());
      CHECK(finding.message.back() != '.');
      CHECK(finding.message.find('\n') == std::string::npos);
    }
}

TEST_CASE("The rules stand in the order of the table, each under its own id, and each judges something") {
  const auto rules = judge::all_rules();
  REQUIRE(rules.size() == model::rules.size());
  for (std::size_t i = 0; i < rules.size(); ++i) {
    CHECK(rules[i]->id == model::rules[i].id);
    CHECK((rules[i]->run_input != nullptr || rules[i]->run_board != nullptr));
  }
}

TEST_CASE("The needs of all rules are each condition once, nominal first") {
  CHECK(judge::needs_of() == std::vector{ConditionKind::nominal, ConditionKind::leakage_high,
                                         ConditionKind::leakage_low, ConditionKind::bare});
}

TEST_CASE("A rule without needs still has the nominal condition") {
  CHECK(judge::needs_of({}) == std::vector{ConditionKind::nominal});
  const judge::Rule bare_only{RuleId::load_error, judge::Stage::sweep, {ConditionKind::bare}, nullptr, nullptr};
  const judge::Rule* const rules[] = {&bare_only};
  CHECK(judge::needs_of(rules) == std::vector{ConditionKind::nominal, ConditionKind::bare});
}
