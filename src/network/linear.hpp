// Closed-form solutions of linear networks by modified nodal analysis (Ho, Ruehli, Brennan 1975). Nonlinear branches
// (Device, Behavioural) are left open here: on a network that has any, results describe its linear part only.
#pragma once

#include <span>
#include <vector>

#include "base/result.hpp"
#include "model/network.hpp"
#include "model/plan.hpp"

namespace network {

using Overrides = std::span<const model::Override>;

// Volts of every node against ground, [0] = 0, with `overrides` in place of the branches' own values (a later one
// wins). Capacitors and Unmodelled are open, and so is an infinite resistance; inductors and zero ohms are shorts. A
// node that only open branches and shorts touch stands at 0. Error: the network has no single solution (a node floats,
// sources fight), or a value is no number (a Number with a residual that nothing overrides); the message names no
// nodes.
[[nodiscard]] base::Result<std::vector<double>> node_volts(const model::Network& network, Overrides overrides = {});

// The one-port form of probe against ground with the Resistor branch `resistor` left free. Error: no finite source
// resistance above zero (fed by a current source, shorted by a rail), or no solution with the branch open or shorted.
[[nodiscard]] base::Result<model::OnePort> one_port(const model::Network& network, model::BranchId resistor,
                                                    model::NodeId probe, Overrides overrides = {});

// Thevenin resistance seen between two nodes, sources at rest; `without` is taken out of the network first (none:
// nothing is).
[[nodiscard]] base::Result<double> thevenin_ohms(const model::Network& network, model::NodeId plus, model::NodeId minus,
                                                 model::BranchId without = {}, Overrides overrides = {});

// The value of a one-port form at `ohms`; infinite ohms is the open circuit.
[[nodiscard]] double volts_at(const model::OnePort& form, double ohms);

// The sensor's resistance from a voltage, the inverse of volts_at: infinite at the open circuit's volts, not a number
// where no resistance gives that voltage.
[[nodiscard]] double ohms_at(const model::OnePort& form, double volts);

// The form of over/under, two voltages of one network with the same resistor free, again as a function of that resistor
// (the bilinear theorem): its "volts" are quotients. Error: they have no such form (the divisor is zero or changes its
// sign within the resistances above zero).
[[nodiscard]] base::Result<model::OnePort> quotient_form(const model::OnePort& over, const model::OnePort& under);

}  // namespace network
