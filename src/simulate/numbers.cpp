#include "simulate/numbers.hpp"

#include <array>
#include <charconv>
#include <cmath>
#include <cstdlib>

namespace simulate {
namespace {

constexpr int kept_digits = 10;  // one fewer than the library keeps

using Buffer = std::array<char, 40>;

std::string_view shortest(double value, Buffer& buffer) {
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), value + 0.0).ptr;
  return {buffer.data(), static_cast<std::size_t>(end - buffer.data())};
}

std::string_view rounded(double value, Buffer& buffer) {
  const auto end =
      std::to_chars(buffer.data(), buffer.data() + buffer.size(), value, std::chars_format::scientific, kept_digits - 1)
          .ptr;
  return {buffer.data(), static_cast<std::size_t>(end - buffer.data())};
}

double value_of(std::string_view text) {
  double value = 0;
  std::from_chars(text.data(), text.data() + text.size(), value);
  return value;
}

}  // namespace

void append_index(std::string& out, std::size_t index) {
  Buffer buffer;
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), index).ptr;
  out.append(buffer.data(), end);
}

void append_number(std::string& out, double value) {
  Buffer buffer;
  out.append(shortest(value, buffer));
}

void append_literal(std::string& out, double value) {
  Buffer buffer;
  const std::string_view head = rounded(value, buffer);
  const double rest = value - value_of(head);
  if (rest != 0 && std::isfinite(rest)) {
    out.append("(").append(head);
    if (rest > 0) out.append("+");
    Buffer small;
    out.append(rounded(rest, small)).append(")");
    return;
  }
  if (value < 0) out.append("(");
  out.append(shortest(value, buffer));
  if (value < 0) out.append(")");
}

}  // namespace simulate
