#include "parse/expression/expression.hpp"

#include <catch2/catch.hpp>

#include "netlist_reading.hpp"
#include "parse/expression/functions.hpp"

namespace {

// The tree of a whole expression, or why there is none.
std::string tree(std::string_view text) {
  model::ExpressionPool pool;
  base::NameTable names;
  const parse::ExpressionRead read = parse::read_expression(text, 100, parse::Extent::whole, 200, pool, names);
  if (!read.fault) return parse_test::show_tree(pool, names, read.root);
  if (!pool.nodes.empty() || !pool.arguments.empty()) return "the pool has been left in disorder";
  return std::to_string(read.fault->offset - 100) + ": " + read.fault->message;
}

}  // namespace

TEST_CASE("expressions: operators bind as in ngspice 39's parameters") {
  // Measured with ngspice 39.3: each of these as a .param, except where noted.
  CHECK(tree("-2**2") == "(neg (^ 2 2))");
  CHECK(tree("2**3**2") == "(^ (^ 2 3) 2)");
  CHECK(tree("2^-1") == "(^ 2 (neg 1))");
  CHECK(tree("1-2-3") == "(- (- 1 2) 3)");
  CHECK(tree("8/4/2") == "(/ (/ 8 4) 2)");
  CHECK(tree("!0+1") == "(+ (! 0) 1)");
  CHECK(tree("1+2<2+2") == "(< (+ 1 2) (+ 2 2))");
  CHECK(tree("1<2==1") == "(== (< 1 2) 1)");
  CHECK(tree("2*-3") == "(* 2 (neg 3))");
  CHECK(tree("-3**2*2") == "(* (neg (^ 3 2)) 2)");
  CHECK(tree("1?2:0?3:4") == "(? 1 2 (? 0 3 4))");
  // From the ngspice manual's table of precedence.
  CHECK(tree("a||b&&c") == "(|| a (&& b c))");
  CHECK(tree("a&&b==c") == "(&& a (== b c))");
  CHECK(tree("a?b?c:d:e") == "(? a (? b c d) e)");
  CHECK(tree("a?b+1:c+1") == "(? a (+ b 1) (+ c 1))");
  CHECK(tree("a%b*c") == "(* (% a b) c)");
  CHECK(tree("a<>b") == "(!= a b)");
  CHECK(tree("a!=b") == "(!= a b)");
  CHECK(tree("+a") == "a");
  CHECK(tree("--a") == "(neg (neg a))");
}

TEST_CASE("expressions: brackets and braces group") {
  CHECK(tree("(1+2)*3") == "(* (+ 1 2) 3)");
  CHECK(tree("{1+2}*3") == "(* (+ 1 2) 3)");
  CHECK(tree(" ( ( a ) ) ") == "a");
  CHECK(tree("(a?b:c)+1") == "(+ (? a b c) 1)");
}

TEST_CASE("expressions: numbers keep both readings") {
  CHECK(tree("10k") == "10000");
  CHECK(tree("4k7") == "4700|4000");
  CHECK(tree("1M") == "1000000|0.001");
  CHECK(tree("1e-3+1") == "(+ 0.001 1)");
}

TEST_CASE("expressions: voltages, currents, temperature and time are leaves") {
  CHECK(tree("V(a)-v( b , c )") == "(- V(a) V(b,c))");
  CHECK(tree("V(+3V3)*I(V1)") == "(* V(+3V3) I(V1))");
  CHECK(tree("V(Net-(R1-Pad2))") == "V(Net-(R1-Pad2))");
  CHECK(tree("temp+TEMPER+time") == "(+ (+ temp temp) time)");
  CHECK(tree("v+i") == "(+ v i)");
  CHECK(tree("1000*(1+0.00385*temp)*mc(1,0.0012)") == "(* (* 1000 (+ 1 (* 0.00385 temp))) (nominal 1 0.0012))");
}

TEST_CASE("expressions: each function of the table is known by its name in any case") {
  for (const char* const name :
       {"abs",  "sgn",    "sqrt",  "exp",    "ln",    "log",  "log10", "sin",   "cos",   "tan",   "asin",  "acos",
        "atan", "arctan", "atan2", "sinh",   "cosh",  "tanh", "asinh", "acosh", "atanh", "floor", "ceil",  "round",
        "nint", "int",    "min",   "max",    "pow",   "pwr",  "pwrs",  "limit", "u",     "stp",   "uramp", "table",
        "pwl",  "mc",     "gauss", "agauss", "aunif", "unif", "flat",  "SQRT",  "Max"}) {
    INFO(name);
    CHECK(parse::find_function(name) != nullptr);
  }
  CHECK(parse::find_function("log")->function == model::Function::ln);
  CHECK(parse::find_function("nosuch") == nullptr);
}

TEST_CASE("expressions: if is the conditional, and a function that nobody knows is kept by its name") {
  CHECK(tree("if(a, b, c)") == "(? a b c)");
  CHECK(tree("foo(a, 1)") == "(foo a 1)");
  CHECK(tree("foo()") == "(foo)");
}

TEST_CASE("expressions: spread functions of one argument are a deviation around zero") {
  CHECK(tree("1+flat(0.1)") == "(+ 1 0)");
  CHECK(tree("gauss(x)") == "0");
  CHECK(tree("gauss(x, 0.1, 3)") == "(nominal x 0.1 3)");
}

TEST_CASE("expressions: a fault says what was expected, where, and leaves no trace") {
  CHECK(tree("") == "0: expected a number, a name or a bracket, found the end");
  CHECK(tree("a+") == "2: expected a number, a name or a bracket, found the end");
  CHECK(tree("a b") == "2: expected an operator or the end of the expression, found \"b\"");
  CHECK(tree("max(1,)") == "6: expected a number, a name or a bracket, found \")\"");
  CHECK(tree("max(1") == "5: expected an operator, a comma or ), found the end");
  CHECK(tree("sin(1,2)") == "0: sin takes 1 argument, found 2");
  CHECK(tree("agauss(1)") == "0: agauss takes 2 to 3 arguments, found 1");
  CHECK(tree("1+(a?b)") == "4: expected : after this ? and the value that follows it");
  CHECK(tree("a?(b:c)") == "4: expected an operator or the end of the expression, found : without ? before it");
  CHECK(tree("a?f(b:c)") == "5: expected an operator or the end of the expression, found : without ? before it");
  CHECK(tree("a=b") == "1: expected an operator or the end of the expression, found \"=b\"");
}

TEST_CASE("expressions: a leading expression ends where no operator follows") {
  model::ExpressionPool pool;
  base::NameTable names;
  const auto read = parse::read_expression(" a*2 b=3", 0, parse::Extent::leading, 200, pool, names);
  REQUIRE_FALSE(read.fault);
  CHECK(read.length == 4);
}

TEST_CASE("expressions: nodes know the place of their text") {
  model::ExpressionPool pool;
  base::NameTable names;
  const auto read = parse::read_expression("a + f(b)", 50, parse::Extent::whole, 200, pool, names);
  REQUIRE_FALSE(read.fault);
  const model::ExpressionNode& sum = pool[read.root];
  CHECK(sum.offset == 52);
  CHECK(pool[pool.argument(sum, 0)].offset == 50);
  CHECK(pool[pool.argument(sum, 1)].offset == 54);
}

TEST_CASE("expressions: no depth of brackets or operators beyond the limit is taken, however high it is set") {
  model::ExpressionPool pool;
  base::NameTable names;
  const std::string deep = std::string(5000, '(') + "1" + std::string(5000, ')');
  const auto read = parse::read_expression(deep, 0, parse::Extent::whole, 1'000'000, pool, names);
  REQUIRE(read.fault);
  CHECK(read.fault->message == "brackets lie deeper inside one another than the limit expression_depth = 1000");
  const std::string fits = std::string(1000, '(') + "1" + std::string(1000, ')');
  CHECK_FALSE(parse::read_expression(fits, 0, parse::Extent::whole, 1'000'000, pool, names).fault);
}
