// Which reader a card goes to, and which cards are passed over.
#include <algorithm>
#include <array>
#include <fmt/format.h>
#include <fmt/ranges.h>

#include "base/text.hpp"
#include "parse/cards/reader.hpp"

namespace parse {
namespace {

// Analyses, output and options: an audit has its own.
constexpr std::array analyses{
    ".ac",       ".alter",        ".backanno", ".csparam", ".data",       ".dc",       ".disto",
    ".four",     ".fft",          ".hb",       ".ic",      ".loadbias",   ".meas",     ".measure",
    ".net",      ".nodeset",      ".noise",    ".op",      ".opt",        ".option",   ".options",
    ".plot",     ".pol",          ".print",    ".probe",   ".pss",        ".pz",       ".save",
    ".savebias", ".sens",         ".sp",       ".step",    ".temp",       ".tf",       ".title",
    ".tran",     ".wave",         ".width",    ".mc",      ".wcase",      ".stimulus", ".distribution",
    ".machine",  ".ends_machine", ".text",     ".aliases", ".endaliases", ".enddata",  ".external"};

constexpr std::array followed{".subckt", ".ends",   ".param", ".parameter", ".params", ".model",   ".include",
                              ".inc",    ".lib",    ".endl",  ".global",    ".end",    ".control", ".endc",
                              ".if",     ".elseif", ".else",  ".endif",     ".func"};

std::string_view analysis_name(const Card& card) {
  for (const std::string_view known : analyses) {
    if (card.is(0, known)) return known;
  }
  return {};
}

std::string nearest_dot(std::string_view wanted) {
  std::vector<std::string_view> known(followed.begin(), followed.end());
  known.insert(known.end(), analyses.begin(), analyses.end());
  const std::string name = base::folded(wanted);
  const std::string_view nearest = base::nearest_name(name, known);
  return nearest.empty() ? std::string() : fmt::format("; did you mean {}?", nearest);
}

bool is_any_of(const Card& card, std::initializer_list<std::string_view> words) {
  return std::any_of(words.begin(), words.end(), [&card](std::string_view word) { return card.is(0, word); });
}

}  // namespace

// Cards in control blocks, behind .end, and in other sections of a library.
bool CardsReader::is_passed_over(const Card& card, model::CardId id) {
  File& now = file();
  if (now.in_control) {
    set_fate(id, model::CardFate::skipped);
    if (card.is(0, ".endc")) {
      now.in_control = false;
    } else {
      ++now.control_cards;
      now.control_unread.push_back(unread(card, id));
    }
    if (!now.in_control) {
      say(base::Level::note, now.control, netlist_.span(now.control),
          fmt::format("a control block of {} line{} is skipped: nothing in it is run", now.control_cards,
                      now.control_cards == 1 ? "" : "s"));
    }
    return true;
  }
  if (now.ended) {
    if (now.after_end++ == 0) now.first_after_end = id;
    set_fate(id, model::CardFate::skipped);
    return true;
  }
  const bool outside = !now.section.empty() ? !now.in_section : now.in_other_section;
  if (!outside || is_any_of(card, {".lib", ".endl"})) return false;
  netlist_.cards.pop_back();  // not part of this netlist
  return true;
}

void CardsReader::read_card(Card& card, model::CardId id) {
  if (card.text(0).front() == '.') return read_dot(card, id);
  if (conditionals_ > 0) return set_fault(id, netlist_.span(conditional_), {}, conditional_);
  read_element_card(card, id);
}

void CardsReader::read_element_card(Card& card, model::CardId id) {
  const char letter = static_cast<char>(card.text(0).front() | 0x20);
  const bool high = static_cast<unsigned char>(card.text(0).front()) >= 0x80U;
  if (card.text(0).front() == '+') return card.fail(0, "a continuation line stands without a card before it");
  if (card.token(0).kind != TokenKind::plain || (!high && (letter < 'a' || letter > 'z'))) {
    return card.fail(
        0, fmt::format("expected an element, which begins with a letter, or a dot card, found {}", card.found(0)));
  }
  for (std::size_t i = 1; i <= 2 && i < card.size(); ++i) card.reading().names.prepare(card.text(i));
  model::ElementCard element;
  element.name = card.name(0);
  element.card = id;
  element.letter = high ? '?' : letter;
  const Outcome outcome = read_element(card, nullptr, element);
  if (card.failed() || outcome == Outcome::nothing) return;
  auto& elements = scope().elements;
  if (outcome == Outcome::later) {
    later_.push_back({open_.back(), static_cast<std::uint32_t>(elements.size())});
    for (std::size_t i = 1; i < card.size(); ++i)
      static_cast<void>(card.name(i));  // so that the first spelling is the first in the text
  }
  const bool known_letter = std::string_view("bcdefghijklmqrsvwx").find(element.letter) != std::string_view::npos;
  if (!known_letter) set_fate(id, model::CardFate::unmodelled);
  elements.push_back(element);
}

void CardsReader::pass_analysis(const Card& card, model::CardId id) {
  File& now = file();
  set_fate(id, model::CardFate::skipped);
  if (now.unused_cards++ == 0) now.first_unused = id;
  const std::string_view name = analysis_name(card);
  if (std::find(now.unused.begin(), now.unused.end(), name) == now.unused.end()) now.unused.push_back(name);
}

void CardsReader::read_dot(Card& card, model::CardId id) {
  if (card.is(0, ".if") && conditionals_++ == 0) {
    conditional_ = id;
    return card.fail(0,
                     "conditional cards are not followed by this version: all cards from here to .endif are not read");
  }
  if (conditionals_ > 0) {
    if (card.is(0, ".endif")) --conditionals_;
    leave_broken(unread(card, id), open_.back());
    return set_fault(id, netlist_.span(conditional_), {}, conditional_);
  }
  if (card.is(0, ".subckt")) return read_subcircuit(card, id);
  if (card.is(0, ".ends")) return read_ends(card, id);
  if (is_any_of(card, {".param", ".params", ".parameter"})) return read_parameters(card, id);
  if (card.is(0, ".model")) return read_model(card, id);
  if (is_any_of(card, {".include", ".inc"})) return read_include(card, id);
  if (card.is(0, ".lib")) return read_library(card, id);
  if (card.is(0, ".endl")) return read_endl(card, id);
  if (card.is(0, ".global")) return read_global(card, id);
  if (card.is(0, ".end")) {
    file().ended = true;
    return;
  }
  if (card.is(0, ".control")) {
    set_fate(id, model::CardFate::skipped);
    file().in_control = true;
    file().control = id;
    file().control_cards = 0;
    file().control_unread.clear();
    return;
  }
  if (!analysis_name(card).empty()) return pass_analysis(card, id);
  if (card.is(0, ".func")) return card.fail(0, "functions of the netlist are not followed by this version");
  if (is_any_of(card, {".elseif", ".else", ".endif"}))
    return card.fail(0, fmt::format("{} stands without .if before it", card.text(0)));
  if (card.is(0, ".endc")) return card.fail(0, ".endc stands without .control before it");
  card.fail(0, fmt::format("unknown card {}{}", card.found(0), nearest_dot(card.text(0))));
}

// What there is to say at a file's end.
void CardsReader::finish_file() {
  const File& now = file();
  if (now.in_control) fail_control();
  if (now.after_end > 0) {
    say(base::Level::warning, now.first_after_end, netlist_.span(now.first_after_end),
        fmt::format("{} card{} behind .end, from this one on, {} skipped", now.after_end, now.after_end == 1 ? "" : "s",
                    now.after_end == 1 ? "is" : "are"));
  }
  if (now.unused_cards > 0) {
    say(base::Level::note, now.first_unused, netlist_.span(now.first_unused),
        fmt::format("analyses, options and output are not followed: {} ({} card{})", fmt::join(now.unused, ", "),
                    now.unused_cards, now.unused_cards == 1 ? "" : "s"));
  }
}

}  // namespace parse
