#include <algorithm>
#include <fmt/format.h>

#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

bool is_rail(const model::Sweep& sweep) {
  return sweep.sensor_ohms.empty();
}

// "from 31 % at 125 degC to 43 % at -40 degC", as the converter clips it.
std::string swing_text(const model::AuditedInput& input, const std::string& unit) {
  const auto& volts = input.sweep->pin_volts;
  const auto end_text = [&](auto end) {
    const double reading = std::clamp(input.divider.input.reading_of(*end), 0.0, 1.0);
    const auto i = static_cast<std::size_t>(end - volts.begin());
    return fmt::format("{} at {}", percent_text(reading), measurand_text(input.sweep->at[i], unit));
  };
  auto [low, high] = std::minmax_element(volts.begin(), volts.end());
  if (input.divider.input.volts_of(1) < input.divider.input.volts_of(0)) std::swap(low, high);
  return fmt::format("from {} to {}", end_text(low), end_text(high));
}

// What would help, as clauses that follow the sentence.
std::string help_text(const model::AuditedInput& input, bool within_reach) {
  const model::Figures& figures = input.figures;
  const bool rail = is_rail(*input.sweep);
  const std::string reach = reach_text(figures);
  std::string text;
  const auto ceiling = ceiling_of(figures);
  if (!ceiling) return reach.empty() ? text : "; " + reach;
  const std::string best = percent_text(*ceiling);
  if (within_reach) {
    text = rail ? fmt::format("; {} is the most any divider reaches over this range of the rail", best)
                : fmt::format("; {} is the most any resistance reaches with this sensor", best);
    return reach.empty() ? text : text + "; " + reach;
  }
  text = rail ? fmt::format("; no divider reaches it: {} is the most over this range of the rail", best)
              : fmt::format("; no resistance reaches it: {} is the most with this sensor", best);
  if (!reach.empty()) text += fmt::format(" ({})", reach);
  return text + (rail ? ", so it takes a converter range that begins nearer to the lowest reading"
                      : ", so it takes gain or a smaller reference");
}

void run(const InputContext& context, Findings& out) {
  const model::Figures& figures = context.input.figures;
  const double limit = limit_of(context.input.divider.input, model::RuleId::span_use);
  if (!figures.span_use || *figures.span_use >= limit) return;
  const bool within_reach = ceiling_of(figures).value_or(limit) >= limit;
  const Compared texts = compared_percent(*figures.span_use, limit);
  model::Finding finding = out.blank();
  if (!within_reach) finding.level = base::Level::note;
  finding.value = figures.span_use;
  finding.limit = limit;
  finding.unit = "fraction";
  finding.message =
      fmt::format("the reading uses {} of the range, {}, where {} is the least accepted{}", texts.value,
                  swing_text(context.input, context.unit), texts.limit, help_text(context.input, within_reach));
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule span_use{model::RuleId::span_use, Stage::sweep, {}, run, nullptr};

}  // namespace judge::rules
