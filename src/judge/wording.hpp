// How findings put numbers and lists into words.
#pragma once

#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "judge/judge.hpp"

namespace judge {

// 0.125 is "12.5 %".
[[nodiscard]] std::string percent_text(double fraction, int digits = 3);

// "-40 degC"; the number alone where there is no unit.
[[nodiscard]] std::string measurand_text(double value, std::string_view unit);

// A value and its limit with as many digits as it takes to tell them apart, three at least: 49.97 % against 50 %, never
// 50 % against 50 %.
struct Compared {
  std::string value;
  std::string limit;
};
[[nodiscard]] Compared compared(double value, double limit,
                                const std::function<std::string(double value, int digits)>& text);
[[nodiscard]] Compared compared_percent(double value, double limit);

// "R1, R2 and R3", made printable; of more than six the first five, then "and 4 more". Empty for none.
[[nodiscard]] std::string list_text(const std::vector<std::string>& names);

// "R7 = 14.2 kohm reaches 23 %", or empty where no resistor was found that can be varied.
[[nodiscard]] std::string reach_text(const model::Figures& figures);

// The most that any change of a resistance is known to reach: the ceiling with the open and short volts held, or more
// where one resistor also moves those. Nothing where neither is known.
[[nodiscard]] std::optional<double> ceiling_of(const model::Figures& figures);

}  // namespace judge
