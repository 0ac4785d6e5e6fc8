#include "divide/touch.hpp"

#include <algorithm>
#include <array>
#include <cctype>

#include "base/names.hpp"

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

}  // namespace

bool is_taken_as_open(std::string_view name) {
  constexpr std::array<std::string_view, 5> open_classes{"j", "p", "tp", "c", "d"};
  const std::string_view own = last_component(name);
  const auto end = std::find_if_not(own.begin(), own.end(), is_letter);
  const std::string letters = base::folded(own.substr(0, static_cast<std::size_t>(end - own.begin())));
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
      touches.push_back({element, net, is_taken_as_open(graph.names().text(element))});
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

model::CardId BrokenCards::touching(const Graph& graph, const Surroundings& around,
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
  for (const Card& card : cards_)
    if (std::any_of(card.words.begin(), card.words.end(),
                    [&](const std::string& word) { return wanted.contains(word); }))
      return card.id;
  return {};
}

}  // namespace divide
