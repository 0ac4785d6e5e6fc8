#include "parse/cards/elements.hpp"

#include <fmt/format.h>

#include "parse/cards/values.hpp"

namespace parse {

void KnownNames::put(std::vector<bool>& set, base::NameId name) {
  if (name.index() >= set.size()) set.resize(name.index() * 2 + 1);
  set[name.index()] = true;
}

KnownNames::KnownNames(const model::Netlist& netlist) {
  for (const model::Scope& scope : netlist.scopes) {
    if (scope.name.valid()) put(models_, scope.name);
    for (const model::ModelCard& model : scope.models) put(models_, model.name);
    for (std::uint32_t i = 0; i < scope.ports.count; ++i) put(nodes_, netlist.words[scope.ports.first + i].name);
    for (const model::ElementCard& element : scope.elements) {
      for (std::uint32_t i = 0; i < element.nodes.count; ++i) put(nodes_, netlist.words[element.nodes.first + i].name);
    }
  }
}

void ElementWords::take_nodes(std::size_t nodes) const {
  for (std::size_t i = 1; i <= nodes; ++i)
    if (card.is(i, TokenKind::braced) || card.is(i, TokenKind::quoted))
      card.fail(i, fmt::format("expected a node, found {}", card.found(i)));
  element.nodes = card.words(1, 1 + nodes);
}

namespace {

// A part of a schematic that has no pins in the netlist: U1 __U1.
bool is_pinless(const Card& card) {
  const std::string_view word = card.text(1);
  return card.size() == 2 && word.size() > 2 && word.substr(0, 2) == "__";
}

}  // namespace

Outcome read_part(const ElementWords& words) {
  Card& card = words.card;
  words.element.letter = words.element.letter >= 'a' && words.element.letter <= 'z' ? words.element.letter : '?';
  if (words.count() == 0) {
    card.fail(1, fmt::format("expected the nodes of {} and what it is, found {}", card.text(0), card.found(1)));
    return Outcome::element;
  }
  words.take_nodes(words.count() - 1);
  words.element.reference = card.word(words.key - 1);
  words.element.parameters = take_assignments(card, words.key, Wanted::anything, true);
  return Outcome::element;
}

Outcome read_instance(const ElementWords& words) {
  Card& card = words.card;
  std::size_t last = 1;  // one past the subcircuit's name
  while (last < words.key && !card.is(last, "params:")) ++last;
  if (last < 2) {
    card.fail(1,
              fmt::format("expected the nodes of {} and its subcircuit's name, found {}", card.text(0), card.found(1)));
    return Outcome::element;
  }
  words.take_nodes(last - 2);
  words.element.reference = card.word(last - 1);
  words.element.parameters = take_assignments(card, last, Wanted::argument);
  return Outcome::element;
}

// Couplings do nothing at DC: the card is understood, and no element comes of it. A relay K1 is a part.
Outcome read_coupling(const ElementWords& words) {
  const Card& card = words.card;
  bool inductors = words.count() >= 2;
  for (std::size_t i = 1; i + 1 < words.key; ++i) inductors = inductors && (card.text(i).front() | 0x20) == 'l';
  const bool factor = card.size() > words.key || (inductors && is_value(card, words.key - 1));
  if (inductors && factor) return Outcome::nothing;
  words.element.letter = '?';
  return read_part(words);
}

Outcome read_element(Card& card, const KnownNames* known, model::ElementCard& element) {
  const ElementWords words{card, known, element, card.first_key(1)};
  if (card.is(1, TokenKind::equals)) {
    card.fail(1, fmt::format("expected a node, found {}", card.found(1)));
    return Outcome::element;
  }
  if (words.count() == 1 && element.letter != 'x' && is_pinless(card)) {
    element.letter = '?';
    return read_part(words);
  }
  switch (element.letter) {
    case 'r':
    case 'c':
    case 'l':
      return read_passive(words);
    case 'v':
    case 'i':
      return read_source(words);
    case 'd':
    case 'q':
    case 'j':
    case 'm':
      return read_device(words);
    case 'e':
    case 'g':
      return read_controlled(words);
    case 'f':
    case 'h':
      return read_current_controlled(words);
    case 'b':
      return read_behavioural(words);
    case 's':
    case 'w':
      return read_switch(words);
    case 'k':
      return read_coupling(words);
    case 'x':
      return read_instance(words);
    default:
      return read_part(words);
  }
}

}  // namespace parse
