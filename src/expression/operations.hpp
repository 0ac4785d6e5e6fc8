// One node's value out of its operands' values: what folding and evaluating share.
#pragma once

#include <cstddef>
#include <span>
#include <string>

#include "model/expression.hpp"

namespace expression {

// What is wrong with this number of operands, in one sentence; empty where nothing is. Operators and calls only.
[[nodiscard]] std::string wrong_operands(const model::ExpressionNode& node);

// The value of an operator or a call; not finite where it has none.
[[nodiscard]] double value_of(const model::ExpressionNode& node, std::span<const double> operands);

// Why value_of() was not finite: "division by zero", "ln(-1) has no finite value".
[[nodiscard]] std::string no_value_text(const model::ExpressionNode& node, std::span<const double> operands);

}  // namespace expression
