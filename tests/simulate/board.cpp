#include "simulate/board.hpp"

#include <algorithm>
#include <cmath>

namespace test {

Board::Board() {
  circuit.nets.resize(1);
}

model::BranchId Board::add(model::Part part, std::vector<unsigned> nodes) {
  model::Branch branch;
  branch.part = std::move(part);
  branch.node_count = static_cast<std::uint8_t>(nodes.size());
  for (std::size_t i = 0; i < nodes.size(); ++i) {
    branch.nodes[i] = model::NodeId{nodes[i]};
    plan.network.node_count = std::max(plan.network.node_count, nodes[i] + 1);
  }
  branch.element = model::ElementId{static_cast<std::uint32_t>(plan.network.branches.size())};
  plan.network.nets.clear();
  for (std::uint32_t node = 0; node < plan.network.node_count; ++node)
    plan.network.nets.emplace_back(model::NetId{node}, model::NodeId{node});
  plan.network.branches.push_back(branch);
  return model::BranchId{branch.element.value};
}

model::BranchId Board::resistor(unsigned a, unsigned b, double ohms) {
  return add(model::Resistor{{ohms, {}}}, {a, b});
}
model::BranchId Board::volts(unsigned plus, unsigned minus, double value) {
  return add(model::VoltageSource{{value, {}}}, {plus, minus});
}
model::BranchId Board::amperes(unsigned from, unsigned into, double value) {
  return add(model::CurrentSource{{value, {}}}, {from, into});
}

model::BranchId Board::device(model::DeviceType type, std::vector<unsigned> nodes,
                              std::vector<std::pair<std::string, double>> parameters) {
  model::DeviceModel model;
  model.type = type;
  for (const auto& parameter : parameters)
    model.parameters.push_back({names.intern(parameter.first), parameter.second});
  circuit.models.push_back(model);
  plan.network.linear = false;
  return add(model::Device{model::DeviceModelId{static_cast<std::uint32_t>(circuit.models.size() - 1)}, {}, false},
             std::move(nodes));
}

model::BranchId Board::source(unsigned plus, unsigned minus, model::ExpressionId expression, bool drives_current) {
  plan.network.linear = false;
  return add(model::Behavioural{expression, drives_current}, {plus, minus});
}

model::ExpressionId Board::keep(model::ExpressionNode node, const std::vector<model::ExpressionId>& arguments) {
  model::ExpressionPool& pool = circuit.expressions;
  node.first_argument = static_cast<std::uint32_t>(pool.arguments.size());
  node.argument_count = static_cast<std::uint16_t>(arguments.size());
  for (const model::ExpressionId argument : arguments) pool.arguments.push_back(argument.value);
  pool.nodes.push_back(node);
  return model::ExpressionId{static_cast<std::uint32_t>(pool.nodes.size() - 1)};
}

model::ExpressionId Board::number(double value) {
  model::ExpressionNode node;
  node.number = value;
  node.spice = value;
  return keep(node, {});
}

model::ExpressionId Board::variable() {
  model::ExpressionNode node;
  node.op = model::Op::variable;
  return keep(node, {});
}

model::ExpressionId Board::net(unsigned plus, unsigned minus) {
  model::ExpressionNode node;
  node.op = model::Op::net_volts;
  node.index = plus;
  node.index2 = minus;
  return keep(node, {});
}

model::ExpressionId Board::current(model::BranchId source) {
  model::ExpressionNode node;
  node.op = model::Op::amperes;
  node.index = source.value;
  return keep(node, {});
}

model::ExpressionId Board::apply(model::Op op, std::vector<model::ExpressionId> arguments) {
  model::ExpressionNode node;
  node.op = op;
  return keep(node, arguments);
}

model::ExpressionId Board::call(model::Function function, std::vector<model::ExpressionId> arguments) {
  model::ExpressionNode node;
  node.op = model::Op::call;
  node.function = function;
  return keep(node, arguments);
}

void Board::nominal(std::size_t points) {
  plan.points = points;
  plan.conditions = {model::Condition{}};
}

void Board::sweep(model::BranchId branch, std::vector<double> values, bool is_variable) {
  nominal(values.size());
  plan.swept.push_back({branch, is_variable, std::move(values)});
}

Board divider(std::vector<double> sensor_ohms) {
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 10e3);
  const model::BranchId sensor = board.resistor(2, 0, 1);
  board.sweep(sensor, std::move(sensor_ohms));
  board.watch(2);
  return board;
}

std::vector<double> geometric(double first, double last, std::size_t count) {
  std::vector<double> values(count);
  for (std::size_t i = 0; i < count; ++i) {
    values[i] = first * std::pow(last / first, static_cast<double>(i) / static_cast<double>(count - 1));
  }
  return values;
}

}  // namespace test
