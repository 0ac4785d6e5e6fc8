// Which parts are the arms, which the sense path: design section 3, "Which elements are the arms".
#pragma once

#include <functional>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "divide/graph.hpp"
#include "divide/walk.hpp"
#include "model/divider.hpp"

namespace divide {

// How far pin and node move, at most over the sweep, when these edges are taken out at a node; infinite where something
// then floats.
struct Weight {
  double pin_volts = 0;
  double node_volts = 0;
  double swing_volts = 0;  // of the pin over the sweep, with the edges
};
using Weigh = std::function<Weight(std::span<const Edge> removed, Node at)>;

struct Arms {
  std::size_t tap = 0;                          // index in Walk::nodes
  std::vector<Edge> edges;                      // of the arms, the sensor's own left out
  std::vector<Edge> sense;                      // from tap to pin
  std::vector<model::TapCandidate> candidates;  // from the sensor to the pin
};

// A candidate is an arm from `share` of the heaviest one's weight on, each weighed at its own node (an attenuator
// behind it would make light of it at the pin), or where no other leads to a second rail; declared roles win over
// weights. More than one candidate is weighed.
[[nodiscard]] Arms choose_arms(const Graph& graph, const SensorEdge& sensor, const Walk& walk, double share,
                               const Weigh& weigh);

// The arms sorted by the rail that they lead to.
struct Sides {
  std::vector<Edge> upper;
  std::vector<Edge> lower;
  std::optional<model::Arm> sensor_arm;
  const Rail* upper_rail = nullptr;
  const Rail* lower_rail = nullptr;
};

[[nodiscard]] Sides sort_sides(const Graph& graph, const SensorEdge& sensor, const Walk& walk, const Arms& arms);

}  // namespace divide
