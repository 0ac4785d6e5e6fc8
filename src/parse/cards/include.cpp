// Included files and sections of libraries.
#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"
#include "parse/cards/reader.hpp"

namespace parse {
namespace {

// A path in quotes or without.
std::string path_text(std::string_view text) {
  const bool quoted = text.size() >= 2 && (text.front() == '"' || text.front() == '\'') && text.back() == text.front();
  return std::string(quoted ? text.substr(1, text.size() - 2) : text);
}

// Whether a file holds sections: then a .lib with one word begins one.
bool has_sections(std::string_view bytes) {
  constexpr std::string_view end = ".endl";
  for (auto at = bytes.find('.'); at != std::string_view::npos; at = bytes.find('.', at + 1)) {
    if (base::same_name(bytes.substr(at, end.size()), end)) return true;
  }
  return false;
}

}  // namespace

// Words [first, last) name the file. Without quotes a path may hold blanks: tried as one where the first word leads
// nowhere.
void CardsReader::include_file(Card& card, model::CardId id, std::size_t first, std::size_t last, std::string section) {
  const source::Place asked{card.source(), card.begin()};
  if (includes_ >= limits_.includes) {
    netlist_.cut = fmt::format("more files are included than the limit includes = {}", limits_.includes);
    return card.fail(first, netlist_.cut);
  }
  if (files_.size() > limits_.include_depth) {
    netlist_.cut =
        fmt::format("files include one another deeper than the limit include_depth = {}", limits_.include_depth);
    return card.fail(first, netlist_.cut);
  }
  const std::string one = path_text(card.text(first));
  const std::string all = path_text(card.between(card.token(first).begin, card.token(last - 1).end));
  base::Result<source::SourceId> wanted = include_(one, asked);
  if (!wanted.ok() && all != one) {
    if (auto whole = include_(all, asked); whole.ok()) wanted = whole;
  }
  if (!wanted.ok()) {
    return say_missing(
        id, card.span(first, last - 1),
        fmt::format("cannot include \"{}\": {}", base::printable_short(all), base::printable(wanted.error())));
  }
  ++includes_;
  if (!may_include(card, *wanted) || read_file(*wanted, 0, section)) return;
  say_missing(id, card.span(last, last),
              fmt::format("\"{}\" has no section {}", base::printable_short(one), base::printable_short(section)));
}

void CardsReader::say_missing(model::CardId id, source::Span where, std::string what) {
  set_fate(id, model::CardFate::skipped);
  netlist_.missing_includes.push_back({id, where, what});
  say(base::Level::warning, id, where, std::move(what));
}

// A file that is open already, under the same name and with the same text, would include itself for ever.
bool CardsReader::may_include(Card& card, source::SourceId wanted) {
  const source::SourceText& text = sources_[wanted];
  const bool open = std::any_of(files_.begin(), files_.end(), [&](const File& other) {
    return sources_[other.source].name == text.name && other.bytes == text.bytes;
  });
  if (open) card.fail(1, fmt::format("{} includes itself", base::printable_short(text.name)));
  return !open;
}

void CardsReader::read_include(Card& card, model::CardId id) {
  if (card.size() < 2)
    return card.fail(1, fmt::format("expected a file behind {}, found the end of the card", card.text(0)));
  include_file(card, id, 1, card.size(), {});
}

// .lib FILE SECTION reads a section of a library; .lib SECTION begins one inside a library; .lib FILE includes all of a
// file.
void CardsReader::read_library(Card& card, model::CardId id) {
  File& now = file();
  if (!now.sections) now.sections = has_sections(now.bytes);
  const bool begins_section = card.size() == 2 && *now.sections;
  if (begins_section && now.section.empty()) {
    now.in_other_section = true;
    return set_fate(id, model::CardFate::skipped);
  }
  if (begins_section) {
    now.in_section = !now.section_found && card.is(1, now.section);
    now.section_found = now.section_found || now.in_section;
    return;
  }
  if ((!now.section.empty() && !now.in_section) || now.in_other_section) return;
  if (card.size() < 2) return card.fail(1, "expected a file behind .lib, found the end of the card");
  // The name of a section has no point or slash in it: else it is the rest of a path with blanks.
  const bool with_section = card.size() == 3 && card.text(2).find_first_of("./\\") == std::string_view::npos;
  include_file(card, id, 1, with_section ? 2 : card.size(), with_section ? std::string(card.text(2)) : std::string());
}

void CardsReader::read_endl(Card& card, model::CardId /*id*/) {
  File& now = file();
  if (!now.section.empty() && !now.in_section) return;
  if (!now.in_section && !now.in_other_section) return card.fail(0, ".endl stands without .lib before it");
  now.in_section = now.in_other_section = false;
}

}  // namespace parse
