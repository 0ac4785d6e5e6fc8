#include "grammar/netlist.hpp"

#include <string>
#include <string_view>

#include <catch2/catch.hpp>
#include <tao/pegtl/contrib/analyze.hpp>

namespace {

namespace pegtl = tao::pegtl;
namespace rules = grammar::netlist;
using Input = pegtl::memory_input<pegtl::tracking_mode::lazy, pegtl::eol::lf_crlf>;

// How many bytes are left behind what the rule takes; -1 where it refuses.
template <typename Rule>
int left(std::string_view text) {
  Input in(text.data(), text.data() + text.size(), "");
  return pegtl::parse<Rule>(in) ? static_cast<int>(in.size()) : -1;
}

}  // namespace

TEST_CASE("the netlist grammar has no rule that can loop without taking a byte") {
  CHECK(pegtl::analyze<rules::text>(0) == 0);
  CHECK(pegtl::analyze<rules::continuation>(0) == 0);
}

TEST_CASE("a plain word ends at blanks, commas, equals signs, braces, semicolons and line ends") {
  CHECK(left<rules::plain>("R1 a") == 2);
  CHECK(left<rules::plain>("a,b") == 2);
  CHECK(left<rules::plain>("a=b") == 2);
  CHECK(left<rules::plain>("a{b}") == 3);
  CHECK(left<rules::plain>("a;b") == 2);
  CHECK(left<rules::plain>("a\nb") == 2);
  CHECK(left<rules::plain>("a\rb") == 2);
  CHECK(left<rules::plain>(std::string_view("a\0b", 3)) == 2);
  CHECK(left<rules::plain>("") == -1);
  CHECK(left<rules::plain>(" a") == -1);
  CHECK(left<rules::plain>("(a)") == -1);
  CHECK(left<rules::plain>("'a'") == -1);
}

TEST_CASE("names of nets hold signs, brackets and any byte beyond ASCII") {
  for (const std::string_view name : {"+3V3", "-5V", "/SHEET/NET", "a.b", "a#", "d[0]", "<1>", "GND!", "a%b", "a&b",
                                      "a~", "a@b", "R\xA7", "R\xC2\xA7", "?", "5V"}) {
    INFO(name);
    CHECK(left<rules::plain>(name) == 0);
  }
}

TEST_CASE("a bracket inside a word belongs to it when it closes before a blank, a comma or an equals sign") {
  CHECK(left<rules::plain>("R(PULL)3 a") == 2);
  CHECK(left<rules::plain>("Net-(R1-Pad2)") == 0);
  CHECK(left<rules::plain>("S861(C1)_5000 x") == 2);
  CHECK(left<rules::plain>("a(b(c)d)e") == 0);
  CHECK(left<rules::plain>("D(IS=1)") == 6);
  CHECK(left<rules::plain>("PULSE(0 5)") == 5);
  CHECK(left<rules::plain>("max(1,2)") == 5);
  CHECK(left<rules::plain>("r(") == 1);
  CHECK(left<rules::plain>("a)b") == 2);
}

TEST_CASE("a bracket that closes beyond the reach of the rule parts the word") {
  const std::string inside(rules::inner_bracket::reach - 2, 'x');
  CHECK(left<rules::plain>("a(" + inside + ")") == 0);
  CHECK(left<rules::plain>("a(x" + inside + ")") == static_cast<int>(inside.size()) + 3);
}

TEST_CASE("braces nest and run over continuations, and a quote closes at the next one") {
  CHECK(left<rules::braced>("{a*{b}} c") == 2);
  CHECK(left<rules::braced>("{a\n+ b}c") == 1);
  CHECK(left<rules::braced>("{a ; why\n* comment\n\n +b}") == 0);
  CHECK(left<rules::braced>("{a\nb}") == -1);
  CHECK(left<rules::braced>("{a") == -1);
  CHECK(left<rules::braced>("{a{b}") == -1);
  CHECK(left<rules::quoted>("'a b'c") == 1);
  CHECK(left<rules::quoted>("'a\r\n+b'") == 0);
  CHECK(left<rules::quoted>("'a") == -1);
  CHECK(left<rules::text_in_quotes>("\"a;b, c\"d") == 1);
  CHECK(left<rules::text_in_quotes>("\"a\nb\"") == -1);
}

TEST_CASE("a card goes on behind comments and empty lines, at a + with blanks or without") {
  CHECK(left<rules::continuation>("\n+b") == 1);
  CHECK(left<rules::continuation>("\r\n  + b") == 2);
  CHECK(left<rules::continuation>("\r+b") == 1);
  CHECK(left<rules::continuation>("\n* comment\n\n \t\n ; more\n$ more\n// more\n+b") == 1);
  CHECK(left<rules::continuation>("\nb") == -1);
  CHECK(left<rules::continuation>("\n* comment\nb") == -1);
  CHECK(left<rules::continuation>("+b") == -1);
  CHECK(left<rules::card>("R1 a\n+b 10k\nR2") == 3);
}

TEST_CASE("comments in a line begin at a semicolon, and at $ and // only behind a blank") {
  CHECK(left<rules::blanks>(" $ rest\nx") == 2);
  CHECK(left<rules::blanks>("  // rest") == 0);
  CHECK(left<rules::blanks>(" a") == 1);
  CHECK(left<rules::line_comment>("; rest\nx") == 2);
  CHECK(left<rules::plain>("a$b") == 0);
  CHECK(left<rules::plain>("a//b") == 0);
}

TEST_CASE("what never closes takes the rest of its card") {
  CHECK(left<rules::unclosed_brace>("{a b\n+ c\nR1") == 3);
  CHECK(left<rules::unclosed_quote>("'a b") == 0);
  CHECK(left<rules::unclosed_brace>("a") == -1);
}

TEST_CASE("NUL and Ctrl-Z are stray bytes, but for a Ctrl-Z at the very end") {
  CHECK(left<rules::stray_byte>(std::string_view("\0", 1)) == 0);
  CHECK(left<rules::stray_byte>("\x1a\n") == 1);
  CHECK(left<rules::stray_byte>("\x1a") == -1);
  CHECK(left<rules::stray_byte>("a") == -1);
}

TEST_CASE("every byte sequence is a text") {
  for (const std::string_view text : {"", "\n", "R1 a b 1", "\r\r\n\n", "(((", ")=,;", "{", "'", "\"", "\x1a", "a\x1a",
                                      "\x1a\x1a", "+", " ", " ;", "* x"}) {
    INFO(text);
    CHECK(left<rules::text>(text) == 0);
  }
  CHECK(left<rules::text>(std::string_view("\0\xFF{\0", 4)) == 0);
}

TEST_CASE("each rule that a card cannot be read for has its error text") {
  CHECK(std::string_view(rules::error_text<rules::unclosed_brace>) == "the { is never closed on this card");
  CHECK(std::string_view(rules::error_text<rules::unclosed_quote>) == "the ' is never closed on this card");
  CHECK(std::string_view(rules::error_text<rules::stray_byte>) == "a byte that no netlist holds");
}
