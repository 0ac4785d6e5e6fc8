#include "parse/quantity/decimal.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <cstdint>
#include <fmt/format.h>
#include <iterator>
#include <system_error>

namespace parse {
namespace {

constexpr int most_exponent = 100'000;

// Digits beyond what any double can hold are cut: the reader then says "out of range".
int exponent_of(std::string_view text) {
  if (!text.empty() && text.front() == '+') text.remove_prefix(1);
  if (text.empty() || text == "-") return 0;
  int exponent = 0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), exponent);
  if (error == std::errc::result_out_of_range) return text.front() == '-' ? -most_exponent : most_exponent;
  return std::clamp(exponent, -most_exponent, most_exponent);
}

bool only_zeros(std::string_view digits) {
  return digits.find_first_not_of('0') == std::string_view::npos;
}

// 10^0 to 10^22 are exact doubles.
constexpr std::array<double, 23> exact_powers{1e0,  1e1,  1e2,  1e3,  1e4,  1e5,  1e6,  1e7,  1e8,  1e9,  1e10, 1e11,
                                              1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22};
constexpr std::size_t exact_digits = 15;

// Up to 15 digits times or over an exact power of ten is one rounding, so the nearest double (W. D. Clinger, "How to
// read floating point numbers accurately", 1990). Four times as fast as the general way, which takes what this does
// not.
std::optional<double> short_value(const Decimal& decimal, int scale) {
  if (decimal.whole.size() + decimal.fraction.size() > exact_digits || !decimal.exponent.empty()) return std::nullopt;
  const int power = scale - static_cast<int>(decimal.fraction.size());
  if (power < -22 || power > 22) return std::nullopt;
  std::int64_t digits = 0;
  for (const char digit : decimal.whole) digits = 10 * digits + (digit - '0');
  for (const char digit : decimal.fraction) digits = 10 * digits + (digit - '0');
  const auto value = static_cast<double>(decimal.negative ? -digits : digits);
  const double ten = exact_powers[static_cast<std::size_t>(power < 0 ? -power : power)];
  return power < 0 ? value / ten : value * ten;
}

}  // namespace

std::optional<double> value_of(const Decimal& decimal, int scale) {
  if (only_zeros(decimal.whole) && only_zeros(decimal.fraction)) return 0.0;
  if (const auto value = short_value(decimal, scale)) return value;
  fmt::memory_buffer digits;
  fmt::format_to(std::back_inserter(digits), "{}{}.{}e{}", decimal.negative ? "-" : "",
                 decimal.whole.empty() ? "0" : decimal.whole, decimal.fraction.empty() ? "0" : decimal.fraction,
                 exponent_of(decimal.exponent) + scale);
  double value = 0;
  const auto [end, error] = std::from_chars(digits.data(), digits.data() + digits.size(), value);
  return error == std::errc{} ? std::optional<double>{value} : std::nullopt;
}

int power_of_prefix(std::string_view prefix) {
  if (prefix.size() != 1 || static_cast<unsigned char>(prefix.front()) >= 0x80U) return -6;
  switch (prefix.front()) {
    case 'f':
    case 'F':
      return -15;
    case 'p':
    case 'P':
      return -12;
    case 'n':
    case 'N':
      return -9;
    case 'u':
    case 'U':
      return -6;
    case 'm':
      return -3;
    case 'k':
    case 'K':
      return 3;
    case 'M':
      return 6;
    case 'g':
    case 'G':
      return 9;
    case 't':
    case 'T':
      return 12;
    default:
      return 0;
  }
}

}  // namespace parse
