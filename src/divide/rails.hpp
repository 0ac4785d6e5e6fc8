// Rails: nodes held at a known voltage, by a declaration or by a source to ground (directly or over another rail).
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "divide/bind.hpp"
#include "divide/nodes.hpp"
#include "model/circuit.hpp"
#include "model/sheet.hpp"
#include "source/diagnostic.hpp"

namespace divide {

struct Rail {
  Node node = 0;
  std::string name;                       // the net, as the netlist first spells it; "0" for ground
  model::Number volts;                    // nominal; a residual where a swept parameter sets it
  bool has_volts = true;                  // false: only a sensor of kind "voltage" says what it is at
  double ohms = 0;                        // between the ideal source and the node
  std::optional<std::size_t> sensor;      // that sweeps it, in Board::sensors
  double highest_volts = 0;               // over its sweep: tells an upper rail from a lower one
  std::string conflict;                   // two sources that disagree; empty where none do
  std::vector<model::ElementId> sources;  // of the netlist, whose sum the volts are; none where they are declared
};

struct Rails {
  std::vector<Rail> rails;                     // [0] is ground
  std::vector<std::optional<std::size_t>> of;  // one a node
  std::vector<char> spent;                     // one an element: a source that makes a rail, no branch of any network

  // The rail that holds a node ideally: networks are cut there. Null for other nodes and for rails behind ohms.
  [[nodiscard]] const Rail* ideal_at(Node node) const;
  [[nodiscard]] const Rail* at(Node node) const { return of[node] ? &rails[*of[node]] : nullptr; }
};

// Declared rails win over sources of the netlist. Errors: an unknown net, one node declared as two rails.
[[nodiscard]] Rails find_rails(const model::Circuit& circuit, const model::Sheet& sheet, const Board& board,
                               const Nodes& nodes, const NameIndex& index, source::Diagnostics& diagnostics);

}  // namespace divide
