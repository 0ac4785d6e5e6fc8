#include "audit/slope.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

#include "divide/sweep_values.hpp"
#include "network/sweep.hpp"
#include "sensor/law.hpp"

namespace audit {
namespace {

constexpr double step_share = 1e-5;  // its square is what the difference leaves out, 1e-15 over it is rounding

// Of full scale over a whole range (or over the value itself): a slope below is rounding. A converter of 24 bits has
// steps of 6e-8.
constexpr double flat = 1e-9;

// A place to difference at, with its neighbours at `step` on either side; `x` is the point that it is for.
struct Place {
  double x = 0;
  double centre = 0;
  double step = 0;
  double scale = 0;  // the range, or the value
};

// Photoresistors and the like follow a power of the measurand: there a step is a ratio.
bool in_ratios(const model::SensorDeclaration& sensor, double from) {
  const sensor::Kind* kind = sensor::find_kind(sensor.kind.value);
  return from > 0 &&
         ((kind != nullptr && kind->logarithmic) || sensor::spacing_of(sensor) == model::Spacing::logarithmic);
}

std::vector<Place> places_of(const model::SensorDeclaration& sensor, std::span<const double> at) {
  const auto [from, to] = std::minmax_element(at.begin(), at.end());
  const bool ratios = in_ratios(sensor, *from);
  std::vector<Place> places;
  for (const double x : at) {
    const double scale = ratios ? x : *to - *from;
    const double step = std::min(step_share * scale, (*to - *from) / 2);
    places.push_back({x, std::clamp(x, *from + step, *to - step), step, scale});
  }
  return places;
}

// Of the parabola through three readings, at the place's own x.
double slope(const Place& place, double below, double centre, double above) {
  const double first = (above - below) / (2 * place.step);
  const double second = (above - 2 * centre + below) / (place.step * place.step);
  const double found = place.centre == place.x ? first : first + second * (place.x - place.centre);
  return std::abs(found * place.scale) > flat ? found : std::numeric_limits<double>::quiet_NaN();
}

// Volts of up to one node of a network, over measurands; no node: none.
std::vector<double> volts_of(const model::ProbedNetwork& probed, model::NodeId node, const model::Circuit& circuit,
                             const model::SensorDeclaration& sensor, std::span<const double> at) {
  if (!probed.network.linear) return {};
  const auto swept = divide::swept_values(probed, circuit, sensor, at);
  if (!swept.ok()) return {};
  const auto volts = network::sweep_volts(probed.network, *swept, at.size(), {}, {&node, 1});
  return volts.ok() ? *volts : std::vector<double>{};
}

// An end of the range: of the bare network, else of the whole one, else a number.
std::vector<double> end_volts(const model::Divider& divider, model::NodeId model::ProbedNetwork::*end, double nominal,
                              const model::Circuit& circuit, const model::SensorDeclaration& sensor,
                              std::span<const double> at) {
  if ((divider.bare.*end).valid()) return volts_of(divider.bare, divider.bare.*end, circuit, sensor, at);
  if ((divider.whole.*end).valid()) return volts_of(divider.whole, divider.whole.*end, circuit, sensor, at);
  return std::vector<double>(at.size(), nominal);
}

}  // namespace

std::vector<double> bare_slopes(const model::Divider& divider, const model::Circuit& circuit,
                                const model::SensorDeclaration& sensor, std::span<const double> at) {
  if (at.size() < 2 || at.front() == at.back()) return {};
  const std::vector<Place> places = places_of(sensor, at);
  std::vector<double> near;
  for (const Place& place : places)
    for (const double x : {place.centre - place.step, place.centre, place.centre + place.step})
      near.push_back(std::clamp(x, std::min(at.front(), at.back()), std::max(at.front(), at.back())));
  const model::Input& input = divider.input;
  const auto tap = volts_of(divider.bare, divider.bare.probe, circuit, sensor, near);
  const auto low = end_volts(divider, &model::ProbedNetwork::low, input.nominal_low, circuit, sensor, near);
  const auto high = end_volts(divider, &model::ProbedNetwork::high, input.nominal_high, circuit, sensor, near);
  if (tap.size() != near.size() || low.size() != near.size() || high.size() != near.size()) return {};
  const auto reading = [&](std::size_t i) { return input.gain * (tap[i] - low[i]) / (high[i] - low[i]); };
  std::vector<double> slopes;
  for (std::size_t p = 0; p < places.size(); ++p)
    slopes.push_back(slope(places[p], reading(3 * p), reading(3 * p + 1), reading(3 * p + 2)));
  return slopes;
}

}  // namespace audit
