// Expression trees by hand: each call adds a node to a pool and gives its id. Offsets are the node's number times ten,
// so that every place in a test is a different one.
#pragma once

#include <initializer_list>
#include <string_view>
#include <vector>

#include "base/names.hpp"
#include "model/expression.hpp"

namespace trees {

using model::ExpressionId;
using model::Function;
using model::Op;

struct Builder {
  base::NameTable& names;
  model::ExpressionPool pool;

  ExpressionId add(model::ExpressionNode node) {
    node.offset = static_cast<std::uint32_t>(10 * pool.nodes.size());
    pool.nodes.push_back(node);
    return ExpressionId{static_cast<std::uint32_t>(pool.nodes.size() - 1)};
  }

  ExpressionId odd(double builder, double spice) {
    model::ExpressionNode node;
    node.number = builder;
    node.spice = spice;
    return add(node);
  }

  ExpressionId number(double value) { return odd(value, value); }

  ExpressionId named(Op op, std::string_view name, std::string_view second = {}) {
    model::ExpressionNode node;
    node.op = op;
    node.name = names.intern(name);
    if (!second.empty()) node.name2 = names.intern(second);
    return add(node);
  }

  ExpressionId parameter(std::string_view name) { return named(Op::parameter, name); }
  ExpressionId volts(std::string_view net, std::string_view second = {}) { return named(Op::net_volts, net, second); }

  ExpressionId leaf(Op op, std::uint32_t index, std::uint32_t index2 = 0) {
    model::ExpressionNode node;
    node.op = op;
    node.index = index;
    node.index2 = index2;
    return add(node);
  }

  ExpressionId with(model::ExpressionNode node, const std::vector<ExpressionId>& operands) {
    node.first_argument = static_cast<std::uint32_t>(pool.arguments.size());
    node.argument_count = static_cast<std::uint16_t>(operands.size());
    for (const ExpressionId operand : operands) pool.arguments.push_back(operand.value);
    return add(node);
  }

  ExpressionId op(Op op, const std::vector<ExpressionId>& operands) {
    model::ExpressionNode node;
    node.op = op;
    return with(node, operands);
  }

  ExpressionId call(Function function, const std::vector<ExpressionId>& arguments) {
    model::ExpressionNode node;
    node.op = Op::call;
    node.function = function;
    return with(node, arguments);
  }

  ExpressionId call(Function function, std::initializer_list<double> arguments) {
    std::vector<ExpressionId> ids;
    for (const double argument : arguments) ids.push_back(number(argument));
    return call(function, ids);
  }
};

}  // namespace trees
