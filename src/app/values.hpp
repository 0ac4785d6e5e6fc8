// Values of command-line options out of their texts. Errors say what was expected and what stands there.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>

#include "app/exit_status.hpp"
#include "base/result.hpp"
#include "source/limits.hpp"

namespace app {

// A whole number from `least` to `most`, in plain digits.
[[nodiscard]] base::Result<std::uint64_t> whole_number(std::string_view text, std::uint64_t least, std::uint64_t most);

// Seconds above zero, at most a day.
[[nodiscard]] base::Result<double> seconds(std::string_view text);

// error, warning, note or never.
[[nodiscard]] base::Result<Gate> gate_of(std::string_view text);

// A day of the calendar as YYYY-MM-DD (ISO 8601).
[[nodiscard]] base::Result<std::string> date_of(std::string_view text);

// NAME=N: sets the limit of that name.
[[nodiscard]] base::Result<base::Done> set_limit(std::string_view text, source::Limits& limits);

// A folder that is there.
[[nodiscard]] base::Result<std::string> folder(const std::string& text);

// Today where the machine stands, as YYYY-MM-DD.
[[nodiscard]] std::string today();

}  // namespace app
