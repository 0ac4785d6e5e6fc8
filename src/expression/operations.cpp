#include "expression/operations.hpp"

#include <cmath>
#include <fmt/format.h>
#include <limits>

#include "base/text.hpp"
#include "expression/functions.hpp"

namespace expression {
namespace {

using model::Op;

std::size_t operand_count(Op op) {
  if (op == Op::negate || op == Op::logical_not) return 1;
  return op == Op::choose ? 3 : 2;
}

std::string_view sign_text(Op op) {
  switch (op) {
    case Op::add:
      return "+";
    case Op::subtract:
      return "-";
    case Op::multiply:
      return "*";
    case Op::divide:
      return "/";
    case Op::power:
      return "^";
    case Op::remainder:
      return "%";
    default:
      return "?";
  }
}

double truth(bool holds) {
  return holds ? 1.0 : 0.0;
}

}  // namespace

std::string wrong_operands(const model::ExpressionNode& node) {
  if (node.op == Op::call) return wrong_count(node.function, node.argument_count);
  const std::size_t wanted = operand_count(node.op);
  if (node.argument_count == wanted) return {};
  return fmt::format("an operator takes {} operands, not {}", wanted, node.argument_count);
}

double value_of(const model::ExpressionNode& node, std::span<const double> x) {
  switch (node.op) {
    case Op::negate:
      return -x[0];
    case Op::logical_not:
      return truth(x[0] == 0);
    case Op::add:
      return x[0] + x[1];
    case Op::subtract:
      return x[0] - x[1];
    case Op::multiply:
      return x[0] * x[1];
    case Op::divide:
      return x[0] / x[1];
    case Op::power:
      return std::pow(x[0], x[1]);
    case Op::remainder:
      return std::fmod(x[0], x[1]);
    case Op::less:
      return truth(x[0] < x[1]);
    case Op::less_equal:
      return truth(x[0] <= x[1]);
    case Op::greater:
      return truth(x[0] > x[1]);
    case Op::greater_equal:
      return truth(x[0] >= x[1]);
    case Op::equal:
      return truth(x[0] == x[1]);
    case Op::not_equal:
      return truth(x[0] != x[1]);
    case Op::logical_and:
      return truth(x[0] != 0 && x[1] != 0);
    case Op::logical_or:
      return truth(x[0] != 0 || x[1] != 0);
    case Op::choose:
      return x[0] != 0 ? x[1] : x[2];
    case Op::call:
      return call(node.function, x);
    default:
      return std::numeric_limits<double>::quiet_NaN();
  }
}

std::string no_value_text(const model::ExpressionNode& node, std::span<const double> x) {
  if ((node.op == Op::divide || node.op == Op::remainder) && x[1] == 0) return "division by zero";
  if (node.op == Op::call) {
    if (node.function == model::Function::table) return "the points of table do not rise";
    std::string list;
    for (const double value : x) list += (list.empty() ? "" : ", ") + base::number_text(value);
    return fmt::format("{}({}) has no finite value", function_name(node.function), list);
  }
  if (x.size() != 2) return "the result is not finite";
  return fmt::format("{} {} {} has no finite value", base::number_text(x[0]), sign_text(node.op),
                     base::number_text(x[1]));
}

}  // namespace expression
