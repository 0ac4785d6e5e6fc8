// The slope of the bare divider's reading, free of where the sweep's points lie.
#pragma once

#include <span>
#include <vector>

#include "model/circuit.hpp"
#include "model/divider.hpp"
#include "model/plan.hpp"
#include "model/sheet.hpp"

namespace audit {

// d(reading)/d(measurand) of the bare divider at each of `at`, per unit of the measurand: from the closed form and the
// sensor's law or expression at a hundred-thousandth of the range about each point (of the value itself where the
// measurand runs in ratios), never outside the declared range. Not a number where the curve is flat. Empty where there
// is no closed form at such places: arms that only the simulator solves, a range whose ends are nets of a network that
// is not linear, an expression without a value there.
[[nodiscard]] std::vector<double> bare_slopes(const model::Divider& divider, const model::Circuit& circuit,
                                              const model::SensorDeclaration& sensor, std::span<const double> at);

}  // namespace audit
