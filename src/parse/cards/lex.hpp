// Bytes -> cards of words. No card is understood here.
#pragma once

#include <cstdint>
#include <functional>
#include <string_view>
#include <vector>

namespace parse {

enum class TokenKind : std::uint8_t {
  plain,
  equals,
  braced,  // {...}, braces included
  quoted,  // '...', quotes included
  text,    // "...", quotes included
};

// A word and its place in the whole text.
struct Token {
  std::uint32_t begin = 0;
  std::uint32_t end = 0;
  TokenKind kind = TokenKind::plain;
};

// One logical line. `end` is past its last word and brackets that close behind it; comments behind that are left out.
// Of a card with a fault it is past its last byte that is no blank.
struct LexedCard {
  std::uint32_t begin = 0;
  std::uint32_t end = 0;
  bool continued = false;  // it has more than one line
  const std::vector<Token>* tokens = nullptr;
  const char* fault = nullptr;  // why it cannot be read, if so
  std::uint32_t fault_offset = 0;
};

// What the lexer finds, in the order of the text. Tokens are good during the call only.
struct LexTaker {
  std::function<void(const LexedCard&)> card;
  std::function<void(std::uint32_t offset)> executable_comment;  // a line that begins with *#
};

// Lexes bytes [begin, end) of `text`, which must begin at a line's start (or at a card's). Offsets are those of `text`.
void lex_cards(std::string_view text, std::uint32_t begin, std::uint32_t end, const LexTaker& taker);

}  // namespace parse
