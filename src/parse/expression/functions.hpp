// The functions that expressions of netlists call, by the names that netlists use.
#pragma once

#include <cstddef>
#include <limits>
#include <string_view>

#include "model/expression.hpp"

namespace parse {

struct FunctionName {
  std::string_view name;
  model::Function function;
  std::size_t fewest = 1;  // arguments
  std::size_t most = 1;
};

inline constexpr std::size_t any_number = std::numeric_limits<std::uint16_t>::max();

// The entry for a name in any case, or nothing.
[[nodiscard]] const FunctionName* find_function(std::string_view name);

}  // namespace parse
