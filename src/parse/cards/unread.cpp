// What cards leave behind that are not read: why, and the names that nobody may use for want of them.
#include <fmt/format.h>

#include "base/text.hpp"
#include "parse/cards/reader.hpp"

namespace parse {
namespace {

bool is_blank(char c) {
  return c == ' ' || c == '\t' || c == '\v' || c == '\f';
}

bool ends_name(char c) {
  return is_blank(c) || std::string_view(",={}'\"()+-*/<>!").find(c) != std::string_view::npos;
}

// The name that ends before an equals sign at `at`, blanks between; empty where there is none.
std::string_view name_before(std::string_view text, std::size_t at) {
  while (at > 0 && is_blank(text[at - 1])) --at;
  std::size_t begin = at;
  while (begin > 0 && !ends_name(text[begin - 1])) --begin;
  return text.substr(begin, at - begin);
}

}  // namespace

void CardsReader::set_fault(model::CardId id, source::Span where, std::string reason, model::CardId cause) {
  set_fate(id, model::CardFate::error);
  netlist_.faults.try_emplace(id, model::CardFault{where, std::move(reason), cause});
}

// Cards behind `first`, up to the last one read, that count as not read for its fault.
void CardsReader::fail_behind(model::CardId first) {
  for (auto i = first.value + 1; i < netlist_.cards.size(); ++i) {
    const model::CardFate fate = netlist_.cards[i].fate;
    if (fate != model::CardFate::skipped) set_fault(model::CardId{i}, netlist_.span(first), {}, first);
  }
}

// The names that a .param card which is not read may give values to, whatever else is on it: what stands before an
// equals sign, and the first word.
std::vector<model::Word> CardsReader::given_names(const Card& card) {
  const std::string_view text = card.between(card.begin(), card.end());
  std::vector<model::Word> names;
  const auto add = [&](std::string_view name) {
    if (name.empty()) return;
    const auto offset = card.begin() + static_cast<std::uint32_t>(name.data() - text.data());
    if (names.empty() || names.front().offset != offset) names.push_back({reading_.names.intern(name), offset});
  };
  if (card.size() > 1) add(name_before(text, card.token(1).end - card.begin()));
  for (auto at = text.find('='); at != std::string_view::npos; at = text.find('=', at + 1)) add(name_before(text, at));
  return names;
}

CardsReader::Unread CardsReader::unread(const Card& card, model::CardId id) {
  if (card.size() == 0) return {};
  if (card.is(0, ".param") || card.is(0, ".params") || card.is(0, ".parameter")) return {id, given_names(card), {}, {}};
  if (card.size() < 2 || card.is(1, TokenKind::equals)) return {};
  if (card.is(0, ".model")) return {id, {}, card.name(1), {}};
  if (card.is(0, ".subckt")) return {id, {}, {}, card.name(1)};
  return {};
}

void CardsReader::leave_broken(const Unread& unread, model::ScopeId scope) {
  model::Scope& in = netlist_.scopes[scope.index()];
  for (const model::Word& name : unread.parameters) in.parameters.push_back({name, {}, unread.card, true});
  if (unread.model.valid()) in.models.push_back({unread.model, {}, unread.card, {}, true});
  if (!unread.subcircuit.valid()) return;
  const model::ScopeId made{static_cast<std::uint32_t>(netlist_.scopes.size())};
  in.scopes.push_back(made);
  model::Scope& broken = netlist_.scopes.emplace_back();
  broken.name = unread.subcircuit;
  broken.card = unread.card;
  broken.parent = scope;
  broken.broken = true;
}

// Where an .ends is missing nobody knows which of the cards behind the header are the subcircuit's and which the
// board's: none of them counts as read, and what they define is known to neither.
void CardsReader::close_scopes() {
  if (open_.size() == 1) return;
  const model::ScopeId outermost = open_[1];
  for (; open_.size() > 1; open_.pop_back()) {
    const model::Scope& left = scope();
    if (netlist_.cards[left.card.index()].fate == model::CardFate::error) continue;  // told already
    const std::string reason = fmt::format("the subcircuit {} has no .ends, so no card from here on counts as read",
                                           base::printable_short(reading_.names.text(left.name)));
    set_fault(left.card, netlist_.span(left.card), reason, {});
    say(base::Level::error, left.card, netlist_.span(left.card), reason);
  }
  fail_behind(netlist_.scopes[outermost.index()].card);
  for (std::size_t i = outermost.index(); i < netlist_.scopes.size(); ++i) {
    model::Scope& swallowed = netlist_.scopes[i];
    swallowed.broken = true;
    for (const model::ParameterCard& card : swallowed.parameters)
      netlist_.scopes[0].parameters.push_back({card.name, {}, card.card, true});
    for (const model::ModelCard& card : swallowed.models)
      netlist_.scopes[0].models.push_back({card.name, {}, card.card, {}, true});
  }
}

// Likewise a control block without its end.
void CardsReader::fail_control() {
  const File& now = file();
  const std::string reason = ".control has no .endc, so no card from here on counts as read";
  set_fault(now.control, netlist_.span(now.control), reason, {});
  say(base::Level::error, now.control, netlist_.span(now.control), reason);
  for (auto i = now.control.value + 1; i < netlist_.cards.size(); ++i)
    set_fault(model::CardId{i}, netlist_.span(now.control), {}, now.control);
  for (const Unread& unread : now.control_unread) leave_broken(unread, open_.back());
}

}  // namespace parse
