#include "parse/cards/number.hpp"

#include <array>
#include <charconv>
#include <cstddef>
#include <cstdint>
#include <system_error>

#include "base/names.hpp"
#include "parse/quantity/decimal.hpp"

namespace parse {
namespace {

constexpr std::uint64_t exact_mantissa = std::uint64_t{1} << 53;
constexpr std::array<double, 23> powers{1e0,  1e1,  1e2,  1e3,  1e4,  1e5,  1e6,  1e7,  1e8,  1e9,  1e10, 1e11,
                                        1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22};

struct Digits {
  std::uint64_t mantissa = 0;
  int scale = 0;
  std::size_t count = 0;
  std::size_t length = 0;
};

bool is_digit(char c) {
  return c >= '0' && c <= '9';
}

Digits read_digits(std::string_view text) {
  Digits digits;
  bool point = false;
  for (; digits.length < text.size(); ++digits.length) {
    const char c = text[digits.length];
    if (c == '.' && !point) {
      point = true;
    } else if (is_digit(c)) {
      if (++digits.count > 18) return {};
      digits.mantissa = digits.mantissa * 10 + static_cast<std::uint64_t>(c - '0');
      if (point) --digits.scale;
    } else {
      break;
    }
  }
  return digits;
}

// The power of ten of a whole suffix; 99 for any other text, and for a bare M or F, which two readers take differently.
int suffix_power(std::string_view suffix) {
  if (suffix.empty()) return 0;
  if (base::same_name(suffix, "meg")) return 6;
  if (suffix.size() != 1 || std::string_view("kKmuUnNpPgGtT").find(suffix.front()) == std::string_view::npos) return 99;
  return power_of_prefix(suffix);
}

// With an exponent: left to the standard library as long as all of the text is the number.
std::optional<double> with_exponent(std::string_view text) {
  double value = 0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (error != std::errc{} || end != text.data() + text.size()) return std::nullopt;
  return value;
}

}  // namespace

// A mantissa below 2^53 and a power of ten up to 22 are both exact doubles, so that one operation on them rounds once
// (Clinger 1990, "How to read floating point numbers accurately").
std::optional<double> plain_number(std::string_view text) {
  const bool negative = !text.empty() && text.front() == '-';
  const std::string_view number = !text.empty() && (negative || text.front() == '+') ? text.substr(1) : text;
  const Digits digits = read_digits(number);
  if (digits.count == 0) return std::nullopt;
  const std::string_view rest = number.substr(digits.length);
  if (rest.size() >= 2 && (rest[0] == 'e' || rest[0] == 'E') && is_digit(rest.back())) {
    const auto value = with_exponent(number);
    return value && negative ? std::optional{-*value} : value;
  }
  const int power = suffix_power(rest);
  const int scale = digits.scale + power;
  if (power == 99 || digits.mantissa >= exact_mantissa || scale > 22 || scale < -22) return std::nullopt;
  const auto mantissa = static_cast<double>(digits.mantissa);
  const double size = scale < 0 ? mantissa / powers[static_cast<std::size_t>(-scale)]
                                : mantissa * powers[static_cast<std::size_t>(scale)];
  return negative ? -size : size;
}

}  // namespace parse
