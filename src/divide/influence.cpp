#include "divide/influence.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <fmt/format.h>
#include <fmt/ranges.h>
#include <initializer_list>

#include "base/text.hpp"
#include "divide/sweep_values.hpp"
#include "network/solver.hpp"

namespace divide {
namespace {

constexpr double same_lsb = 1e-4;
constexpr double rounding = 1e-11;   // of the reading: what is left of nothing
constexpr double no_effect = 1e-13;  // of the range
constexpr double worth_telling = 1.01;
constexpr double unfelt_lsb = 1e-6;  // of one leakage: a hundred of them are still nothing
constexpr double same_share = 1e-9;
constexpr double uneven = 0.05;

bool share_a_parameter(const Graph& graph, std::span<const Mover> movers) {
  std::vector<std::uint32_t> seen;
  for (const Mover& mover : movers)
    if (const auto& variable = graph.board().sensors[mover.sensor].variable) {
      if (std::find(seen.begin(), seen.end(), *variable) != seen.end()) return true;
      seen.push_back(*variable);
    }
  return false;
}

const Rail* rail_swept_by(const Graph& graph, std::size_t sensor) {
  const auto& rails = graph.rails().rails;
  const auto at = std::find_if(rails.begin(), rails.end(), [&](const Rail& rail) { return rail.sensor == sensor; });
  return at == rails.end() ? nullptr : &*at;
}

// What is wanted, and what there is of it.
struct Wanted {
  double wanted = 0;
  double has = 0;
};

// The factor that gives all that is wanted; rounding asks for none. Nothing where no factor does.
std::optional<double> raise(std::initializer_list<Wanted> pairs) {
  double factor = 1;
  for (const Wanted& pair : pairs) {
    if (std::fabs(pair.wanted) <= no_effect) continue;
    if (std::fabs(pair.has) <= no_effect) return std::nullopt;
    if (const double ratio = pair.wanted / pair.has; ratio > 1 + same_share) factor = std::max(factor, ratio);
  }
  return factor;
}

bool is_even(double up, double down) {
  return std::fabs(up + down) <= uneven * std::max(std::fabs(up), std::fabs(down)) + no_effect;
}

}  // namespace

std::optional<Influence> Influence::make(const Subject& subject, const model::Sheet& sheet,
                                         std::span<const Mover> movers) {
  if (share_a_parameter(subject.graph, movers)) return std::nullopt;
  Influence found(subject);
  for (const Mover& mover : movers)
    if (!found.add(subject, sheet, mover)) return std::nullopt;
  return found.moved_.empty() || !found.probed_.network.linear ? std::nullopt : std::optional(std::move(found));
}

bool Influence::add(const Subject& subject, const model::Sheet& sheet, const Mover& mover) {
  // The same nodes and branches whichever sensor sweeps them: as an edge each stands at the pin.
  const Node pin = subject.graph.nodes().of(subject.input.net);
  const SensorEdge edge{mover.sensor, true, pin, pin, {}};
  Subject swept = subject;
  swept.sensor = &edge;
  probed_ = whole_network(swept);
  const BoundSensor& bound = subject.graph.board().sensors[mover.sensor];
  const model::SensorDeclaration& declared = sheet.sensors[bound.declaration];
  auto at = measurands(declared, 3);
  if (!at.ok()) return false;
  const auto values = swept_values(probed_, subject.graph.circuit(), declared, *at);
  if (!values.ok()) return false;
  const Rail* rail = rail_swept_by(subject.graph, mover.sensor);
  Moved moved{
      {mover.sensor, &declared, (*at)[1]}, rail != nullptr, rail != nullptr && rail->has_volts,          bound.name,
      std::string(bound.kind->unit),       std::move(*at),  std::vector<std::vector<model::Override>>(3)};
  for (const model::SweptValues& branch : *values)
    for (std::size_t i = 0; i < 3; ++i) moved.branches[i].push_back({branch.branch, branch.values[i]});
  moved_.push_back(std::move(moved));
  return true;
}

double Influence::Reading::largest(std::size_t leakage) const {
  return std::max(std::fabs(plus[leakage]), std::fabs(minus[leakage]));
}

std::optional<Influence::Reading> Influence::read(const Stands& stands, const Scales& scales) const {
  network::Values values = network::own_values(probed_.network);
  for (std::size_t i = 0; i < moved_.size(); ++i) {
    const bool rests = stands[i] == Stand::rest && moved_[i].rests;
    const auto at = stands[i] == Stand::rest ? Stand::middle : stands[i];
    if (!rests) network::apply(values, moved_[i].branches[static_cast<std::size_t>(at)]);
  }
  const auto solver = network::Solver::make(probed_.network, values);
  if (!solver.ok()) return std::nullopt;
  bool solved_all = true;
  const auto solve = [&] {
    const auto solved = solver->with_sources(values);
    const auto at = [&](model::NodeId node, double otherwise) {
      return node.valid() && solved.ok() ? solver->volts(*solved, node) : otherwise;
    };
    const double low = at(probed_.low, input_->nominal_low);
    const double high = at(probed_.high, input_->nominal_high);
    const double reading = input_->gain * (at(probed_.probe, 0) - low) / (high - low);
    solved_all = solved_all && solved.ok() && std::isfinite(reading);
    return std::copysign(1.0, high - low) * reading;
  };
  const auto leak = [&](std::size_t k, double sign) {
    values[probed_.leakages[k].index()] = sign * scales[k] * probed_.leakage_amperes[k];
  };
  Reading reading;
  reading.own = solve();
  for (std::size_t k = 0; k < scales.size(); ++k)
    for (const double sign : {1.0, -1.0, 0.0}) {
      leak(k, sign);
      if (scales[k] == 0)
        (sign > 0 ? reading.plus : reading.minus).resize(k + 1);
      else if (sign != 0)
        (sign > 0 ? reading.plus : reading.minus).push_back(solve() - reading.own);
    }
  for (const bool up : {true, false}) {
    for (std::size_t k = 0; k < scales.size(); ++k) leak(k, (reading.plus[k] > 0) == up ? 1 : -1);
    (up ? reading.up : reading.down) = solve() - reading.own;
  }
  return solved_all ? std::optional(std::move(reading)) : std::nullopt;
}

bool Influence::stand_still(std::span<const std::size_t> movers) const {
  constexpr std::array stand{Stand::from, Stand::middle, Stand::to};
  const double same = std::max(rounding, std::ldexp(same_lsb, -input_->bits));
  for (std::size_t others = 0; others < 5; ++others) {
    std::optional<double> first;
    for (std::size_t pattern = 0; pattern < 6; ++pattern) {
      Stands stands;
      for (std::size_t i = 0; i < moved_.size(); ++i) stands.push_back(stand[others < 3 ? others : (i + others) % 3]);
      // All at one place, then each at another than its neighbours.
      for (std::size_t i = 0; i < movers.size(); ++i)
        stands[movers[i]] = stand[pattern < 3 ? pattern : (i / (pattern - 2) + pattern) % 3];
      const auto reading = read(stands, {});
      if (!reading) return false;
      if (!first) first = reading->own;
      if (std::fabs(reading->own - *first) > same * std::max(1.0, std::fabs(*first))) return false;
    }
  }
  return true;
}

// What a leakage alone adds goes one way with each sensor (linear-fractional, and the divisor keeps its sign): its
// largest is where each stands at the end that makes it larger.
std::vector<Influence::Stands> Influence::worst_stands(const Scales& felt, std::span<const std::size_t> still) const {
  const Stands rest(moved_.size(), Stand::rest);
  std::vector<Stands> worst(felt.size(), rest);
  for (const std::size_t mover : still) {
    std::array<std::optional<Reading>, 2> ends;
    for (const bool to : {false, true}) {
      Stands moved = rest;
      moved[mover] = to ? Stand::to : Stand::from;
      ends[to ? 1 : 0] = read(moved, felt);
    }
    if (!ends[0] || !ends[1]) return {};
    for (std::size_t k = 0; k < worst.size(); ++k)
      worst[k][mover] = ends[1]->largest(k) > ends[0]->largest(k) ? Stand::to : Stand::from;
  }
  return worst;
}

std::optional<LeakageShare> Influence::leakage_share(std::size_t own, std::span<const std::size_t> still) const {
  LeakageShare share{std::vector<double>(probed_.leakages.size(), 1.0), {}};
  if (probed_.leakages.empty()) return share;
  const auto felt = this->felt(own);
  if (!felt) return std::nullopt;
  auto worst = worst_stands(*felt, still);
  if (worst.empty()) return std::nullopt;
  const Stands told = worst[own_leakage()];
  for (std::size_t k = felt->size(); k-- > 0;)
    if ((*felt)[k] == 0) worst.erase(worst.begin() + static_cast<std::ptrdiff_t>(k));
  std::sort(worst.begin(), worst.end());
  worst.erase(std::unique(worst.begin(), worst.end()), worst.end());
  constexpr int rounds = 6;  // what one share adds to the range's ends changes the others a little
  for (int i = 0; i < rounds; ++i) {
    const auto before = share.of_each;
    if (!cover(share, *felt, worst, own)) return std::nullopt;
    if (share.of_each == before) break;
  }
  if (*std::max_element(share.of_each.begin(), share.of_each.end()) > worth_telling)
    share.where = where_text(told, still);
  return share;
}

// Of the leakages that of the input itself, or the first.
std::size_t Influence::own_leakage() const {
  for (std::size_t k = 0; k < probed_.leakages.size(); ++k)
    if (probed_.network.branches[probed_.leakages[k].index()].nodes[1] == probed_.probe) return k;
  return 0;
}

// Which leakages the reading feels (1) and which not (0): on a shared rail most are another divider's alone.
std::optional<Influence::Scales> Influence::felt(std::size_t own) const {
  const double least = std::ldexp(unfelt_lsb, -input_->bits);
  const Scales all(probed_.leakages.size(), 1.0);
  Scales felt(all.size(), 0.0);
  for (const Stand stand : {Stand::from, Stand::middle, Stand::to}) {
    Stands stands(moved_.size(), Stand::rest);
    stands[own] = stand;
    const auto reading = read(stands, all);
    if (!reading) return std::nullopt;
    for (std::size_t k = 0; k < felt.size(); ++k)
      if (reading->largest(k) > least) felt[k] = 1;
  }
  return felt;
}

// Raises the shares until what the leakages add with them is as much as at the worst stands. False where it cannot be.
bool Influence::cover(LeakageShare& share, const Scales& felt, const std::vector<Stands>& worst,
                      std::size_t own) const {
  const auto scaled = [&] {
    Scales scales;
    for (std::size_t k = 0; k < felt.size(); ++k) scales.push_back(felt[k] * share.of_each[k]);
    return scales;
  };
  for (const Stands& stands : worst)
    for (const Stand stand : {Stand::from, Stand::middle, Stand::to}) {
      Stands at_rest(moved_.size(), Stand::rest);
      Stands at = stands;
      at_rest[own] = at[own] = stand;
      const auto there = read(at, felt);
      auto held = read(at_rest, scaled());
      if (!held || !there || !is_even(there->up, there->down) || !is_even(held->up, held->down)) return false;
      for (std::size_t k = 0; k < felt.size(); ++k) {
        const auto factor = raise({{there->plus[k], held->plus[k]}, {there->minus[k], held->minus[k]}});
        if (!factor) return false;
        share.of_each[k] *= *factor;
      }
      held = read(at_rest, scaled());
      const auto factor = held ? raise({{there->up, held->up}, {there->down, held->down}}) : std::nullopt;
      if (!factor) return false;
      for (double& one : share.of_each) one *= *factor;
    }
  return true;
}

std::string Influence::place_text(std::size_t mover, Stand stand) const {
  const Moved& moved = moved_[mover];
  return fmt::format("{} at {}{}{}", base::printable_short(moved.name),
                     base::number_text(moved.at[static_cast<std::size_t>(stand)]), moved.unit.empty() ? "" : " ",
                     moved.unit);
}

// The first few are enough to find the place.
std::string Influence::where_text(const Stands& worst, std::span<const std::size_t> still) const {
  constexpr std::size_t most = 3;
  std::vector<std::string> places;
  for (const std::size_t mover : still) {
    if (places.size() == most) break;
    places.push_back(place_text(mover, worst[mover]));
  }
  if (still.size() > most) places.push_back(fmt::format("{} more likewise", still.size() - most));
  return fmt::format("{}", fmt::join(places, ", "));
}

std::optional<Held> Influence::held(std::size_t mover) const {
  return moved_[mover].is_rail ? std::nullopt : std::optional(moved_[mover].middle);
}

std::string Influence::held_text(std::size_t mover) const {
  return moved_[mover].is_rail ? base::printable_short(moved_[mover].name) + " at rest"
                               : place_text(mover, Stand::middle);
}

}  // namespace divide
