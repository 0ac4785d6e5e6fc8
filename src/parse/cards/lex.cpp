#include "parse/cards/lex.hpp"

#include <algorithm>

#include "grammar/netlist.hpp"

namespace parse {
namespace {

namespace pegtl = tao::pegtl;
namespace rules = grammar::netlist;
using Input = pegtl::memory_input<pegtl::tracking_mode::lazy, pegtl::eol::lf_crlf>;

struct State {
  const char* text;
  const LexTaker& taker;
  std::vector<Token> tokens;
  LexedCard card;
  std::uint32_t after_executable = 0;  // continuations are tried more than once: each such line is told once

  template <typename ActionInput>
  [[nodiscard]] std::uint32_t begin(const ActionInput& in) const {
    return static_cast<std::uint32_t>(in.begin() - text);
  }
  template <typename ActionInput>
  [[nodiscard]] std::uint32_t end(const ActionInput& in) const {
    return static_cast<std::uint32_t>(in.end() - text);
  }
};

template <typename Rule>
struct Act : pegtl::nothing<Rule> {};

template <TokenKind kind>
struct Take {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tokens.push_back({s.begin(in), s.end(in), kind});
    if constexpr (kind == TokenKind::braced || kind == TokenKind::quoted) {
      if (in.string_view().find_first_of("\r\n") != std::string_view::npos) s.card.continued = true;
    }
  }
};
template <>
struct Act<rules::plain> : Take<TokenKind::plain> {};
template <>
struct Act<rules::equals> : Take<TokenKind::equals> {};
template <>
struct Act<rules::braced> : Take<TokenKind::braced> {};
template <>
struct Act<rules::quoted> : Take<TokenKind::quoted> {};
template <>
struct Act<rules::text_in_quotes> : Take<TokenKind::text> {};

// The first fault of a card stands for all of them.
template <typename Rule>
struct Fault {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    if (s.card.fault != nullptr) return;
    s.card.fault = rules::error_text<Rule>;
    s.card.fault_offset = s.begin(in);
  }
};
template <>
struct Act<rules::unclosed_brace> : Fault<rules::unclosed_brace> {};
template <>
struct Act<rules::unclosed_quote> : Fault<rules::unclosed_quote> {};
template <>
struct Act<rules::stray_byte> : Fault<rules::stray_byte> {};

template <>
struct Act<rules::continuation> {
  static void apply0(State& s) { s.card.continued = true; }
};

template <>
struct Act<rules::executable_mark> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    if (s.begin(in) < s.after_executable) return;
    s.after_executable = s.end(in);
    s.taker.executable_comment(s.begin(in));
  }
};

// Of a card with a fault all of the text counts: what is lost there may name a net.
std::uint32_t end_of_text(const State& s, std::uint32_t least, std::uint32_t end) {
  while (end > least && std::string_view(" \t\v\f\r\n").find(s.text[end - 1]) != std::string_view::npos) --end;
  return std::max(least, end);
}

template <>
struct Act<rules::card> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    LexedCard& card = s.card;
    card.begin = s.tokens.empty() ? s.begin(in) : s.tokens.front().begin;
    card.end = s.tokens.empty() ? s.end(in) : s.tokens.back().end;
    for (std::uint32_t at = card.end; at < s.end(in) && (s.text[at] == ')' || s.text[at] == ' '); ++at) {
      if (s.text[at] == ')') card.end = at + 1;
    }
    if (card.fault != nullptr) card.end = end_of_text(s, std::max(card.end, card.fault_offset + 1), s.end(in));
    card.tokens = &s.tokens;
    s.taker.card(card);
    s.tokens.clear();
    card = {};
  }
};

}  // namespace

void lex_cards(std::string_view text, std::uint32_t begin, std::uint32_t end, const LexTaker& taker) {
  Input in(text.data() + begin, text.data() + end, "");
  State state{text.data(), taker, {}, {}, 0};
  pegtl::parse<rules::text, Act>(in, state);
}

}  // namespace parse
