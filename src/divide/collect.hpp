// What is electrically joined to an input: collected from the graph, then written as a network with nodes of its own.
#pragma once

#include <optional>
#include <span>
#include <vector>

#include "divide/graph.hpp"
#include "model/divider.hpp"
#include "model/network.hpp"

namespace divide {

// All that current can reach from a node without passing an ideal rail.
struct Surroundings {
  std::vector<Node> nodes;             // without ideal rails; the start comes first
  std::vector<Node> rails;             // ideal rails that were met
  std::vector<Edge> edges;             // that conduct, in order
  std::vector<Edge> idle;              // capacitors and parts without a model that touch a node
  bool measures_rail_current = false;  // a controlled source follows the current of a source that makes a rail
};

// Sensed nets of controlled sources are followed too: what they measure counts.
[[nodiscard]] Surroundings collect(const Graph& graph, std::span<const Node> starts);

// A network and where its nodes and branches come from.
struct Built {
  model::Network network;
  std::vector<std::pair<Node, model::NodeId>> nodes;           // ordered by node
  std::vector<std::pair<Edge, model::BranchId>> edges;         // in the order of the edges given
  std::vector<std::pair<std::size_t, model::BranchId>> rails;  // index in Rails::rails, its ideal source

  [[nodiscard]] model::NodeId node(Node node) const;  // none where the node is not part of it
  [[nodiscard]] model::BranchId branch(Edge edge) const;
};

// Writes edges as a network; ideal rails become sources to ground, rails behind ohms a source and that resistance (or,
// with `ideal_rails`, a source alone). Of `nodes`, each gets a node even where no edge touches it.
[[nodiscard]] Built build(const Graph& graph, std::span<const Edge> edges, std::span<const Node> nodes,
                          bool ideal_rails);

}  // namespace divide
