#include "sensor/settings.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>

#include "base/text.hpp"

namespace sensor {
namespace {

const model::SensorSetting* find(Settings settings, std::string_view key) {
  const auto at = std::ranges::find(settings, key, &model::SensorSetting::key);
  return at == settings.end() ? nullptr : &*at;
}

}  // namespace

bool any_set(Settings settings, std::initializer_list<std::string_view> keys) {
  return std::ranges::any_of(keys, [&](std::string_view key) { return find(settings, key) != nullptr; });
}

bool all_set(Settings settings, std::initializer_list<std::string_view> keys) {
  return std::ranges::all_of(keys, [&](std::string_view key) { return find(settings, key) != nullptr; });
}

base::Result<double> finite(Settings settings, std::string_view key) {
  const auto* setting = find(settings, key);
  if (setting == nullptr) return base::Error{fmt::format("\"{}\" is missing", key)};
  const auto* value = std::get_if<double>(&setting->value);
  if (value == nullptr || !std::isfinite(*value)) return base::Error{fmt::format("\"{}\" must be a number", key)};
  return *value;
}

base::Result<double> above_zero(Settings settings, std::string_view key) {
  auto value = finite(settings, key);
  if (!value || *value > 0) return value;
  return base::Error{fmt::format("\"{}\" must be above zero, not {}", key, base::number_text(*value))};
}

}  // namespace sensor
