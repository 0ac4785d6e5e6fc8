#include "audit/advice.hpp"

#include <algorithm>
#include <cmath>

#include "advise/reach.hpp"
#include "audit/load.hpp"
#include "judge/judge.hpp"
#include "network/linear.hpp"

namespace audit {
namespace {

bool sweeps_rail(const model::Divider& divider) {
  return std::any_of(divider.whole.swept.begin(), divider.whole.swept.end(),
                     [](const model::SweptBranch& swept) { return swept.quantity == model::SweptQuantity::volts; });
}

std::optional<double> ceiling(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved) {
  if (sweeps_rail(divider)) {
    // A divider scales a rail: at best its highest volts reach the end of the range.
    const auto [low, high] = std::minmax_element(prepared.at.begin(), prepared.at.end());
    return *high > 0 ? std::optional(std::clamp(1 - *low / *high, 0.0, 1.0)) : std::nullopt;
  }
  if (!divider.bare_form || solved.sensor_ohms.empty()) return std::nullopt;
  return advise::span_ceiling(divider.input, *divider.bare_form, solved.sensor_ohms);
}

void add_reach(const model::Divider& divider, const Prepared& prepared, model::Figures& figures) {
  if (!divider.bare.network.linear || prepared.swept.empty()) return;
  const auto reach =
      advise::best_resistor(divider, prepared.swept, judge::limit_of(divider.input, model::RuleId::rail_gap));
  if (!reach) return;
  figures.span_reachable = reach->span_use;
  figures.best_part = reach->part;
  figures.best_ohms = reach->ohms;
}

// Of a linear network the resistance at the pin is a ratio of linear functions of the sensor's, so its largest is at an
// end.
void add_source_ohms(const model::Divider& divider, const Prepared& prepared, model::Figures& figures) {
  if (!divider.whole.network.linear || prepared.swept.empty()) return;
  const auto& values = prepared.swept.front().values;
  const auto [low, high] = std::minmax_element(values.begin(), values.end());
  for (const auto end : {low, high}) {
    const auto held = at_point(prepared, static_cast<std::size_t>(end - values.begin()));
    const auto ohms = network::thevenin_ohms(divider.whole.network, divider.whole.probe, model::ground_node, {}, held);
    if (!ohms.ok()) return figures.pin_source_ohms.reset();
    figures.pin_source_ohms = std::max(figures.pin_source_ohms.value_or(0), *ohms);
  }
}

}  // namespace

void add_advice(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved,
                model::Figures& figures) {
  figures.span_best = ceiling(divider, prepared, solved);
  add_reach(divider, prepared, figures);
  add_source_ohms(divider, prepared, figures);
  constexpr double worth_naming_lsb = 0.01;
  if (!(figures.load_error_lsb.value_or(0) > worth_naming_lsb)) return;
  figures.largest_load = largest_load(divider, prepared, solved, figures.load_error_point);
  figures.largest_load_measurand = largest_load(divider, prepared, solved, figures.load_error_measurand_point);
}

}  // namespace audit
