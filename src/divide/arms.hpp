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

// How far the pin moves, at most over the sweep, when these edges are taken out; infinite where it then floats.
using Weigh = std::function<double(std::span<const Edge> removed)>;

struct Arms {
  std::size_t tap = 0;                          // index in Walk::nodes
  std::vector<Edge> edges;                      // of the arms, the sensor's own left out
  std::vector<Edge> sense;                      // from tap to pin
  std::vector<model::TapCandidate> candidates;  // from the sensor to the pin
};

// A candidate is an arm from `share` of the heaviest one's weight on, or where no other leads to a second rail;
// declared roles win over weights. More than one candidate is weighed.
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
