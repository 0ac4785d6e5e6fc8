#include "flatten/elements.hpp"

#include <algorithm>
#include <string_view>

namespace flatten {
namespace {

using model::CardFate;
using model::Unmodelled;
using Why = model::Unmodelled::Why;

constexpr std::string_view spice_letters = "bcdefghijklmqrsvwx";

char folded(char c) {
  return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
}

bool waits(char letter) {
  return letter == 'b' || (letter >= 'e' && letter <= 'h');
}

}  // namespace

Elements::Elements(Work& work, Parameters& parameters, Values& values, Models& models)
    : work_(work), parameters_(parameters), values_(values), models_(models) {}

model::NetId Elements::net(const Frame& frame, const model::ElementCard& card, std::uint32_t node) {
  const std::uint32_t word = card.nodes.first + node;
  if (frame.caller == nullptr) return work_.wiring.top(work_.netlist.words[word].name);
  return frame.nets[work_.wiring.node_of(word)];
}

model::ElementId Elements::place(const Frame& frame, const model::ElementCard& card, model::Part part) {
  model::Circuit& circuit = work_.circuit;
  model::Element& element = circuit.elements.emplace_back();
  const std::string_view own = work_.names.text(card.name);
  element.name = frame.caller == nullptr ? card.name : work_.inner_name(frame, card.name);
  element.card = card.card;
  element.instance = frame.instance;
  element.first_pin = static_cast<std::uint32_t>(circuit.pins.size());
  element.pin_count = static_cast<std::uint16_t>(std::min<std::uint32_t>(card.nodes.count, 0xffff));
  element.letter = own.empty() ? '?' : folded(own.front());
  element.part = part;
  for (std::uint32_t i = 0; i < element.pin_count; ++i) circuit.pins.push_back(net(frame, card, i));
  return model::ElementId{static_cast<std::uint32_t>(circuit.elements.size() - 1)};
}

void Elements::add(const Frame& frame, const model::ElementCard& card) {
  current_ = model::ElementId{static_cast<std::uint32_t>(work_.circuit.elements.size())};
  if (waits(card.letter)) {
    place(frame, card, Unmodelled{Why::unsupported, card.reference.name});
    waiting_.push_back({current_, &card});
    return;
  }
  Outcome part = part_of(frame, card);
  if (!part) return add_broken(frame, card);
  if (std::holds_alternative<Unmodelled>(*part)) work_.settle(card.card, CardFate::unmodelled);
  place(frame, card, *part);
  if (std::holds_alternative<model::VoltageSource>(*part)) add_series_resistance(frame, card);
}

void Elements::add_unmodelled(const Frame& frame, const model::ElementCard& card, Unmodelled part) {
  work_.settle(card.card, CardFate::unmodelled);
  place(frame, card, part);
}

void Elements::add_broken(const Frame& frame, const model::ElementCard& card) {
  work_.blame(card.card, work_.netlist.span(card.card), "what it rests on could not be read");
  place(frame, card, Unmodelled{Why::broken_card, card.reference.name});
}

Elements::Outcome Elements::part_of(const Frame& frame, const model::ElementCard& card) {
  switch (card.letter) {
    case 'r':
      return resistor(frame, card);
    case 'c':
    case 'l':
      return reactance(frame, card);
    case 'v':
    case 'i':
      return independent(frame, card);
    case 'd':
    case 'q':
    case 'j':
    case 'm':
    case 's':
      return device(frame, card);
    default:
      break;
  }
  const std::string_view name = work_.names.text(card.name);
  const bool known = !name.empty() && spice_letters.find(folded(name.front())) != std::string_view::npos;
  return Unmodelled{known ? Why::unsupported : Why::unknown_letter, card.reference.name};
}

void Elements::finish(const Frame& frame, std::size_t older) {
  frame.sources_known = false;  // a parameter may have asked for one before all stood
  frame.sources.clear();
  for (std::size_t i = older; i < waiting_.size(); ++i) {
    const Waiting& waiting = waiting_[i];
    current_ = waiting.element;
    model::Element& element = work_.circuit.elements[current_.index()];
    const Outcome part = source_part(frame, *waiting.card, element);
    if (!part) {
      work_.blame(element.card, work_.netlist.span(element.card), "what it rests on could not be read");
      element.part = Unmodelled{Why::broken_card, waiting.card->reference.name};
      continue;
    }
    if (std::holds_alternative<Unmodelled>(*part)) work_.settle(element.card, CardFate::unmodelled);
    element.part = *part;
  }
  waiting_.resize(older);
}

const model::Assignment* Elements::parameter(const model::ElementCard& card, std::string_view key) const {
  for (std::uint32_t i = card.parameters.first; i < card.parameters.first + card.parameters.count; ++i) {
    const model::Assignment& assignment = work_.netlist.assignments[i];
    if (base::same_name(work_.names.text(assignment.key.name), key)) return &assignment;
  }
  return nullptr;
}

void Elements::suspect(const OddValue& value) {
  work_.circuit.suspects.push_back({current_, value.where, value.builder, value.spice});
}

}  // namespace flatten
