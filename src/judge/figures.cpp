#include <algorithm>
#include <cassert>
#include <cmath>

#include "judge/readings.hpp"

namespace judge {
namespace {

using Values = std::vector<double>;

// A reading that misses an end by less than this does so by rounding alone.
constexpr double rounding = 1e-12;

bool on_scale(double reading) {
  return reading >= -rounding && reading <= 1 + rounding;
}

double span_of(const Values& nominal) {
  double low = 1;
  double high = 0;
  for (const double reading : nominal) {
    low = std::min(low, std::clamp(reading, 0.0, 1.0));
    high = std::max(high, std::clamp(reading, 0.0, 1.0));
  }
  return high - low;
}

void set_gaps(model::Figures& figures, const Envelope& around) {
  const auto lowest = std::min_element(around.low.begin(), around.low.end());
  const auto highest = std::max_element(around.high.begin(), around.high.end());
  figures.gap_low = *lowest;
  figures.gap_high = 1 - *highest;
  figures.gap_low_point = static_cast<std::size_t>(lowest - around.low.begin());
  figures.gap_high_point = static_cast<std::size_t>(highest - around.high.begin());
}

// d(reading)/d(measurand) at point i as the sweep's own points tell it, for a divider that only the simulator solves:
// where they are few or the curve bends between them it is as rough as they are. Of the parabola through the point and
// its neighbours (the central difference where points are evenly spaced; one-sided at the ends). Where a steep bend
// turns the parabola's end the wrong way, the secant to the neighbour. Nothing where the curve is flat.
std::optional<double> slope_of_sweep(const Values& at, const Values& reading, std::size_t i) {
  const std::size_t count = at.size();
  if (count < 2) return std::nullopt;
  const auto secant = [&](std::size_t a, std::size_t b) { return (reading[b] - reading[a]) / (at[b] - at[a]); };
  double slope = 0;
  double width = 0;
  if (count == 2) {
    slope = secant(0, 1);
    width = at[1] - at[0];
  } else {
    const std::size_t middle = std::clamp<std::size_t>(i, 1, count - 2);
    const double left = secant(middle - 1, middle);
    const double right = secant(middle, middle + 1);
    const double bend = (right - left) / (at[middle + 1] - at[middle - 1]);
    slope = left + bend * ((at[i] - at[middle - 1]) + (at[i] - at[middle]));
    const double nearest = i < middle ? left : right;
    if (i != middle && slope * nearest <= 0) slope = nearest;
    width = at[middle + 1] - at[middle - 1];
  }
  const bool flat = !(std::fabs(slope * width) > rounding);
  return flat || !std::isfinite(slope) ? std::nullopt : std::optional{slope};
}

std::optional<double> slope_at(const Solved& solved, const Values& bare, std::size_t i) {
  if (!solved.bare_slope.empty() && std::isfinite(solved.bare_slope[i])) return solved.bare_slope[i];
  return slope_of_sweep(solved.at, bare, i);
}

// Keeps the largest value and its point; what is no number counts as larger than any.
void keep_largest(std::optional<double>& figure, std::size_t& point, double value, std::size_t i) {
  if (figure && (std::isnan(*figure) || value <= *figure)) return;
  figure = value;
  point = i;
}

void set_load_errors(model::Figures& figures, const model::Input& input, const Solved& solved, const Envelope& around) {
  const Values bare = bare_readings(input, solved);
  for (std::size_t i = 0; i < bare.size(); ++i) {
    if (!on_scale(bare[i])) continue;
    const double error = std::max(std::fabs(around.low[i] - bare[i]), std::fabs(around.high[i] - bare[i]));
    keep_largest(figures.load_error_lsb, figures.load_error_point, lsb_of(input, error), i);
    if (const auto slope = slope_at(solved, bare, i))
      keep_largest(figures.load_error_measurand, figures.load_error_measurand_point, error / std::fabs(*slope), i);
  }
}

void set_engine_gap(model::Figures& figures, const model::Input& input, const Values& simulated,
                    const Solved::Volts& closed_form) {
  const Values exact = readings(input, closed_form);
  assert(exact.size() == simulated.size());
  for (std::size_t i = 0; i < exact.size(); ++i)
    keep_largest(figures.engine_gap_lsb, figures.engine_gap_point, lsb_of(input, std::fabs(simulated[i] - exact[i])),
                 i);
}

}  // namespace

model::Figures figures_of(const model::Divider& divider, const Solved& solved, const model::Sweep& sweep) {
  const model::Input& input = divider.input;
  model::Figures figures;
  if (sweep.at.empty()) return figures;
  const Values nominal = readings(input, solved.nominal);
  const Envelope around = envelope(input, solved);
  assert(nominal.size() == sweep.at.size());
  figures.span_use = span_of(nominal);
  set_gaps(figures, around);
  set_load_errors(figures, input, solved, around);
  const auto hold = [&](const Solved::Volts& simulated, const std::optional<Solved::Volts>& closed_form) {
    if (closed_form) set_engine_gap(figures, input, readings(input, simulated), *closed_form);
  };
  hold(solved.nominal, solved.closed_form);
  if (solved.leakage_high) hold(*solved.leakage_high, solved.closed_form_high);
  if (solved.leakage_low) hold(*solved.leakage_low, solved.closed_form_low);
  return figures;
}

}  // namespace judge
