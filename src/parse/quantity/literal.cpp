// Literals of a netlist: one text, two readings.
#include <charconv>
#include <cmath>
#include <fmt/format.h>
#include <limits>
#include <string_view>

#include "base/text.hpp"
#include "grammar/quantity.hpp"
#include "parse/quantity.hpp"
#include "parse/quantity/decimal_actions.hpp"

namespace parse {
namespace {

namespace rules = grammar::quantity;
namespace pegtl = tao::pegtl;
using Input = pegtl::memory_input<pegtl::tracking_mode::lazy>;

constexpr double nothing = std::numeric_limits<double>::quiet_NaN();
constexpr double metres_of_mil = 25.4e-6;
constexpr double widest_glued = 0.2;  // the widest tolerance that parts are commonly bought to

// What the builder's grammar has seen.
struct Parts {
  Decimal decimal;
  std::string_view point;  // the letter of a marking code
  std::string_view scale;
  bool comma = false;
  char tolerance_letter = 0;
  std::string_view percent;
  bool percent_glued = false;
};

template <class Rule>
struct Note : NoteNumber<Rule> {};

template <std::string_view Parts::*field>
struct KeepText {
  template <class In>
  static void apply(const In& in, Parts& parts) {
    parts.*field = in.string_view();
  }
};
struct KeepToleranceLetter {
  template <class In>
  static void apply(const In& in, Parts& parts) {
    parts.tolerance_letter = *in.begin();
  }
};

template <>
struct Note<rules::scale> : KeepText<&Parts::scale> {};
template <>
struct Note<rules::coded_scale> : KeepText<&Parts::scale> {};
template <>
struct Note<rules::coded_mega> : KeepText<&Parts::scale> {};
template <>
struct Note<rules::percent> : KeepText<&Parts::percent> {};
template <>
struct Note<rules::any_tolerance_letter> : KeepToleranceLetter {};
template <>
struct Note<rules::common_tolerance_letter> : KeepToleranceLetter {};
template <>
struct Note<rules::mega_tolerance_letter> : KeepToleranceLetter {};
template <>
struct Note<rules::comma> {
  static void apply0(Parts& parts) { parts.comma = true; }
};
template <>
struct Note<rules::glued_percent> {
  template <class In>
  static void apply(const In& in, Parts& parts) {
    parts.percent = in.string_view(), parts.percent_glued = true;
  }
};

// IEC 60062:2004 clause 5, symmetrical tolerances; in percent.
double percent_of_letter(char letter) {
  switch (letter) {
    case 'E':
      return 0.005;
    case 'L':
      return 0.01;
    case 'P':
      return 0.02;
    case 'W':
      return 0.05;
    case 'B':
      return 0.1;
    case 'C':
      return 0.25;
    case 'D':
      return 0.5;
    case 'F':
      return 1;
    case 'G':
      return 2;
    case 'H':
      return 3;
    case 'J':
      return 5;
    case 'K':
      return 10;
    case 'M':
      return 20;
    case 'N':
      return 30;
    default:
      return nothing;
  }
}

// A fraction, or NaN where no tolerance is written. A percent sign says more than a letter.
double tolerance_of(const Parts& parts) {
  if (!parts.percent.empty()) {
    const auto point = parts.percent.find_first_of(".,");
    const Decimal decimal{false,
                          parts.percent.substr(0, point),
                          point == std::string_view::npos ? std::string_view{} : parts.percent.substr(point + 1),
                          {}};
    return value_of(decimal, -2).value_or(std::numeric_limits<double>::infinity());
  }
  // 4n7F is a capacitor's farad, 1m5H an inductor's henry.
  const bool unit = parts.tolerance_letter == 'F' || parts.tolerance_letter == 'H';
  if (unit && !parts.point.empty() && power_of_prefix(parts.point) < 0) return nothing;
  return percent_of_letter(parts.tolerance_letter) / 100;
}

std::optional<double> builder_value(const Parts& parts) {
  const std::string_view suffix = parts.point.empty() ? parts.scale : parts.point;
  if (suffix.empty()) return value_of(parts.decimal, 0);
  const bool three_letters = suffix.size() == 3 && static_cast<unsigned char>(suffix.front()) < 0x80U;
  if (!three_letters) return value_of(parts.decimal, power_of_prefix(suffix));
  if (suffix[1] == 'e' || suffix[1] == 'E') return value_of(parts.decimal, 6);
  const auto value = value_of(parts.decimal, 0);
  return value ? std::optional{*value * metres_of_mil} : value;
}

// ---- SPICE ----

struct SpiceParts {
  Decimal decimal;
  double factor = 1;
  int scale = 0;
  std::size_t length = 0;
};

template <class Rule>
struct SpiceNote : pegtl::nothing<Rule> {};

template <std::string_view Decimal::*field>
struct KeepSpiceDigits {
  template <class In>
  static void apply(const In& in, SpiceParts& parts) {
    parts.decimal.*field = in.string_view();
  }
};

template <>
struct SpiceNote<rules::whole> : KeepSpiceDigits<&Decimal::whole> {};
template <>
struct SpiceNote<rules::fraction> : KeepSpiceDigits<&Decimal::fraction> {};
template <>
struct SpiceNote<rules::spice::exponent> : KeepSpiceDigits<&Decimal::exponent> {};
template <>
struct SpiceNote<rules::sign> {
  template <class In>
  static void apply(const In& in, SpiceParts& parts) {
    parts.decimal.negative = *in.begin() == '-';
  }
};
template <>
struct SpiceNote<rules::meg> {
  static void apply0(SpiceParts& parts) { parts.scale = 6; }
};
template <>
struct SpiceNote<rules::mil> {
  static void apply0(SpiceParts& parts) { parts.factor = metres_of_mil; }
};
template <>
struct SpiceNote<rules::spice::scale_letter> {
  template <class In>
  static void apply(const In& in, SpiceParts& parts) {
    parts.scale = in.string_view() == "M" ? -3 : power_of_prefix(in.string_view());
  }
};
template <>
struct SpiceNote<rules::spice::value> {
  template <class In>
  static void apply(const In& in, SpiceParts& parts) {
    parts.length = in.size();
  }
};

// The number that SPICE takes from one word, or NaN; `text` loses the word.
double take_spice_word(std::string_view& text) {
  Input input(text.data(), text.data() + text.size(), "");
  SpiceParts parts;
  if (!pegtl::parse<rules::spice::value, SpiceNote>(input, parts)) return nothing;
  text.remove_prefix(parts.length);
  // Behind the number, letters, signs and digits are passed over; what ends a word is measured, not documented.
  const auto end = text.find_first_of(" \t,()=+-*/");
  text.remove_prefix(end == std::string_view::npos ? text.size() : end);
  const auto value = value_of(parts.decimal, parts.scale);
  return value ? *value * parts.factor : nothing;
}

// A second number on the card replaces the first: SPICE takes "10k 1%" as 1. A word that is no number is an error
// there, and so is a third one.
double spice_value(std::string_view text) {
  double value = nothing;
  for (int words = 0;; ++words) {
    const auto next = text.find_first_not_of(" \t,()=");
    if (next == std::string_view::npos) return value;
    if (words == 2) return nothing;
    text.remove_prefix(next);
    value = take_spice_word(text);
    if (std::isnan(value)) return nothing;
  }
}

base::Error refusal(std::string_view text, std::string_view why) {
  return {fmt::format("\"{}\" {}", base::printable_short(text), why)};
}

bool parse_literal(std::string_view text, Parts& parts) {
  Input input(text.data(), text.data() + text.size(), "");
  return pegtl::parse<rules::literal, Note>(input, parts);
}

// A literal of its parts, if it is one.
base::Result<Literal> literal_of(std::string_view text, const Parts& parts) {
  if (parts.comma && parts.decimal.fraction.size() == 3 && parts.decimal.whole != "0") {
    return refusal(text, rules::comma_unclear);
  }
  const double tolerance = tolerance_of(parts);
  if (parts.percent_glued && tolerance > widest_glued) return refusal(text, rules::tolerance_unclear);
  if (tolerance >= 1) return refusal(text, rules::tolerance_too_large);
  const auto builder = builder_value(parts);
  if (!builder) return refusal(text, rules::out_of_range);
  return Literal{*builder, spice_value(text), tolerance, parts.point.empty() && parts.scale == "M"};
}

}  // namespace

bool Literal::odd() const {
  return bare_mega || !std::isnan(tolerance) || builder != spice;
}

base::Result<Literal> read_literal(std::string_view text) {
  Parts parts;
  if (!parse_literal(text, parts))
    return base::Error{fmt::format("{}, found \"{}\"", rules::literal_expected, base::printable_short(text))};
  return literal_of(text, parts);
}

std::optional<std::string> literal_refusal(std::string_view text) {
  Parts parts;
  if (!parse_literal(text, parts)) return std::nullopt;
  const auto literal = literal_of(text, parts);
  return literal.ok() ? std::nullopt : std::optional{literal.error()};
}

}  // namespace parse
