#include "audit/plans.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <iterator>
#include <string>
#include <utility>

#include "audit/leakage.hpp"
#include "audit/slope.hpp"
#include "base/text.hpp"
#include "divide/sweep_values.hpp"
#include "network/linear.hpp"
#include "network/sweep.hpp"

namespace audit {
namespace {

const std::string no_closed_solution = "its network has no closed solution: ";

std::vector<model::NodeId> watched_nodes(const model::ProbedNetwork& probed) {
  std::vector<model::NodeId> nodes{probed.probe};
  for (const model::NodeId end : {probed.low, probed.high})
    if (end.valid()) nodes.push_back(end);
  return nodes;
}

bool among(std::span<const model::ConditionKind> needs, model::ConditionKind kind) {
  return std::find(needs.begin(), needs.end(), kind) != needs.end();
}

// Where one side of the leakage's envelope is wanted both are solved: a set of signs found for one may reach further on
// the other.
base::Result<std::vector<model::Condition>> conditions_of(const model::Divider& divider,
                                                          std::span<const model::ConditionKind> needs,
                                                          std::span<const model::SweptValues> swept,
                                                          std::size_t points) {
  std::vector<model::Condition> conditions;
  if (among(needs, model::ConditionKind::nominal)) conditions.push_back({model::ConditionKind::nominal, {}});
  if (!among(needs, model::ConditionKind::leakage_high) && !among(needs, model::ConditionKind::leakage_low))
    return conditions;
  auto leaking = leakage_conditions(divider, swept, points);
  if (!leaking.ok()) return base::Error{leaking.error()};
  std::move(leaking->begin(), leaking->end(), std::back_inserter(conditions));
  return conditions;
}

model::Plan plan_of(const model::ProbedNetwork& probed, std::vector<model::SweptValues> swept,
                    std::vector<model::Condition> conditions, std::size_t points) {
  return {probed.network, std::move(swept), points, std::move(conditions), watched_nodes(probed), {}};
}

// Splits the volts of one condition into pin and ends of the range.
judge::Solved::Volts unpack(const model::Input& input, const model::ProbedNetwork& probed,
                            std::span<const double> volts, std::size_t points) {
  const std::size_t width = watched_nodes(probed).size();
  judge::Solved::Volts out;
  for (std::size_t p = 0; p < points; ++p) {
    std::size_t w = 0;
    out.pin.push_back(volts[p * width + w++]);
    out.low.push_back(probed.low.valid() ? volts[p * width + w++] : input.nominal_low);
    out.high.push_back(probed.high.valid() ? volts[p * width + w++] : input.nominal_high);
  }
  return out;
}

base::Result<judge::Solved::Volts> closed_form(const model::Input& input, const model::ProbedNetwork& probed,
                                               std::span<const model::SweptValues> swept, std::size_t points,
                                               network::Overrides held) {
  const auto watched = watched_nodes(probed);
  auto volts = network::sweep_volts(probed.network, swept, points, held, watched);
  if (!volts.ok()) return base::Error{volts.error()};
  return unpack(input, probed, *volts, points);
}

// The sensor's resistance where neither law nor expression tells it: what it must be, seen from the tap.
std::vector<double> effective_ohms(const model::OnePort& form, std::span<const double> tap_volts) {
  std::vector<double> ohms;
  for (const double volts : tap_volts) ohms.push_back(network::ohms_at(form, volts));
  return ohms;
}

// Error: a linear network that the simulator solved and the closed form could not: neither is to be trusted then.
base::Result<base::Done> unpack_conditions(const model::Divider& divider, const Prepared& prepared,
                                           const model::Plan& plan, const model::Solution& whole,
                                           judge::Solved& solved) {
  const std::size_t points = prepared.at.size();
  const std::size_t width = plan.watched.size() * points;
  std::vector<LeakageCorner> corners;
  for (std::size_t c = 0; c < plan.conditions.size(); ++c) {
    const auto& condition = plan.conditions[c];
    const std::span<const double> volts = std::span(whole.volts).subspan(c * width, width);
    auto unpacked = unpack(divider.input, divider.whole, volts, points);
    std::optional<judge::Solved::Volts> closed;
    if (divider.whole.network.linear) {
      auto form = closed_form(divider.input, divider.whole, prepared.swept, points, condition.held);
      if (!form.ok()) return base::Error{no_closed_solution + form.error()};
      closed = std::move(*form);
    }
    if (condition.kind == model::ConditionKind::nominal)
      solved.nominal = std::move(unpacked), solved.closed_form = std::move(closed);
    else
      corners.push_back({condition.kind, std::move(unpacked), std::move(closed)});
  }
  join_leakage(divider.input, corners, solved);
  return base::Done{};
}

}  // namespace

base::Result<Prepared> prepare(const model::Divider& divider, const model::Circuit& circuit,
                               const model::SensorDeclaration& sensor, std::span<const model::ConditionKind> needs,
                               std::size_t points) {
  Prepared prepared;
  auto at = divide::measurands(sensor, points);
  if (!at.ok()) return base::Error{at.error()};
  prepared.at = std::move(at).value();
  auto swept = divide::swept_values(divider.whole, circuit, sensor, prepared.at);
  if (!swept.ok()) return base::Error{swept.error()};
  prepared.swept = std::move(swept).value();
  auto bare_swept = divide::swept_values(divider.bare, circuit, sensor, prepared.at);
  if (!bare_swept.ok()) return base::Error{bare_swept.error()};
  prepared.bare_swept = std::move(bare_swept).value();
  prepared.bare_slope = bare_slopes(divider, circuit, sensor, prepared.at);
  for (const model::SweptValues& values : prepared.swept)
    if (values.branch == divider.whole.sensor && !values.is_variable) prepared.sensor_ohms = values.values;
  auto conditions = conditions_of(divider, needs, prepared.swept, prepared.at.size());
  if (!conditions.ok()) return base::Error{conditions.error()};
  prepared.whole = plan_of(divider.whole, prepared.swept, std::move(*conditions), prepared.at.size());
  if (!divider.bare.network.linear)
    prepared.bare = plan_of(divider.bare, prepared.bare_swept, {{model::ConditionKind::bare, {}}}, prepared.at.size());
  return prepared;
}

base::Result<judge::Solved> solved_of(const model::Divider& divider, const Prepared& prepared, const model::Plan& plan,
                                      const model::Solution& whole, const model::Solution* bare) {
  judge::Solved solved;
  solved.at = prepared.at;
  solved.sensor_ohms = prepared.sensor_ohms;
  solved.bare_slope = prepared.bare_slope;
  solved.rung = whole.rung;
  solved.stepped = whole.stepped;
  solved.alone_difference = whole.alone_difference;
  if (const auto done = unpack_conditions(divider, prepared, plan, whole, solved); !done.ok())
    return base::Error{done.error()};
  if (bare != nullptr) {
    solved.bare = unpack(divider.input, divider.bare, bare->volts, prepared.at.size());
  } else {
    auto volts = closed_form(divider.input, divider.bare, prepared.bare_swept, prepared.at.size(), {});
    if (!volts.ok()) return base::Error{"the bare divider has no solution: " + volts.error()};
    solved.bare = std::move(*volts);
  }
  // Ends with a network of their own: those of the nominal solution count.
  if (divider.whole.low.valid() && !divider.bare.low.valid()) solved.bare.low.clear();
  if (divider.whole.high.valid() && !divider.bare.high.valid()) solved.bare.high.clear();
  if (solved.sensor_ohms.empty() && divider.sensor_form)
    solved.sensor_ohms = effective_ohms(*divider.sensor_form, solved.bare.pin);
  return solved;
}

std::string turning_range(const judge::Solved& solved) {
  if (solved.nominal.low.empty()) return {};
  const double first = solved.nominal.high.front() - solved.nominal.low.front();
  for (const auto* volts : {&solved.nominal, solved.leakage_high ? &*solved.leakage_high : nullptr,
                            solved.leakage_low ? &*solved.leakage_low : nullptr}) {
    for (std::size_t p = 0; volts != nullptr && p < volts->low.size(); ++p)
      if (const double range = volts->high[p] - volts->low[p]; range * first < 0)
        return fmt::format(
            "the converter's range turns over within the sweep: its high end lies {} V {} the low one at {:g}, "
            "and {} V {} it at {:g}",
            base::number_text(std::fabs(first), 4), first < 0 ? "below" : "above", solved.at.front(),
            base::number_text(std::fabs(range), 4), range < 0 ? "below" : "above", solved.at[p]);
  }
  return {};
}

void settle_range(model::Divider& divider, const judge::Solved& solved) {
  const std::size_t middle = solved.at.size() / 2;
  model::Input& input = divider.input;
  if (divider.whole.low.valid() && std::isnan(input.nominal_low)) input.nominal_low = solved.nominal.low[middle];
  if (divider.whole.high.valid() && std::isnan(input.nominal_high)) input.nominal_high = solved.nominal.high[middle];
}

}  // namespace audit
