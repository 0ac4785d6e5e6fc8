// The number that each branch has in one solve: its own, or what an override puts in its place.
#pragma once

#include <vector>

#include "model/network.hpp"
#include "network/linear.hpp"

namespace network {

// Of each branch: ohms, volts, amperes or gain; not a number where the branch has none of these or a residual.
using Values = std::vector<double>;

[[nodiscard]] Values own_values(const model::Network& network);

// Puts the overrides in, in order: a later one wins.
void apply(Values& values, Overrides overrides);

[[nodiscard]] Values values_of(const model::Network& network, Overrides overrides);

}  // namespace network
