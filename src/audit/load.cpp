#include "audit/load.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <fmt/ranges.h>
#include <limits>
#include <optional>
#include <utility>

#include "network/linear.hpp"

namespace audit {
namespace {

using model::LoadKind;

double reading_at(const model::Input& input, const judge::Solved::Volts& volts, std::size_t p) {
  return input.gain * (volts.pin[p] - volts.low[p]) / (volts.high[p] - volts.low[p]);
}

class LoadSearch {
 public:
  LoadSearch(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved, std::size_t point)
      : divider_(divider), whole_(divider.whole), solved_(solved), point_(point), held_(at_point(prepared, point)) {}

  model::Contributor run() {
    try_leakage();
    const auto all = reading({});
    if (!all) return best_;
    for (std::uint32_t i = 0; i < whole_.network.branches.size(); ++i) try_branch(model::BranchId{i}, *all);
    if (!whole_.network.linear)
      offer({LoadKind::devices, device_names()}, reading_at(divider_.input, solved_.nominal, point_) - *all);
    return best_;
  }

 private:
  // Of the linear part of the network, without leakage.
  [[nodiscard]] std::optional<double> reading(std::vector<model::Override> change) const {
    std::vector<model::Override> held = held_;
    held.insert(held.end(), change.begin(), change.end());
    const auto volts = network::node_volts(whole_.network, held);
    if (!volts.ok()) return std::nullopt;
    const auto at = [&](model::NodeId node, double other) { return node.valid() ? (*volts)[node.index()] : other; };
    const model::Input& input = divider_.input;
    const double low = at(whole_.low, input.nominal_low);
    return input.gain * (at(whole_.probe, 0) - low) / (at(whole_.high, input.nominal_high) - low);
  }

  void offer(model::Contributor what, double moved) {
    constexpr double rounding = 1e-12;
    if (what.name.empty() || !(std::fabs(moved) > std::max(most_, rounding))) return;
    most_ = std::fabs(moved);
    best_ = std::move(what);
  }

  [[nodiscard]] const model::PartName* load_part(model::ElementId element) const {
    const auto at = std::find_if(divider_.load.begin(), divider_.load.end(),
                                 [element](const model::PartName& part) { return part.element == element; });
    return at == divider_.load.end() || !element.valid() ? nullptr : &*at;
  }

  void try_branch(model::BranchId id, double all) {
    const model::Branch& branch = whole_.network.branches[id.index()];
    model::Contributor what;
    double without = std::numeric_limits<double>::infinity();
    if (branch.origin == model::BranchOrigin::input_resistance)
      what = {LoadKind::input_resistance, "the input resistance"};
    if (branch.origin == model::BranchOrigin::rail_resistance)
      what = {LoadKind::rail_resistance, "the source resistance of a rail"}, without = 0;
    if (const model::PartName* part = load_part(branch.element);
        part != nullptr && std::holds_alternative<model::Resistor>(branch.part))
      what = {LoadKind::part, part->name};
    if (what.name.empty()) return;
    if (const auto changed = reading({{id, without}})) offer(std::move(what), *changed - all);
  }

  void try_leakage() {
    for (const auto* leaking : {&solved_.leakage_high, &solved_.leakage_low})
      if (*leaking)
        offer({LoadKind::leakage, "leakage"},
              reading_at(divider_.input, **leaking, point_) - reading_at(divider_.input, solved_.nominal, point_));
  }

  // Clamps and other devices, all together: what ngspice sees beside the linear network.
  [[nodiscard]] std::string device_names() const {
    std::vector<std::string> names;
    for (const auto& branch : whole_.network.branches)
      if (const auto* part = load_part(branch.element);
          part != nullptr && std::holds_alternative<model::Device>(branch.part))
        names.push_back(part->name);
    return fmt::format("{}", fmt::join(names, ", "));
  }

  const model::Divider& divider_;
  const model::ProbedNetwork& whole_;
  const judge::Solved& solved_;
  std::size_t point_;
  std::vector<model::Override> held_;
  model::Contributor best_;
  double most_ = 0;
};

}  // namespace

std::vector<model::Override> at_point(const Prepared& prepared, std::size_t point) {
  std::vector<model::Override> held;
  for (const auto& swept : prepared.swept)
    if (!swept.is_variable) held.push_back({swept.branch, swept.values[point]});
  return held;
}

model::Contributor largest_load(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved,
                                std::size_t point) {
  return LoadSearch(divider, prepared, solved, point).run();
}

}  // namespace audit
