#include "divide/touch.hpp"

#include <algorithm>
#include <array>
#include <cctype>
#include <fmt/format.h>
#include <set>

#include "base/names.hpp"
#include "base/text.hpp"

namespace divide {
namespace {

std::string_view last_component(std::string_view name) {
  const auto dot = name.rfind('.');
  return dot == std::string_view::npos ? name : name.substr(dot + 1);
}

bool is_letter(char c) {
  return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z');
}

constexpr std::string_view word_ends = " \t\r\n(),='\"{}+-*/";

// Every piece of a card that could be a net: cut at blanks and separators, and at blanks alone (nets hold + - / too).
void add_words(std::string_view text, std::string_view ends, std::unordered_set<std::string>& words) {
  for (std::size_t at = 0; at < text.size();) {
    const std::size_t begin = text.find_first_not_of(ends, at);
    if (begin == std::string_view::npos) return;
    const std::size_t end = std::min(text.find_first_of(ends, begin), text.size());
    words.insert(base::folded(text.substr(begin, end - begin)));
    at = end;
  }
}

std::string parts_sentence(const std::vector<std::string>& parts) {
  constexpr std::size_t most = 6;
  std::string list;
  for (std::size_t i = 0; i < std::min(parts.size(), most); ++i) list += (i == 0 ? "" : ", ") + parts[i];
  if (parts.size() > most) list += fmt::format(" and {} more", parts.size() - most);
  const bool one = parts.size() == 1;
  return fmt::format("what {} {} is not known, and {} in the way: declare a stand-in for {}", list, one ? "does" : "do",
                     one ? "it is" : "they are", one ? "it" : "each");
}

std::string place_text(const source::Sources& sources, source::Place place) {
  return fmt::format("{}:{}", base::printable_short(sources[place.source].name), sources.position(place).line);
}

// A sentence for each card, and one for all that a header without its end has taken.
std::vector<std::string> card_sentences(const std::set<model::CardId>& cards, const model::Netlist& netlist,
                                        const source::Sources& sources) {
  constexpr std::size_t most = 6;
  std::vector<std::string> sentences;
  std::set<model::CardId> causes;
  bool more = false;
  for (const model::CardId card : cards) {
    const auto own = netlist.faults.find(card);
    const model::CardFault fault = own == netlist.faults.end() ? model::CardFault{} : own->second;
    const bool taken = fault.reason.empty() && fault.cause.valid();
    if (!causes.insert(taken ? fault.cause : card).second) continue;
    if (sentences.size() == most) {
      more = true;
      break;
    }
    std::string text = fmt::format("the card at {} could not be read and names a net of its network",
                                   place_text(sources, netlist.span(card).begin));
    std::string reason = fault.reason;
    if (taken) {
      const auto cause = netlist.faults.find(fault.cause);
      if (cause != netlist.faults.end()) reason = cause->second.reason;
    }
    if (!reason.empty()) text += ": " + reason;
    if (fault.cause.valid()) text += fmt::format(" ({})", place_text(sources, netlist.span(fault.cause).begin));
    sentences.push_back(std::move(text));
  }
  if (more) sentences.emplace_back("more cards of its network could not be read");
  return sentences;
}

}  // namespace

bool is_taken_as_open(std::string_view name, char letter) {
  constexpr std::array<std::string_view, 5> open_classes{"j", "p", "tp", "c", "d"};
  const std::string_view own = last_component(name);
  const auto end = std::find_if_not(own.begin(), own.end(), is_letter);
  std::string letters = base::folded(own.substr(0, static_cast<std::size_t>(end - own.begin())));
  // An instance card is XJ1 where the connector is J1.
  if (letter == 'x' && letters.size() > 1 && letters.front() == 'x') letters.erase(0, 1);
  return std::find(open_classes.begin(), open_classes.end(), letters) != open_classes.end();
}

std::vector<model::UnmodelledTouch> find_touches(const Graph& graph, const Surroundings& around) {
  const std::unordered_set<Node> nodes(around.nodes.begin(), around.nodes.end());
  const auto& converters = graph.board().converters;
  std::vector<model::UnmodelledTouch> touches;
  for (const Edge edge : around.idle) {
    if (!std::holds_alternative<model::Unmodelled>(graph.part(edge))) continue;
    const model::ElementId element = graph.element(edge);
    if (std::find(converters.begin(), converters.end(), element) != converters.end()) continue;
    const auto& part = graph.circuit().elements[element.index()];
    for (std::size_t i = 0; i < part.pin_count; ++i) {
      const model::NetId net = graph.circuit().pin(part, i);
      if (!nodes.contains(graph.nodes().of(net))) continue;
      touches.push_back({element, net, is_taken_as_open(graph.names().text(element), part.letter)});
      break;
    }
  }
  return touches;
}

BrokenCards::BrokenCards(const model::Netlist& netlist, const source::Sources& sources, const base::NameTable& names)
    : names_(names) {
  for (std::uint32_t i = 0; i < netlist.cards.size(); ++i) {
    if (netlist.cards[i].fate != model::CardFate::error) continue;
    Card card{model::CardId{i}, {}};
    const std::string_view text = sources.text(netlist.span(card.id));
    add_words(text, word_ends, card.words);
    add_words(text, word_ends.substr(0, 4), card.words);
    add_words(text, word_ends.substr(0, 9), card.words);
    cards_.push_back(std::move(card));
  }
}

std::vector<model::CardId> BrokenCards::touching(const Graph& graph, const Surroundings& around,
                                                 const model::Netlist& netlist) const {
  if (cards_.empty()) return {};
  std::unordered_set<std::string> wanted;
  const std::unordered_set<Node> nodes(around.nodes.begin(), around.nodes.end());
  for (const Node node : around.nodes)
    for (const model::NetId net : graph.nodes().nets(node)) {
      wanted.insert(base::folded(graph.names().text(net)));
      wanted.insert(base::folded(last_component(graph.names().text(net))));
    }
  for (const model::Instance& instance : graph.circuit().instances)
    for (const model::Scope& scope : netlist.scopes) {
      if (scope.name != instance.subcircuit || !scope.parent.valid()) continue;
      for (std::size_t i = 0; i < std::min<std::size_t>(instance.pin_count, scope.ports.count); ++i)
        if (nodes.contains(graph.nodes().of(graph.circuit().pin(instance, i))))
          wanted.insert(base::folded(names_.text(netlist.words[scope.ports.first + i].name)));
    }
  std::vector<model::CardId> found;
  constexpr std::size_t enough = 100;  // a junk file has as many broken cards as lines
  for (const Card& card : cards_) {
    const bool names_one = std::any_of(card.words.begin(), card.words.end(),
                                       [&](const std::string& word) { return wanted.contains(word); });
    if (names_one) found.push_back(card.id);
    if (found.size() == enough) break;
  }
  return found;
}

std::vector<std::string> obstacles(const Graph& graph, const Surroundings& around,
                                   const std::vector<model::UnmodelledTouch>& touches, const BrokenCards& broken,
                                   const model::Netlist& netlist, const source::Sources& sources) {
  std::vector<std::string> parts;
  std::set<model::CardId> cards;
  for (const auto& touch : touches) {
    const model::Element& element = graph.circuit().elements[touch.element.index()];
    if (std::get<model::Unmodelled>(element.part).why == model::Unmodelled::Why::broken_card)
      cards.insert(element.card);
    else if (!touch.taken_as_open)
      parts.push_back(base::printable_short(graph.names().text(touch.element)));
  }
  std::vector<std::string> sentences;
  if (!parts.empty()) sentences.push_back(parts_sentence(parts));
  for (const model::CardId card : broken.touching(graph, around, netlist)) cards.insert(card);
  const auto told = card_sentences(cards, netlist, sources);
  sentences.insert(sentences.end(), told.begin(), told.end());
  return sentences;
}

}  // namespace divide
