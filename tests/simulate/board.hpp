// Small networks for tests, built by hand.
#pragma once

#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/plan.hpp"

namespace test {

// Nodes are numbers, 0 is ground; net k is node k.
struct Board {
  base::NameTable names;
  model::Circuit circuit;
  model::Plan plan;

  Board();

  model::BranchId add(model::Part part, std::vector<unsigned> nodes);
  model::BranchId resistor(unsigned a, unsigned b, double ohms);
  model::BranchId volts(unsigned plus, unsigned minus, double value);
  model::BranchId amperes(unsigned from, unsigned into, double value);
  model::BranchId device(model::DeviceType type, std::vector<unsigned> nodes,
                         std::vector<std::pair<std::string, double>> parameters);
  model::BranchId source(unsigned plus, unsigned minus, model::ExpressionId expression, bool drives_current);

  // Leaves and operations of expressions.
  model::ExpressionId number(double value);
  model::ExpressionId variable();
  model::ExpressionId net(unsigned plus, unsigned minus = 0);
  model::ExpressionId current(model::BranchId source);
  model::ExpressionId apply(model::Op op, std::vector<model::ExpressionId> arguments);
  model::ExpressionId call(model::Function function, std::vector<model::ExpressionId> arguments);

  // One condition, everything as it stands; `points` points.
  void nominal(std::size_t points = 1);
  void sweep(model::BranchId branch, std::vector<double> values, bool is_variable = false);
  void watch(unsigned node) { plan.watched.push_back(model::NodeId{node}); }

 private:
  model::ExpressionId keep(model::ExpressionNode node, const std::vector<model::ExpressionId>& arguments);
};

// 3.3 V over 10k and a swept resistor; node 1 the rail, node 2 the tap, watched.
[[nodiscard]] Board divider(std::vector<double> sensor_ohms);

// `count` values from `first` to `last` in equal ratios.
[[nodiscard]] std::vector<double> geometric(double first, double last, std::size_t count);

}  // namespace test
