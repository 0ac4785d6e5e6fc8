// Nodes: nets that zero-ohm links, inductors and ferrites join at DC. Everything in this room walks over nodes, not
// nets.
#pragma once

#include <cstdint>
#include <span>
#include <vector>

#include "divide/bind.hpp"
#include "model/circuit.hpp"

namespace divide {

// Index of a node of the whole board. Node 0 holds ground.
using Node = std::uint32_t;

// Whether a part is a short at DC.
[[nodiscard]] bool is_short(const model::Part& part);

class Nodes {
 public:
  Nodes(const model::Circuit& circuit, const Board& board);

  [[nodiscard]] Node of(model::NetId net) const { return node_of_net_[net.index()]; }
  [[nodiscard]] std::size_t size() const { return first_net_.size() - 1; }

  // The nets of a node, in the netlist's order.
  [[nodiscard]] std::span<const model::NetId> nets(Node node) const;

 private:
  std::vector<Node> node_of_net_;
  std::vector<std::uint32_t> first_net_;  // by node, into nets_
  std::vector<model::NetId> nets_;
};

}  // namespace divide
