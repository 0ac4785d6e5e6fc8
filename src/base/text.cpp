#include "base/text.hpp"

#include <array>
#include <cmath>
#include <cstdint>
#include <cstdlib>
#include <fmt/format.h>

namespace base {
namespace {

constexpr std::array<std::string_view, 11> prefixes{"f", "p", "n", "u", "m", "", "k", "M", "G", "T", "P"};
constexpr int first_exponent = -15;

// Digits only where they say something: "4.700" becomes "4.7".
std::string trimmed(std::string text) {
  if (text.find('.') == std::string::npos || text.find_first_of("eE") != std::string::npos) return text;
  text.erase(text.find_last_not_of('0') + 1);
  if (text.back() == '.') text.pop_back();
  return text;
}

// Length of the UTF-8 sequence at `at`, or 0 when the bytes there are none (RFC 3629 section 4), with its code point.
std::size_t utf8_length(std::string_view text, std::size_t at, std::uint32_t& point) {
  const auto byte = [&](std::size_t i) -> std::uint32_t { return static_cast<unsigned char>(text[i]); };
  const std::uint32_t lead = byte(at);
  if (lead < 0x80U) return point = lead, 1;
  const std::size_t length = lead >= 0xF0U ? 4 : lead >= 0xE0U ? 3 : 2;
  if (lead < 0xC2U || lead > 0xF4U || at + length > text.size()) return 0;
  point = lead & (0x7FU >> length);
  for (std::size_t i = 1; i < length; ++i) {
    if ((byte(at + i) & 0xC0U) != 0x80U) return 0;
    point = (point << 6) | (byte(at + i) & 0x3FU);
  }
  const bool overlong = (length == 3 && point < 0x800U) || (length == 4 && point < 0x10000U);
  const bool surrogate = point >= 0xD800U && point <= 0xDFFFU;
  return overlong || surrogate || point > 0x10FFFFU ? 0 : length;
}

bool is_control(std::uint32_t point) {
  if (point < 0x20U || (point >= 0x7FU && point < 0xA0U)) return true;
  return point == 0x061CU || (point >= 0x200BU && point <= 0x200FU) || (point >= 0x2028U && point <= 0x202EU) ||
         (point >= 0x2060U && point <= 0x206FU) || point == 0xFEFFU || (point >= 0xE0000U && point <= 0xE007FU);
}

bool continues(char c) {
  return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U;
}

// A prefix and a unit behind a number, if there is any.
std::string with_unit(std::string number, std::string_view prefix, std::string_view unit) {
  if (!prefix.empty() || !unit.empty()) number.append(" ").append(prefix).append(unit);
  return number;
}

}  // namespace

std::string si_text(double value, std::string_view unit, int digits) {
  if (!std::isfinite(value)) return with_unit(fmt::format("{}", value), "", unit);
  if (value == 0) return with_unit("0", "", unit);
  // Rounded first, and the exponent read from the rounded text: 999.96 with four digits is 1 k, not 1000.
  const std::string scientific = fmt::format("{:.{}e}", value, digits - 1);
  const int exponent = std::atoi(scientific.c_str() + scientific.find('e') + 1);
  const int group = exponent >= 0 ? exponent / 3 : -((2 - exponent) / 3);
  const int index = group - first_exponent / 3;
  if (index < 0 || index >= static_cast<int>(prefixes.size())) return with_unit(scientific, "", unit);
  const double scaled = std::strtod(scientific.c_str(), nullptr) / std::pow(10.0, 3 * group);
  const int before = std::fabs(scaled) >= 100 ? 3 : std::fabs(scaled) >= 10 ? 2 : 1;
  const int decimals = digits > before ? digits - before : 0;
  return with_unit(trimmed(fmt::format("{:.{}f}", scaled, decimals)), prefixes[static_cast<std::size_t>(index)], unit);
}

std::string number_text(double value, int digits) {
  const double size = std::fabs(value);
  if (value == 0) return "0";
  if (!std::isfinite(value) || size < 1e-5 || size >= 1e7) return fmt::format("{:.{}g}", value, digits);
  const int before = static_cast<int>(std::floor(std::log10(size))) + 1;
  const int decimals = digits > before ? digits - before : 0;
  std::string text = trimmed(fmt::format("{:.{}f}", value, decimals));
  return text == "-0" ? "0" : text;
}

std::string printable(std::string_view text) {
  std::string out;
  out.reserve(text.size());
  for (std::size_t at = 0; at < text.size();) {
    std::uint32_t point = 0;
    const std::size_t length = utf8_length(text, at, point);
    const std::size_t taken = length == 0 ? 1 : length;
    if (length == 0 || is_control(point)) {
      for (std::size_t i = 0; i < taken; ++i)
        out += fmt::format("\\x{:02x}", static_cast<unsigned>(static_cast<unsigned char>(text[at + i])));
    } else {
      out += text.substr(at, taken);
    }
    at += taken;
  }
  return out;
}

std::string printable_short(std::string_view text, std::size_t most) {
  if (text.size() <= most) return printable(text);
  std::size_t head = most * 2 / 3;
  std::size_t tail = text.size() - (most - head);
  // A character has at most three bytes after its first: a longer run is junk and may be cut anywhere.
  for (int i = 0; i < 3 && head > 0 && continues(text[head]); ++i) --head;
  for (int i = 0; i < 3 && tail < text.size() && continues(text[tail]); ++i) ++tail;
  return printable(text.substr(0, head)) + "..." + printable(text.substr(tail));
}

}  // namespace base
