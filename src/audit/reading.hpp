// Everything that is read before anything is solved: texts, declarations, cards, the flat circuit.
#pragma once

#include <string>

#include "audit/audit.hpp"
#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/netlist.hpp"
#include "model/sheet.hpp"
#include "source/diagnostic.hpp"
#include "source/text.hpp"

namespace audit {

struct Reading {
  source::Sources sources;
  base::NameTable names;
  model::Sheet sheet;
  bool sheet_has_errors = false;
  model::Netlist netlist;
  model::Circuit circuit;
  source::Diagnostics diagnostics;
  std::string failure;  // the netlist itself could not be opened; one line with its line feed
};

// Reads the netlist, its declarations (lines *| in it, the file beside it, those of the options) and what it includes.
[[nodiscard]] Reading read_board(const std::string& netlist, const Options& options);

}  // namespace audit
