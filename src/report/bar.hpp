// A converter's range as a bar of characters, with the swing of a reading in it.
#pragma once

#include <cstddef>
#include <string>

namespace report {

inline constexpr std::size_t bar_cells = 60;

// Readings as fractions of the range; any finite number. low <= high each, and the swing lies within the envelope.
struct Reach {
  double swing_low = 0;  // nominal
  double swing_high = 0;
  double envelope_low = 0;  // with leakage of either sign
  double envelope_high = 0;
  double kept_clear = 0;  // distance from either end that the reading is to keep; 0: none
};

// "|: --======-- :|": '=' swing, '-' what the envelope adds, ':' to be kept clear, '!' where it is not, and '<' or '>'
// in place of the bar's end that the envelope passes. bar_cells + 2 characters; a swing of nothing has one cell.
[[nodiscard]] std::string bar(const Reach& reach);

// The scale to stand under it, of the same width: 0, 25, 50, 75 and 100 %.
[[nodiscard]] std::string bar_scale();

}  // namespace report
