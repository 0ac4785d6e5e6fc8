// Circuit + sheet -> dividers: rails, networks, tap, arms, sense path, load (design terms: model/divider.hpp).
#pragma once

#include <string>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/divider.hpp"
#include "model/netlist.hpp"
#include "model/sheet.hpp"
#include "source/diagnostic.hpp"
#include "source/text.hpp"

namespace divide {

struct Request {
  const model::Netlist& netlist;
  const source::Sources& sources;
  const model::Circuit& circuit;
  const model::Sheet& sheet;
  const base::NameTable& names;
  std::vector<std::string> only;  // globs of input names; empty: all
};

// Finds the divider of every declared input. Names of the sheet that match nothing in the netlist are errors with place
// and nearest real name; with any such error no divider is given. What stands in the way of an audit of one input is
// said in its Divider.
[[nodiscard]] model::Division divide(const Request& request, source::Diagnostics& diagnostics);

}  // namespace divide
