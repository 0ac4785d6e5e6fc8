// What the expressions of a flat circuit look at.
#pragma once

#include <functional>

#include "model/circuit.hpp"
#include "model/expression.hpp"

namespace divide {

// The expression of a part's value, where it has no number yet; none for others.
[[nodiscard]] model::ExpressionId expression_of(const model::Part& part);

// Whether an expression depends on a swept parameter; an invalid tree does not.
[[nodiscard]] bool depends_on(const model::ExpressionPool& pool, model::ExpressionId tree, std::uint32_t variable);

// Calls visit(net) for every net whose voltage an expression reads, visit_source(element) for every source whose
// current.
void for_each_leaf(const model::ExpressionPool& pool, model::ExpressionId tree,
                   const std::function<void(model::NetId)>& visit,
                   const std::function<void(model::ElementId)>& visit_source);

}  // namespace divide
