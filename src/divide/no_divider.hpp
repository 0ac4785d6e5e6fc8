// Why an input has no divider that could be audited, in sentences that name what is missing.
#pragma once

#include <span>
#include <string>

#include "divide/arms.hpp"
#include "divide/collect.hpp"
#include "divide/graph.hpp"
#include "divide/walk.hpp"

namespace divide {

// Whether anything among these edges holds a voltage other than 0 or drives a current.
[[nodiscard]] bool is_driven(const Graph& graph, std::span<const Edge> edges);

// Whether a controlled or behavioural source among these edges holds or feeds what it is in.
[[nodiscard]] bool is_followed(const Graph& graph, std::span<const Edge> edges);

// "; net +3V3 is no rail: if it is meant to be one, declare [rail."+3V3"] volts": the net that these edges lead to and
// that looks as if it were meant to be a rail, a dead end or else one where at least three parts meet. Empty where
// there is none.
[[nodiscard]] std::string missing_rail(const Graph& graph, std::span<const Edge> edges, Node pin);

// Why no current can be followed through the sensor: its far end leads neither to a rail nor back to the walk. Empty
// where it does.
[[nodiscard]] std::string dead_end(const Graph& graph, const Surroundings& around, const SensorEdge& sensor,
                                   const Walk& walk);

// Which branch off the walk would be an arm, were the part known that it leads on through: a switched pull-up, a
// buffered supply. Empty where there is none.
[[nodiscard]] std::string blocked_arm(const Graph& graph, const Surroundings& around, const Walk& walk);

}  // namespace divide
