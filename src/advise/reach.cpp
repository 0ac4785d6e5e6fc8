#include "advise/reach.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
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

// The branch of that element where it is a fixed resistor above zero and not swept.
std::optional<Candidate> as_candidate(const model::Divider& divider, const model::PartName& part,
                                      std::span<const model::SweptValues> swept) {
  const auto& branches = divider.whole.network.branches;
  if (!part.element.valid()) return std::nullopt;
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

// Whether `a` is to be told rather than `b`: more span, or as much with less of a change.
bool better(const Found& a, double a_change, const Found& b, double b_change) {
  constexpr double as_good = 1e-9;
  return a.span > b.span + as_good || (a.span > b.span - as_good && a_change < b_change);
}

}  // namespace

std::optional<Reach> best_resistor(const model::Divider& divider, std::span<const model::SweptValues> swept,
                                   double gap_limit) {
  if (!can_follow(swept)) return std::nullopt;
  const States states = swept.size() == 1 ? extremes(swept.front()) : some_points(swept);
  const auto leakage = leakages(divider.whole);
  std::optional<Found> best;
  double best_change = 0;
  const model::PartName* best_part = nullptr;
  for (const Candidate& candidate : candidates(divider, swept)) {
    auto trials = Trials::make(divider, candidate.branch, candidate.ohms, states, leakage);
    if (!trials) continue;
    const auto found = largest_span(candidate.ohms, [&](double ohms) { return trials->at(ohms, gap_limit); });
    if (!found) continue;
    const double change = std::abs(std::log(found->ohms / candidate.ohms));
    if (best && !better(*found, change, *best, best_change)) continue;
    best = found;
    best_change = change;
    best_part = candidate.part;
  }
  if (!best) return std::nullopt;
  return Reach{best_part->name, best->ohms, best->span};
}

}  // namespace advise
