// A page of text, 80 columns wide: rows with a label, wrapped text, titles that fill the line, colour.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <utility>

namespace report {

inline constexpr std::size_t page_columns = 80;
inline constexpr std::size_t label_columns = 15;  // the margin of two blanks included

// Colour says again what a word says already.
enum class Tone : unsigned char { plain, strong, good, attention, bad, faint };

// Columns that printable UTF-8 takes on a terminal; every character counts as one.
[[nodiscard]] std::size_t columns(std::string_view text);

// Collects lines. Texts must be printable already (base::printable); blanks between words are where lines break.
class Page {
 public:
  explicit Page(bool colour) : colour_(colour) {}

  void blank_line() { text_ += '\n'; }

  // One line as it is.
  void line(std::string_view text, Tone tone = Tone::plain);

  // "left ------- right", filled to the page's width.
  void title(std::string_view left, char fill, std::string_view right, Tone tone);

  // Wrapped text; further lines are indented by `indent` columns.
  void paragraph(std::string_view text, std::size_t indent, Tone tone = Tone::plain);

  // A label in its column, then wrapped text beside it; further lines start under the text, or `hang` columns right of
  // there.
  void row(std::string_view label, std::string_view text, Tone label_tone = Tone::plain, std::size_t hang = 0);

  // A label in its column, `fixed` as it is, then wrapped text beside that; further lines start under the wrapped text.
  void figure(std::string_view label, std::string_view fixed, std::string_view text);

  [[nodiscard]] std::string take() { return std::move(text_); }

 private:
  [[nodiscard]] std::string toned(std::string_view text, Tone tone) const;
  std::size_t label(std::string_view text, Tone tone);
  void words(std::string_view text, std::size_t at, std::size_t indent);

  bool colour_;
  std::string text_;
};

}  // namespace report
