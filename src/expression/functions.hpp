// The functions of expressions: how many arguments each takes, and its value.
#pragma once

#include <cstddef>
#include <span>
#include <string>
#include <string_view>

#include "model/expression.hpp"

namespace expression {

// The name by which messages call a function.
[[nodiscard]] std::string_view function_name(model::Function function);

// What is wrong with this number of arguments, in one sentence; empty where nothing is.
[[nodiscard]] std::string wrong_count(model::Function function, std::size_t count);

// The value at `arguments`, whose count is right. Not finite (NaN) where the function has none.
[[nodiscard]] double call(model::Function function, std::span<const double> arguments);

}  // namespace expression
