// How the laws ask for the numbers of their declaration.
#pragma once

#include <initializer_list>
#include <span>
#include <string_view>

#include "base/result.hpp"
#include "model/sheet.hpp"

namespace sensor {

using Settings = std::span<const model::SensorSetting>;

// Whether any, or each, of these keys is set.
[[nodiscard]] bool any_set(Settings settings, std::initializer_list<std::string_view> keys);
[[nodiscard]] bool all_set(Settings settings, std::initializer_list<std::string_view> keys);

// The number of a key, in the unit that the kind's table gives it. Errors: it is missing, no finite number, or
// (above_zero) not above zero.
[[nodiscard]] base::Result<double> finite(Settings settings, std::string_view key);
[[nodiscard]] base::Result<double> above_zero(Settings settings, std::string_view key);

}  // namespace sensor
