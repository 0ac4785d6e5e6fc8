#include <fmt/format.h>

#include "judge/ends.hpp"
#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

std::string help_text(const InputContext& context, const EndGap& end, double limit) {
  if (end.name == "low")
    if (const std::string text = unliftable_text(context.input, end.point, context.unit); !text.empty())
      return "; " + text;
  if (end.nominal_gap >= limit)
    return fmt::format("; without leakage it is {}, so a smaller resistance at the pin would do",
                       compared_percent(end.nominal_gap, end.gap).value);
  const std::string reach = reach_text(context.input.figures);
  if (reach.empty()) return "; other arm values, less gain or a wider range would keep it off the end";
  return fmt::format("; {} of the range with both ends clear", reach);
}

// Not beside off-scale at the same end: that says the same, louder.
void run(const InputContext& context, Findings& out) {
  const model::AuditedInput& input = context.input;
  const double limit = limit_of(input.divider.input, model::RuleId::rail_gap);
  for (const EndGap& end : end_gaps(input)) {
    if (end.gap >= limit || is_off_scale(input.divider.input, end)) continue;
    const Compared texts = compared_percent(end.gap, limit);
    model::Finding finding = out.blank();
    finding.value = end.gap;
    finding.limit = limit;
    finding.unit = "fraction";
    finding.at = input.sweep->at[end.point];
    finding.message = fmt::format("the gap to the {} end of the range is {} at {}, where {} is the least accepted{}",
                                  end.name, texts.value, measurand_text(*finding.at, context.unit), texts.limit,
                                  help_text(context, end, limit));
    out.add(std::move(finding));
  }
}

}  // namespace

extern constinit const Rule rail_gap{model::RuleId::rail_gap,
                                     Stage::sweep,
                                     {model::ConditionKind::leakage_high, model::ConditionKind::leakage_low},
                                     run,
                                     nullptr};

}  // namespace judge::rules
