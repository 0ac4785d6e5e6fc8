// Diodes, transistors, switches: parts with a model.
#include <fmt/format.h>

#include "parse/cards/elements.hpp"
#include "parse/cards/values.hpp"

namespace parse {
namespace {

struct Shape {
  char letter;
  std::size_t fewest;  // nodes
  std::size_t most;
  std::size_t usual;  // nodes, where no word is a known model
  std::string_view needs;
};
constexpr Shape shapes[]{{'d', 2, 2, 2, "a diode needs two nodes and a model"},
                         {'q', 3, 5, 3, "a bipolar transistor needs three nodes and a model"},
                         {'j', 3, 3, 3, "a junction transistor needs three nodes and a model"},
                         {'m', 3, 5, 4, "a MOS transistor needs three or four nodes and a model"}};

const Shape& shape_of(char letter) {
  for (const Shape& shape : shapes) {
    if (shape.letter == letter) return shape;
  }
  return shapes[0];
}

// Behind the model: an area, a count, or off.
bool follows_model(const Card& card, std::size_t i) {
  return card.is(i, "off") || is_value(card, i);
}

Outcome finish(const ElementWords& words, std::size_t nodes) {
  Card& card = words.card;
  for (std::size_t i = nodes + 2; i < words.key; ++i) {
    if (!follows_model(card, i)) {
      words.element.letter = '?';
      return read_part(words);
    }
    if (card.is(i, "off")) words.element.switched_off = true;
  }
  words.take_nodes(nodes);
  words.element.reference = card.word(nodes + 1);
  auto& assignments = card.reading().netlist.assignments;
  const auto first = static_cast<std::uint32_t>(assignments.size());
  for (std::size_t i = nodes + 2; i < words.key; ++i) {
    if (!card.is(i, "off"))
      assignments.push_back({{card.reading().names.intern("area"), card.token(i).begin}, word_value(card, i)});
  }
  static_cast<void>(take_assignments(card, words.key, Wanted::anything));
  words.element.parameters = {first, static_cast<std::uint32_t>(assignments.size()) - first};
  return Outcome::element;
}

// The last word that is a known model, from the fewest nodes on; else the usual place.
std::size_t nodes_before_model(const ElementWords& words, const Shape& shape) {
  for (std::size_t nodes = words.count() - 1; nodes >= shape.fewest; --nodes) {
    if (words.known->is_model(words.card.name(nodes + 1))) return nodes;
  }
  return words.count() > shape.usual ? shape.usual : words.count() - 1;
}

}  // namespace

Outcome read_device(const ElementWords& words) {
  const Shape& shape = shape_of(words.element.letter);
  if (words.count() <= shape.fewest) {
    if (shape.letter == 'j' && words.count() > 0) {  // a connector
      words.element.letter = '?';
      return read_part(words);
    }
    words.card.fail(0, std::string(shape.needs));
    return Outcome::element;
  }
  if (words.count() == shape.fewest + 1) return finish(words, shape.fewest);
  if (words.known == nullptr) return Outcome::later;
  const std::size_t nodes = nodes_before_model(words, shape);
  if (nodes <= shape.most) return finish(words, nodes);
  words.element.letter = '?';
  return read_part(words);
}

// S: four nodes and a model. W: two nodes, a source and a model. Then ON or OFF.
Outcome read_switch(const ElementWords& words) {
  Card& card = words.card;
  const std::size_t nodes = words.element.letter == 's' ? 4 : 2;
  const std::size_t model = words.element.letter == 's' ? 5 : 4;
  const bool state = words.key == model + 2 && (card.is(model + 1, "on") || card.is(model + 1, "off"));
  if (words.key != model + 1 && !state) {
    words.element.letter = '?';
    return read_part(words);
  }
  words.take_nodes(nodes);
  words.element.switched_off = state && card.is(model + 1, "off");
  if (words.element.letter == 's') {
    words.element.reference = card.word(model);
  } else {
    words.element.reference = card.word(3);
    words.element.second_reference = card.name(model);
  }
  words.element.parameters = take_assignments(card, words.key, Wanted::anything);
  return Outcome::element;
}

}  // namespace parse
