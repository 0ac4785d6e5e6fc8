#include "network/sweep.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <limits>
#include <optional>
#include <variant>

#include "network/solver.hpp"
#include "network/values.hpp"

namespace network {
namespace {

template <class Part>
bool is(const model::Network& network, model::BranchId branch) {
  return std::holds_alternative<Part>(network.branches[branch.index()].part);
}

bool is_source(const model::Network& network, model::BranchId branch) {
  return is<model::VoltageSource>(network, branch) || is<model::CurrentSource>(network, branch);
}

// The smallest and largest value of the one swept branch, where the formula of FreeBranch may be used on it.
struct Ends {
  const model::SweptValues* swept = nullptr;
  double lowest = 0;
  double highest = 0;
};

std::optional<Ends> one_free(const model::Network& network, std::span<const model::SweptValues> swept,
                             std::size_t points) {
  const model::SweptValues* one = nullptr;
  for (const auto& branch : swept) {
    if (branch.is_variable) continue;
    if (one != nullptr) return std::nullopt;
    one = &branch;
  }
  if (one == nullptr || points < 3) return std::nullopt;
  const auto values = std::span(one->values).first(points);
  const auto [least, most] = std::ranges::minmax(values);
  if (!std::ranges::all_of(values, [](double value) { return std::isfinite(value); }) || least == most)
    return std::nullopt;
  const bool fits = is_source(network, one->branch) || (is<model::Resistor>(network, one->branch) && least > 0);
  return fits ? std::optional<Ends>(Ends{one, least, most}) : std::nullopt;
}

base::Result<std::vector<double>> along_one(const model::Network& network, const Ends& ends, std::size_t points,
                                            Overrides held, std::span<const model::NodeId> watched) {
  const Overrides nominal;
  const auto free =
      FreeBranch::make(network, ends.swept->branch, ends.lowest, ends.highest, held, {&nominal, 1}, watched);
  if (!free) return base::Error{free.error()};
  std::vector<double> volts;
  volts.reserve(points * watched.size());
  for (std::size_t p = 0; p < points; ++p) {
    const double share = free->share(ends.swept->values[p]);
    for (std::size_t w = 0; w < watched.size(); ++w) volts.push_back(free->mixed(0, w, share));
  }
  return volts;
}

base::Result<std::vector<double>> point_by_point(const model::Network& network,
                                                 std::span<const model::SweptValues> swept, std::size_t points,
                                                 Overrides held, std::span<const model::NodeId> watched) {
  Values values = values_of(network, held);
  std::vector<double> volts;
  volts.reserve(points * watched.size());
  for (std::size_t p = 0; p < points; ++p) {
    for (const auto& branch : swept)
      if (!branch.is_variable) values[branch.branch.index()] = branch.values[p];
    const auto solver = Solver::make(network, values);
    if (!solver) return base::Error{fmt::format("at point {} of the sweep {}", p + 1, solver.error())};
    const auto solution = solver->with_sources(values);
    if (!solution) return base::Error{fmt::format("at point {} of the sweep {}", p + 1, solution.error())};
    for (const model::NodeId node : watched) volts.push_back(solver->volts(*solution, node));
  }
  return volts;
}

// Volts of the watched nodes under each condition, condition by condition.
base::Result<std::vector<double>> under(const model::Network& network, const Solver& solver, const Values& values,
                                        std::span<const Overrides> conditions, std::span<const model::NodeId> watched) {
  std::vector<double> volts;
  volts.reserve(conditions.size() * watched.size());
  for (const Overrides condition : conditions) {
    Values own = values;
    for (const auto& held : condition)
      if (is_source(network, held.branch)) own[held.branch.index()] = held.value;
    const auto solution = solver.with_sources(own);
    if (!solution) return base::Error{solution.error()};
    for (const model::NodeId node : watched) volts.push_back(solver.volts(*solution, node));
  }
  return volts;
}

}  // namespace

base::Result<FreeBranch> FreeBranch::make(const model::Network& network, model::BranchId branch, double first,
                                          double second, Overrides held, std::span<const Overrides> conditions,
                                          std::span<const model::NodeId> watched) {
  FreeBranch made;
  made.first_ = first;
  made.second_ = second;
  made.is_resistor_ = is<model::Resistor>(network, branch);
  made.watched_ = watched.size();
  Values values = values_of(network, held);

  values[branch.index()] = first;
  const auto at_first = Solver::make(network, values);
  if (!at_first) return base::Error{at_first.error()};
  const auto volts_first = under(network, *at_first, values, conditions, watched);
  if (!volts_first) return base::Error{volts_first.error()};

  values[branch.index()] = second;
  std::optional<Solver> other;
  if (made.is_resistor_) {
    auto at_second = Solver::make(network, values);
    if (!at_second) return base::Error{at_second.error()};
    other = std::move(*at_second);
    const auto& ends = network.branches[branch.index()].nodes;
    const auto response = other->with_ampere(ends[0], ends[1]);
    if (!response) return base::Error{response.error()};
    made.thevenin_ohms_ = other->volts(*response, ends[0]) - other->volts(*response, ends[1]);
  }
  const auto volts_second = under(network, other ? *other : *at_first, values, conditions, watched);
  if (!volts_second) return base::Error{volts_second.error()};

  made.volts_.reserve(volts_first->size());
  for (std::size_t i = 0; i < volts_first->size(); ++i) made.volts_.emplace_back((*volts_first)[i], (*volts_second)[i]);
  return made;
}

double FreeBranch::share(double value) const {
  if (is_resistor_ && std::isinf(value)) {
    // What is left of the second resistance where the rest of the network is open: there its volts are rounding.
    constexpr double dust = 1e-9;
    const double rest = second_ - thevenin_ohms_;
    return rest > dust * second_ ? second_ * (second_ / rest) / (second_ - first_)
                                 : std::numeric_limits<double>::quiet_NaN();
  }
  const double linear = (value - first_) / (second_ - first_);
  if (!is_resistor_) return linear;
  return linear * (second_ * second_ / (thevenin_ohms_ * second_ + value * (second_ - thevenin_ohms_)));
}

base::Result<std::vector<double>> sweep_volts(const model::Network& network, std::span<const model::SweptValues> swept,
                                              std::size_t points, Overrides held,
                                              std::span<const model::NodeId> watched) {
  for (const auto& branch : swept)
    if (branch.values.size() < points) return base::Error{"a swept branch has fewer values than the sweep has points"};
  if (const auto one = one_free(network, swept, points)) return along_one(network, *one, points, held, watched);
  return point_by_point(network, swept, points, held, watched);
}

}  // namespace network
