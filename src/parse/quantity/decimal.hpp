// A decimal number as its digits stand in a text, and its exact value.
#pragma once

#include <optional>
#include <string_view>

namespace parse {

struct Decimal {
  bool negative = false;
  std::string_view whole;     // digits before the point
  std::string_view fraction;  // digits behind it
  std::string_view exponent;  // with its sign; empty: 0
};

// The double nearest to the number times ten to the power of `scale`: 4.7 with scale 3 is exactly what "4700" reads as.
// Nothing where that is too large or too small for a double.
[[nodiscard]] std::optional<double> value_of(const Decimal& decimal, int scale);

// The power of ten of a prefix or suffix letter or of a micro sign (either code point of UTF-8, or Latin-1): k is 3, u
// is -6. The case of the letter does not count, but for m (-3) and M (6); R and V, which mark a decimal point, are 0.
[[nodiscard]] int power_of_prefix(std::string_view prefix);

}  // namespace parse
