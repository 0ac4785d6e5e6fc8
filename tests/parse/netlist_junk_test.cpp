// Any byte sequence may come: nothing crashes, nothing hangs, and every card has one fate.
#include <random>

#include <catch2/catch.hpp>

#include "netlist_reading.hpp"
#include "source/diagnostic.hpp"

using parse_test::NetlistReading;
using Said = std::vector<std::string>;

namespace {

constexpr std::size_t long_line = std::size_t{1} << 17;

// Diagnostics must point into their text.
void check_read(const std::string& text) {
  const NetlistReading reading(text);
  for (const model::CardRecord& card : reading.netlist().cards) {
    if (card.begin > card.end || card.end > text.size()) FAIL("a card reaches beyond its text");
  }
  static_cast<void>(reading.said());
}

std::string repeated(const std::string& text, std::size_t times) {
  std::string out;
  for (std::size_t i = 0; i < times; ++i) out += text;
  return out;
}

}  // namespace

TEST_CASE("netlist junk: an empty file and a title alone hold no card") {
  for (const char* const text : {"", "title", "title\n", "\n", "\xEF\xBB\xBF", "\x1a", "* title\n"}) {
    const NetlistReading reading(text);
    CHECK(reading.netlist().cards.empty());
    CHECK(reading.said().empty());
  }
}

TEST_CASE("netlist junk: a line of 10 MB is one error card, and the next card is read") {
  const NetlistReading reading("title\n" + std::string(10'000'000, 'x') + "\nR1 a b 1\n");
  CHECK(reading.said() ==
        Said{"t.cir:2:1: error: the line has 10000000 bytes, more than the limit line_bytes = 1048576"});
  CHECK(reading.fates() == "1 0 0 1");
}

TEST_CASE("netlist junk: a long line of each kind is read in time that grows with its length") {
  for (const char* const piece : {"(", "a(", "{", "'", "\"", "=", ",", "a ", "a=", "$ ", "{a}", "((a", "\x1a", ")"}) {
    INFO(piece);
    const std::string line = repeated(piece, long_line / std::string(piece).size() - 8);
    check_read("title\nR1 " + line + "\n");
  }
  check_read("title\nR1 a b {" + std::string(long_line / 2, '(') + "}\n");
  check_read("title\nR1 a b {" + std::string(long_line / 2, '-') + "1}\n");
  check_read("title\nR1 a b {1" + repeated("+1", long_line / 4) + "}\n");
  check_read("title\nR1 a b {x" + repeated("?1:x", long_line / 8) + "}\n");
}

TEST_CASE("netlist junk: many lines of each kind are read in time that grows with their number") {
  for (const char* const line : {"+ {\n", "+\n", "* c\n", "\n", "*# x\n", ".if\n", ".subckt\n", ".ends\n", "+ '\n",
                                 ".control\n", ".end\n", ".lib x\n", "Q1 a b c d e\n"}) {
    INFO(line);
    check_read("title\nR1 a b 1\n" + repeated(line, 5'000));
  }
}

TEST_CASE("netlist junk: random bytes are read") {
  std::mt19937 random(1);
  for (int run = 0; run < 300; ++run) {
    std::string text(random() % 2000, ' ');
    for (char& c : text) c = static_cast<char>(random() & 0xffU);
    check_read(text);
  }
}

TEST_CASE("netlist junk: random words of netlists are read") {
  const std::vector<std::string> words{
      "R1",     "V1",      "E1",    "X1",       "Q1",      "M1",       "B1",       "K1",   "W1",  "S1",  ".param",
      ".model", ".subckt", ".ends", ".include", ".lib",    ".if",      ".control", ".end", "{",   "}",   "'",
      "\"",     "(",       ")",     "=",        ",",       "+",        "\n",       "\n",   "\n+", "\n*", ";",
      "$",      " ",       " ",     " ",        "10k",     "4k7",      "1M",       "a",    "b",   "GND", "VALUE",
      "TABLE",  "POLY",    "PULSE", "DC",       "PARAMS:", "V(a)",     "I(V1)",    "?",    ":",   "**",  "&&",
      "table",  "if(",     "-",     "*",        "1e",      "\xC2\xB5", "%",        "10 k", "1%",  "R="};
  std::mt19937 random(2);
  for (int run = 0; run < 500; ++run) {
    std::string text = "title\n";
    const std::size_t length = random() % 200;
    for (std::size_t i = 0; i < length; ++i) {
      text += words[random() % words.size()];
      if (random() % 2 == 0) text += ' ';
    }
    check_read(text);
  }
}

TEST_CASE("netlist junk: a netlist cut at any byte is read") {
  const std::string text =
      "title\n.subckt S a b PARAMS: T={1+2} U='3'\nR1 a b {max(T, U)}\n+ tc=1,2\n.ends S\nX1 c d S PARAMS: T=4\nV1 c 0 "
      "PULSE(0 5 1n)\n"
      "E1 a b TABLE {V(a,b)} = (0,0) (1,2)\nB1 a b V=if(V(a)>1, 2, 3)\n.model D1 D(IS=1n)\nQ1 c b e s BC\n.end\n";
  for (std::size_t length = 0; length <= text.size(); ++length) check_read(text.substr(0, length));
}
