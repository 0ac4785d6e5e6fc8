#include "report/page.hpp"

#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"

namespace report {
namespace {

// Select graphic rendition, ECMA-48 section 8.3.117.
std::string_view rendition(Tone tone) {
  switch (tone) {
    case Tone::plain:
      return "";
    case Tone::strong:
      return "1";
    case Tone::good:
      return "32";
    case Tone::attention:
      return "33";
    case Tone::bad:
      return "31";
    case Tone::faint:
      return "2";
  }
  return "";
}

bool continues_utf8(char c) {
  return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U;
}

}  // namespace

std::size_t columns(std::string_view text) {
  return text.size() - static_cast<std::size_t>(std::count_if(text.begin(), text.end(), continues_utf8));
}

std::string Page::toned(std::string_view text, Tone tone) const {
  if (!colour_ || tone == Tone::plain || text.empty()) return std::string(text);
  return fmt::format("\x1b[{}m{}\x1b[0m", rendition(tone), text);
}

void Page::line(std::string_view text, Tone tone) {
  text_ += toned(text, tone) + '\n';
}

void Page::title(std::string_view left, char fill, std::string_view right, Tone tone) {
  const std::size_t taken = columns(left) + columns(right) + (right.empty() ? 1 : 2);
  const std::size_t room = taken + 3 < page_columns ? page_columns - taken : 3;
  text_ += toned(left, Tone::strong) + ' ' + toned(std::string(room, fill), Tone::faint);
  if (!right.empty()) text_ += ' ' + toned(right, tone);
  text_ += '\n';
}

// Puts words from column `at` on; nothing was written on the line from there. A word that no line can hold is cut in
// its middle: the JSON report has it whole.
void Page::words(std::string_view text, std::size_t at, std::size_t indent) {
  const std::size_t longest_word = page_columns - indent - 3;
  bool first = true;
  while (!text.empty()) {
    const std::size_t end = std::min(text.find(' '), text.size());
    const std::string word = base::printable_short(text.substr(0, end), longest_word);
    text.remove_prefix(std::min(end + 1, text.size()));
    if (word.empty()) continue;
    const std::size_t width = columns(word);
    if (!first && at + 1 + width > page_columns) {
      text_ += '\n' + std::string(indent, ' ');
      at = indent;
      first = true;
    }
    if (!first) text_ += ' ';
    text_ += word;
    at += width + (first ? 0 : 1);
    first = false;
  }
  text_.erase(text_.find_last_not_of(' ') + 1);
  text_ += '\n';
}

void Page::paragraph(std::string_view text, std::size_t indent, Tone tone) {
  if (colour_ && tone != Tone::plain) text_ += fmt::format("\x1b[{}m", rendition(tone));
  words(text, 0, indent);
  if (!colour_ || tone == Tone::plain) return;
  text_.pop_back();
  text_ += "\x1b[0m\n";
}

// Returns the column that the line has come to.
std::size_t Page::label(std::string_view text, Tone tone) {
  const std::size_t width = columns(text);
  const std::size_t gap = width + 3 < label_columns ? label_columns - width - 2 : 1;
  text_ += "  " + toned(text, tone) + std::string(gap, ' ');
  return 2 + width + gap;
}

void Page::row(std::string_view text_label, std::string_view text, Tone label_tone, std::size_t hang) {
  const std::size_t at = label(text_label, label_tone);
  words(text, at, label_columns + hang);
}

void Page::figure(std::string_view text_label, std::string_view fixed, std::string_view text) {
  const std::size_t at = label(text_label, Tone::plain) + columns(fixed);
  text_ += fixed;
  words(text, at, at);
}

}  // namespace report
