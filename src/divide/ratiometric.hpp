// Whether what a monitor does to a rail cancels in the reading of another sensor's divider on that rail.
#pragma once

#include <optional>

#include "divide/collect.hpp"
#include "divide/graph.hpp"
#include "model/divider.hpp"

namespace divide {

// A linear network that one rail alone feeds has every voltage in proportion to that rail (superposition), so a reading
// between ends that are ground or in proportion too does not change with it; a leakage's share of the reading goes with
// one over the rail's volts. Where all that is certain for the swept rail: how much more than at rest a leakage counts
// where the sweep of the rail is nearest to 0 V. Else nothing.
[[nodiscard]] std::optional<double> leakage_share(const Graph& graph, const Surroundings& around,
                                                  const model::Input& input, const Rail& swept,
                                                  const model::SensorDeclaration& sweep);

}  // namespace divide
