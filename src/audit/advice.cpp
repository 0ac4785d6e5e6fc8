#include "audit/advice.hpp"

#include <algorithm>
#include <cmath>
#include <numeric>
#include <vector>

#include "advise/reach.hpp"
#include "audit/load.hpp"
#include "audit/reading_form.hpp"
#include "judge/judge.hpp"
#include "network/linear.hpp"

namespace audit {
namespace {

bool sweeps_rail(const model::Divider& divider) {
  return std::any_of(divider.whole.swept.begin(), divider.whole.swept.end(),
                     [](const model::SweptBranch& swept) { return swept.quantity == model::SweptQuantity::volts; });
}

// A monitor's reading follows the rail in proportion, between ends that stand still: what rail_ceiling() is about.
std::optional<double> monitor_ceiling(const model::Divider& divider, const Prepared& prepared,
                                      const judge::Solved& solved) {
  const auto low = still_volts(solved.nominal.low);
  const auto high = still_volts(solved.nominal.high);
  const auto& tap = solved.bare.pin;
  const std::size_t last = tap.size() - 1;
  const double crossed = tap.front() * prepared.at[last] - tap[last] * prepared.at.front();
  const double size = std::fabs(tap.front() * prepared.at[last]) + std::fabs(tap[last] * prepared.at.front());
  if (!low || !high || std::fabs(crossed) > 1e-9 * size) return std::nullopt;
  const auto [least, most] = std::minmax_element(prepared.at.begin(), prepared.at.end());
  return advise::rail_ceiling(*low, *low + (*high - *low) / divider.input.gain, *least, *most);
}

std::optional<double> ceiling(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved) {
  if (sweeps_rail(divider)) return monitor_ceiling(divider, prepared, solved);
  if (solved.sensor_ohms.empty()) return std::nullopt;
  const auto form = reading_form(divider, solved);
  if (!form) return std::nullopt;
  return advise::span_ceiling(form->open_volts, form->short_volts, solved.sensor_ohms);
}

void add_reach(const model::Divider& divider, const Prepared& prepared, model::Figures& figures) {
  if (!divider.bare.network.linear || prepared.swept.empty()) return;
  const auto offers =
      advise::resistor_offers(divider, prepared.swept, judge::limit_of(divider.input, model::RuleId::rail_gap));
  if (offers.other) figures.other = model::Offer{offers.other->part, offers.other->ohms, offers.other->span_use};
  if (!offers.best) return;
  figures.span_reachable = offers.best->span_use;
  figures.best_part = offers.best->part;
  figures.best_ohms = offers.best->ohms;
}

// Points of the sweep among which the resistance at the pin is largest. Of a linear network it is a ratio of linear
// functions of each resistance, so that where one moves its largest is at an end; where several do it may be anywhere.
std::vector<std::size_t> points_of_extremes(const Prepared& prepared) {
  const auto& values = prepared.swept.front().values;
  std::vector<std::size_t> points;
  if (prepared.swept.size() == 1) {
    const auto [low, high] = std::minmax_element(values.begin(), values.end());
    for (const auto end : {low, high}) points.push_back(static_cast<std::size_t>(end - values.begin()));
  } else {
    points.resize(prepared.at.size());
    std::iota(points.begin(), points.end(), std::size_t{0});
  }
  return points;
}

void add_source_ohms(const model::Divider& divider, const Prepared& prepared, model::Figures& figures) {
  if (!divider.whole.network.linear || prepared.swept.empty()) return;
  for (const std::size_t point : points_of_extremes(prepared)) {
    const auto held = at_point(prepared, point);
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
