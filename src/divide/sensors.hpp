// Which sensors move the network of an input, and how a walk sees them.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "divide/collect.hpp"
#include "divide/graph.hpp"
#include "divide/leaves.hpp"
#include "divide/walk.hpp"

namespace divide {

// What a sensor changes in some surroundings: a resistance, whatever depends on its parameter, a rail that it sweeps.
struct Changes {
  std::vector<Edge> edges;
  std::vector<Node> rails;

  [[nodiscard]] bool none() const { return edges.empty() && rails.empty(); }
};
[[nodiscard]] Changes changes_by(const Graph& graph, const Surroundings& around, std::size_t sensor);

// A sensor that changes something in the surroundings of an input.
struct Mover {
  std::size_t sensor = 0;  // in Board::sensors
  std::optional<SensorEdge> edge;
  std::optional<Walk> walk;  // none: it acts on the input otherwise than along resistances from its own ends to the pin
};

// All of them, in the order of declaration. Of several that share one parameter, those with a walk.
[[nodiscard]] std::vector<Mover> movers_of(const Graph& graph, const Surroundings& around, Node pin);

// Where the influence of a sensor comes in that has no walk: "through G1", "through rail VCC". Empty where that has no
// name.
[[nodiscard]] std::string way_in(const Graph& graph, const Surroundings& around, Node pin, std::size_t sensor);

}  // namespace divide
