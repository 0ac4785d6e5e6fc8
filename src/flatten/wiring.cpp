#include "flatten/wiring.hpp"

namespace flatten {

using model::NetId;

bool is_ground_name(std::string_view name) {
  if (name == "0") return true;
  if (name.size() < 3 || name.size() > 4) return false;
  return base::same_name(name, "gnd") || base::same_name(name, "gnd!") || base::same_name(name, "/gnd");
}

Wiring::Wiring(const model::Netlist& netlist, base::NameTable& names, model::Circuit& circuit)
    : netlist_(netlist), names_(names), circuit_(circuit), nodes_(netlist.scopes.size()) {
  unconnected_ = names.intern("?");
  make(names.intern("0"));
  for (const model::Word& word : netlist.globals) globals_.insert(word.name);
  top_.resize(names.size());
}

NodeSlot::Kind Wiring::kind_of(base::NameId name) const {
  if (is_ground_name(names_.text(name))) return NodeSlot::Kind::ground;
  return globals_.count(name) != 0 ? NodeSlot::Kind::global : NodeSlot::Kind::inner;
}

const std::vector<NodeSlot>& Wiring::nodes(model::ScopeId id) {
  Nodes& nodes = nodes_[id.index()];
  if (nodes.known) return nodes.slots;
  nodes.known = true;
  slot_of_word_.resize(netlist_.words.size());
  const model::Scope& scope = netlist_.scopes[id.index()];
  const auto slot = [&](base::NameId name, bool is_port) {
    const auto fresh = static_cast<std::uint32_t>(nodes.slots.size());
    const auto [at, is_new] = nodes.by_name.try_emplace(name, fresh);
    if (!is_new && !is_port && name != unconnected_) return at->second;
    if (!is_new && is_port) nodes.repeated_port = name;
    // Node 0 is ground even where a header lists it.
    const bool port = is_port && names_.text(name) != "0";
    nodes.slots.push_back({port ? NodeSlot::Kind::port : kind_of(name), name});
    return fresh;
  };
  for (std::uint32_t i = 0; i < scope.ports.count; ++i) slot(netlist_.words[scope.ports.first + i].name, true);
  for (const model::ElementCard& card : scope.elements) {
    for (std::uint32_t i = card.nodes.first; i < card.nodes.first + card.nodes.count; ++i)
      slot_of_word_[i] = slot(netlist_.words[i].name, false);
  }
  return nodes.slots;
}

std::vector<NetId> Wiring::connect(model::ScopeId scope, const std::vector<NetId>& pins, const std::string& path) {
  const std::vector<NodeSlot>& slots = nodes(scope);
  std::vector<NetId> nets(slots.size());
  std::string name = path;
  for (std::size_t i = 0; i < slots.size(); ++i) {
    switch (slots[i].kind) {
      case NodeSlot::Kind::port:
        nets[i] = pins[i];
        break;
      case NodeSlot::Kind::ground:
        nets[i] = model::ground;
        break;
      case NodeSlot::Kind::global:
        nets[i] = top(slots[i].name);
        break;
      case NodeSlot::Kind::inner:
        name.resize(path.size());
        nets[i] = make(names_.intern(name.append(names_.text(slots[i].name))));
        break;
    }
  }
  return nets;
}

std::optional<NetId> Wiring::named(model::ScopeId scope, base::NameId name, const std::vector<NetId>& nets) {
  if (scope.value == 0) {
    if (is_ground_name(names_.text(name))) return model::ground;
    if (name.index() >= top_.size() || !top_[name.index()].valid()) return std::nullopt;
    return top_[name.index()];
  }
  const Nodes& known = nodes_[scope.index()];
  if (const auto at = known.by_name.find(name); at != known.by_name.end()) return nets[at->second];
  switch (kind_of(name)) {
    case NodeSlot::Kind::ground:
      return model::ground;
    case NodeSlot::Kind::global:
      return top(name);
    default:
      return std::nullopt;
  }
}

}  // namespace flatten
