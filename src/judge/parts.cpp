#include "judge/parts.hpp"

#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"

namespace judge {

const model::Element* element_of(const BoardView& board, model::ElementId element) {
  const bool known = board.circuit != nullptr && element.valid() && element.index() < board.circuit->elements.size();
  return known ? &board.circuit->elements[element.index()] : nullptr;
}

std::string part_name(const BoardView& board, model::ElementId element) {
  const model::Element* part = element_of(board, element);
  if (part == nullptr || board.names == nullptr || !part->name.valid()) return "a part";
  return base::printable_short(board.names->text(part->name));
}

std::string net_name(const BoardView& board, model::NetId net) {
  if (net == model::ground) return "0";
  const bool known =
      board.circuit != nullptr && board.names != nullptr && net.valid() && net.index() < board.circuit->nets.size();
  if (!known || !board.circuit->nets[net.index()].name.valid()) return "a net";
  return base::printable_short(board.names->text(board.circuit->nets[net.index()].name));
}

source::Span part_place(const BoardView& board, model::ElementId element) {
  const model::Element* part = element_of(board, element);
  const bool known = part != nullptr && board.netlist != nullptr && part->card.valid() &&
                     part->card.index() < board.netlist->cards.size();
  return known ? board.netlist->span(part->card) : source::Span{};
}

std::string quoted(const source::Sources& sources, source::Span span) {
  if (!span.valid() || span.begin.source.index() >= sources.size()) return {};
  std::string_view text = sources.text(span);
  text = text.substr(0, text.find_first_of("\r\n"));
  return text.empty() ? std::string{} : fmt::format("\"{}\"", base::printable_short(text));
}

std::string toml_key(std::string_view name) {
  const auto bare = [](char c) {
    return (c >= 'A' && c <= 'Z') || (c >= 'a' && c <= 'z') || (c >= '0' && c <= '9') || c == '_' || c == '-';
  };
  if (!name.empty() && std::all_of(name.begin(), name.end(), bare)) return std::string{name};
  std::string text = "\"";
  for (const char c : name) {
    if (c == '"' || c == '\\') text += '\\';
    text += c;
  }
  return base::printable(text + "\"");
}

}  // namespace judge
