#include <algorithm>
#include <cmath>

#include "advise/reach.hpp"

namespace advise {
namespace {

double clipped(double reading) {
  return std::clamp(reading, 0.0, 1.0);
}

// The bare divider's reading at its ends, and the sensor's range.
struct Curve {
  double open = 0;
  double shorted = 0;
  double least_ohms = 0;
  double most_ohms = 0;

  [[nodiscard]] double span_at(double source_ohms) const {
    const auto reading = [&](double ohms) {
      return clipped(open + (shorted - open) * (source_ohms / (source_ohms + ohms)));
    };
    return std::abs(reading(least_ohms) - reading(most_ohms));
  }

  // The source resistance at which a sensor of `ohms` reads `reading`; not above zero where there is none.
  [[nodiscard]] double source_for(double reading, double ohms) const {
    const double share = (reading - open) / (shorted - open);
    return ohms * share / (1 - share);
  }
};

}  // namespace

// With one end clipped the span only rises or falls with Rs, so the largest lies at the free optimum or where an end of
// the range is just met.
double span_ceiling(double open_reading, double short_reading, std::span<const double> ohms) {
  if (ohms.empty()) return 0;
  const auto [least, most] = std::ranges::minmax(ohms);
  const Curve curve{open_reading, short_reading, least, most};
  double best = 0;
  const auto consider = [&](double source_ohms) {
    if (source_ohms > 0 && std::isfinite(source_ohms)) best = std::max(best, curve.span_at(source_ohms));
  };
  consider(std::sqrt(least * most));
  for (const double end : {0.0, 1.0})
    for (const double sensor : {least, most}) consider(curve.source_for(end, sensor));
  // A sensor that reaches zero ohms: the limit of a source resistance towards zero.
  if (least == 0 && most > 0) best = std::max(best, std::abs(clipped(curve.shorted) - clipped(curve.open)));
  return best;
}

std::optional<double> rail_ceiling(double bottom, double top, double least, double most) {
  if (!(most > 0) || !(top > bottom)) return std::nullopt;
  const double ratio = std::min(1.0, top / most);
  const auto reading = [&](double rail) { return clipped((ratio * rail - bottom) / (top - bottom)); };
  return std::max(0.0, reading(most) - reading(least));
}

}  // namespace advise
