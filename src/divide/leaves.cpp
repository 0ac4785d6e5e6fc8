#include "divide/leaves.hpp"

#include <vector>

#include "base/overloaded.hpp"

namespace divide {

model::ExpressionId expression_of(const model::Part& part) {
  return std::visit(base::overloaded{[](const model::Resistor& r) { return r.ohms.residual; },
                                     [](const model::VoltageSource& v) { return v.volts.residual; },
                                     [](const model::CurrentSource& i) { return i.amperes.residual; },
                                     [](const model::VoltageControlled& e) { return e.gain.residual; },
                                     [](const model::CurrentControlled& f) { return f.gain.residual; },
                                     [](const model::Behavioural& b) { return b.expression; },
                                     [](const auto&) { return model::ExpressionId{}; }},
                    part);
}

bool depends_on(const model::ExpressionPool& pool, model::ExpressionId tree, std::uint32_t variable) {
  if (!tree.valid()) return false;
  std::vector<model::ExpressionId> open{tree};
  while (!open.empty()) {
    const auto& node = pool[open.back()];
    open.pop_back();
    if (node.op == model::Op::variable && node.index == variable) return true;
    for (std::size_t i = 0; i < node.argument_count; ++i) open.push_back(pool.argument(node, i));
  }
  return false;
}

void for_each_leaf(const model::ExpressionPool& pool, model::ExpressionId tree,
                   const std::function<void(model::NetId)>& visit,
                   const std::function<void(model::ElementId)>& visit_source) {
  if (!tree.valid()) return;
  std::vector<model::ExpressionId> open{tree};
  while (!open.empty()) {
    const auto& node = pool[open.back()];
    open.pop_back();
    if (node.op == model::Op::net_volts) visit(model::NetId{node.index}), visit(model::NetId{node.index2});
    if (node.op == model::Op::amperes) visit_source(model::ElementId{node.index});
    for (std::size_t i = 0; i < node.argument_count; ++i) open.push_back(pool.argument(node, i));
  }
}

}  // namespace divide
