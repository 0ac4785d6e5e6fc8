// The walk from the sensor to the pin, and what hangs off it.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "divide/collect.hpp"
#include "divide/graph.hpp"

namespace divide {

// The sensor as the walk sees it: one edge between two nodes, however many elements it is made of.
struct SensorEdge {
  std::size_t sensor = 0;  // in Board::sensors
  bool is_rail = false;    // a rail: then `plus` is its node and the walk starts there
  Node plus = 0;
  Node minus = 0;
  std::vector<Edge> edges;  // that belong to the sensor: no walk passes them
};

// Where what hangs on a node leads to.
struct Region {
  std::vector<Edge> edges;
  std::vector<Node> rails;
  bool reaches_sensor_far_end = false;  // parallel to the sensor
  std::vector<Node> returns;            // other nodes of the walk that it comes back to

  [[nodiscard]] bool reaches_rail() const { return !rails.empty(); }
};

// An edge off the walk at one of its nodes, with all that lies behind it.
struct OffWalk {
  Edge edge = 0;
  Region whole;
  Region kept;  // without what is declared load, and what hangs behind that alone
};

struct Walk {
  std::vector<Node> nodes;                // from the sensor's end to the pin
  std::vector<std::vector<Edge>> steps;   // the edges between nodes[i] and nodes[i+1]; parallel ones together
  std::vector<std::vector<OffWalk>> off;  // one list a node
  std::optional<Node> far_end;            // the sensor's other end, where it is no rail and not on the walk
  Region behind_sensor;                   // all that the far end leads to, without what is declared load
};

// The shortest walk from either end of the sensor to the pin's node, past no edge that is declared load; nothing where
// there is none.
[[nodiscard]] std::optional<Walk> find_walk(const Graph& graph, const SensorEdge& sensor, Node pin);

// The nodes that resistive ways join to a node, rails included but not passed.
[[nodiscard]] std::vector<Node> resistive_reach(const Graph& graph, Node start);

}  // namespace divide
