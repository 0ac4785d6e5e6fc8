#include "flatten/flatten.hpp"

#include <algorithm>

#include "flatten/instances.hpp"

namespace flatten {
namespace {

using model::CardFate;

// Room for all at once: what is not used is never touched.
void reserve(Work& work) {
  const model::Scope& top = work.netlist.scopes.front();
  const std::uint64_t all = work.library.size_of(model::ScopeId{0}, work.limits.nesting);
  const std::size_t elements = static_cast<std::size_t>(std::min(all, work.limits.elements));
  work.circuit.elements.reserve(elements);
  work.circuit.pins.reserve(2 * elements + elements / 2);
  work.circuit.nets.reserve(elements);
  if (elements > 2 * top.elements.size()) work.names.reserve(work.names.size() + 2 * elements);
}

CardFate fate_unused(const Work& work, const Models& models, model::ScopeId scope, const model::ElementCard& card) {
  constexpr std::string_view modelled = "rclvibefgh";
  constexpr std::string_view devices = "dqjms";
  const base::NameId wanted = card.reference.name;
  if (modelled.find(card.letter) != std::string_view::npos) return CardFate::modelled;
  bool known = false;
  if (card.letter == 'x' && wanted.valid()) known = work.library.subcircuit(scope, wanted).valid();
  if (devices.find(card.letter) != std::string_view::npos && wanted.valid()) {
    const FoundModel found = work.library.model(scope, wanted);
    known = found.card != nullptr && models.is_known(*found.card);
  }
  return known ? CardFate::modelled : CardFate::unmodelled;
}

// Elements of subcircuits that nothing instantiates, and models that nothing may use.
void settle_unused(Work& work, const Models& models, const Instances& instances) {
  for (std::size_t i = 0; i < work.netlist.scopes.size(); ++i) {
    const model::ScopeId id{static_cast<std::uint32_t>(i)};
    const model::Scope& scope = work.netlist.scopes[i];
    for (const model::ModelCard& card : scope.models) {
      if (!models.is_known(card)) work.settle(card.card, CardFate::unmodelled);
    }
    if (instances.expanded(id)) continue;
    for (const model::ElementCard& card : scope.elements) work.settle(card.card, fate_unused(work, models, id, card));
  }
}

}  // namespace

model::Circuit flatten(model::Netlist& netlist, base::NameTable& names, const Options& options,
                       const source::Limits& limits, source::Diagnostics& diagnostics) {
  if (netlist.scopes.empty()) netlist.scopes.emplace_back();
  Work work(netlist, names, options, limits);
  Parameters parameters(work);
  Values values(work, parameters);
  Models models(work, values);
  Elements elements(work, parameters, values, models);
  Sweeps sweeps(work, parameters);
  Instances instances(work, elements, sweeps);
  reserve(work);
  Frame top;
  sweeps.begin(top);
  instances.expand(top);
  elements.tell_unused();
  parameters.check_all(top);
  settle_unused(work, models, instances);
  work.problems.tell(work.circuit.instances, names, diagnostics);
  std::stable_sort(work.circuit.suspects.begin(), work.circuit.suspects.end(),
                   [](const model::SuspectValue& a, const model::SuspectValue& b) { return a.element < b.element; });
  return std::move(work.circuit);
}

model::ReadingCount count_cards(const model::Netlist& netlist) {
  model::ReadingCount count;
  count.cards = netlist.cards.size();
  for (const model::CardRecord& card : netlist.cards) {
    switch (card.fate) {
      case CardFate::modelled:
        ++count.modelled;
        break;
      case CardFate::unmodelled:
        ++count.unmodelled;
        break;
      case CardFate::skipped:
        ++count.skipped;
        break;
      case CardFate::error:
        ++count.error;
        break;
    }
  }
  return count;
}

}  // namespace flatten
