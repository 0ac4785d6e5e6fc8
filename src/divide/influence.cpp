#include "divide/influence.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <fmt/format.h>
#include <fmt/ranges.h>

#include "base/text.hpp"
#include "divide/sweep_values.hpp"
#include "network/solver.hpp"

namespace divide {
namespace {

constexpr double same_lsb = 1e-4;
constexpr double rounding = 1e-11;   // of the reading: what is left of nothing
constexpr double no_effect = 1e-13;  // of the range
constexpr double worth_telling = 1.01;

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

std::optional<Influence::Reading> Influence::read(const Stands& stands, bool with_leakage) const {
  network::Values values = network::own_values(probed_.network);
  for (std::size_t i = 0; i < moved_.size(); ++i) {
    const bool rests = stands[i] == Stand::rest && moved_[i].rests;
    const auto at = stands[i] == Stand::rest ? Stand::middle : stands[i];
    if (!rests) network::apply(values, moved_[i].branches[static_cast<std::size_t>(at)]);
  }
  const auto solver = network::Solver::make(probed_.network, values);
  if (!solver.ok()) return std::nullopt;
  const auto solve = [&]() -> std::optional<double> {
    const auto solved = solver->with_sources(values);
    if (!solved.ok()) return std::nullopt;
    const double low = probed_.low.valid() ? solver->volts(*solved, probed_.low) : input_->nominal_low;
    const double high = probed_.high.valid() ? solver->volts(*solved, probed_.high) : input_->nominal_high;
    const double reading = input_->gain * (solver->volts(*solved, probed_.probe) - low) / (high - low);
    return std::isfinite(reading) ? std::optional(std::copysign(1.0, high - low) * reading) : std::nullopt;
  };
  const auto own = solve();
  if (!own) return std::nullopt;
  Reading reading{*own, {}};
  for (std::size_t k = 0; with_leakage && k < probed_.leakages.size(); ++k) {
    double& amperes = values[probed_.leakages[k].index()];
    amperes = probed_.leakage_amperes[k];
    const auto leaking = solve();
    amperes = 0;
    if (!leaking) return std::nullopt;
    reading.leaking.push_back(std::fabs(*leaking - *own));
  }
  return reading;
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
      const auto reading = read(stands, false);
      if (!reading) return false;
      if (!first) first = reading->own;
      if (std::fabs(reading->own - *first) > same * std::max(1.0, std::fabs(*first))) return false;
    }
  }
  return true;
}

// What a leakage alone adds goes one way with each sensor (linear-fractional, and the divisor keeps its sign): its
// largest is where each stands at the end that makes it larger.
std::vector<Influence::Stands> Influence::worst_stands(Stands rest, std::span<const std::size_t> still) const {
  std::vector<Stands> worst(probed_.leakages.size(), rest);
  for (const std::size_t mover : still) {
    std::array<std::optional<Reading>, 2> ends;
    for (const bool to : {false, true}) {
      Stands moved = rest;
      moved[mover] = to ? Stand::to : Stand::from;
      ends[to ? 1 : 0] = read(moved, true);
    }
    if (!ends[0] || !ends[1]) return {};
    for (std::size_t k = 0; k < worst.size(); ++k)
      worst[k][mover] = ends[1]->leaking[k] > ends[0]->leaking[k] ? Stand::to : Stand::from;
  }
  return worst;
}

std::optional<LeakageShare> Influence::leakage_share(std::size_t own, std::span<const std::size_t> still) const {
  LeakageShare share{std::vector<double>(probed_.leakages.size(), 1.0), {}};
  if (probed_.leakages.empty()) return share;
  const Stands rest(moved_.size(), Stand::rest);
  const auto worst = worst_stands(rest, still);
  if (worst.empty()) return std::nullopt;
  double largest = worth_telling;
  for (const Stand stand : {Stand::from, Stand::middle, Stand::to}) {
    Stands at_rest = rest;
    at_rest[own] = stand;
    const auto base = read(at_rest, true);
    for (std::size_t k = 0; k < worst.size(); ++k) {
      Stands at = worst[k];
      at[own] = stand;
      const auto reading = base ? read(at, true) : std::nullopt;
      if (!reading) return std::nullopt;
      if (reading->leaking[k] <= no_effect) continue;
      if (base->leaking[k] <= no_effect) return std::nullopt;
      const double ratio = reading->leaking[k] / base->leaking[k];
      share.of_each[k] = std::max(share.of_each[k], ratio);
      if (ratio > largest) largest = ratio, share.where = where_text(worst[k], still);
    }
  }
  return share;
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
