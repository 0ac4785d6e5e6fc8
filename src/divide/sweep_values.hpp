// What each swept branch of a network is at each point of a sensor's range.
#pragma once

#include <span>
#include <string>
#include <vector>

#include "base/result.hpp"
#include "model/circuit.hpp"
#include "model/divider.hpp"
#include "model/plan.hpp"
#include "model/sheet.hpp"

namespace divide {

// The measurand at `points` points of a declared range, spaced as declared. Error: a range that the spacing cannot
// divide.
[[nodiscard]] base::Result<std::vector<double>> measurands(const model::SensorDeclaration& sensor, std::size_t points);

// Values of the swept branches at these measurands: the law's ohms, the rail's volts, or the number that an expression
// of the netlist has there (for a behavioural branch: the measurand, put in later). Error: the expression has no value
// somewhere, or a resistance is not above zero; the sentence says where.
[[nodiscard]] base::Result<std::vector<model::SweptValues>> swept_values(const model::ProbedNetwork& probed,
                                                                         const model::Circuit& circuit,
                                                                         const model::SensorDeclaration& sensor,
                                                                         std::span<const double> at);

// Puts the numbers that the swept branches have at one measurand in their place. False where one has none there.
[[nodiscard]] bool hold(model::ProbedNetwork& probed, const model::Circuit& circuit,
                        const model::SensorDeclaration& sensor, double at);

// Puts numbers in place of every value that depends on a swept parameter, at one measurand: for looking at a network at
// one point. False where an expression has no value there.
[[nodiscard]] bool freeze(model::Network& network, const model::Circuit& circuit, double at);

}  // namespace divide
