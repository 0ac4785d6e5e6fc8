#include "flatten/instances.hpp"

#include <algorithm>
#include <fmt/format.h>

namespace flatten {
namespace {

using model::ScopeId;
using model::Unmodelled;
using Why = model::Unmodelled::Why;

constexpr std::size_t deepest_stack =
    1000;  // instances inside one another that the stack of calls holds, whatever the limit

std::string counted(std::uint32_t count, std::string_view noun) {
  return fmt::format("{} {}{}", count, noun, count == 1 ? "" : "s");
}

}  // namespace

Instances::Instances(Work& work, Elements& elements, Sweeps& sweeps)
    : work_(work),
      elements_(elements),
      sweeps_(sweeps),
      deepest_(static_cast<std::size_t>(std::min<std::uint64_t>(work.limits.nesting, deepest_stack))),
      expanded_(work.netlist.scopes.size()) {}

void Instances::expand(Frame& frame) {
  if (!expanded_[frame.scope.index()]) find_duplicates(frame.scope);
  expanded_[frame.scope.index()] = true;
  frame.first_element = work_.circuit.elements.size();
  const std::size_t older = elements_.waiting();
  for (const model::ElementCard& card : work_.netlist.scopes[frame.scope.index()].elements) {
    if (!fits(1)) {
      work_.circuit.cut =
          fmt::format("the flat circuit has more elements than the limit elements = {}", work_.limits.elements);
      refuse(frame, card, ProblemKind::limit, work_.circuit.cut);
      break;
    }
    if (!duplicate_.empty() && duplicate_[card.card.index()]) {
      refuse(frame, card, ProblemKind::duplicate, fmt::format("{} stands twice in its scope", work_.shown(card.name)));
    } else if (card.letter == 'x') {
      instantiate(frame, card);
    } else {
      elements_.add(frame, card);
    }
  }
  elements_.finish(frame, older);
}

bool Instances::fits(std::uint64_t more) const {
  return work_.circuit.elements.size() + work_.circuit.instances.size() + more <= work_.limits.elements;
}

void Instances::refuse(const Frame& caller, const model::ElementCard& card, ProblemKind kind, std::string message) {
  work_.fail(kind, card.card, work_.netlist.span(card.card), caller.instance, std::move(message));
  elements_.add_broken(caller, card);
}

// Names are looked up in a set of bits, which is cleared by going through them again.
void Instances::find_duplicates(ScopeId scope) {
  const base::LargeVector<model::ElementCard>& cards = work_.netlist.scopes[scope.index()].elements;
  if (seen_.size() < work_.names.size()) seen_.resize(work_.names.size());
  for (const model::ElementCard& card : cards) {
    if (seen_[card.name.index()]) {
      duplicate_.resize(work_.netlist.cards.size());
      duplicate_[card.card.index()] = true;
    }
    seen_[card.name.index()] = true;
  }
  for (const model::ElementCard& card : cards) seen_[card.name.index()] = false;
}

bool Instances::may_expand(const Frame& caller, const model::ElementCard& card, ScopeId scope) {
  const std::string name = work_.shown(card.name);
  const std::string subcircuit = work_.shown(card.reference.name);
  for (const Frame* frame = &caller; frame != nullptr; frame = frame->caller) {
    if (frame->scope != scope) continue;
    refuse(caller, card, ProblemKind::recursion, fmt::format("subcircuit {} contains itself", subcircuit));
    return false;
  }
  if (caller.depth >= deepest_) {
    refuse(caller, card, ProblemKind::limit,
           fmt::format("{} lies deeper inside other instances than the limit nesting = {}", name, deepest_));
    return false;
  }
  const std::uint32_t ports = work_.netlist.scopes[scope.index()].ports.count;
  if (card.nodes.count != ports) {
    refuse(caller, card, ProblemKind::pins,
           fmt::format("{} has {}, and subcircuit {} has {}", name, counted(card.nodes.count, "pin"), subcircuit,
                       counted(ports, "port")));
    return false;
  }
  work_.wiring.nodes(scope);
  if (const base::NameId port = work_.wiring.repeated_port(scope); port.valid()) {
    refuse(caller, card, ProblemKind::pins,
           fmt::format("subcircuit {} lists the port {} twice", subcircuit, work_.shown(port)));
    return false;
  }
  if (!fits(work_.library.size_of(scope, deepest_))) {
    refuse(caller, card, ProblemKind::limit,
           fmt::format("with {} the flat circuit has more elements than the limit elements = {}", name,
                       work_.limits.elements));
    return false;
  }
  return true;
}

void Instances::instantiate(const Frame& caller, const model::ElementCard& card) {
  const ScopeId scope =
      card.reference.name.valid() ? work_.library.subcircuit(caller.scope, card.reference.name) : ScopeId{};
  if (!scope.valid()) return elements_.add_unmodelled(caller, card, {Why::missing_subcircuit, card.reference.name});
  if (const model::Scope& wanted = work_.netlist.scopes[scope.index()]; wanted.broken) {
    work_.blame(card.card, work_.place(card.card, card.reference),
                fmt::format("subcircuit {} cannot be used", work_.shown(card.reference.name)), wanted.card);
    return elements_.add_broken(caller, card);
  }
  if (!may_expand(caller, card, scope)) return;

  model::Circuit& circuit = work_.circuit;
  std::vector<model::NetId> pins(card.nodes.count);
  for (std::uint32_t i = 0; i < card.nodes.count; ++i) pins[i] = elements_.net(caller, card, i);
  model::Instance made;
  made.name = caller.caller == nullptr ? card.name : work_.inner_name(caller, card.name);
  made.subcircuit = card.reference.name;
  made.card = card.card;
  made.parent = caller.instance;
  made.first_pin = static_cast<std::uint32_t>(circuit.pins.size());
  made.pin_count = static_cast<std::uint16_t>(std::min<std::size_t>(pins.size(), 0xffff));
  made.first_element = static_cast<std::uint32_t>(circuit.elements.size());
  circuit.pins.insert(circuit.pins.end(), pins.begin(), pins.begin() + made.pin_count);

  Frame frame;
  frame.caller = &caller;
  frame.scope = scope;
  frame.instance = model::InstanceId{static_cast<std::uint32_t>(circuit.instances.size())};
  frame.call = &card;
  frame.path.append(work_.names.text(made.name)).append(".");
  frame.depth = caller.depth + 1;
  frame.nets = work_.wiring.connect(scope, pins, frame.path);
  circuit.instances.push_back(made);
  sweeps_.bind(frame);
  check_arguments(frame);
  expand(frame);
  model::Instance& now = circuit.instances[frame.instance.index()];
  now.element_count = static_cast<std::uint32_t>(circuit.elements.size()) - now.first_element;
}

// What the instance gives against what the subcircuit takes.
void Instances::check_arguments(const Frame& frame) {
  const model::ElementCard& card = *frame.call;
  const std::string name = work_.shown(card.name);
  const std::string subcircuit = work_.shown(card.reference.name);
  const std::vector<ParameterSlot>& slots = work_.library.parameters(frame.scope);
  std::vector<bool> given(slots.size());
  for (const auto& [slot, variable] : frame.swept) given[slot] = true;
  for (std::uint32_t i = card.parameters.first; i < card.parameters.first + card.parameters.count; ++i) {
    const model::Word& key = work_.netlist.assignments[i].key;
    const auto slot = work_.library.parameter(frame.scope, key.name);
    if (slot && slots[*slot].is_default) {
      given[*slot] = true;
      continue;
    }
    work_.problems.say(ProblemKind::unknown_argument, base::Level::note, work_.place(card.card, key),
                       frame.caller->instance,
                       fmt::format("{} gives a value for {}, which is no parameter of subcircuit {}", name,
                                   work_.shown(key.name), subcircuit));
  }
  std::string missing;
  for (std::size_t i = 0; i < slots.size(); ++i) {
    if (given[i] || !slots[i].is_default || !std::holds_alternative<std::monostate>(slots[i].card->value)) continue;
    missing += (missing.empty() ? "" : ", ") + work_.shown(slots[i].card->name.name);
  }
  if (missing.empty()) return;
  work_.fail(
      ProblemKind::missing_argument, card.card, work_.netlist.span(card.card), frame.caller->instance,
      fmt::format("{} gives no value for {}, which subcircuit {} has no default for", name, missing, subcircuit));
}

}  // namespace flatten
