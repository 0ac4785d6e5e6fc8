// Controlled and behavioural sources.
#include <fmt/format.h>

#include "parse/cards/elements.hpp"
#include "parse/cards/values.hpp"

namespace parse {
namespace {

bool begins_with(std::string_view text, std::string_view start) {
  return text.size() >= start.size() && base::same_name(text.substr(0, start.size()), start);
}

// The word that says how a source is written, behind its two nodes: value, table, poly ... ; none is empty.
std::string_view manner(const Card& card) {
  for (const std::string_view known : {"value", "vol", "cur"}) {
    if (card.is(3, known)) return "value";
  }
  if (card.is(3, "table")) return "table";
  if (card.size() > 3 && begins_with(card.text(3), "poly")) return "POLY";
  for (const std::string_view known : {"LAPLACE", "FREQ", "CHEBYSHEV"}) {
    if (card.is(3, known)) return known;
  }
  return {};
}

// Polynomials and functions of frequency: kept without a value.
void keep_unread(const ElementWords& words, std::size_t nodes, std::string_view what) {
  words.take_nodes(nodes);
  words.element.reference = {words.card.reading().names.intern(what), words.card.token(nodes + 1).begin};
}

void take_value(const ElementWords& words) {
  const bool equals = words.card.is(4, TokenKind::equals);
  const Taken taken = value_behind(words.card, equals ? 4 : 3, Wanted::expression);
  words.take_nodes(2);
  words.element.value = taken.value;
  words.element.parameters = take_assignments(words.card, taken.next, Wanted::anything);
}

// The table function of these arguments becomes the value; `word` says TABLE.
void build_table(const ElementWords& words, std::size_t word, const std::vector<std::uint32_t>& arguments) {
  Card& card = words.card;
  if (arguments.size() < 3 || arguments.size() % 2 == 0) {
    return card.fail(word, fmt::format("a TABLE needs pairs of numbers, found {}", arguments.size() - 1));
  }
  if (arguments.size() > 0xffff)
    return card.fail(word, fmt::format("{} numbers are too many for a TABLE", arguments.size() - 1));
  auto& pool = card.reading().netlist.expressions;
  model::ExpressionNode node;
  node.op = model::Op::call;
  node.function = model::Function::table;
  node.offset = card.token(word).begin;
  node.argument_count = static_cast<std::uint16_t>(arguments.size());
  node.first_argument = static_cast<std::uint32_t>(pool.arguments.size());
  pool.arguments.insert(pool.arguments.end(), arguments.begin(), arguments.end());
  words.element.value = model::ExpressionId{static_cast<std::uint32_t>(pool.nodes.size())};
  pool.nodes.push_back(node);
}

// The numbers from word i on, behind the arguments that there are.
void take_points(const ElementWords& words, std::size_t i, std::size_t word, std::vector<std::uint32_t> arguments) {
  for (; i < words.card.size() && !words.card.failed(); ++i) {
    if (!words.card.is(i, TokenKind::equals)) arguments.push_back(expression_of_word(words.card, i).value);
  }
  if (!words.card.failed()) build_table(words, word, arguments);
}

// TABLE {expression} = (x, y) (x, y) ... : linear between the points, level outside.
void take_table(const ElementWords& words) {
  Card& card = words.card;
  const std::size_t i = card.is(4, TokenKind::equals) ? 5 : 4;
  if (!card.is(i, TokenKind::braced) && !card.is(i, TokenKind::quoted)) {
    return card.fail(i, fmt::format("expected an expression in braces behind TABLE, found {}", card.found(i)));
  }
  take_points(words, i, 3, {});
  words.take_nodes(2);
}

// Four nodes, then TABLE = (x, y) ... of the volts between the second two.
void take_table_of_nodes(const ElementWords& words) {
  auto& nodes = words.card.reading().netlist.expressions.nodes;
  model::ExpressionNode volts;
  volts.op = model::Op::net_volts;
  volts.name = words.card.name(3);
  volts.name2 = words.card.name(4);
  volts.offset = words.card.token(3).begin;
  nodes.push_back(volts);
  take_points(words, words.key + 2, words.key, {static_cast<std::uint32_t>(nodes.size() - 1)});
  words.take_nodes(2);
}

// A gain that stands alone, or nothing and a fault.
bool take_gain(const ElementWords& words, std::size_t i) {
  words.element.value = word_value(words.card, i);
  return has_number(words.element.value);
}

}  // namespace

Outcome read_controlled(const ElementWords& words) {
  Card& card = words.card;
  const std::string_view how = manner(card);
  words.element.drives_current = words.element.letter == 'g';
  if (how == "value") return take_value(words), Outcome::element;
  if (how == "table") return take_table(words), Outcome::element;
  if (!how.empty()) return keep_unread(words, 2, how), Outcome::element;
  if (words.count() == 4 && card.is(words.key, "table")) return take_table_of_nodes(words), Outcome::element;
  if (words.count() == 4 && card.is(words.key, "laplace")) return keep_unread(words, 4, "LAPLACE"), Outcome::element;
  const std::string_view name = words.element.letter == 'e' ? "voltage" : "current";
  if (words.count() == 5) {
    words.take_nodes(4);
    if (!take_gain(words, 5))
      card.fail(5, fmt::format("expected the gain of a controlled {} source, found {}", name, card.found(5)));
    words.element.parameters = take_assignments(card, words.key, Wanted::anything);
    return Outcome::element;
  }
  if (words.count() == 4 && card.is(words.key, "gain")) {
    words.take_nodes(4);
    words.element.value = value_behind(card, words.key + 1, Wanted::expression).value;
    return Outcome::element;
  }
  card.fail(0, fmt::format("a controlled {} source needs four nodes and a gain, or two nodes and VALUE = an expression",
                           name));
  return Outcome::element;
}

Outcome read_current_controlled(const ElementWords& words) {
  Card& card = words.card;
  if (words.count() > 2 && begins_with(card.text(3), "poly")) return keep_unread(words, 2, "POLY"), Outcome::element;
  if (words.count() != 4 || !take_gain(words, 4)) {
    words.element.letter = '?';
    words.element.value = {};
    return read_part(words);
  }
  words.take_nodes(2);
  words.element.reference = card.word(3);
  words.element.drives_current = words.element.letter == 'f';
  words.element.parameters = take_assignments(card, words.key, Wanted::anything);
  return Outcome::element;
}

Outcome read_behavioural(const ElementWords& words) {
  Card& card = words.card;
  std::size_t own = words.key;
  while (own < card.size() && !(card.is_key(own) && (card.is(own, "v") || card.is(own, "i")))) ++own;
  if (words.count() != 2 || own == card.size()) {
    if (words.count() > 2 && own == card.size()) {  // a battery BT1 with its part text
      words.element.letter = '?';
      return read_part(words);
    }
    card.fail(0, "a behavioural source needs two nodes and V = or I = an expression");
    return Outcome::element;
  }
  const Taken taken = value_behind(card, own + 1, Wanted::expression);
  words.take_nodes(2);
  words.element.value = taken.value;
  words.element.drives_current = card.is(own, "i");
  words.element.parameters = take_assignments(card, taken.next, Wanted::anything);
  return Outcome::element;
}

}  // namespace parse
