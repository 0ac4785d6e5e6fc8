#include "flatten/library.hpp"

#include <algorithm>

namespace flatten {
namespace {

using model::ScopeId;

std::uint64_t key(ScopeId scope, base::NameId name) {
  return (std::uint64_t{scope.value} << 32U) | name.value;
}

constexpr std::uint64_t most = std::uint64_t{1}
                               << 60U;  // a size that is beyond any limit; the sum of two does not overflow

constexpr std::uint32_t nodes_of_one = 16;  // a card with very many nodes counts as several elements

}  // namespace

Library::Library(const model::Netlist& netlist)
    : netlist_(netlist), slots_(netlist.scopes.size()), sizes_(netlist.scopes.size()) {
  for (std::size_t i = 0; i < netlist.scopes.size(); ++i) {
    const ScopeId id{static_cast<std::uint32_t>(i)};
    const model::Scope& scope = netlist.scopes[i];
    // Of several of one name the first counts, as in SPICE; one that is broken makes them all so.
    for (const ScopeId inner : scope.scopes) {
      const auto [at, is_new] = subcircuits_.try_emplace(key(id, netlist.scopes[inner.index()].name), inner);
      if (!is_new && netlist.scopes[inner.index()].broken) at->second = inner;
    }
    for (const model::ModelCard& card : scope.models) {
      const auto [at, is_new] = models_.try_emplace(key(id, card.name), FoundModel{&card, id});
      if (!is_new && card.broken) at->second.card = &card;
    }
    add_parameters(id);
  }
}

void Library::add_parameters(ScopeId id) {
  const model::Scope& scope = netlist_.scopes[id.index()];
  std::vector<ParameterSlot>& slots = slots_[id.index()];
  const auto add = [&](const model::ParameterCard& card, bool is_default) {
    const auto [at, is_new] = parameters_.try_emplace(key(id, card.name.name), slots.size());
    if (is_new)
      slots.push_back({&card, is_default});
    else if (slots[at->second].is_default == is_default && !slots[at->second].card->broken)
      slots[at->second].card = &card;
  };
  for (const model::ParameterCard& card : scope.defaults) add(card, true);
  for (const model::ParameterCard& card : scope.parameters) add(card, false);
}

ScopeId Library::subcircuit(ScopeId from, base::NameId name) const {
  for (ScopeId scope = from; scope.valid(); scope = netlist_.scopes[scope.index()].parent) {
    if (const auto at = subcircuits_.find(key(scope, name)); at != subcircuits_.end()) return at->second;
  }
  return {};
}

FoundModel Library::model(ScopeId from, base::NameId name) const {
  for (ScopeId scope = from; scope.valid(); scope = netlist_.scopes[scope.index()].parent) {
    if (const auto at = models_.find(key(scope, name)); at != models_.end()) return at->second;
  }
  return {};
}

std::optional<std::size_t> Library::parameter(ScopeId scope, base::NameId name) const {
  const auto at = parameters_.find(key(scope, name));
  if (at == parameters_.end()) return std::nullopt;
  return at->second;
}

std::uint64_t Library::size_of(ScopeId scope, std::size_t depth) {
  if (sizes_[scope.index()] != 0 || depth == 0) return std::max<std::uint64_t>(sizes_[scope.index()], 1);
  sizes_[scope.index()] = 1;  // what a scope inside itself counts
  std::uint64_t size = 1;
  for (const model::ElementCard& card : netlist_.scopes[scope.index()].elements) {
    const ScopeId inner = card.letter == 'x' ? subcircuit(scope, card.reference.name) : ScopeId{};
    size = std::min(most, size + card.nodes.count / nodes_of_one + (inner.valid() ? size_of(inner, depth - 1) : 1));
  }
  return sizes_[scope.index()] = size;
}

}  // namespace flatten
