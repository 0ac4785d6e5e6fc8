// What the simulator found for a plan, and the curve that is made of it.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "model/plan.hpp"

namespace model {

// How ngspice was asked: which rung of the ladder of options led to a result (design: linear decks need none).
enum class Rung : std::uint8_t { linear, tight, medium, single };

// Volts of a plan: of condition c, point p, watched node w at [(c * points + p) * watched + w]; likewise amperes.
struct Solution {
  std::vector<double> volts;
  std::vector<double> amperes;
  Rung rung = Rung::linear;
  bool stepped = false;  // the last rung needed gmin or source stepping
  double alone_difference =
      0;  // V, largest difference of first, last and extreme points solved again alone (nonlinear)
};

// A solved plan, or why there is no solution: one sentence without a full stop.
struct Outcome {
  std::optional<Solution> solution;
  std::string failure;
};

// The curve of one input. All vectors have a value a point, but for those that say otherwise.
struct Sweep {
  std::string measurand;
  std::string unit;
  std::vector<double> at;
  std::vector<double> sensor_ohms;  // empty for a swept rail
  std::vector<double> bare_volts;   // at the tap of the bare divider, as reading in nominal volts
  std::vector<double> pin_volts;    // nominal, likewise
  std::vector<double> pin_low;      // envelope over the leakage's signs
  std::vector<double> pin_high;
  std::vector<long long> code;
  Rung rung = Rung::linear;
  bool stepped = false;
  double alone_difference = 0;  // V at the pin, as in Solution
};

}  // namespace model
