// Thermistors that fall with temperature: the B equation, R = R25 exp(B (1/T - 1/T25)) (terms of IEC 60539-1), and the
// equation of Steinhart and Hart, 1/T = a + b ln R + c (ln R)^3 (Deep-Sea Research 15 (1968) 497-503). T in kelvin, R
// in ohm.
#include <array>
#include <cmath>
#include <fmt/format.h>
#include <limits>

#include "base/text.hpp"
#include "sensor/law.hpp"
#include "sensor/settings.hpp"
#include "sensor/temperature.hpp"

namespace sensor {
namespace {

constexpr double absolute_zero = -zero_celsius_kelvin;
constexpr double unlimited = std::numeric_limits<double>::max();

std::optional<double> degrees_at(double inverse_kelvin) {
  if (!std::isfinite(inverse_kelvin) || inverse_kelvin <= 0) return std::nullopt;
  return degrees_of(1 / inverse_kelvin);
}

base::Result<Law> by_beta(Settings settings) {
  const auto r25 = above_zero(settings, "r25");
  if (!r25) return base::Error{r25.error()};
  const auto beta = above_zero(settings, "beta");
  if (!beta) return base::Error{beta.error()};
  Law law;
  law.ohms = [r = *r25, b = *beta](double t) { return r * std::exp(b * (1 / kelvin_of(t) - 1 / kelvin_of(25))); };
  law.measurand = [r = *r25, b = *beta](double ohms) -> std::optional<double> {
    if (!(ohms > 0)) return std::nullopt;
    return degrees_at(1 / kelvin_of(25) + std::log(ohms / r) / b);
  };
  law.valid_from = absolute_zero;
  law.valid_to = unlimited;
  law.validity = "the B equation holds above -273.15 degC, where the resistance is a finite number";
  return law;
}

struct SteinhartHart {
  double a = 0;
  double b = 0;
  double c = 0;

  [[nodiscard]] double inverse_kelvin(double log_ohms) const { return a + log_ohms * (b + c * log_ohms * log_ohms); }
  [[nodiscard]] double slope(double log_ohms) const { return b + 3 * c * log_ohms * log_ohms; }
  // With c below zero the curve turns where the slope is zero; only what lies between the turns falls with temperature.
  [[nodiscard]] double turn() const {
    return c < 0 ? std::sqrt(b / (-3 * c)) : std::numeric_limits<double>::infinity();
  }

  // ln R at 1/T, between the turns. Newton's method from ln R = 0, the point of inflection, runs to the root from one
  // side.
  [[nodiscard]] double log_ohms(double wanted) const {
    double at = 0;
    for (int i = 0; i < 200; ++i) {
      const double step = (wanted - inverse_kelvin(at)) / slope(at);
      at += step;
      if (!(std::abs(step) > 1e-15 * (1 + std::abs(at)))) break;
    }
    return at;
  }
};

Law law_with(const SteinhartHart& curve) {
  Law law;
  law.ohms = [curve](double t) { return std::exp(curve.log_ohms(1 / kelvin_of(t))); };
  law.measurand = [curve](double ohms) -> std::optional<double> {
    if (!(ohms > 0) || std::abs(std::log(ohms)) > curve.turn()) return std::nullopt;
    return degrees_at(curve.inverse_kelvin(std::log(ohms)));
  };
  law.valid_from = absolute_zero;
  law.valid_to = unlimited;
  return law;
}

base::Result<Law> by_steinhart_hart(Settings settings) {
  const auto a = finite(settings, "a");
  if (!a) return base::Error{a.error()};
  const auto b = above_zero(settings, "b");
  if (!b) return base::Error{b.error()};
  const auto c = finite(settings, "c");
  if (!c) return base::Error{c.error()};
  const SteinhartHart curve{*a, *b, *c};
  Law law = law_with(curve);
  if (std::isfinite(curve.turn())) {
    const auto hottest = degrees_at(curve.inverse_kelvin(-curve.turn()));
    const auto coldest = degrees_at(curve.inverse_kelvin(curve.turn()));
    if (!coldest) return base::Error{"with these \"a\", \"b\" and \"c\" the resistance falls at no temperature"};
    law.valid_from = *coldest;
    law.valid_to = hottest.value_or(unlimited);
  }
  law.validity =
      law.valid_to < unlimited
          ? fmt::format("with these \"a\", \"b\" and \"c\" the Steinhart-Hart resistance falls from {} to {} degC only",
                        base::number_text(law.valid_from), base::number_text(law.valid_to))
          : fmt::format(
                "with these \"a\", \"b\" and \"c\" the Steinhart-Hart equation holds above {} degC, where "
                "the resistance is a finite number",
                base::number_text(law.valid_from, 5));
  return law;
}

base::Result<Law> make(Settings settings) {
  const bool beta = any_set(settings, {"r25", "beta"});
  const bool steinhart_hart = any_set(settings, {"a", "b", "c"});
  if (beta && steinhart_hart)
    return base::Error{"give \"r25\" and \"beta\", or \"a\", \"b\" and \"c\", not some of both"};
  if (beta) return by_beta(settings);
  if (steinhart_hart) return by_steinhart_hart(settings);
  return base::Error{"needs \"r25\" and \"beta\", or \"a\", \"b\" and \"c\""};
}

constexpr std::array keys{Key{"r25", KeyUnit::ohms}, Key{"beta", KeyUnit::kelvin}, Key{"a", KeyUnit::number},
                          Key{"b", KeyUnit::number}, Key{"c", KeyUnit::number}};

}  // namespace

Kind ntc_kind() {
  return {"ntc", "temperature", "degC", Moves::ohms, false, keys, make};
}

}  // namespace sensor
