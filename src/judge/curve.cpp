#include <algorithm>
#include <cassert>
#include <cmath>
#include <utility>

#include "judge/readings.hpp"

namespace judge {
namespace {

std::vector<double> readings(const model::Input& input, const std::vector<double>& pin, const std::vector<double>& low,
                             const std::vector<double>& high) {
  assert(low.size() == pin.size() && high.size() == pin.size());
  std::vector<double> out(pin.size());
  for (std::size_t i = 0; i < pin.size(); ++i) out[i] = input.gain * (pin[i] - low[i]) / (high[i] - low[i]);
  return out;
}

std::vector<double> nominal_volts(const model::Input& input, std::vector<double> readings) {
  for (double& value : readings) value = input.volts_of(value);
  return readings;
}

}  // namespace

std::vector<double> readings(const model::Input& input, const Solved::Volts& volts) {
  return readings(input, volts.pin, volts.low, volts.high);
}

std::vector<double> bare_readings(const model::Input& input, const Solved& solved) {
  const Solved::Volts& bare = solved.bare;
  return readings(input, bare.pin, bare.low.empty() ? solved.nominal.low : bare.low,
                  bare.high.empty() ? solved.nominal.high : bare.high);
}

Envelope envelope(const model::Input& input, const Solved& solved) {
  Envelope out{readings(input, solved.nominal), {}};
  out.high = out.low;
  for (const auto* condition : {&solved.leakage_high, &solved.leakage_low}) {
    if (!*condition) continue;
    const std::vector<double> leaked = readings(input, **condition);
    assert(leaked.size() == out.low.size());
    for (std::size_t i = 0; i < leaked.size(); ++i) {
      // What is no number must stay so: std::min would drop it and the point would pass.
      out.low[i] = leaked[i] < out.low[i] || std::isnan(leaked[i]) ? leaked[i] : out.low[i];
      out.high[i] = leaked[i] > out.high[i] || std::isnan(leaked[i]) ? leaked[i] : out.high[i];
    }
  }
  return out;
}

double lsb_of(const model::Input& input, double readings) {
  return std::ldexp(readings, input.bits);
}
double reading_of_lsb(const model::Input& input, double lsb) {
  return std::ldexp(lsb, -input.bits);
}

long long code_of(double reading, int bits) {
  const double top = std::ldexp(1.0, bits) - 1;
  const double scaled = std::ldexp(reading, bits);
  // Not floor(scaled + 0.5): the sum would round up what lies a hair below the transition.
  const double below = std::floor(scaled);
  const double code = scaled - below >= 0.5 ? below + 1 : below;
  if (!(code > 0)) return 0;
  return static_cast<long long>(std::min(code, top));
}

model::Sweep curve_of(const model::Input& input, const Solved& solved, std::string measurand, std::string unit) {
  model::Sweep sweep;
  sweep.measurand = std::move(measurand);
  sweep.unit = std::move(unit);
  sweep.at = solved.at;
  sweep.sensor_ohms = solved.sensor_ohms;
  const std::vector<double> nominal = readings(input, solved.nominal);
  for (const double reading : nominal) sweep.code.push_back(code_of(reading, input.bits));
  sweep.pin_volts = nominal_volts(input, nominal);
  sweep.bare_volts = nominal_volts(input, bare_readings(input, solved));
  Envelope around = envelope(input, solved);
  sweep.pin_low = nominal_volts(input, std::move(around.low));
  sweep.pin_high = nominal_volts(input, std::move(around.high));
  // On a range that runs downwards the lowest reading is the highest voltage.
  if (input.volts_of(1) < input.volts_of(0)) std::swap(sweep.pin_low, sweep.pin_high);
  sweep.rung = solved.rung;
  sweep.stepped = solved.stepped;
  sweep.alone_difference = solved.alone_difference;
  return sweep;
}

}  // namespace judge
