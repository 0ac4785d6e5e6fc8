// Quantities of declarations: SI prefixes, and the units that a key takes.
#include "parse/quantity.hpp"

#include <algorithm>
#include <array>
#include <fmt/format.h>
#include <optional>
#include <span>

#include "base/text.hpp"
#include "grammar/quantity.hpp"
#include "parse/quantity/decimal_actions.hpp"

namespace parse {
namespace {

namespace rules = grammar::quantity;
namespace pegtl = tao::pegtl;

struct Parts {
  Decimal decimal;
  std::string_view point;  // the letter of a marking code
  std::string_view unit;   // all that stands behind the number
};

template <class Rule>
struct Note : NoteNumber<Rule> {};

template <>
struct Note<rules::unit_text> {
  template <class In>
  static void apply(const In& in, Parts& parts) {
    parts.unit = in.string_view();
  }
};

// A unit as written, and the power of ten that it stands for.
struct UnitWord {
  std::string_view word;
  int power = 0;
};

struct UnitText {
  Unit unit;
  std::string_view expected;  // "a resistance such as \"10k\""
  std::string_view name;      // "in ohms"
  bool prefixes;              // whether k, M, m and the others may stand before it
  std::array<UnitWord, 6> words;
};

constexpr std::array unit_texts{
    UnitText{Unit::none, "a number", "", true, {}},
    UnitText{Unit::ohm,
             "a resistance such as \"10k\"",
             "in ohms",
             true,
             {{{"ohm"}, {"Ohm"}, {"ohms"}, {"\xCE\xA9"}, {"\xE2\x84\xA6"}, {"R"}}}},
    UnitText{Unit::volt, "a voltage such as \"3.3 V\"", "in volts", true, {{{"V"}}}},
    UnitText{Unit::ampere, "a current such as \"100 nA\"", "in amperes", true, {{{"A"}}}},
    UnitText{Unit::farad, "a capacitance such as \"8 pF\"", "in farads", true, {{{"F"}}}},
    UnitText{Unit::henry, "an inductance such as \"10 uH\"", "in henries", true, {{{"H"}}}},
    UnitText{Unit::second, "a time such as \"2.5 us\"", "in seconds", true, {{{"s"}}}},
    UnitText{Unit::hertz, "a frequency such as \"1 kHz\"", "in hertz", true, {{{"Hz"}}}},
    UnitText{Unit::watt, "a power such as \"0.1 W\"", "in watts", true, {{{"W"}}}},
    UnitText{
        Unit::fraction, "a fraction such as \"1%\" or \"50 ppm\"", "a fraction", false, {{{"%", -2}, {"ppm", -6}}}},
    UnitText{Unit::degc,
             "a temperature such as \"25 degC\"",
             "in degrees Celsius",
             false,
             {{{"degC"},
               {"\xC2\xB0"
                "C"},
               {"C"}}}},
    UnitText{Unit::kelvin, "a number of kelvin such as \"3435 K\"", "in kelvin", false, {{{"K"}}}},
    UnitText{Unit::lux, "a brightness such as \"10 lx\"", "in lux", true, {{{"lx"}, {"lux"}}}},
};

const UnitText& text_of(Unit unit) {
  return *std::find_if(unit_texts.begin(), unit_texts.end(), [&](const UnitText& text) { return text.unit == unit; });
}

std::string_view without_blanks(std::string_view text) {
  while (!text.empty() && (text.back() == ' ' || text.back() == '\t')) text.remove_suffix(1);
  while (!text.empty() && (text.front() == ' ' || text.front() == '\t')) text.remove_prefix(1);
  return text;
}

std::optional<int> power_of_word(std::string_view word, const UnitText& unit) {
  if (word.empty()) return 0;
  for (const UnitWord& known : unit.words) {
    if (known.word == word) return known.power;
  }
  return std::nullopt;
}

// How many bytes of `text` are an SI prefix. "Meg" is no SI, but nobody means anything else by it.
std::size_t prefix_length(std::string_view text) {
  for (const std::string_view mega : {"Meg", "meg", "MEG"}) {
    if (text.substr(0, mega.size()) == mega) return mega.size();
  }
  for (const std::string_view prefix : {"f", "p", "n", "u", "\xC2\xB5", "\xCE\xBC", "m", "k", "K", "M", "G", "T"}) {
    if (text.substr(0, prefix.size()) == prefix) return prefix.size();
  }
  return 0;
}

int power_of_si(std::string_view prefix) {
  return prefix.size() == 3 ? 6 : power_of_prefix(prefix);
}

// The power of ten of prefix and unit together; nothing when they are none of `unit`. The unit is tried first: "K"
// behind a number of kelvin is no kilo.
std::optional<int> power_of_unit(std::string_view text, const UnitText& unit) {
  if (const auto power = power_of_word(text, unit)) return power;
  const std::size_t length = unit.prefixes ? prefix_length(text) : 0;
  if (length == 0) return std::nullopt;
  const auto power = power_of_word(without_blanks(text.substr(length)), unit);
  return power ? std::optional{*power + power_of_si(text.substr(0, length))} : std::nullopt;
}

// The power of ten of a marking code's letter: R is a point for ohms alone, V for volts alone.
std::optional<int> power_of_point(std::string_view point, const UnitText& unit) {
  if (point == "R" || point == "r") return unit.unit == Unit::ohm ? std::optional{0} : std::nullopt;
  if (point == "V" || point == "v") return unit.unit == Unit::volt ? std::optional{0} : std::nullopt;
  if (!unit.prefixes || prefix_length(point) != point.size()) return std::nullopt;
  return power_of_prefix(point);
}

std::optional<int> scale_of(const Parts& parts, const UnitText& unit) {
  if (parts.point.empty()) return power_of_unit(parts.unit, unit);
  const auto power = power_of_word(parts.unit, unit);
  const auto point = power_of_point(parts.point, unit);
  return power && point ? std::optional{*power + *point} : std::nullopt;
}

// Why the text behind the number does not do, where that can be told.
std::string hint(const Parts& parts) {
  if (parts.unit.substr(0, 1) == ",") return "; write a point in place of the comma";
  if (!parts.point.empty() || parts.unit.empty()) return {};
  if (prefix_length(parts.unit) == parts.unit.size()) return {};
  for (const UnitText& other : unit_texts) {
    if (!other.name.empty() && power_of_unit(parts.unit, other)) return fmt::format(", which is {}", other.name);
  }
  return {};
}

}  // namespace

std::string_view expected_of(Unit unit) {
  return text_of(unit).expected;
}

base::Result<double> read_quantity(std::string_view text, Unit unit) {
  const UnitText& wanted = text_of(unit);
  const auto expected = [&](const std::string& reason) {
    return base::Error{
        fmt::format("expected {}, found \"{}\"{}", wanted.expected, base::printable_short(text), reason)};
  };
  pegtl::memory_input<pegtl::tracking_mode::lazy> input(text.data(), text.data() + text.size(), "");
  Parts parts;
  if (!pegtl::parse<rules::quantity, Note>(input, parts)) return expected("");
  parts.unit = without_blanks(parts.unit);
  const auto scale = scale_of(parts, wanted);
  if (!scale) return expected(hint(parts));
  const auto value = value_of(parts.decimal, *scale);
  if (!value) return base::Error{fmt::format("\"{}\" {}", base::printable_short(text), rules::out_of_range)};
  return *value;
}

}  // namespace parse
