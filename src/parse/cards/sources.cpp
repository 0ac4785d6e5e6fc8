// Independent sources: what they hold at DC.
#include <array>
#include <fmt/format.h>

#include "parse/cards/elements.hpp"
#include "parse/cards/number.hpp"
#include "parse/cards/values.hpp"

namespace parse {
namespace {

// Functions of time and which argument holds their value at time zero (ngspice manual, chapter on sources: pulse V1,
// sin and sffm the offset, exp V1; pwl the first pair's value).
struct TimeFunction {
  std::string_view name;
  std::size_t argument;  // counted from 0
};
constexpr std::size_t no_argument = 99;  // zero at DC
constexpr std::array functions{TimeFunction{"pulse", 0},
                               TimeFunction{"sin", 0},
                               TimeFunction{"sine", 0},
                               TimeFunction{"exp", 0},
                               TimeFunction{"pwl", 1},
                               TimeFunction{"sffm", 0},
                               TimeFunction{"am", 1},
                               TimeFunction{"trnoise", no_argument},
                               TimeFunction{"trrandom", no_argument},
                               TimeFunction{"external", no_argument}};

const TimeFunction* function_at(const Card& card, std::size_t i) {
  const std::string_view word = card.text(i);
  const std::string_view name = word.substr(0, word.find('('));
  for (const TimeFunction& known : functions) {
    if (base::same_name(known.name, name)) return &known;
  }
  return nullptr;
}

class SourceReader {
 public:
  explicit SourceReader(const ElementWords& words) : words_(words), card_(words.card) {}

  Outcome run() {
    for (std::size_t i = 3; i < card_.size() && !card_.failed();) i = take(i);
    if (strange_ > 1 || (strange_ == 1 && has_number(dc_))) {
      words_.element.letter = '?';
      return read_part(words_);
    }
    words_.take_nodes(2);
    words_.element.at_time_zero = !has_number(dc_) && has_number(start_);
    words_.element.value = has_number(dc_) ? dc_ : has_number(start_) ? start_ : word_;
    const auto first = static_cast<std::uint32_t>(card_.reading().netlist.assignments.size() - parameters_);
    words_.element.parameters = {first, parameters_};
    return Outcome::element;
  }

 private:
  // Takes what begins at word i; gives the next word.
  std::size_t take(std::size_t i) {
    if (card_.is(i, "dc")) return take_dc(i);
    if (card_.is(i, "ac")) {
      if (!has_number(start_)) start_ = 0.0;  // a signal alone: nothing at DC
      return skip_numbers(card_.is(i + 1, TokenKind::equals) ? i + 2 : i + 1, 2);
    }
    if (const TimeFunction* const function = function_at(card_, i)) return take_function(i, *function);
    if (card_.is_key(i)) return take_parameter(i);
    if (card_.is(i, TokenKind::equals)) return card_.fail(i, "expected key = value, found \"=\""), i;
    return take_bare(i);
  }

  std::size_t take_dc(std::size_t i) {
    if (card_.is(i + 1, TokenKind::equals)) {
      const Taken taken = value_behind(card_, i + 1, Wanted::expression);
      dc_ = taken.value;
      return taken.next;
    }
    if (i + 1 == card_.size() || function_at(card_, i + 1) != nullptr) return i + 1;
    dc_ = word_value(card_, i + 1);
    if (!has_number(dc_) && !card_.failed())
      card_.fail(i + 1, fmt::format("expected a number behind DC, found {}", card_.found(i + 1)));
    return i + 2;
  }

  std::size_t skip_numbers(std::size_t i, std::size_t most) {
    for (; most > 0 && i < card_.size() && !card_.is_key(i); --most, ++i) {
      if (!is_value(card_, i)) break;
    }
    return i;
  }

  // Arguments run to the next word that is no number.
  std::size_t take_function(std::size_t i, const TimeFunction& function) {
    const Token token = card_.token(i);
    const std::string_view word = card_.text(i);
    std::size_t next = i + 1;
    if (card_.is(next, "file")) {  // points that stand in another file: no value is known
      word_ = card_.name(next);
      ++strange_;
      return card_.size();
    }
    const bool starts = function.argument == no_argument;
    if (starts) start_ = 0.0;
    bool found = starts;
    if (word.size() > function.name.size() + 1) {  // sin(0): one argument, no blank before it
      const auto only = plain_number(word.substr(function.name.size() + 1, word.size() - function.name.size() - 2));
      if (only && function.argument == 0) start_ = *only, found = true;
    } else {
      for (std::size_t argument = 0; next < card_.size() && !card_.is_key(next); ++argument, ++next) {
        if (!is_value(card_, next)) break;
        if (argument == function.argument) start_ = word_value(card_, next), found = true;
      }
    }
    if (!found) {
      card_.fail_at(token.begin, token.end - token.begin,
                    fmt::format("expected numbers behind {}, found {}", word, card_.found(next)));
    }
    return next;
  }

  std::size_t take_parameter(std::size_t i) {
    const Taken taken = value_behind(card_, i + 1, Wanted::anything);
    card_.reading().netlist.assignments.push_back({card_.word(i), taken.value});
    ++parameters_;
    return taken.next;
  }

  // A number alone, or in two words: 5 V.
  std::size_t take_bare(std::size_t i) {
    if (i + 1 < words_.key && !has_number(dc_)) {
      if (const auto joined = literal_value(card_, i, i + 1)) return dc_ = *joined, i + 2;
    }
    const model::Value value = word_value(card_, i);
    if (has_number(value) && !has_number(dc_)) return dc_ = value, i + 1;
    if (strange_++ == 0) word_ = value;
    return i + 1;
  }

  const ElementWords& words_;
  Card& card_;
  model::Value dc_;
  model::Value start_;  // at time zero, of the last function
  model::Value word_;
  std::size_t strange_ = 0;  // words that are no part of a source
  std::uint32_t parameters_ = 0;
};

}  // namespace

Outcome read_source(const ElementWords& words) {
  if (words.count() < 2) {
    words.card.fail(0, fmt::format("a {} source needs two nodes", words.element.letter == 'v' ? "voltage" : "current"));
    return Outcome::element;
  }
  return SourceReader(words).run();
}

}  // namespace parse
