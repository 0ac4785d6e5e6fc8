#include <fmt/format.h>

#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

// Where span-use warns, it says the same and more. Where it only notes that its limit is out of reach, what could be
// reached still counts.
bool beside_span_use(const model::Input& input, const model::Figures& figures) {
  const double limit = limit_of(input, model::RuleId::span_use);
  const bool warned = *figures.span_use < limit && ceiling_of(figures).value_or(limit) >= limit;
  return warned && !is_off(input.levels, model::RuleId::span_use);
}

// Against what one resistor reaches at a value of its own (advise::Offers::best): a part that would better be left out
// is as often there on purpose, as a linearising resistor across a sensor is.
void run(const InputContext& context, Findings& out) {
  const model::Figures& figures = context.input.figures;
  const model::Input& input = context.input.divider.input;
  if (!figures.span_use || !figures.span_reachable || !(*figures.span_reachable > 0)) return;
  if (beside_span_use(input, figures)) return;
  const double limit = limit_of(input, model::RuleId::span_efficiency);
  const double efficiency = *figures.span_use / *figures.span_reachable;
  if (efficiency >= limit) return;
  const Compared texts = compared_percent(efficiency, limit);
  const std::string reach = reach_text(figures);
  model::Finding finding = out.blank();
  finding.value = efficiency;
  finding.limit = limit;
  finding.unit = "fraction";
  finding.message = fmt::format(
      "the reading uses {} of the range, which is {} of what another resistor value would reach, where {} is the least "
      "accepted{}",
      percent_text(*figures.span_use), texts.value, texts.limit, reach.empty() ? "" : "; " + reach);
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule span_efficiency{model::RuleId::span_efficiency, Stage::sweep, {}, run, nullptr};

}  // namespace judge::rules
