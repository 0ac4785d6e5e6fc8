// Networks made by hand, a branch a line.
#pragma once

#include <initializer_list>
#include <limits>

#include "model/network.hpp"

namespace network_test {

inline constexpr double infinite = std::numeric_limits<double>::infinity();

// Nodes are plain numbers, 0 is ground; the network grows to hold the largest.
struct Board {
  model::Network network;

  model::BranchId add(model::Part part, std::initializer_list<std::uint32_t> nodes, model::BranchId through = {}) {
    model::Branch branch;
    branch.part = std::move(part);
    branch.through = through;
    for (const std::uint32_t node : nodes) {
      branch.nodes[branch.node_count++] = model::NodeId{node};
      network.node_count = std::max(network.node_count, node + 1);
    }
    network.branches.push_back(branch);
    return {static_cast<std::uint32_t>(network.branches.size() - 1)};
  }

  model::BranchId resistor(std::uint32_t a, std::uint32_t b, double ohms) {
    return add(model::Resistor{{ohms, {}}}, {a, b});
  }
  model::BranchId volts(std::uint32_t plus, std::uint32_t minus, double v) {
    return add(model::VoltageSource{{v, {}}}, {plus, minus});
  }
  // From `from` through the source into `into`.
  model::BranchId amperes(std::uint32_t from, std::uint32_t into, double a) {
    return add(model::CurrentSource{{a, {}}}, {from, into});
  }
  model::BranchId inductor(std::uint32_t a, std::uint32_t b) { return add(model::Inductor{{1e-3, {}}}, {a, b}); }
  model::BranchId capacitor(std::uint32_t a, std::uint32_t b) { return add(model::Capacitor{{1e-7, {}}}, {a, b}); }
};

inline constexpr model::NodeId node(std::uint32_t n) {
  return model::NodeId{n};
}

}  // namespace network_test
