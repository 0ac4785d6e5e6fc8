#include "parse/cards/values.hpp"

#include <cmath>
#include <fmt/format.h>
#include <limits>
#include <string_view>
#include <utility>
#include <variant>

#include "parse/cards/number.hpp"
#include "parse/expression/expression.hpp"
#include "parse/quantity.hpp"

namespace parse {
namespace {

constexpr double none_written = std::numeric_limits<double>::quiet_NaN();

bool is_digit(char c) {
  return c >= '0' && c <= '9';
}
bool is_letter(char c) {
  return ((c | 0x20) >= 'a' && (c | 0x20) <= 'z') || c == '_' || static_cast<unsigned char>(c) >= 0x80U;
}

// A name as expressions have it: no operator in it.
bool is_name(std::string_view text) {
  if (text.empty() || !is_letter(text.front())) return false;
  for (const char c : text) {
    if (!is_letter(c) && !is_digit(c) && c != '.' && c != '#' && c != '$') return false;
  }
  return true;
}

// Whether the text can only be an expression's: operators that no literal and no usual part text has.
bool has_operator(std::string_view text) {
  return text.find_first_of("*^?<>&|{") != std::string_view::npos;
}

model::Value odd_value(Card& card, double builder, double spice, double tolerance, bool bare_mega, source::Span where) {
  auto& odd = card.reading().netlist.odd_literals;
  odd.push_back({builder, spice, tolerance, bare_mega, where});
  return model::OddLiteralId{static_cast<std::uint32_t>(odd.size() - 1)};
}

// A literal without its sign may begin with a digit, a point, or the R of a marking code.
bool may_be_literal(std::string_view text) {
  if (!text.empty() && (text.front() == '+' || text.front() == '-')) text.remove_prefix(1);
  if (text.empty()) return false;
  const bool code = (text.front() | 0x20) == 'r' && text.size() > 1 && is_digit(text[1]);
  return is_digit(text.front()) || text.front() == '.' || code;
}

std::optional<model::Value> literal_text(Card& card, std::string_view text, source::Span where) {
  if (const auto plain = plain_number(text)) return model::Value{*plain};
  if (!may_be_literal(text)) return std::nullopt;
  if (const auto literal = read_literal(text); literal.ok()) {
    if (!literal->odd()) return model::Value{literal->builder};
    return odd_value(card, literal->builder, literal->spice, literal->tolerance, literal->bare_mega, where);
  }
  // Shorter text would make another number of it.
  if (auto refusal = literal_refusal(text)) {
    card.fail_at(where.begin.offset, where.length, std::move(*refusal));
    return std::nullopt;
  }
  // 5%: a fraction where the builder writes it, 5 to SPICE.
  if (text.back() != '%') return std::nullopt;
  const auto percent = plain_number(text.substr(0, text.size() - 1));
  if (!percent) return std::nullopt;
  return odd_value(card, *percent / 100, *percent, none_written, false, where);
}

// An expression that is but a number is a number.
model::Value simplified(Card& card, model::ExpressionId root) {
  auto& pool = card.reading().netlist.expressions;
  const model::ExpressionNode node = pool[root];
  if (node.op != model::Op::number || node.number != node.spice || root.index() + 1 != pool.nodes.size()) return root;
  pool.nodes.pop_back();
  return node.number;
}

// Reads [begin, end); the bytes read, or 0 and a fault.
std::size_t take_expression(Card& card, std::uint32_t begin, std::uint32_t end, Extent extent, model::Value& value) {
  Reading& reading = card.reading();
  ExpressionRead read = read_expression(card.between(begin, end), begin, extent, reading.limits.expression_depth,
                                        reading.netlist.expressions, reading.names);
  if (read.fault) {
    card.fail_at(read.fault->offset, 0, std::move(read.fault->message));
    return 0;
  }
  value = simplified(card, read.root);
  return read.length;
}

// The inside of braces or quotes.
model::Value enclosed_value(Card& card, std::size_t i) {
  model::Value value;
  take_expression(card, card.token(i).begin + 1, card.token(i).end - 1, Extent::whole, value);
  return value;
}

// Whether the text behind a value goes on with an operator, so that the value is only the begin of an expression.
bool goes_on(const Card& card, std::size_t i, bool callable) {
  const std::string_view rest = card.between(card.token(i).end, card.end());
  if (rest.empty()) return false;
  if (rest.front() == '(') return callable;
  const auto next = rest.find_first_not_of(" \t\v\f");
  if (next == std::string_view::npos) return false;
  const char c = rest[next];
  if (c == '=' || c == '!') return next + 1 < rest.size() && rest[next + 1] == '=';
  return std::string_view("*/^%<>&|?+-").find(c) != std::string_view::npos;
}

// A bare expression: as much of the text as is one.
Taken bare_expression(Card& card, std::uint32_t begin, Wanted wanted, std::size_t first) {
  Taken taken{{}, card.size()};
  const std::size_t length = take_expression(card, begin, card.end(), Extent::leading, taken.value);
  if (length == 0) return taken;
  const auto end = begin + static_cast<std::uint32_t>(length);
  taken.next = card.word_at(end);
  if (taken.next > 0 && card.token(taken.next - 1).end > end) {
    if (wanted == Wanted::anything) return {card.name(first), first + 1};
    card.fail_at(end, 0,
                 fmt::format("expected an operator or a blank, found \"{}\"",
                             card.between(end, card.token(taken.next - 1).end)));
  }
  return taken;
}

Taken plain_value(Card& card, std::size_t i, std::uint32_t begin, Wanted wanted) {
  const std::string_view text = card.text(i);
  const bool name = is_name(text);
  if (!goes_on(card, i, name)) {
    if (const auto literal = literal_text(card, text, card.span(i, i))) return {*literal, i + 1};
    if (name && wanted != Wanted::expression) return {card.name(i), i + 1};
    if (wanted == Wanted::anything && !has_operator(text)) return {card.name(i), i + 1};
  }
  return bare_expression(card, begin, wanted, i);
}

// Whether word i is the next key: a = b = 1 leaves a without a value, a = b == 1 and a = b <= 1 do not.
bool begins_next_key(const Card& card, std::size_t i) {
  return card.is_key(i) && !card.is(i + 2, TokenKind::equals) &&
         std::string_view("<>!").find(card.text(i).back()) == std::string_view::npos;
}

bool stands_alone(std::string_view word) {
  for (const std::string_view known : {"off", "on", "noiseless", "m", "params:", "optional:", "text:"}) {
    if (base::same_name(word, known)) return true;
  }
  return false;
}

// TC=0.1,0.2 is tc1 and tc2; TC=0.1 is tc1.
model::Word key_word(const Card& card, std::size_t i) {
  model::Word key = card.word(i);
  if (base::same_name(card.text(i), "tc")) key.name = card.reading().names.intern("tc1");
  return key;
}

bool take_second_coefficient(Card& card, std::size_t i) {
  auto& assignments = card.reading().netlist.assignments;
  if (!base::same_name(card.reading().names.text(assignments.back().key.name), "tc1")) return false;
  const auto value = literal_text(card, card.text(i), card.span(i, i));
  if (!value) return false;
  assignments.push_back({{card.reading().names.intern("tc2"), card.token(i).begin}, *value});
  return true;
}

}  // namespace

bool has_number(const model::Value& value) {
  return !std::holds_alternative<std::monostate>(value) && !std::holds_alternative<base::NameId>(value);
}

source::Span literal_span(const Card& card, std::size_t first, std::size_t last) {
  source::Span where = card.span(first, last);
  const std::uint32_t end = where.begin.offset + where.length;
  const bool closes = end < card.end() && card.between(end, end + 1) == ")";
  if (closes && card.between(where.begin.offset, end).find('(') != std::string_view::npos) ++where.length;
  return where;
}

std::optional<model::Value> literal_value(Card& card, std::size_t first, std::size_t last) {
  const source::Span where = literal_span(card, first, last);
  return literal_text(card, card.between(where.begin.offset, where.begin.offset + where.length), where);
}

model::Value word_value(Card& card, std::size_t i) {
  const TokenKind kind = card.token(i).kind;
  if (kind == TokenKind::braced || kind == TokenKind::quoted) return enclosed_value(card, i);
  if (kind == TokenKind::plain) {
    if (const auto literal = literal_text(card, card.text(i), card.span(i, i))) return *literal;
  }
  return card.name(i);
}

bool is_value(const Card& card, std::size_t i) {
  if (card.token(i).kind != TokenKind::plain)
    return card.token(i).kind == TokenKind::braced || card.token(i).kind == TokenKind::quoted;
  const std::string_view text = card.text(i);
  return plain_number(text) || (may_be_literal(text) && read_literal(text).ok());
}

model::ExpressionId expression_of_word(Card& card, std::size_t i) {
  const model::Value value = word_value(card, i);
  if (const auto* const id = std::get_if<model::ExpressionId>(&value)) return *id;
  model::ExpressionNode node;
  node.offset = card.token(i).begin;
  if (const auto* const number = std::get_if<double>(&value)) {
    node.number = node.spice = *number;
  } else if (const auto* const odd = std::get_if<model::OddLiteralId>(&value)) {
    node.number = card.reading().netlist.odd_literals[odd->index()].builder;
    node.spice = card.reading().netlist.odd_literals[odd->index()].spice;
  } else if (const auto* const name = std::get_if<base::NameId>(&value); name != nullptr && is_name(card.text(i))) {
    node.op = model::Op::parameter;
    node.name = *name;
  } else {
    card.fail(i, fmt::format("expected a number, found {}", card.found(i)));
    return {};
  }
  auto& nodes = card.reading().netlist.expressions.nodes;
  nodes.push_back(node);
  return model::ExpressionId{static_cast<std::uint32_t>(nodes.size() - 1)};
}

Taken value_behind(Card& card, std::size_t before, Wanted wanted) {
  const std::size_t i = before + 1;
  const std::size_t key = card.is(before, TokenKind::equals) ? before - 1 : before;
  if (i < card.size() && begins_next_key(card, i)) {
    card.fail(i, fmt::format("expected a value for {}, found the next key {}", card.text(key), card.text(i)));
    return {{}, card.size()};
  }
  if (i >= card.size() || card.is(i, TokenKind::equals)) {
    card.fail(i < card.size() ? i : key,
              fmt::format("expected a value for {}, found {}", card.text(key), card.found(i)));
    return {{}, card.size()};
  }
  const std::uint32_t begin = card.token(before).end;
  const std::string_view gap = card.between(begin, card.token(i).begin);
  if (gap.find('(') != std::string_view::npos && wanted != Wanted::anything)
    return bare_expression(card, begin, wanted, i);
  switch (card.token(i).kind) {
    case TokenKind::braced:
    case TokenKind::quoted:
      if (card.token(i).kind == TokenKind::braced && goes_on(card, i, false))
        return bare_expression(card, begin, wanted, i);
      return {enclosed_value(card, i), i + 1};
    case TokenKind::text:
      if (wanted == Wanted::expression) return {enclosed_value(card, i), i + 1};
      return {card.reading().names.intern(card.between(card.token(i).begin + 1, card.token(i).end - 1)), i + 1};
    default:
      return plain_value(card, i, begin, wanted);
  }
}

model::Range take_assignments(Card& card, std::size_t i, Wanted wanted, bool loose) {
  auto& assignments = card.reading().netlist.assignments;
  const auto first = static_cast<std::uint32_t>(assignments.size());
  while (i < card.size() && !card.failed()) {
    if (card.is_key(i)) {
      const Taken taken = value_behind(card, i + 1, wanted);
      assignments.push_back({key_word(card, i), taken.value});
      i = taken.next;
    } else if (loose && !card.is(i, TokenKind::equals)) {
      assignments.push_back({card.word(i), {}});
      ++i;
    } else if (stands_alone(card.text(i)) || (assignments.size() > first && take_second_coefficient(card, i))) {
      ++i;
    } else {
      card.fail(i, fmt::format("expected key = value, found {}", card.found(i)));
    }
  }
  return {first, static_cast<std::uint32_t>(assignments.size()) - first};
}

}  // namespace parse
