#include <string>

#include <catch2/catch.hpp>

#include "source/text.hpp"

namespace {

struct Text {
  source::Sources sources;
  source::SourceId id;

  explicit Text(std::string bytes) { id = sources.add({"board.cir", std::move(bytes), {}}); }

  [[nodiscard]] source::Position at(std::uint32_t offset) const { return sources.position({id, offset}); }
  [[nodiscard]] std::string_view line(std::uint32_t offset) const { return sources.line({id, offset}); }
};

bool is(source::Position position, std::size_t line, std::size_t column) {
  return position.line == line && position.column == column;
}

}  // namespace

TEST_CASE("lines and columns count from one") {
  const Text text("ab\ncd\n");
  CHECK(is(text.at(0), 1, 1));
  CHECK(is(text.at(1), 1, 2));
  CHECK(is(text.at(2), 1, 3));
  CHECK(is(text.at(3), 2, 1));
  CHECK(is(text.at(4), 2, 2));
}

TEST_CASE("LF, CR LF and a lone CR each end one line") {
  const Text text("a\nb\r\nc\rd");
  CHECK(is(text.at(0), 1, 1));
  CHECK(is(text.at(2), 2, 1));
  CHECK(is(text.at(5), 3, 1));
  CHECK(is(text.at(7), 4, 1));
  CHECK(text.line(2) == "b");
  CHECK(text.line(5) == "c");
  CHECK(text.line(7) == "d");
}

TEST_CASE("the bytes of one line end belong to the line that they end") {
  const Text text("ab\r\ncd");
  CHECK(is(text.at(2), 1, 3));
  CHECK(is(text.at(3), 1, 4));
  CHECK(text.line(3) == "ab");
}

TEST_CASE("a character of several bytes is one column") {
  const Text text("\xC2\xB5\xE2\x84\xA6x");
  CHECK(is(text.at(0), 1, 1));
  CHECK(is(text.at(2), 1, 2));
  CHECK(is(text.at(5), 1, 3));
}

TEST_CASE("the end of a file is a place, in a line of its own after a last line end") {
  CHECK(is(Text("ab").at(2), 1, 3));
  CHECK(is(Text("ab\n").at(3), 2, 1));
  CHECK(Text("ab").line(2) == "ab");
  CHECK(Text("ab\n").line(3).empty());
}

TEST_CASE("an empty file has one empty line") {
  const Text text("");
  CHECK(is(text.at(0), 1, 1));
  CHECK(text.line(0).empty());
}

TEST_CASE("a place past the end of the file counts as its end") {
  const Text text("ab");
  CHECK(is(text.at(1000), 1, 3));
  CHECK(text.line(1000) == "ab");
}

TEST_CASE("a span gives its bytes, and no more than the file has") {
  const Text text("R1 a b 10k");
  CHECK(text.sources.text({{text.id, 7}, 3}) == "10k");
  CHECK(text.sources.text({{text.id, 7}, 300}) == "10k");
  CHECK(text.sources.text({{text.id, 300}, 3}).empty());
}

TEST_CASE("texts stay where they are when further ones come") {
  source::Sources sources;
  const source::SourceId first = sources.add({"a", "first", {}});
  const std::string_view view = sources[first].bytes;
  for (int i = 0; i < 1000; ++i) sources.add({"b", "more", {}});
  CHECK(view.data() == sources[first].bytes.data());
  CHECK(sources.size() == 1001);
}
