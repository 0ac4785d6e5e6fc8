#include <algorithm>
#include <array>
#include <cmath>
#include <fmt/format.h>
#include <limits>
#include <optional>
#include <span>

#include "base/overloaded.hpp"
#include "expression/evaluate.hpp"
#include "expression/operations.hpp"

namespace expression {
namespace {

using model::ExpressionId;
using model::ExpressionNode;
using model::Number;
using model::Op;

bool is_leaf(const ExpressionNode& node) {
  return node.op <= Op::time;
}

// How deep a flat tree is, and how many nodes it unfolds to.
struct Extent {
  std::size_t depth = 1;
  std::size_t nodes = 1;
};

Extent extent_of(const ExpressionNode& node) {
  if (is_leaf(node)) return {};
  return {node.index, node.index2};
}

// Adds an operator whose operands are in the pool already.
ExpressionId add_operator(model::ExpressionPool& pool, ExpressionNode node, std::span<const ExpressionId> operands) {
  Extent extent;
  node.first_argument = static_cast<std::uint32_t>(pool.arguments.size());
  node.argument_count = static_cast<std::uint16_t>(operands.size());
  for (const ExpressionId operand : operands) {
    const Extent inner = extent_of(pool[operand]);
    extent.depth = std::max(extent.depth, inner.depth + 1);
    extent.nodes += inner.nodes;
    pool.arguments.push_back(operand.value);
  }
  node.name = node.name2 = {};
  node.index = static_cast<std::uint32_t>(extent.depth);
  node.index2 = static_cast<std::uint32_t>(extent.nodes);
  pool.nodes.push_back(node);
  return ExpressionId{static_cast<std::uint32_t>(pool.nodes.size() - 1)};
}

ExpressionId operand_of(model::ExpressionPool& pool, const Number& number, std::uint32_t offset) {
  return number.fixed() ? add_number(pool, number.value, offset) : number.residual;
}

// One folding. Trouble is noted once, and what comes after it does not matter.
class Reducer {
 public:
  Reducer(const model::ExpressionPool& from, const Meaning& meaning, model::ExpressionPool& into, std::size_t depth)
      : from_(from), meaning_(meaning), into_(into), deepest_(std::min(depth, deepest_tree)) {}

  Outcome<Number> run(ExpressionId tree) {
    const Number number = fold(tree, 1);
    if (trouble_) return *std::move(trouble_);
    return number;
  }

 private:
  Number fold(ExpressionId id, std::size_t depth) {
    const ExpressionNode node = from_[id];
    if (depth > deepest_) return too_deep(node.offset);
    switch (node.op) {
      case Op::number:
        return fold_literal(node);
      case Op::parameter:
        return fold_parameter(node);
      case Op::net_volts:
        return fold_net_volts(node);
      case Op::amperes:
        return fold_amperes(node);
      case Op::temperature:
        return {meaning_.temperature, {}};
      case Op::time:
        return {0, {}};
      case Op::variable:
        return leaf(node);
      case Op::user_call:
        return fail(meaning_.unknown_function ? meaning_.unknown_function(node.name) : "this function is not known",
                    node.offset);
      default:
        return fold_operator(node, depth);
    }
  }

  Number fail(std::string message, std::uint32_t offset) {
    if (!trouble_) trouble_ = Trouble{std::move(message), offset};
    return {std::numeric_limits<double>::quiet_NaN(), {}};
  }

  Number too_deep(std::uint32_t offset) {
    return fail(fmt::format("the expression is nested deeper than the limit expression_depth = {}", deepest_), offset);
  }

  Number leaf(const ExpressionNode& node) {
    into_.nodes.push_back(node);
    return {0, ExpressionId{static_cast<std::uint32_t>(into_.nodes.size() - 1)}};
  }

  Number fold_literal(const ExpressionNode& node) {
    const bool spice =
        meaning_.literals == Literals::spice || (meaning_.literals == Literals::milli && is_bare_mega(node));
    const double value = spice ? node.spice : node.number;
    if (!std::isfinite(value)) return fail("this is not a finite number", node.offset);
    return {value, {}};
  }

  // What a lookup gave, or the trouble that it had.
  template <class T, class Lookup>
  std::optional<T> found(const Lookup& lookup, base::NameId name, std::uint32_t offset) {
    if (!lookup) return fail("a name has no meaning here", offset), std::nullopt;
    std::variant<T, std::string> result = lookup(name);
    if (T* value = std::get_if<T>(&result)) return *value;
    return fail(std::get<std::string>(std::move(result)), offset), std::nullopt;
  }

  Number fold_parameter(const ExpressionNode& node) {
    const std::optional<Number> number = found<Number>(meaning_.parameter, node.name, node.offset);
    if (!number) return {};
    if (number->fixed() && !std::isfinite(number->value)) return fail("this parameter is not finite", node.offset);
    return *number;
  }

  Number fold_net_volts(const ExpressionNode& node) {
    const auto plus = found<model::NetId>(meaning_.net, node.name, node.offset);
    const auto minus = node.name2.valid() ? found<model::NetId>(meaning_.net, node.name2, node.offset)
                                          : std::optional<model::NetId>(model::ground);
    if (!plus || !minus) return {};
    if (*plus == *minus) return {0, {}};
    ExpressionNode flat = node;
    flat.name = flat.name2 = {};
    flat.index = plus->value;
    flat.index2 = minus->value;
    return leaf(flat);
  }

  Number fold_amperes(const ExpressionNode& node) {
    const auto element = found<model::ElementId>(meaning_.source, node.name, node.offset);
    if (!element) return {};
    ExpressionNode flat = node;
    flat.name = {};
    flat.index = element->value;
    return leaf(flat);
  }

  Number fold_operator(const ExpressionNode& node, std::size_t depth) {
    if (std::string wrong = wrong_operands(node); !wrong.empty()) return fail(std::move(wrong), node.offset);
    if (node.op == Op::choose || node.op == Op::logical_and || node.op == Op::logical_or) {
      const Number first = fold(from_.argument(node, 0), depth + 1);
      if (trouble_) return {};
      if (first.fixed()) return fold_chosen(node, first.value != 0, depth);
    }
    const std::size_t base = operands_.size();
    for (std::size_t i = 0; i < node.argument_count && !trouble_; ++i) {
      const Number operand = fold(from_.argument(node, i), depth + 1);
      operands_.push_back(operand);
    }
    const Number result = trouble_ ? Number{} : combine(node, std::span<const Number>(operands_).subspan(base));
    operands_.resize(base);
    return result;
  }

  // The rest of a ? b : c, a && b, a || b once the truth of a is known.
  Number fold_chosen(const ExpressionNode& node, bool holds, std::size_t depth) {
    if (node.op == Op::choose) return fold(from_.argument(node, holds ? 1 : 2), depth + 1);
    if (holds == (node.op == Op::logical_or)) return {holds ? 1.0 : 0.0, {}};
    const Number second = fold(from_.argument(node, 1), depth + 1);
    if (trouble_) return {};
    if (second.fixed()) return {second.value != 0 ? 1.0 : 0.0, {}};
    ExpressionNode test = node;
    test.op = Op::not_equal;
    const std::array<Number, 2> operands{second, Number{0, {}}};
    return combine(test, operands);
  }

  Number combine(const ExpressionNode& node, std::span<const Number> operands) {
    if (std::all_of(operands.begin(), operands.end(), [](const Number& x) { return x.fixed(); }))
      return compute(node, operands);
    ids_.clear();
    for (const Number& operand : operands) ids_.push_back(operand_of(into_, operand, node.offset));
    const ExpressionId made = add_operator(into_, node, ids_);
    const Extent extent = extent_of(into_[made]);
    if (extent.depth > deepest_) return too_deep(node.offset);
    if (extent.nodes > largest_tree)
      return fail(fmt::format("the expression unfolds to more than {} terms", largest_tree), node.offset);
    return {0, made};
  }

  Number compute(const ExpressionNode& node, std::span<const Number> operands) {
    values_.clear();
    for (const Number& operand : operands) values_.push_back(operand.value);
    const double value = value_of(node, values_);
    if (!std::isfinite(value)) return fail(no_value_text(node, values_), node.offset);
    return {value, {}};
  }

  const model::ExpressionPool& from_;
  const Meaning& meaning_;
  model::ExpressionPool& into_;
  std::size_t deepest_;
  std::optional<Trouble> trouble_;
  std::vector<Number> operands_;  // of the operators being folded, innermost last
  std::vector<ExpressionId> ids_;
  std::vector<double> values_;
};

}  // namespace

bool is_bare_mega(const ExpressionNode& node) {
  // 1e6 and 1e-3 times one literal, both rounded: the ratio is 1e9 but for two roundings.
  constexpr double rounding = 4 * std::numeric_limits<double>::epsilon();
  return node.op == Op::number && node.number != node.spice &&
         std::fabs(node.number - 1e9 * node.spice) <= rounding * std::fabs(node.number);
}

ExpressionId add_number(model::ExpressionPool& pool, double value, std::uint32_t offset) {
  ExpressionNode node;
  node.number = node.spice = value;
  node.offset = offset;
  pool.nodes.push_back(node);
  return ExpressionId{static_cast<std::uint32_t>(pool.nodes.size() - 1)};
}

ExpressionId add_binary(model::ExpressionPool& pool, Op op, const Number& left, const Number& right) {
  ExpressionNode node;
  node.op = op;
  const std::array operands{operand_of(pool, left, 0), operand_of(pool, right, 0)};
  return add_operator(pool, node, operands);
}

Outcome<Number> reduce(const model::ExpressionPool& from, ExpressionId tree, const Meaning& meaning,
                       model::ExpressionPool& into, std::size_t depth) {
  return Reducer(from, meaning, into, depth).run(tree);
}

}  // namespace expression
