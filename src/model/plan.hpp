// A plan: the operating points that one input needs, as overrides on its network.
#pragma once

#include <cstdint>
#include <vector>

#include "model/divider.hpp"
#include "model/network.hpp"

namespace model {

// The conditions under which a sweep is solved. Each rule names those that it needs; audit merges them.
enum class ConditionKind : std::uint8_t {
  nominal,        // everything nominal, leakage zero
  leakage_high,   // every leakage, each with the sign that puts the reading up
  leakage_low,    // and each with the sign that puts it down
  bare,           // the bare divider, where its arms are not linear
  leakage_alone,  // one leakage with one sign
};

// A branch held at a value (ohms, volts, amperes) in place of its own.
struct Override {
  BranchId branch;
  double value = 0;
};

// A branch with a value of its own at each point.
struct SweptValues {
  BranchId branch;
  bool is_variable = false;    // Behavioural: `values` are the swept parameter's, put into its expression
  std::vector<double> values;  // one a point
};

struct Condition {
  ConditionKind kind = ConditionKind::nominal;
  std::vector<Override> held;
};

// Points times conditions on one network. Solved volts come back for each watched node.
struct Plan {
  Network network;
  std::vector<SweptValues> swept;
  std::size_t points = 0;
  std::vector<Condition> conditions;
  std::vector<NodeId> watched;
  std::vector<BranchId>
      watched_currents;  // VoltageSource branches whose current is wanted, A, from plus through the source
};

}  // namespace model
