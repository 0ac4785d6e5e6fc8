#include "parse/netlist.hpp"

#include <algorithm>
#include <cstring>
#include <fmt/format.h>
#include <utility>

#include "base/text.hpp"
#include "parse/cards/reader.hpp"
#include "parse/cards/values.hpp"

namespace parse {
namespace {

constexpr std::string_view utf8_mark = "\xEF\xBB\xBF";
constexpr std::size_t bytes_per_card = 16;  // about the least that a card with its line end takes
constexpr std::size_t bytes_per_name = 12;  // about the least for a name seen for the first time, all else counted in

std::string_view first_line(std::string_view text) {
  return text.substr(0, text.find_first_of("\r\n"));
}

std::uint32_t behind_line(std::string_view bytes, std::size_t line_end) {
  if (line_end + 1 < bytes.size() && bytes[line_end] == '\r' && bytes[line_end + 1] == '\n') ++line_end;
  return static_cast<std::uint32_t>(std::min(line_end + 1, bytes.size()));
}

// The first line from `begin` on that is longer than `most`, as [begin, end); end 0 where there is none. It goes from
// line end to line end in steps of `most`, so that few bytes are looked at.
std::pair<std::uint32_t, std::uint32_t> next_long_line(std::string_view bytes, std::uint32_t begin,
                                                       std::uint64_t most) {
  while (bytes.size() - begin > most) {
    const auto last_end = bytes.substr(begin, most + 1).find_last_of("\r\n");
    if (last_end == std::string_view::npos)
      return {begin, static_cast<std::uint32_t>(std::min(bytes.find_first_of("\r\n", begin + most), bytes.size()))};
    begin += static_cast<std::uint32_t>(last_end) + 1;
  }
  return {0, 0};
}

// Cards that move what is open do so even where they cannot be read: what follows them is not what stands before.
bool opens_or_closes(const Card& card) {
  for (const std::string_view word : {".subckt", ".ends", ".control", ".if", ".endif"}) {
    if (card.is(0, word)) return true;
  }
  return false;
}

char first_sign(std::string_view text) {
  const auto at = text.find_first_not_of(" \t\r\n");
  return at == std::string_view::npos ? '\0' : text[at];
}

// Whether a title reads as a card: a designator with its number and at least three words more, a value as the third
// where the letter wants one; or a dot card.
bool looks_like_card(Card& card) {
  if (card.size() == 0 || card.token(0).kind != TokenKind::plain) return false;
  const std::string_view name = card.text(0);
  if (name.front() == '.') {
    for (const std::string_view known :
         {".param", ".subckt", ".include", ".inc", ".lib", ".model", ".ends", ".global"}) {
      if (card.is(0, known)) return true;
    }
    return false;
  }
  const bool designator =
      name.size() > 1 &&
      std::string_view("rclvidqjmx").find(static_cast<char>(name[0] | 0x20)) != std::string_view::npos &&
      name.substr(1).find_first_not_of("0123456789") == std::string_view::npos;
  if (!designator || card.size() < 4) return false;
  return std::string_view("rclvi").find(static_cast<char>(name[0] | 0x20)) == std::string_view::npos ||
         is_value(card, 3);
}

}  // namespace

CardsReader::CardsReader(source::Sources& sources, base::NameTable& names, const Includer& include,
                         const source::Limits& limits, model::Netlist& netlist)
    : sources_(sources), include_(include), limits_(limits), netlist_(netlist), reading_{names, limits, netlist} {
  netlist_.scopes.emplace_back();
  open_.push_back(model::ScopeId{0});
}

model::CardId CardsReader::add_card(std::uint32_t begin, std::uint32_t end, model::CardFate fate) {
  netlist_.cards.push_back({file().source, begin, end, fate});
  return model::CardId{static_cast<std::uint32_t>(netlist_.cards.size() - 1)};
}

void CardsReader::say(base::Level level, model::CardId card, source::Span where, std::string message) {
  said_.push_back({card, {level, where, std::move(message)}});
}

void CardsReader::say_fault(const Card& card, model::CardId id) {
  const Fault& fault = *card.fault();
  const source::Span where{{card.source(), fault.offset}, fault.length};
  set_fault(id, where, fault.message, {});
  say(base::Level::error, id, where, fault.message);
}

source::Diagnostics CardsReader::diagnostics() && {
  std::stable_sort(said_.begin(), said_.end(), [](const Said& a, const Said& b) { return a.card < b.card; });
  source::Diagnostics out;
  out.reserve(said_.size());
  for (Said& said : said_) out.push_back(std::move(said.diagnostic));
  return out;
}

void CardsReader::take(const LexedCard& lexed) {
  const model::CardId id = add_card(lexed.begin, lexed.end, model::CardFate::modelled);
  Card card(reading_, file().source, file().bytes, lexed);
  if (is_passed_over(card, id)) return;
  if (lexed.fault != nullptr) {
    card.fail_at(lexed.fault_offset, 1, lexed.fault);
  } else if (file().cut_at != 0 && lexed.end <= file().cut_at &&
             first_sign(file().bytes.substr(lexed.end, file().cut_at - lexed.end)) == '\0') {
    card.fail_at(file().cut_at, 0,
                 fmt::format("the card goes on in a line longer than the limit line_bytes = {}", limits_.line_bytes));
  } else if (card.size() == 0) {
    card.fail_at(card.begin(), 1,
                 fmt::format("expected an element or a dot card, found \"{}\"",
                             base::printable_short(card.between(card.begin(), card.end()), 40)));
  }
  const bool readable = !card.failed();
  if (readable || opens_or_closes(card)) read_card(card, id);
  if (!card.failed()) return;
  say_fault(card, id);
  if (!card.is(0, ".subckt")) leave_broken(unread(card, id), open_.back());
}

void CardsReader::take_executable(std::uint32_t offset) {
  const model::CardId next{static_cast<std::uint32_t>(netlist_.cards.size())};
  say(base::Level::note, next, {{file().source, offset}, 2},
      "SPICE runs a line that begins with *# as a command; it is skipped here");
}

void CardsReader::read_long_line(std::uint32_t begin, std::uint32_t end) {
  const model::CardId id = add_card(begin, end, model::CardFate::error);
  const std::string reason =
      fmt::format("the line has {} bytes, more than the limit line_bytes = {}", end - begin, limits_.line_bytes);
  set_fault(id, {{file().source, begin}, 0}, reason, {});
  say(base::Level::error, id, {{file().source, begin}, 0}, reason);
}

// All lines of the file that is open, from `begin` on. Lines beyond the limit never reach the lexer.
void CardsReader::read_lines(std::uint32_t begin) {
  const LexTaker taker{[this](const LexedCard& card) { take(card); },
                       [this](std::uint32_t offset) { take_executable(offset); }};
  const std::string_view bytes = file().bytes;
  while (true) {
    const auto [long_begin, long_end] = next_long_line(bytes, begin, limits_.line_bytes);
    const auto end = long_end == 0 ? static_cast<std::uint32_t>(bytes.size()) : long_begin;
    file().cut_at =
        long_end != 0 && first_sign(bytes.substr(long_begin, long_end - long_begin)) == '+' ? long_begin : 0;
    lex_cards(bytes, begin, end, taker);
    if (long_end == 0) return;
    read_long_line(long_begin, long_end);
    begin = behind_line(bytes, long_end);
  }
}

bool CardsReader::read_file(source::SourceId id, std::uint32_t begin, std::string section) {
  const std::string_view bytes = sources_[id].bytes;
  File file;
  file.source = id;
  file.bytes = bytes;
  file.section = std::move(section);
  files_.push_back(std::move(file));
  if (begin == 0 && bytes.substr(0, utf8_mark.size()) == utf8_mark)
    begin = static_cast<std::uint32_t>(utf8_mark.size());
  read_lines(begin);
  finish_file();
  const bool found = files_.back().section.empty() || files_.back().section_found;
  files_.pop_back();
  return found;
}

// The first line of the root names the netlist: it is no card, whatever it looks like.
void CardsReader::read_title(std::string_view title, source::SourceId root) {
  if (title.empty() || title.front() == '*') return;
  const auto offset = static_cast<std::uint32_t>(title.data() - sources_[root].bytes.data());
  bool card_like = false;
  const LexTaker taker{[&](const LexedCard& lexed) {
                         Card card(reading_, root, sources_[root].bytes, lexed);
                         card_like = lexed.fault == nullptr && looks_like_card(card);
                       },
                       [](std::uint32_t) {}};
  if (title.size() <= 1000)
    lex_cards(sources_[root].bytes, offset, offset + static_cast<std::uint32_t>(title.size()), taker);
  if (!card_like) return;
  say(base::Level::note, model::CardId{0}, {{root, offset}, static_cast<std::uint32_t>(title.size())},
      "SPICE takes the first line as the title: this card is not read; put a title line before it");
}

// Files that are no netlist at all: told once, not card by card.
bool CardsReader::is_foreign(std::string_view bytes, source::SourceId root) {
  const auto refuse = [&](std::string_view what) {
    say(base::Level::error, model::CardId{0}, {{root, 0}, 0}, fmt::format("this is no SPICE netlist: {}", what));
    return true;
  };
  if (bytes.substr(0, 2) == "\xFF\xFE" || bytes.substr(0, 2) == "\xFE\xFF")
    return refuse("it is text in UTF-16; save it as UTF-8");
  const std::string_view rest = bytes.substr(std::min(first_line(bytes).size(), bytes.size()));
  const char first = first_sign(first_line(bytes));
  if (bytes.substr(0, 5) == "<?xml" || (first == '<' && first_sign(rest) == '<')) return refuse("it looks like XML");
  if (first == '(' && first_sign(rest) == '(') return refuse("it looks like a list in brackets");
  return false;
}

void CardsReader::read_root(source::SourceId root) {
  netlist_.root = root;
  std::string_view bytes = sources_[root].bytes;
  if (bytes.substr(0, utf8_mark.size()) == utf8_mark) bytes.remove_prefix(utf8_mark.size());
  if (is_foreign(bytes, root)) return;
  if (bytes.size() > 4096) {
    netlist_.cards.reserve(bytes.size() / bytes_per_card);
    netlist_.words.reserve(bytes.size() / bytes_per_card * 2);
    netlist_.scopes[0].elements.reserve(bytes.size() / bytes_per_card);
    reading_.names.reserve(bytes.size() / bytes_per_name);
  }
  const std::string_view title = first_line(bytes);
  read_title(title, root);
  const auto line_end = static_cast<std::size_t>(title.data() - sources_[root].bytes.data()) + title.size();
  read_file(root, behind_line(sources_[root].bytes, line_end), {});
  close_scopes();
  find_duplicates();
  read_later();
}

// Cards that waited for the names of the whole netlist are lexed once more: they are few.
void CardsReader::read_later() {
  if (later_.empty()) return;
  const KnownNames known(netlist_);
  for (const Later& later : later_) {
    model::ElementCard& element = netlist_.scopes[later.scope.index()].elements[later.element];
    const model::CardRecord record = netlist_.cards[element.card.index()];
    const std::string_view bytes = sources_[record.source].bytes;
    const LexTaker taker{[&](const LexedCard& lexed) {
                           Card card(reading_, record.source, bytes, lexed);
                           static_cast<void>(read_element(card, &known, element));
                           if (element.letter == '?') set_fate(element.card, model::CardFate::unmodelled);
                           if (!card.failed()) return;
                           say_fault(card, element.card);
                           element.name = {};
                         },
                         [](std::uint32_t) {}};
    lex_cards(bytes, record.begin, record.end, taker);
  }
  for (model::Scope& scope : netlist_.scopes) {
    const auto failed = [](const model::ElementCard& element) { return !element.name.valid(); };
    scope.elements.erase(std::remove_if(scope.elements.begin(), scope.elements.end(), failed), scope.elements.end());
  }
}

model::Netlist read_netlist(source::SourceId root, source::Sources& sources, base::NameTable& names,
                            const Includer& include, const source::Limits& limits, source::Diagnostics& diagnostics) {
  model::Netlist netlist;
  CardsReader reader(sources, names, include, limits, netlist);
  reader.read_root(root);
  source::Diagnostics said = std::move(reader).diagnostics();
  diagnostics.insert(diagnostics.end(), std::make_move_iterator(said.begin()), std::make_move_iterator(said.end()));
  return netlist;
}

}  // namespace parse
