// The search for a better resistor: how much of the range one changed value could reach.
#pragma once

#include <optional>
#include <span>
#include <string>

#include "model/divider.hpp"

namespace advise {

struct Reach {
  std::string part;
  double ohms = 0;
  double span_use = 0;
};

// The most that a bare divider between these ends could use, over its source resistance, with open_volts and short_volts held; the
// reading clipped to 0..1. `ohms` are the sensor's over the sweep. Formula: span is largest at Rs = sqrt(Rmin Rmax) where no end
// clips (derivative of the one-port form set to zero); searched where one does.
[[nodiscard]] double span_ceiling(const model::Input& input, const model::OnePort& form, std::span<const double> ohms);

// Over the value of one fixed resistor of the arms (the one that reaches most): the largest span of the pin's reading that keeps both gaps
// at `gap_limit` or more, leakage of either sign included. Nothing where no fixed resistor can be varied so.
// Nonlinear branches count as open.
[[nodiscard]] std::optional<Reach> best_resistor(const model::Divider& divider, std::span<const double> sensor_values, double gap_limit);

}  // namespace advise
