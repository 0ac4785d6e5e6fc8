// What is electrically joined to an input: collected from the graph, then written as a network with nodes of its own.
#pragma once

#include <optional>
#include <span>
#include <unordered_map>
#include <vector>

#include "divide/graph.hpp"
#include "model/divider.hpp"
#include "model/network.hpp"

namespace divide {

// How a node was met: through an edge at another one. A start was met from itself, through no edge.
struct Meeting {
  Node from = 0;
  Edge through = no_edge;
};

// A controlled source that follows the current of a source that makes a rail.
struct MeasuredRail {
  Edge by = 0;
  model::ElementId source;
};

// All that current can reach from a node without passing an ideal rail.
struct Surroundings {
  std::vector<Node> nodes;  // without ideal rails; the start comes first
  std::vector<Node> rails;  // ideal rails that were met
  std::vector<Edge> edges;  // that conduct, in order
  std::vector<Edge> idle;   // capacitors and parts without a model that touch a node
  std::vector<MeasuredRail> measured_rails;
  std::unordered_map<Node, Meeting> met_through;  // of every node, by the fewest edges from a start
};

// The rails that were met, those behind a resistance included.
[[nodiscard]] std::vector<const Rail*> rails_of(const Graph& graph, const Surroundings& around);

// The edges among them through which current from a node can flow, ideal rails not passed, and the idle ones at those
// nodes.
[[nodiscard]] std::vector<Edge> drawing_from(const Graph& graph, const Surroundings& around, Node node);

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
