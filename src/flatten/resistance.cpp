#include "flatten/resistance.hpp"

#include <cmath>

#include "expression/evaluate.hpp"

namespace flatten {
namespace {

using model::ExpressionId;
using model::Number;
using model::Op;

struct Matcher {
  model::ExpressionPool& pool;
  model::NetId plus;
  model::NetId minus;

  Number combine(Op op, const Number& left, const Number& right) {
    if (!left.fixed() || !right.fixed()) {
      const bool same = right.fixed() && right.value == 1;  // times or by one
      const bool one = op == Op::multiply && left.fixed() && left.value == 1;
      if (same) return left;
      if (one) return right;
      return {0, expression::add_binary(pool, op, left, right)};
    }
    return {op == Op::multiply ? left.value * right.value : left.value / right.value, {}};
  }

  // A subtree that is neither a voltage nor a current, as a number.
  std::optional<Number> factor(ExpressionId tree) const {
    if (pool[tree].op == Op::number) return Number{pool[tree].number, {}};
    if (expression::is_behavioural(pool, tree)) return std::nullopt;
    return Number{0, tree};
  }

  // 1 or -1 where the tree is the voltage between the two nets.
  std::optional<double> voltage(ExpressionId tree) const {
    const model::ExpressionNode& node = pool[tree];
    model::NetId from{node.index};
    model::NetId to{node.index2};
    if (node.op == Op::subtract) {
      const model::ExpressionNode& left = pool[pool.argument(node, 0)];
      const model::ExpressionNode& right = pool[pool.argument(node, 1)];
      if (left.op != Op::net_volts || right.op != Op::net_volts || left.index2 != 0 || right.index2 != 0)
        return std::nullopt;
      from = model::NetId{left.index};
      to = model::NetId{right.index};
    } else if (node.op != Op::net_volts) {
      return std::nullopt;
    }
    if (from == plus && to == minus) return 1.0;
    if (from == minus && to == plus) return -1.0;
    return std::nullopt;
  }

  // The tree as the voltage by some ohms.
  std::optional<Number> ohms(ExpressionId tree) {
    if (const auto sign = voltage(tree)) return Number{*sign, {}};
    const model::ExpressionNode node = pool[tree];
    if (node.op == Op::negate) {
      const auto inner = ohms(pool.argument(node, 0));
      return inner ? std::optional(combine(Op::multiply, *inner, Number{-1, {}})) : std::nullopt;
    }
    if (node.op != Op::multiply && node.op != Op::divide) return std::nullopt;
    const ExpressionId left = pool.argument(node, 0);
    const ExpressionId right = pool.argument(node, 1);
    if (const auto by = factor(right)) {
      const auto inner = ohms(left);
      return inner ? std::optional(combine(node.op == Op::divide ? Op::multiply : Op::divide, *inner, *by))
                   : std::nullopt;
    }
    const auto by = node.op == Op::multiply ? factor(left) : std::nullopt;
    const auto inner = by ? ohms(right) : std::nullopt;
    return inner ? std::optional(combine(Op::divide, *inner, *by)) : std::nullopt;
  }
};

}  // namespace

std::optional<Number> resistance_of(model::ExpressionPool& pool, ExpressionId tree, model::NetId plus,
                                    model::NetId minus) {
  if (plus == minus) return std::nullopt;
  const std::optional<Number> ohms = Matcher{pool, plus, minus}.ohms(tree);
  if (!ohms || !ohms->fixed()) return ohms;
  return std::isfinite(ohms->value) && ohms->value > 0 ? ohms : std::nullopt;
}

}  // namespace flatten
