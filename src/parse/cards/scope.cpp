// Subcircuit definitions, parameters, models, global nets.
#include <fmt/format.h>

#include "parse/cards/reader.hpp"
#include "parse/cards/values.hpp"

namespace parse {
namespace {

bool begins_name(const Card& card, std::size_t i) {
  const char c = card.text(i).front();
  return card.is(i, TokenKind::plain) &&
         (((c | 0x20) >= 'a' && (c | 0x20) <= 'z') || c == '_' || static_cast<unsigned char>(c) >= 0x80U);
}

bool ends_ports(const Card& card, std::size_t i) {
  return card.is(i, "params:") || card.is(i, "optional:") || card.is(i, "text:");
}

}  // namespace

void CardsReader::read_subcircuit(Card& card, model::CardId id) {
  if (open_.size() > limits_.nesting && !nesting_told_) {
    nesting_told_ = true;
    card.fail(0, fmt::format("subcircuits lie deeper inside one another than the limit nesting = {}", limits_.nesting));
  } else if (open_.size() > limits_.nesting) {
    set_fault(id, netlist_.span(id), fmt::format("it lies deeper than the limit nesting = {}", limits_.nesting), {});
  }
  const std::size_t key = card.first_key(1);
  if (card.size() < 2 || key < 2)
    card.fail(1, fmt::format("expected the name of the subcircuit, found {}", card.found(1)));
  model::Scope made;
  made.card = id;
  made.parent = open_.back();
  std::size_t next = 2;
  if (card.size() > 1 && key > 1) made.name = card.name(1);
  if (!card.failed()) {
    while (next < key && !ends_ports(card, next)) ++next;
    made.ports = card.words(2, next);
  }
  while (next < card.size() && !card.failed()) {
    if (ends_ports(card, next)) {
      ++next;
    } else if (card.is_key(next)) {
      const Taken taken = value_behind(card, next + 1, Wanted::argument);
      made.defaults.push_back({card.word(next), taken.value, id});
      next = taken.next;
    } else if (begins_name(card, next)) {
      made.defaults.push_back({card.word(next), {}, id});
      ++next;
    } else {
      card.fail(next, fmt::format("expected a parameter's name, found {}", card.found(next)));
    }
  }
  const model::ScopeId made_id{static_cast<std::uint32_t>(netlist_.scopes.size())};
  const bool linked = netlist_.cards[id.index()].fate != model::CardFate::error;
  made.broken = card.failed() || !linked;
  if (linked && made.name.valid()) scope().scopes.push_back(made_id);
  netlist_.scopes.push_back(std::move(made));
  open_.push_back(made_id);
}

void CardsReader::read_ends(Card& card, model::CardId id) {
  if (open_.size() == 1) return card.fail(0, ".ends stands without .subckt before it");
  const base::NameId open = scope().name;
  if (card.size() > 1 && open.valid() && card.name(1) != open) {
    card.fail(1, fmt::format("expected the end of {}, found .ends {}", reading_.names.text(open), card.text(1)));
  }
  scope().last = id;
  open_.pop_back();
}

// a=1 b={...}, and a 1 without an equals sign.
void CardsReader::read_parameters(Card& card, model::CardId id) {
  if (card.size() < 2)
    return card.fail(1, fmt::format("expected name = value behind {}, found the end of the card", card.text(0)));
  for (std::size_t i = 1; i < card.size() && !card.failed();) {
    if (!begins_name(card, i)) return card.fail(i, fmt::format("expected a parameter's name, found {}", card.found(i)));
    if (card.text(i).find('(') != std::string_view::npos)
      return card.fail(i, "functions of the netlist are not followed by this version");
    const bool equals = card.is(i + 1, TokenKind::equals);
    const Taken taken = value_behind(card, equals ? i + 1 : i, Wanted::expression);
    if (!card.failed()) scope().parameters.push_back({card.word(i), taken.value, id});
    i = taken.next;
  }
}

void CardsReader::read_model(Card& card, model::CardId id) {
  if (card.size() < 3 || card.is(1, TokenKind::equals) || card.is_key(1) || card.is_key(2) ||
      card.is(2, TokenKind::equals)) {
    return card.fail(card.size() < 3 ? 0 : 1, "a model needs a name and a type");
  }
  model::ModelCard made;
  made.name = card.name(1);
  made.card = id;
  const std::string_view type = card.text(2);
  made.type = reading_.names.intern(type.substr(0, type.find('(')));
  made.parameters = take_assignments(card, 3, Wanted::anything, true);
  if (!card.failed()) scope().models.push_back(made);
}

void CardsReader::read_global(Card& card, model::CardId /*id*/) {
  if (card.size() < 2) return card.fail(1, "expected the names of nets behind .global, found the end of the card");
  for (std::size_t i = 1; i < card.size(); ++i) netlist_.globals.push_back(card.word(i));
}

}  // namespace parse
