// One card with its words, as the readers of cards see it.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

#include "base/names.hpp"
#include "model/netlist.hpp"
#include "parse/cards/lex.hpp"
#include "source/limits.hpp"
#include "source/text.hpp"

namespace parse {

// What all cards of one netlist share.
struct Reading {
  base::NameTable& names;
  const source::Limits& limits;
  model::Netlist& netlist;
};

// Why a card cannot be read, and where.
struct Fault {
  std::uint32_t offset = 0;
  std::uint32_t length = 0;
  std::string message;
};

// `text` in as many bytes, with every line end, continuation sign and comment in it turned into blanks.
[[nodiscard]] std::string blanked(std::string_view text);

class Card {
 public:
  // `bytes` is the whole source; it and the lexed card outlive this.
  Card(Reading& reading, source::SourceId source, std::string_view bytes, const LexedCard& lexed);

  [[nodiscard]] std::size_t size() const { return lexed_.tokens->size(); }
  [[nodiscard]] const Token& token(std::size_t i) const { return (*lexed_.tokens)[i]; }
  [[nodiscard]] std::string_view text(std::size_t i) const { return between(token(i).begin, token(i).end); }
  [[nodiscard]] std::uint32_t begin() const { return lexed_.begin; }
  [[nodiscard]] std::uint32_t end() const { return lexed_.end; }
  [[nodiscard]] source::SourceId source() const { return source_; }

  // Bytes of the source by their offsets, lines joined.
  [[nodiscard]] std::string_view between(std::uint32_t begin, std::uint32_t end) const;

  [[nodiscard]] bool is(std::size_t i, TokenKind kind) const { return i < size() && token(i).kind == kind; }
  [[nodiscard]] bool is(std::size_t i, std::string_view word) const {
    return i < size() && base::same_name(text(i), word);
  }

  // Whether word i is the key of a key = value.
  [[nodiscard]] bool is_key(std::size_t i) const { return is(i, TokenKind::plain) && is(i + 1, TokenKind::equals); }

  // The first key at or after word i, or the number of words.
  [[nodiscard]] std::size_t first_key(std::size_t i) const;

  // The first word that begins at `offset` or later.
  [[nodiscard]] std::size_t word_at(std::uint32_t offset) const;

  [[nodiscard]] base::NameId name(std::size_t i) const { return reading_.names.intern(text(i)); }
  [[nodiscard]] model::Word word(std::size_t i) const { return {name(i), token(i).begin}; }
  [[nodiscard]] source::Span span(std::size_t first, std::size_t last) const;

  // Appends words [first, last) to the netlist.
  [[nodiscard]] model::Range words(std::size_t first, std::size_t last) const;

  // Notes why the card cannot be read; the first reason stays. fail(i, ...) marks word i, or the card's end.
  void fail(std::size_t i, std::string message);
  void fail_at(std::uint32_t offset, std::uint32_t length, std::string message);
  [[nodiscard]] bool failed() const { return fault_.has_value(); }
  [[nodiscard]] const std::optional<Fault>& fault() const { return fault_; }

  // Word i as messages quote it; "the end of the card" behind the last.
  [[nodiscard]] std::string found(std::size_t i) const;

  [[nodiscard]] Reading& reading() const { return reading_; }

 private:
  Reading& reading_;
  source::SourceId source_;
  std::string_view bytes_;
  const LexedCard& lexed_;
  std::string joined_;  // the card with its lines joined, where it has more than one
  std::optional<Fault> fault_;
};

}  // namespace parse
