// Resistors, capacitors, inductors.
#include <algorithm>
#include <fmt/format.h>
#include <limits>

#include "parse/cards/elements.hpp"
#include "parse/cards/number.hpp"
#include "parse/cards/values.hpp"

namespace parse {
namespace {

std::string_view kind(char letter) {
  return letter == 'r' ? "a resistor" : letter == 'c' ? "a capacitor" : "an inductor";
}

std::string_view full_key(char letter) {
  return letter == 'r' ? "resistance" : letter == 'c' ? "capacitance" : "inductance";
}

// {R} 1%: a tolerance behind an expression becomes the parameter tol. Gives how many there are.
std::uint32_t take_tolerance(const ElementWords& words) {
  Card& card = words.card;
  if (words.count() != 4 || card.token(3).kind == TokenKind::plain || card.text(4).back() != '%') return 0;
  const model::Value value = word_value(card, 4);
  if (!has_number(value)) return 0;
  card.reading().netlist.assignments.push_back({{card.reading().names.intern("tol"), card.token(4).begin}, value});
  words.element.reference = {};
  return 1;
}

// What stands behind a value may name a model or say more of the part; what goes on with it like an expression, or is
// a second value, would be lost.
bool may_follow_value(const Card& card, std::size_t i) {
  if (card.token(i).kind != TokenKind::plain) return false;
  const std::string_view text = card.text(i);
  const bool glued = card.token(i - 1).kind != TokenKind::plain && card.token(i - 1).end == card.token(i).begin;
  return std::string_view("*/^+-<>?&|!}%").find(text.front()) == std::string_view::npos &&
         (!glued || text.back() == '%');
}

void refuse_rest(Card& card, std::size_t i) {
  card.fail(i, fmt::format("expected the end of the value, found {}", card.found(i)));
}

// R=10k and the like: the value goes to its place, the rest are parameters.
void take_keys(const ElementWords& words) {
  Card& card = words.card;
  model::ElementCard& element = words.element;
  const bool own = card.is_key(words.key) && (card.is(words.key, std::string_view(&element.letter, 1)) ||
                                              card.is(words.key, full_key(element.letter)));
  std::size_t next = words.key;
  if (own && has_number(element.value)) {
    card.fail(words.key, fmt::format("the value stands twice on the card; the second is {} = {}", card.text(words.key),
                                     card.found(words.key + 2)));
  }
  if (own) {
    const Taken taken = value_behind(card, words.key + 1, Wanted::expression);
    element.value = taken.value;
    next = taken.next;
  }
  const std::uint32_t tolerance = take_tolerance(words);
  const model::Range rest = take_assignments(card, next, Wanted::anything);
  element.parameters = {rest.first - tolerance, rest.count + tolerance};
}

bool is_letter_alone(const Card& card, std::size_t i, char letter) {
  return card.text(i).size() == 1 && (card.text(i).front() | 0x20) == letter;
}

// 10k 1%, 10 uF, 10k (0805): the longest run of words from `first` on that is one literal. Gives one past its last
// word, or `first` where even the first word is none.
std::size_t take_literal(const ElementWords& words, std::size_t first) {
  constexpr std::size_t most = 4;  // 10 k 1 %
  for (std::size_t last = std::min(words.key, first + most) - 1; last >= first; --last) {
    if (auto value = literal_value(words.card, first, last)) {
      words.element.value = *value;
      return last + 1;
    }
  }
  return first;
}

// SPICE takes the last number on the card: in 10k (0805) it sees 805.
void note_last_number(const ElementWords& words, std::size_t next) {
  auto& literals = words.card.reading().netlist.odd_literals;
  const auto last = next < words.key ? plain_number(words.card.text(words.key - 1)) : std::nullopt;
  if (!last) return;
  if (const auto* const plain = std::get_if<double>(&words.element.value)) {
    constexpr double none = std::numeric_limits<double>::quiet_NaN();
    literals.push_back({*plain, *last, none, false, literal_span(words.card, 3, words.key - 1)});
    words.element.value = model::OddLiteralId{static_cast<std::uint32_t>(literals.size() - 1)};
  } else if (const auto* const odd = std::get_if<model::OddLiteralId>(&words.element.value)) {
    literals[odd->index()].spice = *last;
  }
}

// A word that is a node elsewhere, or a number, is a third pin: RV1 a wiper b 10k.
bool is_third_pin(const ElementWords& words) {
  const base::NameId name = words.card.name(3);
  return !words.known->is_model(name) && words.known->is_node(name);
}

// Two words or more behind the nodes, the first of which is no value.
Outcome take_model_first(const ElementWords& words) {
  if (words.known == nullptr) return Outcome::later;
  if (is_third_pin(words)) {
    words.element.letter = '?';
    return read_part(words);
  }
  words.element.reference = words.card.word(3);
  std::size_t next = take_literal(words, 4);
  if (next == 4) words.element.value = word_value(words.card, next++);
  if (next < words.key && !may_follow_value(words.card, next)) refuse_rest(words.card, next);
  return Outcome::element;
}

Outcome take_value(const ElementWords& words) {
  Card& card = words.card;
  std::size_t first = 3;
  if (words.count() > 3 && is_letter_alone(card, first, words.element.letter)) ++first;  // R (10 kohm)
  const std::size_t next = take_literal(words, first);
  if (next > first) {
    note_last_number(words, next);
    if (next < words.key && !may_follow_value(card, next))
      refuse_rest(card, next);
    else if (next < words.key && !is_value(card, next))
      words.element.reference = card.word(next);
    return Outcome::element;
  }
  const TokenKind first_kind = card.token(3).kind;
  if (words.count() > 3 && first_kind == TokenKind::plain && card.text(3).front() != '<')
    return take_model_first(words);
  words.element.value = word_value(card, 3);
  if (!has_number(words.element.value)) words.element.reference = card.word(3);
  if (words.count() == 3 || !has_number(words.element.value)) return Outcome::element;
  if (is_value(card, 4) || !may_follow_value(card, 4)) refuse_rest(card, 4);
  words.element.reference = card.word(4);
  return Outcome::element;
}

}  // namespace

Outcome read_passive(const ElementWords& words) {
  if (words.count() < 2) {
    words.card.fail(0, fmt::format("{} needs two nodes and a value", kind(words.element.letter)));
    return Outcome::element;
  }
  if (words.count() > 2) {
    const Outcome outcome = take_value(words);
    if (outcome != Outcome::element || words.element.letter == '?') return outcome;
  }
  words.take_nodes(2);
  take_keys(words);
  return Outcome::element;
}

}  // namespace parse
