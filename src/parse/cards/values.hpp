// The values on cards: numbers, literals with two readings, expressions, words.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>

#include "model/value.hpp"
#include "parse/cards/text.hpp"

namespace parse {

// A value and the first word behind it.
struct Taken {
  model::Value value;
  std::size_t next = 0;
};

enum class Wanted : std::uint8_t {
  expression,  // what is neither number nor expression is a fault; a bare name is a parameter
  argument,    // likewise, but a bare name, which may be a parameter or a model, stays a word
  anything,    // what is neither stays a word
};

// The literal that stands in words first .. last, joined as they stand; nothing where there is none. One that can be
// read in two ways is a fault.
[[nodiscard]] std::optional<model::Value> literal_value(Card& card, std::size_t first, std::size_t last);

// Where words first .. last stand, with the bracket that closes behind them where one opens in them.
[[nodiscard]] source::Span literal_span(const Card& card, std::size_t first, std::size_t last);

// Word i alone: a number, a literal, an expression in braces or quotes, or else the word itself.
[[nodiscard]] model::Value word_value(Card& card, std::size_t i);

// Whether word_value would give a number, a literal or an expression for word i; reads nothing in.
[[nodiscard]] bool is_value(const Card& card, std::size_t i);

// Word i as a node of an expression, for tables of numbers and braces; none and a fault where it is no value.
[[nodiscard]] model::ExpressionId expression_of_word(Card& card, std::size_t i);

// The value that stands behind word `before` (a key's equals sign, or the key where there is none).
[[nodiscard]] Taken value_behind(Card& card, std::size_t before, Wanted wanted);

// Reads key = value from word i to the card's end into the netlist. Other words are faults, but for those that stand
// alone by custom (off, a second tc); where `loose`, any word may stand alone, as a key without a value.
[[nodiscard]] model::Range take_assignments(Card& card, std::size_t i, Wanted wanted, bool loose = false);

// Whether a value is a number, a literal or an expression.
[[nodiscard]] bool has_number(const model::Value& value);

}  // namespace parse
