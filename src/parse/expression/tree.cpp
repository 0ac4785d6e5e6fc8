#include "parse/expression/tree.hpp"

#include <algorithm>
#include <array>
#include <fmt/format.h>
#include <numbers>
#include <utility>

#include "base/text.hpp"
#include "parse/cards/number.hpp"
#include "parse/expression/functions.hpp"
#include "parse/quantity.hpp"

namespace parse {
namespace {

using model::ExpressionNode;
using model::Op;

constexpr int binding_conditional = 1;
constexpr int binding_or = 2;
constexpr int binding_and = 3;
constexpr int binding_comparison = 4;
constexpr int binding_sum = 5;
constexpr int binding_product = 6;
constexpr int binding_sign = 7;
constexpr int binding_power = 8;
constexpr int binding_not = 9;

struct Infix {
  std::string_view sign;
  Op op;
  int binding;
};

constexpr std::array infixes{
    Infix{"+", Op::add, binding_sum},
    Infix{"-", Op::subtract, binding_sum},
    Infix{"*", Op::multiply, binding_product},
    Infix{"/", Op::divide, binding_product},
    Infix{"%", Op::remainder, binding_product},
    Infix{"**", Op::power, binding_power},
    Infix{"^", Op::power, binding_power},
    Infix{"<", Op::less, binding_comparison},
    Infix{"<=", Op::less_equal, binding_comparison},
    Infix{">", Op::greater, binding_comparison},
    Infix{">=", Op::greater_equal, binding_comparison},
    Infix{"==", Op::equal, binding_comparison},
    Infix{"!=", Op::not_equal, binding_comparison},
    Infix{"<>", Op::not_equal, binding_comparison},
    Infix{"&&", Op::logical_and, binding_and},
    Infix{"&", Op::logical_and, binding_and},
    Infix{"||", Op::logical_or, binding_or},
    Infix{"|", Op::logical_or, binding_or},
};

ExpressionNode leaf(Op op, std::uint32_t offset) {
  ExpressionNode node;
  node.op = op;
  node.offset = offset;
  return node;
}

ExpressionNode constant(double value, std::uint32_t offset) {
  ExpressionNode node = leaf(Op::number, offset);
  node.number = value;
  node.spice = value;
  return node;
}

std::string plural(std::size_t count) {
  return fmt::format("{} argument{}", count, count == 1 ? "" : "s");
}

std::string takes(const FunctionName& known) {
  if (known.most == any_number) return fmt::format("at least {}", plural(known.fewest));
  if (known.most == known.fewest) return plural(known.fewest);
  return fmt::format("{} to {}", known.fewest, plural(known.most));
}

}  // namespace

TreeBuilder::TreeBuilder(model::ExpressionPool& pool, base::NameTable& names, std::uint64_t depth)
    : pool_(pool), names_(names), depth_(depth) {}

void TreeBuilder::push(const ExpressionNode& node, std::uint64_t depth) {
  if (depth > depth_) {
    throw ExpressionFailure{
        node.offset,
        fmt::format("operators lie deeper inside one another than the limit expression_depth = {}", depth_)};
  }
  operands_.push_back({model::ExpressionId{static_cast<std::uint32_t>(pool_.nodes.size())}, depth});
  pool_.nodes.push_back(node);
}

void TreeBuilder::number(std::string_view text, std::uint32_t offset) {
  if (const auto plain = plain_number(text)) return push(constant(*plain, offset), 1);
  const auto literal = read_literal(text);
  if (!literal.ok()) throw ExpressionFailure{offset, literal.error()};
  ExpressionNode node = constant(literal->builder, offset);
  node.spice = literal->spice;
  push(node, 1);
}

void TreeBuilder::name(std::string_view text, std::uint32_t offset) {
  if (base::same_name(text, "time")) return push(leaf(Op::time, offset), 1);
  if (base::same_name(text, "temp") || base::same_name(text, "temper")) return push(leaf(Op::temperature, offset), 1);
  if (base::same_name(text, "pi")) return push(constant(std::numbers::pi, offset), 1);
  ExpressionNode node = leaf(Op::parameter, offset);
  node.name = names_.intern(text);
  push(node, 1);
}

void TreeBuilder::volts(std::string_view net, std::string_view second_net, std::uint32_t offset) {
  ExpressionNode node = leaf(Op::net_volts, offset);
  node.name = names_.intern(net);
  if (!second_net.empty()) node.name2 = names_.intern(second_net);
  push(node, 1);
}

void TreeBuilder::amperes(std::string_view source, std::uint32_t offset) {
  ExpressionNode node = leaf(Op::amperes, offset);
  node.name = names_.intern(source);
  push(node, 1);
}

void TreeBuilder::prefix(char sign, std::uint32_t offset) {
  if (sign == '+') return;
  const bool negates = sign == '-';
  pending_.push_back(
      {Kind::prefix, negates ? Op::negate : Op::logical_not, negates ? binding_sign : binding_not, offset, 0, {}});
}

void TreeBuilder::infix(std::string_view sign, std::uint32_t offset) {
  if (sign == ":") return colon(offset);
  if (sign == "?") {
    while (!pending_.empty() && pending_.back().binding > binding_conditional) reduce();
    pending_.push_back({Kind::question, Op::choose, binding_conditional, offset, 0, {}});
    return;
  }
  const auto* const found =
      std::find_if(infixes.begin(), infixes.end(), [sign](const Infix& i) { return i.sign == sign; });
  while (!pending_.empty() && pending_.back().binding >= found->binding) reduce();
  pending_.push_back({Kind::infix, found->op, found->binding, offset, 0, {}});
}

// Ends the second part of a conditional: what waits behind its question mark is complete.
void TreeBuilder::colon(std::uint32_t offset) {
  while (!pending_.empty() && pending_.back().binding > 0 && pending_.back().kind != Kind::question) reduce();
  if (pending_.empty() || pending_.back().kind != Kind::question) {
    throw ExpressionFailure{offset, "expected an operator or the end of the expression, found : without ? before it"};
  }
  pending_.back().kind = Kind::colon;
}

void TreeBuilder::mark(Pending pending) {
  if (++marks_ > depth_) {
    throw ExpressionFailure{
        pending.offset,
        fmt::format("brackets lie deeper inside one another than the limit expression_depth = {}", depth_)};
  }
  pending_.push_back(pending);
}

void TreeBuilder::open(std::uint32_t offset) {
  mark({Kind::bracket, Op::add, 0, offset, 0, {}});
}

void TreeBuilder::open_call(std::string_view function, std::uint32_t offset) {
  mark({Kind::call, Op::call, 0, offset, operands_.size(), function});
}

void TreeBuilder::reduce_to_mark() {
  while (!pending_.empty() && pending_.back().binding > 0) reduce();
}

void TreeBuilder::close() {
  reduce_to_mark();
  pending_.pop_back();
  --marks_;
}

void TreeBuilder::next_argument() {
  reduce_to_mark();
}

void TreeBuilder::close_call(bool empty) {
  if (!empty) reduce_to_mark();
  const Pending call = pending_.back();
  pending_.pop_back();
  --marks_;
  build_call(call, operands_.size() - call.operands);
}

// Makes one node of the last `count` operands.
void TreeBuilder::combine(ExpressionNode node, std::size_t count, std::uint32_t offset) {
  node.offset = offset;
  node.argument_count = static_cast<std::uint16_t>(count);
  node.first_argument = static_cast<std::uint32_t>(pool_.arguments.size());
  std::uint64_t deepest = 0;
  for (std::size_t i = operands_.size() - count; i < operands_.size(); ++i) {
    pool_.arguments.push_back(operands_[i].id.value);
    deepest = std::max(deepest, operands_[i].depth);
  }
  operands_.resize(operands_.size() - count);
  push(node, deepest + 1);
}

void TreeBuilder::reduce() {
  const Pending top = pending_.back();
  pending_.pop_back();
  if (top.kind == Kind::question)
    throw ExpressionFailure{top.offset, "expected : after this ? and the value that follows it"};
  ExpressionNode node;
  node.op = top.op;
  combine(node, top.kind == Kind::prefix ? 1U : top.kind == Kind::colon ? 3U : 2U, top.offset);
}

void TreeBuilder::build_call(const Pending& call, std::size_t count) {
  if (count > any_number) throw ExpressionFailure{call.offset, fmt::format("{} arguments are too many", count)};
  ExpressionNode node;
  if (base::same_name(call.function, "if") || base::same_name(call.function, "ternary_fcn")) {
    if (count != 3)
      throw ExpressionFailure{call.offset, fmt::format("{} takes 3 arguments, found {}", call.function, count)};
    node.op = Op::choose;
    return combine(node, 3, call.offset);
  }
  const FunctionName* const known = find_function(call.function);
  if (known == nullptr) {
    node.op = Op::user_call;
    node.name = names_.intern(call.function);
    return combine(node, count, call.offset);
  }
  const bool odd_table = known->function == model::Function::table && count % 2 == 0;
  if (count < known->fewest || count > known->most || odd_table) {
    throw ExpressionFailure{call.offset, fmt::format("{} takes {}{}, found {}", call.function, takes(*known),
                                                     odd_table ? " (one value, then pairs)" : "", count)};
  }
  if (known->function == model::Function::nominal && count == 1) {
    operands_.pop_back();  // flat(x) and gauss(x) spread around zero
    return push(constant(0, call.offset), 1);
  }
  node.op = Op::call;
  node.function = known->function;
  combine(node, count, call.offset);
}

model::ExpressionId TreeBuilder::finish() {
  reduce_to_mark();
  return operands_.back().id;
}

}  // namespace parse
