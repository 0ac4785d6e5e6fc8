// Nets: which net a node word means, at the top level and inside an instance.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <unordered_map>
#include <unordered_set>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/netlist.hpp"

namespace flatten {

// Whether a net is ground by its name, as long as it is no port: 0, gnd, gnd! or /gnd in any case.
[[nodiscard]] bool is_ground_name(std::string_view name);

// A node of a subcircuit: every instance has one net for each.
struct NodeSlot {
  enum class Kind : std::uint8_t { inner, port, ground, global };
  Kind kind = Kind::inner;
  base::NameId name;
};

class Wiring {
 public:
  Wiring(const model::Netlist& netlist, base::NameTable& names, model::Circuit& circuit);

  // The net of a node at the top level, made on first sight. A node `?` is a net of its own each time.
  model::NetId top(base::NameId name) {
    if (name == unconnected_) return make(name);
    model::NetId& net = top_[name.index()];
    if (!net.valid()) net = is_ground_name(names_.text(name)) ? model::ground : make(name);
    return net;
  }

  // The nodes of a subcircuit; the first are its ports in order. Worked out on first use.
  const std::vector<NodeSlot>& nodes(model::ScopeId scope);

  // A port that a subcircuit lists twice; none where there is none. nodes() has been called for it.
  [[nodiscard]] base::NameId repeated_port(model::ScopeId scope) const { return nodes_[scope.index()].repeated_port; }

  // Which of its subcircuit's nodes a word is; nodes() has been called for that subcircuit.
  [[nodiscard]] std::uint32_t node_of(std::uint32_t word) const { return slot_of_word_[word]; }

  // The nets of a new instance: `pins` for its ports, `path` (with its last dot) before the names of inner nets.
  std::vector<model::NetId> connect(model::ScopeId scope, const std::vector<model::NetId>& pins,
                                    const std::string& path);

  // The net that an expression of a scope means by a name; `nets` are the instance's. None where no element has it.
  std::optional<model::NetId> named(model::ScopeId scope, base::NameId name, const std::vector<model::NetId>& nets);

  // A net that no node names.
  model::NetId make(base::NameId name) {
    circuit_.nets.push_back({name});
    return model::NetId{static_cast<std::uint32_t>(circuit_.nets.size() - 1)};
  }

 private:
  NodeSlot::Kind kind_of(base::NameId name) const;

  struct Nodes {
    bool known = false;
    base::NameId repeated_port;
    std::vector<NodeSlot> slots;
    std::unordered_map<base::NameId, std::uint32_t> by_name;
  };

  const model::Netlist& netlist_;
  base::NameTable& names_;
  model::Circuit& circuit_;
  base::NameId unconnected_;
  std::unordered_set<base::NameId> globals_;
  base::LargeVector<model::NetId> top_;      // by NameId; names made later are no nodes of the top level
  std::vector<std::uint32_t> slot_of_word_;  // for the words of subcircuits
  std::vector<Nodes> nodes_;                 // by scope
};

}  // namespace flatten
