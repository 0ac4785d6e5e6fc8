// Readings: what the converter sees, as a fraction of its range.
#pragma once

#include <vector>

#include "judge/judge.hpp"

namespace judge {

// u = gain (V - low)/(high - low) of each point, volts and ends of the same condition.
[[nodiscard]] std::vector<double> readings(const model::Input& input, const Solved::Volts& volts);

// The same of the bare divider, with the nominal ends where it has none of its own.
[[nodiscard]] std::vector<double> bare_readings(const model::Input& input, const Solved& solved);

// Lowest and highest reading of each point over nominal and both signs of the leakage.
struct Envelope {
  std::vector<double> low;
  std::vector<double> high;
};
[[nodiscard]] Envelope envelope(const model::Input& input, const Solved& solved);

// LSB of a difference of readings, and back.
[[nodiscard]] double lsb_of(const model::Input& input, double readings);
[[nodiscard]] double reading_of_lsb(const model::Input& input, double lsb);

}  // namespace judge
