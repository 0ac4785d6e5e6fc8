// The two networks of an input: the whole one, with everything that loads it, and the bare divider.
#pragma once

#include <functional>
#include <optional>
#include <span>
#include <vector>

#include "divide/arms.hpp"
#include "divide/collect.hpp"
#include "divide/graph.hpp"
#include "model/divider.hpp"
#include "model/sheet.hpp"

namespace divide {

// A sensor that stands still at one measurand, because the reading does not care where it stands.
struct Held {
  std::size_t sensor = 0;  // in Board::sensors
  const model::SensorDeclaration* declaration = nullptr;
  double at = 0;
};

// What is solved, for which input, moved by which sensor.
struct Subject {
  const Graph& graph;
  const std::vector<model::Input>& inputs;  // all of the board
  const model::Input& input;
  const Surroundings& around;
  const SensorEdge* sensor;      // null: nothing varies
  std::span<const Held> held{};  // other sensors
};

// The whole network, the pin as probe: every edge of the surroundings, rails with their resistances, every input's
// leakage (nominally zero) and input resistance.
[[nodiscard]] model::ProbedNetwork whole_network(const Subject& subject);

// The arms and the sensor between ideal rails, the tap as probe. An end of the converter's range that the arms do not
// touch is no part of it.
[[nodiscard]] model::ProbedNetwork bare_network(const Subject& subject, std::span<const Edge> arms, Node tap);

// The one-port form of the bare divider at its tap, for a sensor of any make between its two ends. Nothing where the
// sensor is a rail or has more than two ends, where the rest of the arms is not linear, or where it sees no finite
// resistance.
[[nodiscard]] std::optional<model::OnePort> sensor_form(const Subject& subject, std::span<const Edge> arms, Node tap);

// Weighs edges of the surroundings for choose_arms(), at seven points of the sweep (of a monitor at the end where it
// stands highest).
[[nodiscard]] Weigh weigher(const Subject& subject, const model::SensorDeclaration& declaration);

}  // namespace divide
