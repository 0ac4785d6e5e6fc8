#include "grammar/expression.hpp"

#include <string_view>

#include <catch2/catch.hpp>
#include <tao/pegtl/contrib/analyze.hpp>

namespace {

namespace pegtl = tao::pegtl;
namespace rules = grammar::expression;
using Input = pegtl::memory_input<pegtl::tracking_mode::lazy, pegtl::eol::lf_crlf>;

constexpr int refused = -1;
constexpr int raised = -2;

// How many bytes are left behind what the rule takes; `refused` where it takes nothing, `raised` where it began and
// went wrong.
template <typename Rule>
int left(std::string_view text) {
  Input in(text.data(), text.data() + text.size(), "");
  try {
    return pegtl::parse<Rule>(in) ? static_cast<int>(in.size()) : refused;
  } catch (const pegtl::parse_error&) {
    return raised;
  }
}

}  // namespace

TEST_CASE("the expression grammar has no rule that can loop without taking a byte") {
  CHECK(pegtl::analyze<rules::whole>(0) == 0);
  CHECK(pegtl::analyze<rules::leading>(0) == 0);
}

TEST_CASE("a number takes all letters and digits that are glued to it, and no operator") {
  CHECK(left<rules::number>("10k*2") == 2);
  CHECK(left<rules::number>("1e-3+1") == 2);
  CHECK(left<rules::number>("1e+x") == 2);
  CHECK(left<rules::number>("4k7") == 0);
  CHECK(left<rules::number>("2.5meg") == 0);
  CHECK(left<rules::number>(".5") == 0);
  CHECK(left<rules::number>("10\xC2\xB5") == 0);
  CHECK(left<rules::number>("1-2") == 2);
  CHECK(left<rules::number>("x1") == refused);
  CHECK(left<rules::number>(".") == refused);
  CHECK(left<rules::number>("-1") == refused);
}

TEST_CASE("a name begins with a letter, an underscore or a byte beyond ASCII") {
  CHECK(left<rules::name>("R25*2") == 2);
  CHECK(left<rules::name>("_a.b#$ c") == 2);
  CHECK(left<rules::name>("\xC2\xB5x") == 0);
  CHECK(left<rules::name>("a!=b") == 3);
  CHECK(left<rules::name>("1a") == refused);
}

TEST_CASE("V holds one net or two, I one source, and the names of nets may hold signs and brackets") {
  CHECK(left<rules::volts>("V(a) ") == 1);
  CHECK(left<rules::volts>("v ( a , b )") == 0);
  CHECK(left<rules::volts>("V(+3V3,Net-(R1-Pad2))") == 0);
  CHECK(left<rules::volts>("V(a b)") == 0);
  CHECK(left<rules::volts>("V()") == raised);
  CHECK(left<rules::volts>("V(a,)") == raised);
  CHECK(left<rules::volts>("V(a,b,c)") == raised);
  CHECK(left<rules::volts>("V(a") == raised);
  CHECK(left<rules::volts>("Vx(a)") == refused);
  CHECK(left<rules::amperes>("I(V1)*2") == 2);
  CHECK(left<rules::amperes>("I(V1,V2)") == raised);
  CHECK(left<rules::amperes>("if(a,b,c)") == refused);
}

TEST_CASE("calls have any number of arguments, and groups must close") {
  CHECK(left<rules::call>("f()") == 0);
  CHECK(left<rules::call>("max( 1 , 2, g(3) )+1") == 2);
  CHECK(left<rules::call>("f(1") == raised);
  CHECK(left<rules::call>("f(1,)") == raised);
  CHECK(left<rules::call>("f") == refused);
  CHECK(left<rules::group>("(1)2") == 1);
  CHECK(left<rules::group>("(1") == raised);
  CHECK(left<rules::group>("()") == raised);
  CHECK(left<rules::braces>("{a*2}") == 0);
  CHECK(left<rules::braces>("{a*2)") == raised);
}

TEST_CASE("each operator is taken whole") {
  for (const std::string_view sign :
       {"+", "-", "*", "/", "%", "**", "^", "<", "<=", ">", ">=", "==", "!=", "<>", "&&", "||", "?", ":"}) {
    INFO(sign);
    CHECK(left<rules::infix>(sign) == 0);
  }
  CHECK(left<rules::infix>("=") == refused);
  CHECK(left<rules::infix>("!") == refused);
  CHECK(left<rules::infix>("~") == refused);
}

TEST_CASE("a leading expression ends before the next key, and a whole one takes all or raises") {
  CHECK(left<rules::leading>(" b*2 c=3") == 4);
  CHECK(left<rules::leading>("(1 + 2) * -x)") == 1);
  CHECK(left<rules::leading>("1 +") == raised);
  CHECK(left<rules::leading>("") == raised);
  CHECK(left<rules::whole>(" 1 ? 2 : 3 ") == 0);
  CHECK(left<rules::whole>("1 2") == raised);
  CHECK(left<rules::whole>("- - ! x") == 0);
  CHECK(left<rules::whole>("*x") == raised);
}
