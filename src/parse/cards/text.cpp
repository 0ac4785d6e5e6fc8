#include "parse/cards/text.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <utility>

#include "base/text.hpp"

namespace parse {
namespace {

bool is_blank(char c) {
  return c == ' ' || c == '\t' || c == '\v' || c == '\f';
}
bool ends_line(char c) {
  return c == '\r' || c == '\n';
}

// Blanks a text line by line, in place.
class Blanker {
 public:
  explicit Blanker(std::string& text) : text_(text) {}

  void run() {
    while (at_ < text_.size()) {
      if (ends_line(text_[at_])) {
        next_line();
      } else if (begins_comment()) {
        blank_line();
      } else {
        note_bracket(text_[at_++]);
      }
    }
  }

 private:
  [[nodiscard]] bool begins_comment() const {
    const char c = text_[at_];
    if (in_text_) return false;
    if (c == ';') return true;
    if (braces_ > 0 || in_quotes_ || at_ == 0 || !is_blank(text_[at_ - 1])) return false;
    return c == '$' || (c == '/' && at_ + 1 < text_.size() && text_[at_ + 1] == '/');
  }

  void note_bracket(char c) {
    if (c == '"' && !in_quotes_ && braces_ == 0) in_text_ = !in_text_;
    if (in_text_) return;
    if (c == '{' && !in_quotes_) ++braces_;
    if (c == '}' && braces_ > 0) --braces_;
    if (c == '\'' && braces_ == 0) in_quotes_ = !in_quotes_;
  }

  void blank_line() {
    while (at_ < text_.size() && !ends_line(text_[at_])) text_[at_++] = ' ';
  }

  // Behind a line's end: the sign of a continuation, or a line of its own that is a comment or empty.
  void next_line() {
    in_text_ = false;
    while (at_ < text_.size() && (ends_line(text_[at_]) || is_blank(text_[at_]))) text_[at_++] = ' ';
    if (at_ == text_.size()) return;
    if (text_[at_] == '+') {
      text_[at_++] = ' ';
    } else {
      blank_line();
    }
  }

  std::string& text_;
  std::size_t at_ = 0;
  std::size_t braces_ = 0;
  bool in_quotes_ = false;
  bool in_text_ = false;
};

}  // namespace

std::string blanked(std::string_view text) {
  std::string out(text);
  Blanker(out).run();
  return out;
}

Card::Card(Reading& reading, source::SourceId source, std::string_view bytes, const LexedCard& lexed)
    : reading_(reading), source_(source), bytes_(bytes), lexed_(lexed) {
  if (lexed.continued) joined_ = blanked(bytes.substr(lexed.begin, lexed.end - lexed.begin));
}

std::string_view Card::between(std::uint32_t begin, std::uint32_t end) const {
  if (!lexed_.continued) return bytes_.substr(begin, end - begin);
  return std::string_view(joined_).substr(begin - lexed_.begin, end - begin);
}

std::size_t Card::first_key(std::size_t i) const {
  while (i < size() && !is_key(i)) ++i;
  return i;
}

std::size_t Card::word_at(std::uint32_t offset) const {
  const auto& tokens = *lexed_.tokens;
  const auto found =
      std::partition_point(tokens.begin(), tokens.end(), [offset](const Token& t) { return t.begin < offset; });
  return static_cast<std::size_t>(found - tokens.begin());
}

source::Span Card::span(std::size_t first, std::size_t last) const {
  return {{source_, token(first).begin}, token(last).end - token(first).begin};
}

model::Range Card::words(std::size_t first, std::size_t last) const {
  auto& words = reading_.netlist.words;
  const model::Range range{static_cast<std::uint32_t>(words.size()), static_cast<std::uint32_t>(last - first)};
  for (std::size_t i = first; i < last; ++i) words.push_back(word(i));
  return range;
}

void Card::fail_at(std::uint32_t offset, std::uint32_t length, std::string message) {
  if (!fault_) fault_ = Fault{offset, length, std::move(message)};
}

void Card::fail(std::size_t i, std::string message) {
  if (i < size()) return fail_at(token(i).begin, token(i).end - token(i).begin, std::move(message));
  fail_at(end(), 0, std::move(message));
}

std::string Card::found(std::size_t i) const {
  return i < size() ? fmt::format("\"{}\"", base::printable_short(text(i), 40)) : "the end of the card";
}

}  // namespace parse
