#include "audit/leakage.hpp"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <optional>
#include <set>
#include <utility>

#include "judge/readings.hpp"
#include "network/corner.hpp"
#include "network/sweep.hpp"

namespace audit {
namespace {

using model::ConditionKind;
using Signs = std::vector<signed char>;

constexpr signed char plus = 1;
constexpr signed char minus = -1;
constexpr std::size_t most_tried = 4;  // leakages of which every set of signs is simulated

model::Condition condition(const model::ProbedNetwork& probed, ConditionKind kind, const Signs& signs) {
  model::Condition made{kind, {}};
  for (std::size_t i = 0; i < signs.size(); ++i)
    if (signs[i] != 0) made.held.push_back({probed.leakages[i], signs[i] * probed.leakage_amperes[i]});
  return made;
}

// A node that no source holds against ground.
bool moves(const model::Network& network, model::NodeId node) {
  const auto holds = [&](const model::Branch& branch) {
    return std::holds_alternative<model::VoltageSource>(branch.part) &&
           ((branch.nodes[0] == node && branch.nodes[1] == model::ground_node) ||
            (branch.nodes[1] == node && branch.nodes[0] == model::ground_node));
  };
  return node.valid() && std::none_of(network.branches.begin(), network.branches.end(), holds);
}

// Whether current into any node lifts every other one or leaves it.
bool only_lifts(const model::Network& network) {
  return std::all_of(network.branches.begin(), network.branches.end(), [](const model::Branch& branch) {
    if (const auto* resistor = std::get_if<model::Resistor>(&branch.part))
      return !(resistor->ohms.value < 0);  // what is swept is above zero
    if (std::holds_alternative<model::Device>(branch.part)) return branch.node_count == 2;
    return !std::holds_alternative<model::VoltageControlled>(branch.part) &&
           !std::holds_alternative<model::CurrentControlled>(branch.part) &&
           !std::holds_alternative<model::Behavioural>(branch.part);
  });
}

// The closed form with each leakage alone, and from it the corners of each point.
class Corners {
 public:
  Corners(const model::Divider& divider, std::span<const model::SweptValues> swept, std::size_t points)
      : input_(divider.input), probed_(divider.whole), swept_(swept), points_(points) {}

  base::Result<std::vector<model::Condition>> run() {
    if (const auto done = solve(); !done.ok()) return base::Error{done.error()};
    const auto highest = patterns(network::Wanted::largest);
    const auto lowest = patterns(network::Wanted::smallest);
    if (!highest || !lowest)
      return base::Error{"within the declared leakages the ends of the converter's range may meet"};
    std::vector<model::Condition> conditions;
    for (const Signs& signs : *highest) conditions.push_back(condition(probed_, ConditionKind::leakage_high, signs));
    for (const Signs& signs : *lowest) conditions.push_back(condition(probed_, ConditionKind::leakage_low, signs));
    return conditions;
  }

 private:
  // Of every point, without leakage and then with each alone: its reading as a quotient.
  base::Result<base::Done> solve() {
    for (std::size_t i = 0; i <= probed_.leakages.size(); ++i) {
      std::vector<model::Override> held;
      if (i > 0) held.push_back({probed_.leakages[i - 1], probed_.leakage_amperes[i - 1]});
      const std::vector<model::NodeId> watched{probed_.probe, end(probed_.low), end(probed_.high)};
      const auto volts = network::sweep_volts(probed_.network, swept_, points_, held, watched);
      if (!volts.ok()) return base::Error{"its network has no closed solution: " + volts.error()};
      readings_.emplace_back();
      for (std::size_t p = 0; p < points_; ++p) readings_.back().push_back(quotient(*volts, p));
    }
    return base::Done{};
  }

  static model::NodeId end(model::NodeId node) { return node.valid() ? node : model::ground_node; }

  [[nodiscard]] network::Quotient quotient(const std::vector<double>& volts, std::size_t p) const {
    const double low = probed_.low.valid() ? volts[3 * p + 1] : input_.nominal_low;
    const double high = probed_.high.valid() ? volts[3 * p + 2] : input_.nominal_high;
    return {input_.gain * (volts[3 * p] - low), high - low};
  }

  // Nothing where the range may be none.
  [[nodiscard]] std::optional<std::set<Signs>> patterns(network::Wanted wanted) const {
    std::set<Signs> found;
    std::vector<network::Quotient> moves(probed_.leakages.size());
    Signs signs(moves.size());
    for (std::size_t p = 0; p < points_; ++p) {
      const network::Quotient base = readings_.front()[p];
      for (std::size_t i = 0; i < moves.size(); ++i)
        moves[i] = {readings_[i + 1][p].over - base.over, readings_[i + 1][p].under - base.under};
      if (std::isnan(network::extreme(base, moves, wanted, signs))) return std::nullopt;
      found.insert(signs);
    }
    return found;
  }

  const model::Input& input_;
  const model::ProbedNetwork& probed_;
  std::span<const model::SweptValues> swept_;
  std::size_t points_;
  std::vector<std::vector<network::Quotient>> readings_;
};

std::vector<model::Condition> every_sign(const model::ProbedNetwork& probed) {
  const std::size_t count = probed.leakages.size();
  std::vector<model::Condition> conditions;
  for (std::uint32_t down = 0; down < 1U << count; ++down) {
    Signs signs(count);
    for (std::size_t i = 0; i < count; ++i) signs[i] = (down >> i & 1U) != 0 ? minus : plus;
    conditions.push_back(condition(probed, ConditionKind::leakage_high, signs));
  }
  conditions.back().kind = ConditionKind::leakage_low;  // all of them down
  return conditions;
}

std::vector<model::Condition> all_alike(const model::ProbedNetwork& probed) {
  const Signs up(probed.leakages.size(), plus);
  const Signs down(probed.leakages.size(), minus);
  return {condition(probed, ConditionKind::leakage_high, up), condition(probed, ConditionKind::leakage_low, down)};
}

std::vector<model::Condition> each_alone(const model::ProbedNetwork& probed) {
  std::vector<model::Condition> conditions = all_alike(probed);
  for (std::size_t i = 0; i < probed.leakages.size(); ++i)
    for (const signed char sign : {plus, minus}) {
      Signs signs(probed.leakages.size());
      signs[i] = sign;
      conditions.push_back(condition(probed, ConditionKind::leakage_alone, signs));
    }
  return conditions;
}

// What is no number wins, so that it is seen.
bool further(double reading, double than, bool up) {
  return std::isnan(reading) || (up ? reading > than : reading < than);
}

void copy_point(const judge::Solved::Volts& from, judge::Solved::Volts& to, std::size_t p) {
  to.pin[p] = from.pin[p];
  to.low[p] = from.low[p];
  to.high[p] = from.high[p];
}

// The corner that reads furthest at each point, its own kind's first one where several do.
std::optional<LeakageCorner> furthest(const model::Input& input, std::span<const LeakageCorner> corners,
                                      ConditionKind kind) {
  const auto own =
      std::find_if(corners.begin(), corners.end(), [&](const auto& corner) { return corner.kind == kind; });
  if (own == corners.end()) return std::nullopt;
  LeakageCorner best = *own;
  std::vector<double> reading = judge::readings(input, best.volts);
  for (const LeakageCorner& corner : corners) {
    if (corner.kind == ConditionKind::leakage_alone) continue;
    const std::vector<double> other = judge::readings(input, corner.volts);
    for (std::size_t p = 0; p < reading.size(); ++p) {
      if (!further(other[p], reading[p], kind == ConditionKind::leakage_high)) continue;
      reading[p] = other[p];
      copy_point(corner.volts, best.volts, p);
      if (corner.closed_form && best.closed_form) copy_point(*corner.closed_form, *best.closed_form, p);
    }
  }
  return best;
}

// The nominal readings with the effects of each leakage alone on top, as far up or down as either sign takes it.
// `corners` holds the two signs of one leakage next to each other.
std::vector<double> added(const model::Input& input, std::span<const LeakageCorner> corners, bool up,
                          const std::vector<double>& nominal) {
  std::vector<double> sum = nominal;
  std::vector<std::vector<double>> alone;
  for (const LeakageCorner& corner : corners)
    if (corner.kind == ConditionKind::leakage_alone) alone.push_back(judge::readings(input, corner.volts));
  for (std::size_t i = 0; i + 1 < alone.size(); i += 2)
    for (std::size_t p = 0; p < sum.size(); ++p) {
      const double rise = alone[i][p] - nominal[p];
      const double fall = alone[i + 1][p] - nominal[p];
      sum[p] += up ? std::max({rise, fall, 0.0}) : std::min({rise, fall, 0.0});
      if (std::isnan(rise + fall)) sum[p] = rise + fall;
    }
  return sum;
}

void reach_as_far(const model::Input& input, const std::vector<double>& readings, bool up,
                  const judge::Solved::Volts& nominal, judge::Solved::Volts& volts) {
  const std::vector<double> present = judge::readings(input, volts);
  for (std::size_t p = 0; p < present.size(); ++p) {
    if (!further(readings[p], present[p], up)) continue;
    copy_point(nominal, volts, p);
    volts.pin[p] = nominal.low[p] + readings[p] * (nominal.high[p] - nominal.low[p]) / input.gain;
  }
}

}  // namespace

base::Result<std::vector<model::Condition>> leakage_conditions(const model::Divider& divider,
                                                               std::span<const model::SweptValues> swept,
                                                               std::size_t points) {
  const model::ProbedNetwork& probed = divider.whole;
  if (probed.leakages.empty()) return std::vector<model::Condition>{};
  const bool still = !moves(probed.network, probed.low) && !moves(probed.network, probed.high);
  if (probed.leakages.size() == 1 || (still && only_lifts(probed.network))) return all_alike(probed);
  if (probed.network.linear) return Corners(divider, swept, points).run();
  return probed.leakages.size() <= most_tried ? every_sign(probed) : each_alone(probed);
}

void join_leakage(const model::Input& input, std::span<const LeakageCorner> corners, judge::Solved& solved) {
  const bool alone = std::any_of(corners.begin(), corners.end(),
                                 [](const auto& corner) { return corner.kind == ConditionKind::leakage_alone; });
  const auto side = [&](ConditionKind kind, auto& volts, auto& closed_form) {
    auto corner = furthest(input, corners, kind);
    if (!corner) return;
    const bool up = kind == ConditionKind::leakage_high;
    if (alone) {
      const auto nominal = judge::readings(input, solved.nominal);
      reach_as_far(input, added(input, corners, up, nominal), up, solved.nominal, corner->volts);
    }
    volts = std::move(corner->volts);
    closed_form = std::move(corner->closed_form);
  };
  side(ConditionKind::leakage_high, solved.leakage_high, solved.closed_form_high);
  side(ConditionKind::leakage_low, solved.leakage_low, solved.closed_form_low);
}

}  // namespace audit
