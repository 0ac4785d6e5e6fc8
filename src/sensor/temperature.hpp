// The two scales of temperature.
#pragma once

namespace sensor {

inline constexpr double zero_celsius_kelvin = 273.15;

[[nodiscard]] constexpr double kelvin_of(double degrees) {
  return degrees + zero_celsius_kelvin;
}
[[nodiscard]] constexpr double degrees_of(double kelvin) {
  return kelvin - zero_celsius_kelvin;
}

}  // namespace sensor
