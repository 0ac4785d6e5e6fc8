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

// "R7 = 14.2 kohm reaches 23 %", "R7 as a link reaches 23 %" or "without R7 it reaches 23 %".
[[nodiscard]] std::string offer_text(const model::Offer& offer);

// The offer that span_reachable speaks of, or empty where no resistor was found that can be varied.
[[nodiscard]] std::string reach_text(const model::Figures& figures);

// The most that the arms' resistances are known to reach: the ceiling with the readings of an open and a shorted sensor
// held, or more where one resistor also moves those. Nothing where the former is not known.
[[nodiscard]] std::optional<double> ceiling_of(const model::Figures& figures);

// Where an end of a watched rail's sweep is itself at or below the low end of the range, no divider to ground lifts it:
// what to do instead, as a clause. Empty elsewhere.
[[nodiscard]] std::string unliftable_text(const model::AuditedInput& input, std::size_t point, std::string_view unit);

}  // namespace judge
