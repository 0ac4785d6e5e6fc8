// The board as a graph: edges (elements of the netlist, then the extras of the sheet) between nodes.
#pragma once

#include <array>
#include <cstdint>
#include <limits>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "divide/bind.hpp"
#include "divide/names.hpp"
#include "divide/nodes.hpp"
#include "divide/rails.hpp"
#include "model/circuit.hpp"

namespace divide {

// An element of the circuit, or an extra of the sheet counted on from the last element.
using Edge = std::uint32_t;
inline constexpr Edge no_edge = std::numeric_limits<Edge>::max();

// What current through a pin of a part means for the network around it.
enum class PinUse : std::uint8_t { conducts, senses, nothing };

class Graph {
 public:
  Graph(const model::Circuit& circuit, const Board& board, const Nodes& nodes, const Rails& rails,
        const NameIndex& index);

  [[nodiscard]] const model::Circuit& circuit() const { return circuit_; }
  [[nodiscard]] const Board& board() const { return board_; }
  [[nodiscard]] const Nodes& nodes() const { return nodes_; }
  [[nodiscard]] const Rails& rails() const { return rails_; }
  [[nodiscard]] const NameIndex& names() const { return index_; }

  // The edges with a pin on a node; parts that a declaration removed, sources that make rails, and shorts are left out.
  [[nodiscard]] std::span<const Edge> edges_at(Node node) const;

  // Shorts (zero ohms, inductors) whose two ends are in a node.
  [[nodiscard]] std::span<const Edge> shorts_in(Node node) const;

  [[nodiscard]] bool is_extra(Edge edge) const { return edge >= circuit_.elements.size(); }
  [[nodiscard]] const Extra& extra(Edge edge) const { return board_.extras[edge - circuit_.elements.size()]; }
  [[nodiscard]] model::ElementId element(Edge edge) const {
    return is_extra(edge) ? extra(edge).element : model::ElementId{edge};
  }
  [[nodiscard]] const model::Part& part(Edge edge) const {
    return is_extra(edge) ? extra(edge).part : circuit_.elements[edge].part;
  }
  [[nodiscard]] std::size_t pin_count(Edge edge) const {
    return is_extra(edge) ? 2 : circuit_.elements[edge].pin_count;
  }
  [[nodiscard]] Node pin(Edge edge, std::size_t i) const;
  [[nodiscard]] PinUse pin_use(Edge edge, std::size_t i) const;
  [[nodiscard]] std::string name(Edge edge) const;

  // What a declaration says of the part.
  [[nodiscard]] std::optional<model::Role> role(Edge edge) const;

  // Place in the netlist's order, for lists of parts.
  [[nodiscard]] std::uint32_t order(Edge edge) const;

  // Whether an edge is a way for a walk (a resistance, or a source in series), and whether it can feed a node from a
  // rail (those, and a current source).
  [[nodiscard]] bool is_way(Edge edge) const;
  [[nodiscard]] bool feeds(Edge edge) const;

  // The other end of a two-ended edge.
  [[nodiscard]] Node other_end(Edge edge, Node node) const {
    return pin(edge, 0) == node ? pin(edge, 1) : pin(edge, 0);
  }

 private:
  void index_edges();

  const model::Circuit& circuit_;
  const Board& board_;
  const Nodes& nodes_;
  const Rails& rails_;
  const NameIndex& index_;
  struct Lists {
    std::vector<std::uint32_t> first;  // by node
    std::vector<Edge> edges;
  };
  Lists touching_;
  Lists shorts_;
};

}  // namespace divide
