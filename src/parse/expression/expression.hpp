// Text -> expression tree: parameters, values in braces or quotes, behavioural sources.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

#include "base/names.hpp"
#include "model/expression.hpp"

namespace parse {

// Where an expression cannot be read, and why: what was expected, what stands there.
struct ExpressionFault {
  std::uint32_t offset = 0;  // in the source, as are the offsets of the nodes
  std::string message;
};

struct ExpressionRead {
  model::ExpressionId root;              // none where `fault` is set
  std::size_t length = 0;                // bytes of the text that were read
  std::optional<ExpressionFault> fault;  // the pool is then as it was before
};

enum class Extent : unsigned char {
  whole,    // the text must be one expression from end to end
  leading,  // as much of the text as is an expression is read
};

// Reads `text`, whose first byte is byte `offset` of its source; line ends in it must have been blanked. Brackets,
// operators and calls may lie `depth` inside one another (and never more than 1000). Operators bind as in ngspice 39's
// parameters, measured there: ! first, then ** and ^ (from the left: 2**3**2 is 64), then a sign (-2**2 is -4), * / %,
// + -, comparisons, &&, ||, ?: (from the right).
[[nodiscard]] ExpressionRead read_expression(std::string_view text, std::uint32_t offset, Extent extent,
                                             std::uint64_t depth, model::ExpressionPool& pool, base::NameTable& names);

}  // namespace parse
