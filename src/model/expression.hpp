// Expression trees: parameters, values in braces or quotes, behavioural sources. Nodes live in a pool; a tree is the
// index of its root, and a subtree may be shared.
#pragma once

#include <cstdint>
#include <vector>

#include "base/id.hpp"
#include "base/names.hpp"

namespace model {

using ExpressionId = base::Id<struct ExpressionTag>;

enum class Op : std::uint8_t {
  number,       // `number`; `spice` is what SPICE would read there
  parameter,    // `name`, a parameter of the scope
  variable,     // `index`: a swept quantity of the flat circuit (flat trees only)
  net_volts,    // V(a) or V(a,b): net names while parsed, then `index` (and `index2`) are NetIds of the flat circuit
  amperes,      // I(V1): the current through a voltage source; `name`, then `index` is an ElementId
  temperature,  // temp or temper, in degC
  time,         // zero: every audit is of the operating point
  negate,
  logical_not,
  add,
  subtract,
  multiply,
  divide,
  power,
  remainder,
  less,
  less_equal,
  greater,
  greater_equal,
  equal,
  not_equal,
  logical_and,
  logical_or,
  choose,     // a ? b : c, and if(a, b, c)
  call,       // `function` of its arguments
  user_call,  // a function that the netlist defines: `name` of its arguments
};

// Functions of one or more arguments; the names by which netlists call them stand in the grammar's table.
enum class Function : std::uint8_t {
  abs,
  sgn,
  sqrt,
  exp,
  ln,
  log10,
  sin,
  cos,
  tan,
  asin,
  acos,
  atan,
  atan2,
  sinh,
  cosh,
  tanh,
  asinh,
  acosh,
  atanh,
  floor,
  ceil,
  round,
  integer,
  min,
  max,
  pow,
  power_of_magnitude,
  signed_power,
  limit,
  step,
  ramp,
  table,
  nominal,
};
// power_of_magnitude: |x|^y (pwr). signed_power: sgn(x) |x|^y (pwrs). step: u(x). ramp: uramp(x).
// limit(x, a, b): x kept between a and b. table(x, x1, y1, ...): linear between points, level outside.
// nominal(x, ...): its first argument; the spread functions of netlists (a nominal value, then a tolerance) read so.

struct ExpressionNode {
  Op op = Op::number;
  Function function = Function::abs;
  std::uint16_t argument_count = 0;
  std::uint32_t first_argument = 0;  // in ExpressionPool::arguments; operands of operators too
  base::NameId name;                 // net_volts: the first net while parsed
  base::NameId name2;                // net_volts: the second net, if any, while parsed
  std::uint32_t index = 0;
  std::uint32_t index2 = 0;  // net_volts: NetId of the second net; ground when there is one only
  double number = 0;
  double spice = 0;
  std::uint32_t offset = 0;  // byte of its text, in the source of the card that holds it
};

struct ExpressionPool {
  std::vector<ExpressionNode> nodes;
  std::vector<std::uint32_t> arguments;  // indices of nodes

  [[nodiscard]] const ExpressionNode& operator[](ExpressionId id) const { return nodes[id.index()]; }
  [[nodiscard]] ExpressionId argument(const ExpressionNode& node, std::size_t i) const {
    return ExpressionId{arguments[node.first_argument + i]};
  }
};

}  // namespace model
