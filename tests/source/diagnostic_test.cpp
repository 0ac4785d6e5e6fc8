#include "source/diagnostic.hpp"

#include <algorithm>
#include <sstream>
#include <string>
#include <vector>

#include <catch2/catch.hpp>

using base::Level;

namespace {

std::string drawn(const std::string& bytes, std::uint32_t offset, std::uint32_t length,
                  const std::string& name = "board.cir") {
  source::Sources sources;
  const source::SourceId id = sources.add({name, bytes, {}});
  return source::draw(sources, {Level::error, {{id, offset}, length}, "expected a number"});
}

std::vector<std::string> lines(const std::string& text) {
  std::vector<std::string> out;
  std::istringstream in(text);
  for (std::string line; std::getline(in, line);) out.push_back(line);
  return out;
}

std::size_t width(const std::string& text) {
  return static_cast<std::size_t>(
      std::count_if(text.begin(), text.end(), [](char c) { return (static_cast<unsigned char>(c) & 0xC0U) != 0x80U; }));
}

}  // namespace

TEST_CASE("a diagnostic names file, line, column, level and message, and marks its span") {
  CHECK(drawn("title\nR1 a b 10kk\n", 13, 4) ==
        "board.cir:2:8: error: expected a number\n"
        "    R1 a b 10kk\n"
        "           ^~~~\n");
}

TEST_CASE("each level has its word") {
  source::Sources sources;
  const source::SourceId id = sources.add({"a", "x", {}});
  CHECK(source::headline(sources, {Level::warning, {{id, 0}, 1}, "m"}) == "a:1:1: warning: m");
  CHECK(source::headline(sources, {Level::note, {{id, 0}, 1}, "m"}) == "a:1:1: note: m");
}

TEST_CASE("a point is marked by a caret alone") {
  CHECK(drawn("R1 a b", 6, 0) ==
        "board.cir:1:7: error: expected a number\n"
        "    R1 a b\n"
        "          ^\n");
}

TEST_CASE("a diagnostic without a place is its message alone") {
  const source::Sources sources;
  CHECK(source::draw(sources, {Level::error, {}, "cannot read x"}) == "error: cannot read x\n");
  CHECK(source::headline(sources, {Level::error, {}, "cannot read x"}) == "error: cannot read x");
}

TEST_CASE("a mark ends with its line") {
  CHECK(drawn("R1 a\n+ b 10k\n", 3, 9) ==
        "board.cir:1:4: error: expected a number\n"
        "    R1 a\n"
        "       ^\n");
}

TEST_CASE("a mark stands right under characters of several bytes") {
  CHECK(drawn("* \xC2\xB5\xE2\x84\xA6 = \xC2\xB5x", 10, 3) ==
        "board.cir:1:8: error: expected a number\n"
        "    * \xC2\xB5\xE2\x84\xA6 = \xC2\xB5x\n"
        "           ^~\n");
}

TEST_CASE("a place inside a character marks the character") {
  CHECK(drawn("a \xE2\x84\xA6 b", 3, 1) ==
        "board.cir:1:4: error: expected a number\n"
        "    a \xE2\x84\xA6 b\n"
        "      ^\n");
}

TEST_CASE("a tab is drawn as one blank") {
  CHECK(drawn("\tR1\ta\tb", 4, 1) ==
        "board.cir:1:5: error: expected a number\n"
        "     R1 a b\n"
        "        ^\n");
}

TEST_CASE("control characters and bytes that are not UTF-8 are drawn as escapes and the mark follows them") {
  CHECK(drawn("\x1b[0m \xff R1", 7, 2) ==
        "board.cir:1:8: error: expected a number\n"
        "    \\x1b[0m \\xff R1\n"
        "                 ^~\n");
  CHECK(drawn("a\x01", 1, 1) ==
        "board.cir:1:2: error: expected a number\n"
        "    a\\x01\n"
        "     ^~~~\n");
}

TEST_CASE("a hostile file name and message reach no terminal") {
  source::Sources sources;
  const source::SourceId id = sources.add({"\x1b]0;x\x07.cir", "x", {}});
  CHECK(source::headline(sources, {Level::error, {{id, 0}, 1}, "no part \x1b[2J\n"}) ==
        "\\x1b]0;x\\x07.cir:1:1: error: no part \\x1b[2J\\x0a");
}

TEST_CASE("a carriage return ends the line that is drawn") {
  CHECK(drawn("title\r\nR1 a\r\nR2 b\r\n", 10, 1) ==
        "board.cir:2:4: error: expected a number\n"
        "    R1 a\n"
        "       ^\n");
  CHECK(drawn("title\rR1 a\rR2 b", 9, 1) ==
        "board.cir:2:4: error: expected a number\n"
        "    R1 a\n"
        "       ^\n");
}

TEST_CASE("a place on a line end is marked behind the line's last character") {
  CHECK(drawn("R1 a\r\nR2", 5, 1) ==
        "board.cir:1:6: error: expected a number\n"
        "    R1 a\n"
        "        ^\n");
}

TEST_CASE("the end of a file, an empty line and an empty file have no line to show") {
  CHECK(drawn("title\n", 6, 0) == "board.cir:2:1: error: expected a number\n");
  CHECK(drawn("a\n\nb", 2, 1) == "board.cir:2:1: error: expected a number\n");
  CHECK(drawn("", 0, 0) == "board.cir:1:1: error: expected a number\n");
  CHECK(drawn("", 0, 10) == "board.cir:1:1: error: expected a number\n");
}

TEST_CASE("the end of a file without a last line end is marked behind its last character") {
  CHECK(drawn("title\nR1 a", 10, 0) ==
        "board.cir:2:5: error: expected a number\n"
        "    R1 a\n"
        "        ^\n");
}

TEST_CASE("of a long line only what stands around the place is drawn, within a hundred columns") {
  for (const std::size_t at : {0U, 40U, 5'000'000U, 9'999'990U, 10'000'000U}) {
    std::string bytes(10'000'000, 'x');
    if (at < bytes.size()) bytes[at] = '?';
    const auto rows = lines(drawn(bytes, static_cast<std::uint32_t>(at), 1'000'000));
    REQUIRE(rows.size() == 3);
    CHECK(rows[0] == "board.cir:1:" + std::to_string(at + 1) + ": error: expected a number");
    CHECK(rows[1].size() <= 100);
    CHECK(rows[2].size() <= 100);
    const std::size_t caret = rows[2].find('^');
    REQUIRE(caret != std::string::npos);
    if (at < bytes.size()) CHECK(rows[1][caret] == '?');
    CHECK((rows[1].find("...") == 4) == (at > 50));
    CHECK((rows[1].rfind("...") > caret) == (at < 9'999'900));
  }
}

TEST_CASE("a long line of escapes or of characters of several bytes stays within a hundred columns too") {
  for (const std::string unit : {"\xff", "\x80", "\xE2\x84\xA6", "\xE2\x84", "\x01"}) {
    std::string bytes;
    for (int i = 0; i < 1000; ++i) bytes += unit;
    const auto at = static_cast<std::uint32_t>(unit.size() * 500);
    const auto rows = lines(drawn(bytes + "?" + bytes, static_cast<std::uint32_t>(bytes.size()), 1));
    REQUIRE(rows.size() == 3);
    CHECK(width(rows[1]) <= 100);
    const std::size_t mark = rows[1].find('?');
    REQUIRE(mark != std::string::npos);
    CHECK(width(rows[1].substr(0, mark)) == rows[2].find('^'));
    CHECK(width(lines(drawn(bytes, at, 300))[2]) <= 100);
  }
}

TEST_CASE("ten megabytes of stray continuation bytes are drawn in one short line") {
  CHECK(lines(drawn(std::string(10'000'000, '\x80'), 5'000'000, 3))[1].size() <= 100);
}

TEST_CASE("the chain of includes is told, nearest first") {
  source::Sources sources;
  const source::SourceId top = sources.add({"board.cir", "title\n.include a.lib\n", {}});
  const source::SourceId middle = sources.add({"a.lib", ".include b.lib\n", source::Place{top, 15}});
  const source::SourceId inner = sources.add({"b.lib", "R1 ?\n", source::Place{middle, 9}});
  CHECK(source::draw(sources, {Level::error, {{inner, 3}, 1}, "expected a net"}) ==
        "b.lib:1:4: error: expected a net\n"
        "    R1 ?\n"
        "       ^\n"
        "  included from a.lib:1:10\n"
        "  included from board.cir:2:10\n");
}

TEST_CASE("diagnostics are counted by level") {
  const source::Diagnostics diagnostics{{Level::error, {}, "a"}, {Level::note, {}, "b"}, {Level::error, {}, "c"}};
  CHECK(source::count(diagnostics, Level::error) == 2);
  CHECK(source::count(diagnostics, Level::note) == 1);
  CHECK(source::count(diagnostics, Level::warning) == 0);
}
