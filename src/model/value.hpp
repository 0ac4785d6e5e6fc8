// The value of an element, a parameter or a model entry, as a netlist writes it.
#pragma once

#include <cstdint>
#include <variant>

#include "base/names.hpp"
#include "model/expression.hpp"
#include "source/text.hpp"

namespace model {

// A literal that SPICE and the board's builder may read differently, or that carries a tolerance. Both readings are
// kept: flatten, which knows the declarations, chooses.
struct OddLiteral {
  double builder = 0;      // 4k7 is 4700
  double spice = 0;        // 4k7 is 4000; NaN where SPICE sees no number
  double tolerance = 0;    // a fraction; NaN where none is written
  bool bare_mega = false;  // a bare M: mega or milli is for flatten to say (builder holds the mega reading)
  source::Span where;
};

using OddLiteralId = base::Id<struct OddLiteralTag>;

// Nothing, a plain number, an odd literal, an expression, or a word that is none of these (a part number, a model
// name).
using Value = std::variant<std::monostate, double, OddLiteralId, ExpressionId, base::NameId>;

}  // namespace model
