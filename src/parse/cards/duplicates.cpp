// Subcircuits and models that are defined twice in one scope: harmless where both say the same, as where a library is
// included twice; else nobody knows which is meant.
#include <fmt/format.h>
#include <unordered_map>

#include "base/names.hpp"
#include "base/text.hpp"
#include "parse/cards/reader.hpp"

namespace parse {
namespace {

// A card's text in small letters, its lines and blanks joined.
void append_text(std::string_view card, std::string& text) {
  for (const char c : base::folded(blanked(card))) {
    const bool blank = c == ' ' || c == '\t' || c == '\v' || c == '\f';
    if (!blank || (!text.empty() && text.back() != ' ')) text += blank ? ' ' : c;
  }
  text += '\n';
}

}  // namespace

std::string CardsReader::text_of(model::CardId first, model::CardId last) const {
  std::string text;
  for (auto i = first.value; i <= last.value; ++i) {
    const model::CardRecord& card = netlist_.cards[i];
    append_text(std::string_view(sources_[card.source].bytes).substr(card.begin, card.end - card.begin), text);
  }
  return text;
}

void CardsReader::compare(std::string_view what, const Defined& first, Defined& again) {
  if (first.broken || again.broken) return;  // told already
  const model::CardRecord& card = netlist_.cards[first.first.index()];
  const std::string name = base::printable_short(reading_.names.text(again.name));
  const bool as_long = first.last.value - first.first.value == again.last.value - again.first.value;
  if (as_long && text_of(first.first, first.last) == text_of(again.first, again.last)) {
    if (same_++ == 0) same_card_ = again.first;
    return;
  }
  again.broken = true;
  const std::string reason =
      fmt::format("{} {} stands twice and says something else at {}:{}", what, name,
                  base::printable_short(sources_[card.source].name), sources_.position({card.source, card.begin}).line);
  set_fault(again.first, netlist_.span(again.first), reason, {});
  say(base::Level::error, again.first, netlist_.span(again.first), reason);
}

void CardsReader::find_duplicates() {
  for (std::size_t i = 0; i < netlist_.scopes.size(); ++i) {
    std::unordered_map<base::NameId, Defined> subcircuits;
    for (const model::ScopeId id : netlist_.scopes[i].scopes) {
      model::Scope& scope = netlist_.scopes[id.index()];
      Defined now{scope.name, scope.card, scope.last.valid() ? scope.last : scope.card, scope.broken};
      const auto [at, is_new] = subcircuits.try_emplace(scope.name, now);
      if (!is_new) compare("subcircuit", at->second, now);
      scope.broken = now.broken;
    }
    std::unordered_map<base::NameId, Defined> models;
    for (model::ModelCard& card : netlist_.scopes[i].models) {
      Defined now{card.name, card.card, card.card, card.broken};
      const auto [at, is_new] = models.try_emplace(card.name, now);
      if (!is_new) compare("model", at->second, now);
      card.broken = now.broken;
    }
  }
  if (same_ == 0) return;
  const std::string more = same_ == 1 ? std::string() : fmt::format("; so it is with {} more", same_ - 1);
  say(base::Level::note, same_card_, netlist_.span(same_card_),
      fmt::format("this definition stands twice with the same text{}", more));
}

}  // namespace parse
