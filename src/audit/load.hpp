// What bends a reading most.
#pragma once

#include <vector>

#include "audit/plans.hpp"
#include "model/divider.hpp"
#include "model/figures.hpp"

namespace audit {

// The swept branches of the whole network at one point, as overrides.
[[nodiscard]] std::vector<model::Override> at_point(const Prepared& prepared, std::size_t point);

// What moves the reading most at that point of the sweep: each resistor that is no arm, input resistance and rail
// resistance is taken away in turn, and pin and both ends of the range are solved again, so that what is ratiometric
// counts for nothing; leakage counts with its envelope, and devices with what the simulator sees beside the linear part
// of the network. None where nothing does.
[[nodiscard]] model::Contributor largest_load(const model::Divider& divider, const Prepared& prepared,
                                              const judge::Solved& solved, std::size_t point);

}  // namespace audit
