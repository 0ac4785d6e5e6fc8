// The values of elements: which reading of a literal counts, and what SPICE would have read.
#pragma once

#include <variant>

#include "flatten/parameters.hpp"

namespace flatten {

// A value as an element gets it.
struct Quantity {
  model::Number number;
  double tolerance = 0;  // a fraction; NaN: none written
  bool odd = false;      // SPICE reads something else
  OddValue readings;     // where odd
  source::Span where;    // of a literal or an expression; none of a plain number
};

struct NoValue {
  base::NameId word;  // what stands in place of a value; none: nothing
};
struct Behaving {};  // an expression of voltages or currents
struct Failed {};    // the user has been told

// A flat tree. Where odd, the readings are those of its first odd literal.
struct Tree {
  model::ExpressionId root;
  bool odd = false;
  OddValue readings;
};

using Reading = std::variant<Quantity, NoValue, Behaving, Failed>;

// Whose value it is: on a resistor a bare M may be mega.
enum class Letter : std::uint8_t { resistor, other };

class Values {
 public:
  Values(Work& work, Parameters& parameters) : work_(work), parameters_(parameters) {}

  // The value that stands in an element's own place, where a word is no number.
  Reading read(const Frame& frame, const model::Value& value, model::CardId card, Letter letter);

  // The value of `key = value` on a card or in a .model, where a word is a parameter's name.
  Reading read(const Frame& frame, const model::Assignment& assignment, model::CardId card, Letter letter);

  // The flat tree of a source's expression; a plain number becomes a tree of one node. NoValue where there is nothing.
  std::variant<Tree, NoValue, Failed> tree(const Frame& frame, const model::Value& value, model::CardId card);

 private:
  Reading fold(const Frame& frame, model::ExpressionId tree, model::CardId card, Letter letter);
  Quantity choose(const model::OddLiteral& literal, Letter letter) const;
  template <class Fold>
  Reading choose_folded(const Fold& fold, Letter letter, source::Span where, const model::ExpressionNode* odd);

  Work& work_;
  Parameters& parameters_;
};

}  // namespace flatten
