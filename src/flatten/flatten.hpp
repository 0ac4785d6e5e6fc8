// Cards -> flat circuit: parameters evaluated, subcircuits expanded, every card given its fate.
#pragma once

#include <string>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/netlist.hpp"
#include "model/sheet.hpp"
#include "source/diagnostic.hpp"
#include "source/limits.hpp"

namespace flatten {

// A parameter that stays free: `sensor` names an instance by its full path (then its parameter, if it has one of that
// name) or an element; otherwise the .param of the top level is meant.
struct SweepRequest {
  std::string sensor;
  std::string parameter;
};

struct Options {
  std::vector<SweepRequest> sweeps;
  model::BareM bare_m = model::BareM::by_size;
};

// Expands the top level. Errors in a card (undefined parameter, unknown function, a value without a number, a name that
// stands twice) are diagnostics at its place; the element is then Unmodelled{broken_card} with all its pins, so that
// nothing it touches passes for checked, and its card's fate is error. Instances of an unknown subcircuit, devices of
// an unknown model, and letters without a meaning become Unmodelled elements too; the fate of their cards is
// unmodelled. A problem that many instances of a subcircuit share is one diagnostic, with their number and one of them.
[[nodiscard]] model::Circuit flatten(model::Netlist& netlist, base::NameTable& names, const Options& options,
                                     const source::Limits& limits, source::Diagnostics& diagnostics);

// The four counts of a netlist that was flattened.
[[nodiscard]] model::ReadingCount count_cards(const model::Netlist& netlist);

}  // namespace flatten
