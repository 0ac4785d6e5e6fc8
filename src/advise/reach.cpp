#include "advise/reach.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <utility>
#include <vector>

#include "advise/search.hpp"
#include "network/corner.hpp"
#include "network/sweep.hpp"

namespace advise {
namespace {

using model::Override;

// What the sweep does, cut down to the states that decide: each is a set of overrides for the swept branches.
using States = std::vector<std::vector<Override>>;

// The volts that make a reading, out of the watched nodes of a network.
class Reading {
 public:
  explicit Reading(const model::Divider& divider) : input_(divider.input) {
    watch(divider.whole.probe);
    if (divider.whole.low.valid()) low_ = watch(divider.whole.low);
    if (divider.whole.high.valid()) high_ = watch(divider.whole.high);
  }

  [[nodiscard]] std::span<const model::NodeId> watched() const { return {nodes_.data(), count_}; }

  // With the free branch at the value that `share` stands for.
  [[nodiscard]] network::Quotient at(const network::FreeBranch& free, std::size_t condition, double share) const {
    const double low = low_ ? free.mixed(condition, low_, share) : input_.nominal_low;
    const double high = high_ ? free.mixed(condition, high_, share) : input_.nominal_high;
    return {input_.gain * (free.mixed(condition, 0, share) - low), high - low};
  }

 private:
  std::size_t watch(model::NodeId node) {
    nodes_[count_] = node;
    return count_++;
  }

  const model::Input& input_;
  std::array<model::NodeId, 3> nodes_;
  std::size_t count_ = 0;
  std::size_t low_ = 0;  // place among the watched nodes; 0, the pin's, where the end is a number of volts
  std::size_t high_ = 0;
};

// The smallest and largest of some readings; one that is not a number leaves no room.
struct Extent {
  double lowest = std::numeric_limits<double>::infinity();
  double highest = -std::numeric_limits<double>::infinity();

  void add(double reading) {
    if (std::isnan(reading)) lowest = -(highest = std::numeric_limits<double>::infinity());
    lowest = std::min(lowest, reading);
    highest = std::max(highest, reading);
  }
  [[nodiscard]] double span() const { return std::clamp(highest, 0.0, 1.0) - std::clamp(lowest, 0.0, 1.0); }
  [[nodiscard]] double gap() const { return std::min(lowest, 1 - highest); }
};

// No leakage, then each alone.
std::vector<std::vector<Override>> leakages(const model::ProbedNetwork& whole) {
  std::vector<std::vector<Override>> conditions(1);
  for (std::size_t i = 0; i < whole.leakages.size(); ++i)
    if (whole.leakage_amperes[i] != 0) conditions.push_back({{whole.leakages[i], whole.leakage_amperes[i]}});
  return conditions;
}

// A divider with one of its fixed resistors free, in all states.
class Trials {
 public:
  static std::optional<Trials> make(const model::Divider& divider, model::BranchId branch, double present,
                                    const States& states, std::span<const std::vector<Override>> leakage) {
    Trials trials(divider);
    const std::vector<network::Overrides> conditions(leakage.begin(), leakage.end());
    for (const auto& state : states) {
      auto free = network::FreeBranch::make(divider.whole.network, branch, present / 1000, present * 1000, state,
                                            conditions, trials.reading_.watched());
      if (!free) return std::nullopt;
      trials.states_.push_back(std::move(*free));
    }
    trials.moves_.resize(conditions.size() - 1);
    trials.signs_.resize(conditions.size() - 1);
    return trials;
  }

  [[nodiscard]] Trial at(double ohms, double gap_limit) {
    Extent nominal;
    Extent all;
    for (const auto& state : states_) {
      const double share = state.share(ohms);
      const network::Quotient still = reading_.at(state, 0, share);
      nominal.add(still.over / still.under);
      for (std::size_t i = 0; i < moves_.size(); ++i) {
        const network::Quotient leaking = reading_.at(state, i + 1, share);
        moves_[i] = {leaking.over - still.over, leaking.under - still.under};
      }
      all.add(network::extreme(still, moves_, network::Wanted::largest, signs_));
      all.add(network::extreme(still, moves_, network::Wanted::smallest, signs_));
    }
    return {nominal.span(), all.gap() - gap_limit};
  }

 private:
  explicit Trials(const model::Divider& divider) : reading_(divider) {}

  Reading reading_;
  std::vector<network::FreeBranch> states_;
  std::vector<network::Quotient> moves_;  // of each leakage, at the state that is looked at
  std::vector<signed char> signs_;
};

struct Candidate {
  const model::PartName* part = nullptr;
  model::BranchId branch;
  double ohms = 0;
};

// The letter that says what an element is: the first of its name behind the instances' names.
bool is_resistor(const model::PartName& part) {
  const std::size_t dot = part.name.rfind('.');
  const std::size_t first = dot == std::string::npos ? 0 : dot + 1;
  return first < part.name.size() && (part.name[first] == 'R' || part.name[first] == 'r');
}

// The branch of that element where it is a fixed resistor above zero and not swept.
std::optional<Candidate> as_candidate(const model::Divider& divider, const model::PartName& part,
                                      std::span<const model::SweptValues> swept) {
  const auto& branches = divider.whole.network.branches;
  if (!part.element.valid() || !is_resistor(part)) return std::nullopt;
  for (std::uint32_t i = 0; i < branches.size(); ++i) {
    const auto* resistor = std::get_if<model::Resistor>(&branches[i].part);
    if (resistor == nullptr || branches[i].origin != model::BranchOrigin::element ||
        branches[i].element != part.element)
      continue;
    const model::BranchId id{i};
    const double ohms = resistor->ohms.value;
    const bool is_swept =
        id == divider.whole.sensor || std::ranges::find(swept, id, &model::SweptValues::branch) != swept.end();
    if (is_swept || !resistor->ohms.fixed() || !(ohms > 0) || !std::isfinite(ohms)) return std::nullopt;
    return Candidate{&part, id, ohms};
  }
  return std::nullopt;
}

std::vector<Candidate> candidates(const model::Divider& divider, std::span<const model::SweptValues> swept) {
  std::vector<Candidate> found;
  for (const auto* arm : {&divider.upper, &divider.lower})
    for (const auto& part : *arm)
      if (const auto candidate = as_candidate(divider, part, swept)) found.push_back(*candidate);
  return found;
}

States extremes(const model::SweptValues& swept) {
  const auto [least, most] = std::ranges::minmax(swept.values);
  return {{{swept.branch, least}}, {{swept.branch, most}}};
}

States some_points(std::span<const model::SweptValues> swept) {
  std::size_t points = swept.front().values.size();
  for (const auto& branch : swept) points = std::min(points, branch.values.size());
  States states;
  const std::size_t count = std::min<std::size_t>(points, 11);
  for (std::size_t i = 0; i < count; ++i) {
    const std::size_t p = count > 1 ? i * (points - 1) / (count - 1) : 0;
    states.emplace_back();
    for (const auto& branch : swept) states.back().push_back({branch.branch, branch.values[p]});
  }
  return states;
}

bool can_follow(std::span<const model::SweptValues> swept) {
  return !swept.empty() &&
         std::ranges::none_of(swept, [](const auto& branch) { return branch.is_variable || branch.values.empty(); });
}

// The best that one resistor reaches.
struct Outcome {
  Reach reach;
  double change = 0;  // logarithm of its ohms over the present ones
  bool at_limit = false;
  bool across_sensor = false;
};

// Whether `a` is to be told rather than `b`: more span, or as much with less of a change.
bool better(const Outcome& a, const Outcome& b) {
  constexpr double as_good = 1e-9;
  const double more = a.reach.span_use - b.reach.span_use;
  return more > as_good || (more > -as_good && a.change < b.change);
}

// Whether a part far from its present value is as good left out or as a link, and then so.
void settle_limit(Trials& trials, double present, double gap_limit, Outcome& outcome) {
  constexpr double far = 10;
  constexpr double as_good = 1 - 1e-3;
  constexpr double rounding = 1e-12;
  const double ohms = outcome.reach.ohms;
  if (ohms < far * present && ohms > present / far) return;
  const double limit = ohms > present ? std::numeric_limits<double>::infinity() : 0;
  const Trial there = trials.at(limit, gap_limit);
  if (!(there.room >= -rounding) || !(there.span >= as_good * outcome.reach.span_use)) return;
  outcome.reach.ohms = limit;
  outcome.reach.span_use = there.span;
  outcome.at_limit = true;
}

bool is_across_sensor(const model::ProbedNetwork& whole, model::BranchId branch) {
  const auto& nodes = whole.network.branches[branch.index()].nodes;
  return whole.sensor_plus.valid() && ((nodes[0] == whole.sensor_plus && nodes[1] == whole.sensor_minus) ||
                                       (nodes[1] == whole.sensor_plus && nodes[0] == whole.sensor_minus));
}

std::optional<Outcome> outcome_of(const model::Divider& divider, const Candidate& candidate, const States& states,
                                  std::span<const std::vector<Override>> leakage, double gap_limit) {
  constexpr double worth_telling = 1e-6;
  auto trials = Trials::make(divider, candidate.branch, candidate.ohms, states, leakage);
  if (!trials) return std::nullopt;
  const auto found = largest_span(candidate.ohms, [&](double ohms) { return trials->at(ohms, gap_limit); });
  if (!found || !(found->span >= worth_telling)) return std::nullopt;
  Outcome outcome{{candidate.part->name, found->ohms, found->span},
                  std::abs(std::log(found->ohms / candidate.ohms)),
                  false,
                  is_across_sensor(divider.whole, candidate.branch)};
  settle_limit(*trials, candidate.ohms, gap_limit, outcome);
  return outcome;
}

Offers choose(std::span<const Outcome> outcomes) {
  const Outcome* best = nullptr;  // by ohms of its own before any that is at a limit
  const Outcome* most = nullptr;
  for (const Outcome& outcome : outcomes) {
    if (most == nullptr || better(outcome, *most)) most = &outcome;
    if (outcome.across_sensor) continue;
    if (best == nullptr || (best->at_limit && !outcome.at_limit) ||
        (best->at_limit == outcome.at_limit && better(outcome, *best)))
      best = &outcome;
  }
  if (most == nullptr) return {};
  if (best == nullptr) return {std::nullopt, most->reach};
  constexpr double more = 1 + 1e-3;
  constexpr double no_purpose = 2;
  const double gain = most->reach.span_use / best->reach.span_use;
  if (gain > no_purpose) return {most->reach, std::nullopt};
  return {best->reach, gain > more ? std::optional(most->reach) : std::nullopt};
}

}  // namespace

Offers resistor_offers(const model::Divider& divider, std::span<const model::SweptValues> swept, double gap_limit) {
  if (!can_follow(swept)) return {};
  const States states = swept.size() == 1 ? extremes(swept.front()) : some_points(swept);
  const auto leakage = leakages(divider.whole);
  std::vector<Outcome> outcomes;
  for (const Candidate& candidate : candidates(divider, swept))
    if (auto outcome = outcome_of(divider, candidate, states, leakage, gap_limit))
      outcomes.push_back(std::move(*outcome));
  return choose(outcomes);
}

}  // namespace advise
