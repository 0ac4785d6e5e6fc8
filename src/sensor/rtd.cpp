// Platinum resistance thermometers, IEC 60751 clause 4.1: R = R0 (1 + A t + B t^2) from 0 degC up, with the further
// term C (t - 100) t^3 below.
#include <array>
#include <cmath>

#include "sensor/law.hpp"
#include "sensor/settings.hpp"

namespace sensor {
namespace {

constexpr double a = 3.9083e-3;   // 1/degC
constexpr double b = -5.775e-7;   // 1/degC^2
constexpr double c = -4.183e-12;  // 1/degC^4
constexpr double coldest = -200;  // degC
constexpr double hottest = 850;

double ratio_at(double t) {
  const double above = 1 + t * (a + b * t);
  return t < 0 ? above + c * (t - 100) * t * t * t : above;
}

double slope_at(double t) {
  return a + 2 * b * t + c * (4 * t - 300) * t * t;
}

// Below 0 degC the curve is smooth and nearly straight: Newton's method from the quadratic's answer needs three steps.
double degrees_at(double ratio) {
  double t = (-a + std::sqrt(a * a - 4 * b * (1 - ratio))) / (2 * b);
  if (t >= 0) return t;
  for (int i = 0; i < 8; ++i) t -= (ratio_at(t) - ratio) / slope_at(t);
  return t;
}

std::optional<double> degrees_within(double ratio) {
  constexpr double rounding = 1e-12;
  if (!(ratio >= ratio_at(coldest) - rounding && ratio <= ratio_at(hottest) + rounding)) return std::nullopt;
  return degrees_at(ratio);
}

base::Result<Law> make(Settings settings) {
  const auto r0 = above_zero(settings, "r0");
  if (!r0) return base::Error{r0.error()};
  Law law;
  law.ohms = [r = *r0](double t) { return r * ratio_at(t); };
  law.measurand = [r = *r0](double ohms) { return degrees_within(ohms / r); };
  law.valid_from = coldest;
  law.valid_to = hottest;
  law.validity = "IEC 60751 holds from -200 to 850 degC";
  return law;
}

constexpr std::array keys{Key{"r0", KeyUnit::ohms}};

}  // namespace

Kind rtd_kind() {
  return {"rtd", "temperature", "degC", Moves::ohms, false, keys, make};
}

}  // namespace sensor
