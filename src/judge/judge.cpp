#include "judge/judge.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <utility>

#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge {
namespace {

// The setting of a rule among levels or limits: a later one wins.
template <class Setting>
const Setting* last_of(std::span<const Setting> settings, model::RuleId rule) {
  const std::string_view name = model::rule_text(rule).name;
  for (std::size_t i = settings.size(); i-- > 0;)
    if (settings[i].rule == name) return &settings[i];
  return nullptr;
}

bool all_finite(const std::vector<double>& values) {
  return std::all_of(values.begin(), values.end(), [](double value) { return std::isfinite(value); });
}

// Why an input that claims a result has none. A comparison with "not a number" is false, so such a reading would pass
// every limit in silence.
std::string missing_result(const model::AuditedInput& input) {
  if (!input.sweep || input.sweep->at.empty()) return "no sweep was solved";
  const model::Sweep& sweep = *input.sweep;
  for (const auto* volts : {&sweep.pin_volts, &sweep.pin_low, &sweep.pin_high, &sweep.bare_volts})
    if (volts->size() != sweep.at.size()) return "the sweep is not complete";
  for (std::size_t i = 0; i < sweep.at.size(); ++i)
    for (const auto* volts : {&sweep.pin_volts, &sweep.pin_low, &sweep.pin_high, &sweep.bare_volts})
      if (!std::isfinite((*volts)[i]))
        return fmt::format(
            "the reading at {} is no number: the ends of the converter's range meet there, or a voltage "
            "could not be had",
            measurand_text(sweep.at[i], sweep.unit));
  if (!all_finite(sweep.at)) return "the sweep's points are no numbers";
  if (!std::isfinite(input.figures.engine_gap_lsb.value_or(0))) return "the closed form of the network is no number";
  return {};
}

bool ends_without_sweep(const model::Divider& divider) {
  return !divider.no_divider.empty() || divider.no_sensor;
}

void settle_result(model::AuditedInput& input) {
  if (!input.audited || ends_without_sweep(input.divider)) return;
  std::string reason = missing_result(input);
  if (reason.empty()) return;
  input.audited = false;
  input.sweep.reset();
  input.figures = {};
  input.divider.not_audited.push_back(std::move(reason));
}

}  // namespace

std::optional<double> declared_limit(const model::Input& input, model::RuleId rule) {
  const auto* setting = last_of<model::LimitSetting>(input.limits, rule);
  return setting == nullptr ? std::nullopt : std::optional{setting->limit.value};
}

double limit_of(const model::Input& input, model::RuleId rule) {
  return declared_limit(input, rule).value_or(model::rule_text(rule).limit);
}

bool is_off(std::span<const model::LevelSetting> levels, model::RuleId rule) {
  const auto* setting = last_of(levels, rule);
  return setting != nullptr && !setting->level.value;
}

model::Finding Findings::blank() const {
  model::Finding finding;
  finding.rule = rule_;
  finding.level = model::rule_text(rule_).level;
  finding.where = where_;
  return finding;
}

void Findings::add(model::Finding finding) {
  if (is_off(levels_, rule_)) return;
  if (const auto* setting = last_of(levels_, rule_)) finding.level = *setting->level.value;
  list_.push_back(std::move(finding));
}

void judge_input(model::AuditedInput& input, const model::SensorDeclaration* sensor, const BoardView& board) {
  settle_result(input);
  const bool swept = input.audited && input.sweep && !ends_without_sweep(input.divider);
  const InputContext context{input, sensor, input.sweep ? input.sweep->unit : std::string{}, board};
  model::FindingList found;
  for (const Rule* rule : all_rules()) {
    if (rule->run_input == nullptr || (rule->stage == Stage::sweep && !swept)) continue;
    const source::Span where = input.place.valid() ? input.place : input.divider.input.declared_at;
    Findings out(rule->id, input.divider.input.levels, where, found);
    rule->run_input(context, out);
  }
  input.findings.insert(input.findings.end(), std::make_move_iterator(found.begin()),
                        std::make_move_iterator(found.end()));
}

void judge_board(model::BoardReport& report, const BoardFacts& facts) {
  model::FindingList found;
  for (const Rule* rule : all_rules()) {
    if (rule->run_board == nullptr) continue;
    Findings out(rule->id, facts.levels, facts.netlist, found);
    rule->run_board({report, facts}, out);
  }
  report.findings.insert(report.findings.end(), std::make_move_iterator(found.begin()),
                         std::make_move_iterator(found.end()));
}

}  // namespace judge
