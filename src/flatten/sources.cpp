#include <fmt/format.h>

#include "flatten/elements.hpp"
#include "flatten/resistance.hpp"

namespace flatten {
namespace {

using model::Unmodelled;
using Why = model::Unmodelled::Why;

}  // namespace

Elements::Outcome Elements::source_part(const Frame& frame, const model::ElementCard& card, model::Element& element) {
  switch (card.letter) {
    case 'b':
      return behavioural(frame, card, element, card.drives_current);
    case 'f':
    case 'h':
      return current_controlled(frame, card);
    default:
      break;
  }
  if (card.nodes.count == 4) return gain_source(frame, card, element);
  return behavioural(frame, card, element, card.letter == 'g');
}

// E and G with four nodes. A G that is controlled by the voltage between its own nodes is a resistor.
Elements::Outcome Elements::gain_source(const Frame& frame, const model::ElementCard& card, model::Element& element) {
  const Reading reading = values_.read(frame, card.value, card.card, Letter::other);
  if (std::holds_alternative<Failed>(reading)) return std::nullopt;
  if (std::holds_alternative<Behaving>(reading)) return Unmodelled{Why::unsupported, {}};
  if (const auto* word = std::get_if<NoValue>(&reading)) return without_value(frame, card, word->word);
  const auto& quantity = std::get<Quantity>(reading);
  suspect(quantity);
  const model::Circuit& circuit = work_.circuit;
  const bool own =
      circuit.pin(element, 0) == circuit.pin(element, 2) && circuit.pin(element, 1) == circuit.pin(element, 3);
  const model::Number& gain = quantity.number;
  if (card.letter == 'g' && own && gain.fixed() && gain.value > 0) {
    element.pin_count = 2;
    return model::Resistor{{1 / gain.value, {}}};
  }
  return model::VoltageControlled{gain, card.letter == 'g'};
}

Elements::Outcome Elements::current_controlled(const Frame& frame, const model::ElementCard& card) {
  if (card.nodes.count != 2 || std::holds_alternative<std::monostate>(card.value))
    return Unmodelled{Why::unsupported, card.reference.name};
  const Reading reading = values_.read(frame, card.value, card.card, Letter::other);
  if (std::holds_alternative<Failed>(reading)) return std::nullopt;
  if (std::holds_alternative<Behaving>(reading)) return Unmodelled{Why::unsupported, {}};
  if (const auto* word = std::get_if<NoValue>(&reading)) return without_value(frame, card, word->word);
  const auto& quantity = std::get<Quantity>(reading);
  const model::ElementId through = parameters_.source(frame, card.reference.name);
  if (!through.valid()) {
    work_.fail(ProblemKind::source, card.card, work_.place(card.card, card.reference), frame.instance,
               fmt::format("{} is controlled by the current of {}, and there is no such voltage source here",
                           work_.shown(card.name), work_.shown(card.reference.name)));
    return std::nullopt;
  }
  suspect(quantity);
  return model::CurrentControlled{quantity.number, through, card.letter == 'f'};
}

Elements::Outcome Elements::behavioural(const Frame& frame, const model::ElementCard& card, model::Element& element,
                                        bool drives_current) {
  if (card.nodes.count != 2 || std::holds_alternative<std::monostate>(card.value))
    return Unmodelled{Why::unsupported, card.reference.name};
  const auto made = values_.tree(frame, card.value, card.card);
  if (std::holds_alternative<Failed>(made)) return std::nullopt;
  if (const auto* word = std::get_if<NoValue>(&made)) return without_value(frame, card, word->word);
  const Tree& tree = std::get<Tree>(made);
  if (tree.odd) suspect(tree.readings);
  if (drives_current) {
    const auto ohms = resistance_of(work_.circuit.expressions, tree.root, work_.circuit.pin(element, 0),
                                    work_.circuit.pin(element, 1));
    if (ohms) return model::Resistor{*ohms};
  }
  return model::Behavioural{tree.root, drives_current};
}

}  // namespace flatten
