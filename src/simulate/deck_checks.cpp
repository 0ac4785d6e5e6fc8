// What DeckWriter settles and refuses before the first deck is written.
#include <algorithm>
#include <cmath>
#include <numeric>
#include <string_view>

#include "base/disjoint_sets.hpp"
#include "base/overloaded.hpp"
#include "simulate/deck.hpp"
#include "simulate/device_card.hpp"
#include "simulate/topology.hpp"

namespace simulate {
namespace {

const double none = std::numeric_limits<double>::quiet_NaN();

// The branch's own Number; null where it has none.
const model::Number* number_of(const model::Part& part) {
  return std::visit(base::overloaded{
                        [](const model::Resistor& p) { return &p.ohms; },
                        [](const model::VoltageSource& p) { return &p.volts; },
                        [](const model::CurrentSource& p) { return &p.amperes; },
                        [](const model::VoltageControlled& p) { return &p.gain; },
                        [](const model::CurrentControlled& p) { return &p.gain; },
                        [](const auto&) -> const model::Number* { return nullptr; },
                    },
                    part);
}

std::size_t least_nodes(const model::Part& part) {
  return std::visit(base::overloaded{
                        [](const model::VoltageControlled&) -> std::size_t { return 4; },
                        [](const model::Capacitor&) -> std::size_t { return 0; },
                        [](const model::Unmodelled&) -> std::size_t { return 0; },
                        [](const auto&) -> std::size_t { return 2; },
                    },
                    part);
}

bool is_resistor(const model::Branch& branch) {
  return std::holds_alternative<model::Resistor>(branch.part);
}
bool is_source(const model::Branch& branch) {
  return std::holds_alternative<model::VoltageSource>(branch.part);
}

bool pins_exist(const model::Network& network, const model::Branch& branch) {
  if (branch.node_count < least_nodes(branch.part) || branch.node_count > branch.nodes.size()) return false;
  return std::all_of(branch.nodes.begin(), branch.nodes.begin() + branch.node_count,
                     [&](model::NodeId node) { return node.valid() && node.index() < network.node_count; });
}

}  // namespace

// A plan that contradicts itself is refused rather than read past its ends.
std::optional<std::string> DeckWriter::check_plan() const {
  auto trouble = check_network();
  if (!trouble) trouble = check_overrides();
  if (!trouble) trouble = check_watched();
  if (trouble) return "the plan contradicts itself: " + *trouble;
  return {};
}

bool DeckWriter::exists(model::BranchId branch) const {
  return branch.valid() && branch.index() < branches();
}

bool DeckWriter::is_voltage_source(model::BranchId branch) const {
  return exists(branch) && is_source(plan_->network.branches[branch.index()]);
}

std::optional<std::string> DeckWriter::check_network() const {
  const model::Network& network = plan_->network;
  if (network.node_count == 0) return "a network without ground";
  for (const model::Branch& branch : network.branches) {
    if (!pins_exist(network, branch)) return "a branch has too few nodes";
    const auto* device = std::get_if<model::Device>(&branch.part);
    if (device != nullptr && !(device->model.valid() && device->model.index() < circuit_->models.size())) {
      return "a device without a model";
    }
    if (std::holds_alternative<model::CurrentControlled>(branch.part) && !is_voltage_source(branch.through)) {
      return "a controlled source without its controlling source";
    }
  }
  return {};
}

std::optional<std::string> DeckWriter::check_overrides() const {
  for (const model::SweptValues& swept : plan_->swept) {
    if (!exists(swept.branch) || swept.values.size() != plan_->points)
      return "a swept branch has not one value a point";
    const model::Part& part = plan_->network.branches[swept.branch.index()].part;
    if (std::holds_alternative<model::Behavioural>(part) != swept.is_variable)
      return "a swept value that its branch does not take";
  }
  for (const model::Condition& condition : plan_->conditions) {
    for (const model::Override& held : condition.held) {
      if (!exists(held.branch)) return "a held branch is not there";
      if (number_of(plan_->network.branches[held.branch.index()].part) == nullptr)
        return "a held value that its branch does not take";
    }
  }
  return {};
}

std::optional<std::string> DeckWriter::check_watched() const {
  for (const model::NodeId node : plan_->watched) {
    if (!node.valid() || node.index() >= plan_->network.node_count) return "a watched node is not there";
  }
  for (const model::BranchId branch : plan_->watched_currents) {
    if (!is_voltage_source(branch)) return "a watched current of no voltage source";
  }
  return {};
}

void DeckWriter::settle_overrides() {
  const std::size_t count = branches();
  swept_.assign(count, nullptr);
  held_.assign(count * plan_->conditions.size(), none);
  overridden_.assign(count, false);
  for (const model::SweptValues& swept : plan_->swept) {
    swept_[swept.branch.index()] = &swept.values;
    overridden_[swept.branch.index()] = true;
  }
  for (std::size_t c = 0; c < plan_->conditions.size(); ++c) {
    for (const model::Override& held : plan_->conditions[c].held) {
      // A held value that is no number must not pass for "not held".
      held_[c * count + held.branch.index()] =
          std::isnan(held.value) ? std::numeric_limits<double>::infinity() : held.value;
      overridden_[held.branch.index()] = true;
    }
  }
}

double DeckWriter::own_value(std::size_t branch) const {
  const model::Number* number = number_of(plan_->network.branches[branch].part);
  return number != nullptr && number->fixed() ? number->value : none;
}

double DeckWriter::value(std::size_t branch, std::size_t copy) const {
  if (overridden_[branch]) {
    const double held = held_[(copy / plan_->points) * branches() + branch];
    if (!std::isnan(held)) return held;
    if (swept_[branch] != nullptr) return (*swept_[branch])[copy % plan_->points];
  }
  return own_value(branch);
}

std::optional<std::string> DeckWriter::check_value(std::size_t branch, std::size_t condition) const {
  const bool resistor = is_resistor(plan_->network.branches[branch]);
  const std::size_t points = overridden_[branch] ? plan_->points : 1;
  for (std::size_t p = 0; p < points; ++p) {
    const double number = value(branch, condition * plan_->points + p);
    if (!std::isfinite(number)) return "a value of the network is not a finite number";
    if (resistor && number < 0) return "a resistance of the network is negative";
  }
  return {};
}

std::optional<std::string> DeckWriter::check_values() const {
  if (plan_->points == 0) return {};
  for (std::size_t b = 0; b < branches(); ++b) {
    const model::Part& part = plan_->network.branches[b].part;
    const bool swept_variable = std::holds_alternative<model::Behavioural>(part) && swept_[b] != nullptr;
    if (number_of(part) == nullptr && !swept_variable) continue;
    const std::size_t conditions = overridden_[b] ? plan_->conditions.size() : 1;
    for (std::size_t c = 0; c < conditions; ++c) {
      if (auto trouble = check_value(b, c)) return trouble;
    }
  }
  return {};
}

// An inductor is a short, and so is a resistor of no resistance. One whose resistance depends on the copy waits for its
// copy.
void DeckWriter::settle_shorts() {
  const model::Network& network = plan_->network;
  base::DisjointSets sets(network.node_count);
  for (std::size_t b = 0; b < network.branches.size(); ++b) {
    const model::Branch& branch = network.branches[b];
    const bool resistor = is_resistor(branch);
    if (resistor && overridden_[b]) {
      perhaps_zero_.push_back(b);
    } else if (std::holds_alternative<model::Inductor>(branch.part) || (resistor && own_value(b) == 0)) {
      sets.join(branch.nodes[0].value, branch.nodes[1].value);
    }
  }
  roots_.resize(network.node_count);
  for (std::uint32_t node = 0; node < network.node_count; ++node) roots_[node] = sets.find(node);
}

void DeckWriter::settle_currents() {
  const model::Network& network = plan_->network;
  current_wanted_.assign(branches(), false);
  for (const model::BranchId branch : plan_->watched_currents) current_wanted_[branch.index()] = true;
  bool expressions = false;
  for (const model::Branch& branch : network.branches) {
    if (std::holds_alternative<model::CurrentControlled>(branch.part)) current_wanted_[branch.through.index()] = true;
    expressions = expressions || std::holds_alternative<model::Behavioural>(branch.part);
  }
  // An expression may ask for the current of any source that is an element.
  for (std::size_t b = 0; b < branches() && expressions; ++b) {
    if (is_source(network.branches[b]) && network.branches[b].element.valid()) current_wanted_[b] = true;
  }
}

// Copies of a linear network may hang on one ideal rail: it keeps its volts whatever they draw.
void DeckWriter::settle_shared() {
  const model::Network& network = plan_->network;
  shared_source_.assign(branches(), false);
  shared_node_.assign(network.node_count, false);
  linear_ = std::none_of(network.branches.begin(), network.branches.end(), [](const model::Branch& branch) {
    return std::holds_alternative<model::Device>(branch.part) ||
           std::holds_alternative<model::Behavioural>(branch.part);
  });
  for (std::size_t b = 0; b < branches() && linear_; ++b) {
    const model::Branch& branch = network.branches[b];
    if (!is_source(branch) || overridden_[b] || current_wanted_[b]) continue;
    const std::uint32_t plus = roots_[branch.nodes[0].index()];
    const std::uint32_t minus = roots_[branch.nodes[1].index()];
    if ((plus == 0) == (minus == 0)) continue;
    shared_source_[b] = true;
    shared_node_[plus + minus] = true;
  }
}

std::optional<std::string> DeckWriter::check_paths() const {
  const model::Network& network = plan_->network;
  if (has_voltage_loop(network, roots_)) return "voltage sources of the network form a loop";
  const std::vector<bool> reached = reaches_ground(network, *circuit_, roots_);
  const std::string trouble = "a node of the network has no DC path to ground";
  for (const model::NodeId node : plan_->watched) {
    if (!reached[node.index()]) return trouble;
  }
  for (const model::Branch& branch : network.branches) {
    if (std::holds_alternative<model::Capacitor>(branch.part) || std::holds_alternative<model::Unmodelled>(branch.part))
      continue;
    for (std::size_t i = 0; i < branch.node_count; ++i) {
      if (!reached[branch.nodes[i].index()]) return trouble;
    }
  }
  return {};
}

std::optional<std::string> DeckWriter::settle_devices() {
  const model::Network& network = plan_->network;
  device_text_.assign(branches(), {});
  std::vector<bool> written(circuit_->models.size());
  for (std::size_t b = 0; b < branches(); ++b) {
    const auto* device = std::get_if<model::Device>(&network.branches[b].part);
    if (device == nullptr) continue;
    const std::size_t index = device->model.index();
    const model::DeviceModel& model = circuit_->models[index];
    const DeviceShape shape = shape_of(model.type);
    const std::size_t pins = network.branches[b].node_count;
    if (pins < shape.least_pins || pins > shape.most_pins)
      return "a device of the network has a number of pins that its model does not take";
    if (!written[index]) {
      if (auto done = append_model(models_, index, model, *names_); !done) return done.error();
      written[index] = true;
    }
    std::string& text = device_text_[b];
    text = " dm" + std::to_string(index);
    if (auto done = append_parameters(text, *device, *circuit_, *names_); !done) return done.error();
    if (device->starts_off) text.append(" off");
  }
  return {};
}

std::vector<std::uint32_t> DeckWriter::roots_of(std::size_t copy) const {
  const bool none_zero =
      std::none_of(perhaps_zero_.begin(), perhaps_zero_.end(), [&](std::size_t b) { return value(b, copy) == 0; });
  if (none_zero) return {};
  const model::Network& network = plan_->network;
  base::DisjointSets sets(network.node_count);
  for (std::uint32_t node = 0; node < network.node_count; ++node) sets.join(node, roots_[node]);
  for (const std::size_t b : perhaps_zero_) {
    if (value(b, copy) == 0) sets.join(network.branches[b].nodes[0].value, network.branches[b].nodes[1].value);
  }
  // A node that a shared source holds stands for its set, for the source knows it by this name.
  std::vector<std::uint32_t> leader(network.node_count);
  std::iota(leader.begin(), leader.end(), 0U);
  for (std::uint32_t node = 1; node < network.node_count; ++node) {
    if (shared_node_[node] && sets.find(node) != 0) leader[sets.find(node)] = node;
  }
  std::vector<std::uint32_t> roots(network.node_count);
  for (std::uint32_t node = 0; node < network.node_count; ++node) roots[node] = leader[sets.find(node)];
  return roots;
}

}  // namespace simulate
