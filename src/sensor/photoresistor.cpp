// Photoresistors: R = R10 (E/10 lx)^-gamma, the power law by which makers' data sheets define gamma.
#include <array>
#include <cmath>
#include <limits>

#include "sensor/law.hpp"
#include "sensor/settings.hpp"

namespace sensor {
namespace {

base::Result<Law> make(Settings settings) {
  const auto ohms_at_10lx = above_zero(settings, "ohms_at_10lx");
  if (!ohms_at_10lx) return base::Error{ohms_at_10lx.error()};
  const auto gamma = above_zero(settings, "gamma");
  if (!gamma) return base::Error{gamma.error()};
  Law law;
  law.ohms = [r = *ohms_at_10lx, g = *gamma](double lux) { return r * std::pow(lux / 10, -g); };
  law.measurand = [r = *ohms_at_10lx, g = *gamma](double ohms) -> std::optional<double> {
    const double lux = ohms > 0 ? 10 * std::pow(ohms / r, -1 / g) : 0;
    if (!std::isfinite(lux) || !(lux > 0)) return std::nullopt;
    return lux;
  };
  law.valid_from = 0;
  law.valid_to = std::numeric_limits<double>::max();
  law.validity = "the power law of a photoresistor holds above 0 lx, where the resistance is a finite number";
  return law;
}

constexpr std::array keys{Key{"ohms_at_10lx", KeyUnit::ohms}, Key{"gamma", KeyUnit::number}};

}  // namespace

Kind photoresistor_kind() {
  return {"photoresistor", "light", "lx", Moves::ohms, true, keys, make};
}

}  // namespace sensor
