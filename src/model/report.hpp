// The result of a run: what every report format renders and none computes.
#pragma once

#include <map>
#include <optional>
#include <string>
#include <vector>

#include "model/divider.hpp"
#include "model/figures.hpp"
#include "model/finding.hpp"
#include "model/netlist.hpp"
#include "model/sweep.hpp"
#include "source/text.hpp"

namespace model {

struct AuditedInput {
  Divider divider;
  source::Span place;    // the card that findings point to; none: where the input was declared
  bool audited = false;  // false: there is no result
  std::optional<Sweep> sweep;
  Figures figures;
  FindingList findings;
};

struct BoardReport {
  std::string netlist;  // as given on the command line
  ReadingCount reading;
  std::vector<AuditedInput> inputs;
  FindingList findings;                    // of the board as a whole
  std::vector<std::string> not_checked;    // declared, but no rule of this version looks at it
  bool done_in_whole = true;               // false: exit status 2
  bool include_missing = false;            // an include that could not be read
  std::map<NetId, std::string> net_names;  // of every net that a divider names: tap, candidates, nets; ground is "0"
  source::Sources sources;                 // the texts that places point into
};

struct RunReport {
  std::string version;
  std::string simulator;  // "ngspice-39", or empty where none ran
  std::string as_of;      // ISO 8601 date
  std::vector<BoardReport> boards;
};

}  // namespace model
