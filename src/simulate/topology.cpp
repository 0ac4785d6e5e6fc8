#include "simulate/topology.hpp"

#include <unordered_set>
#include <utility>

#include "base/disjoint_sets.hpp"
#include "base/overloaded.hpp"

namespace simulate {

bool sets_voltage(const model::Branch& branch) {
  return std::visit(base::overloaded{
                        [](const model::VoltageSource&) { return true; },
                        [](const model::VoltageControlled& part) { return !part.drives_current; },
                        [](const model::CurrentControlled& part) { return !part.drives_current; },
                        [](const model::Behavioural& part) { return !part.drives_current; },
                        [](const auto&) { return false; },
                    },
                    branch.part);
}

bool has_voltage_loop(const model::Network& network, std::span<const std::uint32_t> roots) {
  base::DisjointSets sets(network.node_count);
  for (const model::Branch& branch : network.branches) {
    if (!sets_voltage(branch)) continue;
    const std::uint32_t a = roots[branch.nodes[0].index()];
    const std::uint32_t b = roots[branch.nodes[1].index()];
    if (a != b && !sets.join(a, b)) return true;
  }
  return false;
}

namespace {

// Joins what branches carry direct current between.
class Conduction {
 public:
  Conduction(const model::Network& network, const model::Circuit& circuit, std::span<const std::uint32_t> roots)
      : network_(network), circuit_(circuit), roots_(roots), sets_(network.node_count) {}

  void add(const model::Branch& branch) {
    std::visit(base::overloaded{
                   [&](const model::Resistor&) { join(branch, 0, 1); },
                   [&](const model::Inductor&) { join(branch, 0, 1); },
                   [&](const model::Capacitor&) {},
                   [&](const model::VoltageSource&) { join(branch, 0, 1); },
                   [&](const model::CurrentSource&) {},
                   [&](const model::VoltageControlled& part) { add_controlled(branch, part); },
                   [&](const model::CurrentControlled& part) { join_if(!part.drives_current, branch); },
                   [&](const model::Behavioural& part) {
                     join_if(!part.drives_current || asks_for_own_nodes(branch, part.expression), branch);
                   },
                   [&](const model::Device& part) { add_device(branch, circuit_.models[part.model.index()].type); },
                   [&](const model::Unmodelled&) {},
               },
               branch.part);
  }

  [[nodiscard]] std::vector<bool> grounded() {
    std::vector<bool> reached(network_.node_count);
    for (std::uint32_t node = 0; node < network_.node_count; ++node) {
      reached[node] = sets_.find(roots_[node]) == sets_.find(roots_[0]);
    }
    return reached;
  }

 private:
  [[nodiscard]] std::uint32_t root(const model::Branch& branch, std::size_t pin) const {
    return roots_[branch.nodes[pin].index()];
  }

  void join(const model::Branch& branch, std::size_t a, std::size_t b) { sets_.join(root(branch, a), root(branch, b)); }

  void join_if(bool conducts, const model::Branch& branch) {
    if (conducts) join(branch, 0, 1);
  }

  [[nodiscard]] bool is_end(const model::Branch& branch, std::uint32_t node) const {
    return node != 0 && (node == root(branch, 0) || node == root(branch, 1));
  }

  // A current controlled by a voltage at its own ends is a conductance.
  void add_controlled(const model::Branch& branch, const model::VoltageControlled& part) {
    join_if(!part.drives_current || is_end(branch, root(branch, 2)) || is_end(branch, root(branch, 3)), branch);
  }

  // A gate, a substrate and the controlling pins of a switch carry nothing.
  void add_device(const model::Branch& branch, model::DeviceType type) {
    switch (type) {
      case model::DeviceType::diode:
      case model::DeviceType::voltage_switch:
        join(branch, 0, 1);
        break;
      case model::DeviceType::npn:
      case model::DeviceType::pnp:
      case model::DeviceType::njf:
      case model::DeviceType::pjf:
        join(branch, 0, 1);
        join(branch, 1, 2);
        break;
      case model::DeviceType::nmos:
      case model::DeviceType::pmos:
        join(branch, 0, 2);
        join(branch, 0, 3);
        break;
    }
  }

  [[nodiscard]] bool is_own(const model::Branch& branch, std::uint32_t net) const {
    const model::NodeId node = network_.node_of(model::NetId{net});
    return node.valid() && node.index() < roots_.size() && is_end(branch, roots_[node.index()]);
  }

  [[nodiscard]] bool asks_for_own_nodes(const model::Branch& branch, model::ExpressionId tree) const {
    std::unordered_set<std::uint32_t> seen;
    std::vector<std::uint32_t> open{tree.value};
    while (!open.empty()) {
      const std::uint32_t at = open.back();
      open.pop_back();
      if (!seen.insert(at).second) continue;
      const model::ExpressionNode& node = circuit_.expressions.nodes[at];
      if (node.op == model::Op::net_volts && (is_own(branch, node.index) || is_own(branch, node.index2))) return true;
      for (std::size_t i = 0; i < node.argument_count; ++i)
        open.push_back(circuit_.expressions.argument(node, i).value);
    }
    return false;
  }

  const model::Network& network_;
  const model::Circuit& circuit_;
  std::span<const std::uint32_t> roots_;
  base::DisjointSets sets_;
};

}  // namespace

std::vector<bool> reaches_ground(const model::Network& network, const model::Circuit& circuit,
                                 std::span<const std::uint32_t> roots) {
  Conduction conduction(network, circuit, roots);
  for (const model::Branch& branch : network.branches) conduction.add(branch);
  return conduction.grounded();
}

}  // namespace simulate
