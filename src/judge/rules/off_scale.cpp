#include <fmt/format.h>
#include <optional>

#include "judge/ends.hpp"
#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

// The measurand at which the envelope passes the end, between the points next to each other where it first does;
// nothing where it is past the end all along.
std::optional<double> crossing(const model::AuditedInput& input, const EndGap& end) {
  const model::Sweep& sweep = *input.sweep;
  const bool high = end.name == "high";
  const bool reversed = input.divider.input.volts_of(1) < input.divider.input.volts_of(0);
  const std::vector<double>& volts = high != reversed ? sweep.pin_high : sweep.pin_low;
  const auto gap = [&](std::size_t i) {
    const double reading = input.divider.input.reading_of(volts[i]);
    return high ? 1 - reading : reading;
  };
  for (std::size_t i = 0; i + 1 < volts.size(); ++i) {
    const double here = gap(i);
    const double next = gap(i + 1);
    if ((here < 0) != (next < 0)) return sweep.at[i] + (sweep.at[i + 1] - sweep.at[i]) * here / (here - next);
  }
  return std::nullopt;
}

std::string help_text(const InputContext& context, const EndGap& end) {
  if (end.name == "low")
    if (const std::string text = unliftable_text(context.input, end.point, context.unit); !text.empty())
      return "; " + text;
  if (end.nominal_gap >= 0) return "; without leakage it stays on scale, so a smaller resistance at the pin would do";
  const std::string reach = reach_text(context.input.figures);
  if (reach.empty()) return "; other arm values, less gain or a wider range would keep it on scale";
  return fmt::format("; {} of the range and stays on scale", reach);
}

void run(const InputContext& context, Findings& out) {
  const model::AuditedInput& input = context.input;
  const Tolerated tolerated = tolerated_excess(input.divider.input);
  for (const EndGap& end : end_gaps(input)) {
    const double excess = -end.gap;
    if (excess <= tolerated.fraction) continue;
    const Compared texts = compared_percent(excess, tolerated.fraction);
    const std::optional<double> leaves = crossing(input, end);
    model::Finding finding = out.blank();
    finding.value = excess;
    finding.limit = tolerated.fraction;
    finding.unit = "fraction";
    finding.at = input.sweep->at[end.point];
    finding.message =
        fmt::format("the reading passes the {} end of the range by {} at {}, where {} ({}) is the most accepted; {}{}",
                    end.name, texts.value, measurand_text(*finding.at, context.unit), texts.limit, tolerated.reason,
                    leaves ? fmt::format("it crosses the end at {}", measurand_text(*leaves, context.unit))
                           : std::string{"it is past the end over the whole sweep"},
                    help_text(context, end));
    out.add(std::move(finding));
  }
}

}  // namespace

extern constinit const Rule off_scale{model::RuleId::off_scale,
                                      Stage::sweep,
                                      {model::ConditionKind::leakage_high, model::ConditionKind::leakage_low},
                                      run,
                                      nullptr};

}  // namespace judge::rules
