// Which nodes are one, and which hang in the air: what has to be settled before a simulator sees a network.
#pragma once

#include <cstdint>
#include <span>
#include <vector>

#include "model/circuit.hpp"
#include "model/network.hpp"

namespace simulate {

// Whether a branch drives a voltage between its first two nodes: a voltage source of any kind.
[[nodiscard]] bool sets_voltage(const model::Branch& branch);

// Whether voltage sources of any kind form a loop among the merged nodes `roots` (a node -> the node that stands for
// it), so that the network has no single solution. A source with both ends on one node is not counted here.
[[nodiscard]] bool has_voltage_loop(const model::Network& network, std::span<const std::uint32_t> roots);

// For each node of the network, whether branches that carry direct current join it to ground. `roots` as above.
[[nodiscard]] std::vector<bool> reaches_ground(const model::Network& network, const model::Circuit& circuit,
                                               std::span<const std::uint32_t> roots);

}  // namespace simulate
