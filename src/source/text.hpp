// Source texts (netlists, included files, declarations) and places in them. A place is a file and a byte offset; line
// and column are worked out only when somebody reads them.
#pragma once

#include <cstdint>
#include <deque>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "base/id.hpp"
#include "source/bytes.hpp"

namespace source {

using SourceId = base::Id<struct SourceTag>;

// A byte of a source text.
struct Place {
  SourceId source;
  std::uint32_t offset = 0;

  [[nodiscard]] bool valid() const { return source.valid(); }
  friend auto operator<=>(const Place&, const Place&) = default;
};

// `length` bytes from a place on; length 0 marks a point.
struct Span {
  Place begin;
  std::uint32_t length = 0;

  [[nodiscard]] bool valid() const { return begin.valid(); }
};

// What a person counts: both from 1. A column counts bytes, as compilers do; a continuation byte of UTF-8 is not
// counted.
struct Position {
  std::size_t line = 1;
  std::size_t column = 1;
};

struct SourceText {
  std::string name;                  // as given on the command line; of an included file from the netlist's folder on
  Bytes bytes;                       // the whole text, as read
  std::optional<Place> included_at;  // the card that asked for it
};

// All texts of one audit of one board. Texts stay where they are: views into them are good as long as this lives.
class Sources {
 public:
  // Takes the text in and gives it its id. Files of 4 GiB and more are refused by the reader before they come here.
  SourceId add(SourceText text);

  [[nodiscard]] const SourceText& operator[](SourceId id) const { return texts_[id.index()]; }
  [[nodiscard]] std::size_t size() const { return texts_.size(); }

  // The bytes that a span covers.
  [[nodiscard]] std::string_view text(Span span) const;

  // Line and column of a place; the first call for a text indexes its lines.
  [[nodiscard]] Position position(Place place) const;

  // The whole line that holds the place, without its line end.
  [[nodiscard]] std::string_view line(Place place) const;

 private:
  [[nodiscard]] const std::vector<std::uint32_t>& line_starts(SourceId id) const;

  std::deque<SourceText> texts_;
  mutable std::deque<std::vector<std::uint32_t>> line_starts_;
};

}  // namespace source
