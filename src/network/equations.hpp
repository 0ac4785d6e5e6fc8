// The equations of modified nodal analysis (Ho, Ruehli, Brennan 1975) for one set of branch values: one unknown a group
// of shorted nodes, and one a branch whose voltage is given (its current, from the first pin through the branch to the
// second).
#pragma once

#include <cstdint>
#include <vector>

#include "base/result.hpp"
#include "model/network.hpp"
#include "network/values.hpp"

namespace network {

// Position of an unknown in a solution. Position 0 is ground: always zero, and no equation.
using Slot = std::uint32_t;

enum class Relation : std::uint8_t {
  conductance,       // amperes out of plus = value (plus - minus)
  amperes,           // amperes out of plus: a source
  transconductance,  // amperes out of plus = value (control_plus - control_minus)
  current_gain,      // amperes out of plus = value * control_current
  volts,             // plus - minus: a source
  volts_gain,        // plus - minus = value (control_plus - control_minus)
  transresistance,   // plus - minus = value * control_current
};

struct Term {
  Relation relation = Relation::conductance;
  Slot plus = 0;
  Slot minus = 0;
  Slot control_plus = 0;
  Slot control_minus = 0;
  Slot current = 0;  // own, of the last three rules
  Slot control_current = 0;
  double value = 0;
  model::BranchId branch;
};

struct Equations {
  Slot slots = 1;                  // ground's included
  Slot node_slots = 1;             // those that are volts
  std::vector<Slot> slot_of_node;  // nodes that nothing reaches stand at ground's
  std::vector<bool> reached;       // by node: all but those
  std::vector<Term> terms;
  bool passive = true;       // sources and positive resistances only: there is exactly one solution
  double smallest_ohms = 0;  // of the resistances above zero; 0 where there is none
};

// Error: a node floats, an independent voltage source is shorted by branches of given voltage or by shorts, a
// controlled source lacks its controlling one, a value is no finite number (but an infinite resistance is open).
[[nodiscard]] base::Result<Equations> equations_of(const model::Network& network, const Values& values);

// Right-hand sides by slot: of the sources at `values`, and of one ampere from outside into `into` and out of `out_of`.
[[nodiscard]] std::vector<double> source_side(const Equations& equations, const Values& values);
[[nodiscard]] std::vector<double> ampere_side(const Equations& equations, model::NodeId into, model::NodeId out_of);

// side - A x, term by term: each term adds the same rounded current to both its ends, so that a large current through a
// small resistance leaves no trace in the sum of the two.
[[nodiscard]] std::vector<double> residual(const Equations& equations, const std::vector<double>& side,
                                           const std::vector<double>& solution);

}  // namespace network
