// Current sources that are resistors: sensor models are often written so.
#pragma once

#include <optional>

#include "model/circuit.hpp"

namespace flatten {

// The ohms of a current source from `plus` to `minus` whose flat tree is its own voltage times or by something that is
// neither a voltage nor a current, in any order of * / and signs: V(plus, minus)/R, (V(plus)-V(minus))*G. Nothing where
// the tree is anything else, or where the ohms are a number and not positive. New nodes are added to the pool.
[[nodiscard]] std::optional<model::Number> resistance_of(model::ExpressionPool& pool, model::ExpressionId tree,
                                                         model::NetId plus, model::NetId minus);

}  // namespace flatten
