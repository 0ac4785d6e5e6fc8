// What every reader of a quantity keeps of its number, whatever else it keeps.
#pragma once

#include <string_view>

#include "grammar/quantity.hpp"
#include "parse/quantity/decimal.hpp"

namespace parse {

// Keeps digits, sign and the letter that marks the point in the `decimal` and `point` of the reader's own parts. A
// reader's actions derive from this one and add what is theirs.
template <class Rule>
struct NoteNumber : tao::pegtl::nothing<Rule> {};

template <std::string_view Decimal::*field>
struct KeepDigits {
  template <class In, class Parts>
  static void apply(const In& in, Parts& parts) {
    parts.decimal.*field = in.string_view();
  }
};

template <>
struct NoteNumber<grammar::quantity::whole> : KeepDigits<&Decimal::whole> {};
template <>
struct NoteNumber<grammar::quantity::fraction> : KeepDigits<&Decimal::fraction> {};
template <>
struct NoteNumber<grammar::quantity::marked_fraction> : KeepDigits<&Decimal::fraction> {};
template <>
struct NoteNumber<grammar::quantity::lead_fraction> : KeepDigits<&Decimal::fraction> {};
template <>
struct NoteNumber<grammar::quantity::exponent> : KeepDigits<&Decimal::exponent> {};
template <>
struct NoteNumber<grammar::quantity::point_letter> {
  template <class In, class Parts>
  static void apply(const In& in, Parts& parts) {
    parts.point = in.string_view();
  }
};
template <>
struct NoteNumber<grammar::quantity::sign> {
  template <class In, class Parts>
  static void apply(const In& in, Parts& parts) {
    parts.decimal.negative = *in.begin() == '-';
  }
};

}  // namespace parse
