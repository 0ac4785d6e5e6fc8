#include "expression/evaluate.hpp"

#include <array>
#include <cmath>
#include <fmt/format.h>
#include <limits>
#include <optional>
#include <span>
#include <vector>

#include "expression/operations.hpp"

namespace expression {
namespace {

using model::ExpressionId;
using model::ExpressionNode;
using model::Op;

// For the few nodes that add_binary() puts on top of a residual as large as reduce() allows.
constexpr std::size_t spare = 16;

// One evaluation. Trouble is noted once, and what comes after it does not matter.
class Evaluator {
 public:
  Evaluator(const model::ExpressionPool& pool, const Leaves& leaves) : pool_(pool), leaves_(leaves) {}

  Outcome<double> run(ExpressionId tree) {
    const double value = at(tree, 1);
    if (trouble_) return *std::move(trouble_);
    return value;
  }

 private:
  double at(ExpressionId id, std::size_t depth) {
    const ExpressionNode& node = pool_[id];
    if (depth > deepest_tree + spare) return fail("the expression is nested too deeply", node);
    if (++nodes_ > largest_tree + spare) return fail("the expression unfolds to too many terms", node);
    switch (node.op) {
      case Op::number:
        return finite(node.number, node);
      case Op::variable:
        return leaves_.variable ? finite(leaves_.variable(node.index), node)
                                : fail("a swept value is not known here", node);
      case Op::net_volts:
        if (!leaves_.net_volts) return fail("a net's voltage is not known here", node);
        return finite(leaves_.net_volts(model::NetId{node.index}, model::NetId{node.index2}), node);
      case Op::amperes:
        if (!leaves_.amperes) return fail("a source's current is not known here", node);
        return finite(leaves_.amperes(model::ElementId{node.index}), node);
      case Op::time:
        return 0;
      case Op::parameter:
      case Op::temperature:
      case Op::user_call:
        return fail("a name has no value here", node);
      default:
        return operation(node, depth);
    }
  }

  double operation(const ExpressionNode& node, std::size_t depth) {
    if (std::string wrong = wrong_operands(node); !wrong.empty()) return fail(std::move(wrong), node);
    if (node.op == Op::choose) {
      const double test = at(pool_.argument(node, 0), depth + 1);
      return trouble_ ? test : at(pool_.argument(node, test != 0 ? 1 : 2), depth + 1);
    }
    if (node.op == Op::logical_and || node.op == Op::logical_or) {
      const double left = at(pool_.argument(node, 0), depth + 1);
      if (trouble_ || (left != 0) == (node.op == Op::logical_or)) return left != 0 ? 1 : 0;
      return at(pool_.argument(node, 1), depth + 1) != 0 ? 1 : 0;
    }
    return compute(node, depth);
  }

  double compute(const ExpressionNode& node, std::size_t depth) {
    const std::size_t base = operands_.size();
    for (std::size_t i = 0; i < node.argument_count && !trouble_; ++i) {
      const double operand = at(pool_.argument(node, i), depth + 1);
      operands_.push_back(operand);
    }
    const std::span<const double> operands = std::span<const double>(operands_).subspan(base);
    double value = 0;
    if (!trouble_) {
      value = value_of(node, operands);
      if (!std::isfinite(value)) fail(no_value_text(node, operands), node);
    }
    operands_.resize(base);
    return value;
  }

  double finite(double value, const ExpressionNode& node) {
    return std::isfinite(value) ? value : fail("a value is not finite", node);
  }

  double fail(std::string message, const ExpressionNode& node) {
    if (!trouble_) trouble_ = Trouble{std::move(message), node.offset};
    return std::numeric_limits<double>::quiet_NaN();
  }

  const model::ExpressionPool& pool_;
  const Leaves& leaves_;
  std::optional<Trouble> trouble_;
  std::vector<double> operands_;  // of the operators being evaluated, innermost last
  std::size_t nodes_ = 0;
};

}  // namespace

Outcome<double> evaluate(const model::ExpressionPool& pool, ExpressionId tree, const Leaves& leaves) {
  return Evaluator(pool, leaves).run(tree);
}

bool is_behavioural(const model::ExpressionPool& pool, ExpressionId tree) {
  std::vector<ExpressionId> open{tree};
  for (std::size_t seen = 0; !open.empty() && seen <= largest_tree; ++seen) {
    const ExpressionNode& node = pool[open.back()];
    open.pop_back();
    if (node.op == Op::net_volts || node.op == Op::amperes) return true;
    for (std::size_t i = 0; i < node.argument_count; ++i) open.push_back(pool.argument(node, i));
  }
  return false;
}

}  // namespace expression
