// Which sensor moves an input, and how its walk sees it.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "divide/collect.hpp"
#include "divide/graph.hpp"
#include "divide/walk.hpp"

namespace divide {

// The sensors of the sheet that are part of these surroundings: those of resistances by their edges, those of
// parameters by what depends on them, those of rails by a resistive way to the rail from the input's node.
[[nodiscard]] std::vector<std::size_t> sensors_in(const Graph& graph, const Surroundings& around, Node pin);

// A sensor as one edge. Nothing where it has no two ends (a parameter that moves no resistance here).
[[nodiscard]] std::optional<SensorEdge> sensor_edge(const Graph& graph, const Surroundings& around, std::size_t sensor);

// Whether an expression of the flat circuit depends on a swept parameter; an invalid tree does not.
[[nodiscard]] bool depends_on(const Graph& graph, model::ExpressionId tree, std::uint32_t variable);

// The expression of a part's value, where it has no number yet; none for others.
[[nodiscard]] model::ExpressionId expression_of(const model::Part& part);

}  // namespace divide
