#include "audit/advice.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <fmt/ranges.h>
#include <limits>

#include "advise/reach.hpp"
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

// The swept branches at one point, as overrides.
std::vector<model::Override> at_point(const Prepared& prepared, std::size_t point) {
  std::vector<model::Override> held;
  for (const auto& swept : prepared.swept)
    if (!swept.is_variable) held.push_back({swept.branch, swept.values[point]});
  return held;
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

// Finds what moves the pin most from the bare divider, at the point where the load error is worst: each suspect is
// taken out of the network in turn.
class LoadSearch {
 public:
  LoadSearch(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved, std::size_t point)
      : divider_(divider), whole_(divider.whole), solved_(solved), point_(point), held_(at_point(prepared, point)) {}

  std::string run() {
    const auto all = pin_volts({});
    if (!all) return {};
    for (std::uint32_t i = 0; i < whole_.network.branches.size(); ++i) try_branch(model::BranchId{i}, *all);
    try_leakage(*all);
    if (!whole_.network.linear) offer(device_names(), std::fabs(solved_.nominal.pin[point_] - *all));
    return best_;
  }

 private:
  std::optional<double> pin_volts(std::vector<model::Override> change) const {
    std::vector<model::Override> held = held_;
    held.insert(held.end(), change.begin(), change.end());
    const auto volts = network::node_volts(whole_.network, held);
    return volts.ok() ? std::optional((*volts)[whole_.probe.index()]) : std::nullopt;
  }

  void offer(std::string name, double moved_volts) {
    if (name.empty() || moved_volts <= most_) return;
    most_ = moved_volts;
    best_ = std::move(name);
  }

  [[nodiscard]] const model::PartName* load_part(model::ElementId element) const {
    const auto at = std::find_if(divider_.load.begin(), divider_.load.end(),
                                 [element](const model::PartName& part) { return part.element == element; });
    return at == divider_.load.end() || !element.valid() ? nullptr : &*at;
  }

  void try_branch(model::BranchId id, double all) {
    const model::Branch& branch = whole_.network.branches[id.index()];
    std::string name;
    double value = std::numeric_limits<double>::infinity();
    if (branch.origin == model::BranchOrigin::input_resistance) name = "the input resistance";
    if (branch.origin == model::BranchOrigin::rail_resistance) name = "the source resistance of a rail", value = 0;
    if (const model::PartName* part = load_part(branch.element);
        part != nullptr && std::holds_alternative<model::Resistor>(branch.part))
      name = part->name;
    if (name.empty()) return;
    if (const auto volts = pin_volts({{id, value}})) offer(name, std::fabs(*volts - all));
  }

  void try_leakage(double all) {
    std::vector<model::Override> leaks;
    for (std::size_t i = 0; i < whole_.leakages.size(); ++i)
      leaks.push_back({whole_.leakages[i], whole_.leakage_amperes[i]});
    if (leaks.empty()) return;
    if (const auto volts = pin_volts(leaks)) offer("leakage", std::fabs(*volts - all));
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
  std::string best_;
  double most_ = 0;
};

}  // namespace

void add_advice(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved,
                model::Figures& figures) {
  figures.span_best = ceiling(divider, prepared, solved);
  add_reach(divider, prepared, figures);
  add_source_ohms(divider, prepared, figures);
  constexpr double worth_naming_lsb = 0.01;
  if (figures.load_error_lsb.value_or(0) > worth_naming_lsb)
    figures.largest_load = LoadSearch(divider, prepared, solved, figures.load_error_point).run();
}

}  // namespace audit
