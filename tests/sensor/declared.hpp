// Declarations of sensors, made in a line.
#pragma once

#include <string>
#include <utility>
#include <vector>

#include "sensor/law.hpp"

namespace sensor_test {

inline model::SensorDeclaration declared(std::string kind, std::vector<std::pair<std::string, double>> settings,
                                         double from = 1, double to = 2) {
  model::SensorDeclaration declaration;
  declaration.kind.value = std::move(kind);
  declaration.from = model::Declared<double>{from, {}};
  declaration.to = model::Declared<double>{to, {}};
  for (auto& setting : settings) declaration.settings.push_back({setting.first, setting.second, {}});
  return declaration;
}

// The law of a declaration that is known to be good.
inline sensor::Law law(std::string kind, std::vector<std::pair<std::string, double>> settings) {
  return sensor::law_of(declared(std::move(kind), std::move(settings))).value();
}

}  // namespace sensor_test
