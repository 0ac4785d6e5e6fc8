// Broken netlists: the exact message and place of each, and reading goes on behind it.
#include <fmt/format.h>

#include <catch2/catch.hpp>

#include "netlist_reading.hpp"

using parse_test::NetlistReading;
using Said = std::vector<std::string>;

namespace {

struct Broken {
  const char* card;  // stands on line 2
  const char* said;  // line:column: level: message
};

constexpr Broken all[]{
    {"R1", "2:1: error: a resistor needs two nodes and a value"},
    {"R1 a", "2:1: error: a resistor needs two nodes and a value"},
    {"C1 a", "2:1: error: a capacitor needs two nodes and a value"},
    {"L1 a", "2:1: error: an inductor needs two nodes and a value"},
    {"V1 a", "2:1: error: a voltage source needs two nodes"},
    {"I1", "2:1: error: a current source needs two nodes"},
    {"D1 a b", "2:1: error: a diode needs two nodes and a model"},
    {"Q1 a b c", "2:1: error: a bipolar transistor needs three nodes and a model"},
    {"M1 a b c", "2:1: error: a MOS transistor needs three or four nodes and a model"},
    {"E1 a b c",
     "2:1: error: a controlled voltage source needs four nodes and a gain, or two nodes and VALUE = an expression"},
    {"G1 a b c d",
     "2:1: error: a controlled current source needs four nodes and a gain, or two nodes and VALUE = an expression"},
    {"E1 a b c d gain", "2:12: error: expected the gain of a controlled voltage source, found \"gain\""},
    {"E1 a b TABLE x (1,2)", "2:14: error: expected an expression in braces behind TABLE, found \"x\""},
    {"E1 a b TABLE {x} (1,2) (3)", "2:8: error: a TABLE needs pairs of numbers, found 3"},
    {"E1 a b TABLE {x} (1,{2+})", "2:24: error: expected a number, a name or a bracket, found the end"},
    {"B1 a b", "2:1: error: a behavioural source needs two nodes and V = or I = an expression"},
    {"B1 a b V=", "2:8: error: expected a value for V, found the end of the card"},
    {"X1", "2:3: error: expected the nodes of X1 and its subcircuit's name, found the end of the card"},
    {"X1 a b S PARAMS: T", "2:18: error: expected key = value, found \"T\""},
    {"U1", "2:3: error: expected the nodes of U1 and what it is, found the end of the card"},
    {"R1 a b 1k tol=", "2:11: error: expected a value for tol, found the end of the card"},
    {"R1 a b R= tc1=0", "2:11: error: expected a value for R, found the next key tc1"},
    {"R1 a b {1+", "2:8: error: the { is never closed on this card"},
    {"R1 a b 'x", "2:8: error: the ' is never closed on this card"},
    {"R1 a b {1+*2}", "2:11: error: expected a number, a name or a bracket, found \"*2\""},
    {"R1 a b {(1+2}", "2:13: error: expected an operator or ), found the end"},
    {"R1 a b {1 2}", "2:11: error: expected an operator or the end of the expression, found \"2\""},
    {"R1 a b {}", "2:9: error: expected a number, a name or a bracket, found the end"},
    {"R1 a b 1,000",
     "2:8: error: \"1,000\" may be a decimal comma or a separator of thousands; write a point, or no comma"},
    {"C1 a b 10,000 5%",
     "2:8: error: \"10,000 5%\" may be a decimal comma or a separator of thousands; write a point, or no comma"},
    {"V1 a 0 3,300",
     "2:8: error: \"3,300\" may be a decimal comma or a separator of thousands; write a point, or no comma"},
    {"R1 a b 10k 100%", "2:8: error: \"10k 100%\" has a tolerance of 100 % or more"},
    {"R1 a b 4k75%",
     "2:8: error: \"4k75%\" leaves open where the value ends and the tolerance begins; put a blank between them"},
    {"R1 a b 1e400", "2:8: error: \"1e400\" is too large or too small for a number"},
    {"R1 a b 1k R=2k", "2:11: error: the value stands twice on the card; the second is R = \"2k\""},
    {"R1 a b {1k}}", "2:12: error: expected the end of the value, found \"}\""},
    {"R1 a b {1k} 10k", "2:13: error: expected the end of the value, found \"10k\""},
    {"R1 a b {2*3k}*2", "2:14: error: expected the end of the value, found \"*2\""},
    {"R1 a b 2 * 3", "2:10: error: expected the end of the value, found \"*\""},
    {"V1 a 0 PULSE", "2:8: error: expected numbers behind PULSE, found the end of the card"},
    {"V1 a 0 PWL(0)", "2:8: error: expected numbers behind PWL(0), found the end of the card"},
    {"R1 = a b", "2:4: error: expected a node, found \"=\""},
    {"R9 A {undefined+} 47k", "2:6: error: expected a node, found \"{undefined+}\""},
    {"V1 a 0 DC five", "2:11: error: expected a number behind DC, found \"five\""},
    {"V1 a 0 PULSE low high", "2:8: error: expected numbers behind PULSE, found \"low\""},
    {"V1 a 0 5 =", "2:8: error: expected a value for 5, found the end of the card"},
    {"5V a b", "2:1: error: expected an element, which begins with a letter, or a dot card, found \"5V\""},
    {"{x} a b", "2:1: error: expected an element, which begins with a letter, or a dot card, found \"{x}\""},
    {"((", "2:1: error: expected an element or a dot card, found \"((\""},
    {".ends", "2:1: error: .ends stands without .subckt before it"},
    {".param", "2:7: error: expected name = value behind .param, found the end of the card"},
    {".param a", "2:8: error: expected a value for a, found the end of the card"},
    {".param a=", "2:8: error: expected a value for a, found the end of the card"},
    {".param a= b=1", "2:11: error: expected a value for a, found the next key b"},
    {".param 5=1", "2:8: error: expected a parameter's name, found \"5\""},
    {".param f(x)=1", "2:8: error: functions of the netlist are not followed by this version"},
    {".param a={pow(1)}", "2:11: error: pow takes 2 arguments, found 1"},
    {".param a={table(1,2,3,4)}", "2:11: error: table takes at least 3 arguments (one value, then pairs), found 4"},
    {".param a={if(1,2)}", "2:11: error: if takes 3 arguments, found 2"},
    {".param a={x ? 1}", "2:13: error: expected : after this ? and the value that follows it"},
    {".param a={1 : 2}", "2:13: error: expected an operator or the end of the expression, found : without ? before it"},
    {".param a={V(}", "2:13: error: expected the name of a net, found the end"},
    {".param a={I(V1,V2)}", "2:15: error: expected ), found \",\""},
    {".param a={4x7..}", "2:11: error: expected a number such as 10k, 4k7, 2.2u or 1e3, found \"4x7\""},
    {".param a=x@y", "2:11: error: expected an operator or a blank, found \"@y\""},
    {".model M", "2:1: error: a model needs a name and a type"},
    {".model M x=1", "2:8: error: a model needs a name and a type"},
    {".modell M D", "2:1: error: unknown card \".modell\"; did you mean .model?"},
    {".zzzzzz", "2:1: error: unknown card \".zzzzzz\""},
    {".func f(x) {x}", "2:1: error: functions of the netlist are not followed by this version"},
    {".else", "2:1: error: .else stands without .if before it"},
    {".endc", "2:1: error: .endc stands without .control before it"},
    {".endl", "2:1: error: .endl stands without .lib before it"},
    {".global", "2:8: error: expected the names of nets behind .global, found the end of the card"},
    {".include", "2:9: error: expected a file behind .include, found the end of the card"},
    {".lib", "2:5: error: expected a file behind .lib, found the end of the card"},
};

}  // namespace

TEST_CASE("netlist errors: each broken card is told with its place, and the card behind it is read") {
  for (const Broken& broken : all) {
    INFO(broken.card);
    const NetlistReading reading("title\n" + std::string(broken.card) + "\n\nR9 y z 1\n");
    CHECK(reading.said() == Said{"t.cir:" + std::string(broken.said)});
    CHECK(reading.element("R9") == "r R9(y z) = 1");
    CHECK(reading.fates().back() == '1');
  }
}

TEST_CASE("netlist errors: all errors of a file are told in one run, in the order of the text") {
  // Q1 waits for the models of the whole netlist, and is told in its place all the same.
  const NetlistReading reading("title\nR1 a\nQ1 c b e 0 BC area=\nR2 b\n.ends\n.model BC NPN\n.param x={\nX1\n");
  CHECK(reading.said() ==
        Said{"t.cir:2:1: error: a resistor needs two nodes and a value",
             "t.cir:3:15: error: expected a value for area, found the end of the card",
             "t.cir:4:1: error: a resistor needs two nodes and a value",
             "t.cir:5:1: error: .ends stands without .subckt before it",
             "t.cir:7:10: error: the { is never closed on this card",
             "t.cir:8:3: error: expected the nodes of X1 and its subcircuit's name, found the end of the card"});
  CHECK(reading.top().elements.empty());
  CHECK(reading.fates() == "1 0 0 6");
}

TEST_CASE("netlist errors: an .ends that names another subcircuit is an error and closes the inner one") {
  const NetlistReading reading("title\n.subckt A x\nR1 x 0 1\n.ends B\nR2 a b 1\n");
  CHECK(reading.said() == Said{"t.cir:4:7: error: expected the end of A, found .ends B"});
  CHECK(reading.top().elements.size() == 1);
}

TEST_CASE("netlist errors: files that are no netlists are told once") {
  CHECK(NetlistReading("(a (b c)\n  (d e))\n").said() ==
        Said{"t.cir:1:1: error: this is no SPICE netlist: it looks like a list in brackets"});
  CHECK(NetlistReading("<?xml version=\"1.0\"?>\n<a/>\n").said() ==
        Said{"t.cir:1:1: error: this is no SPICE netlist: it looks like XML"});
  CHECK(NetlistReading("\xFF\xFEt\n").said() ==
        Said{"t.cir:1:1: error: this is no SPICE netlist: it is text in UTF-16; save it as UTF-8"});
}

TEST_CASE("netlist errors: each limit is named when it is reached") {
  source::Limits limits;
  limits.nesting = 2;
  CHECK(NetlistReading("title\n.subckt A a\n.subckt B a\n.ends\n.ends\n", {}, limits).said().empty());
  CHECK(NetlistReading("title\n.subckt A a\n.subckt B a\n.subckt C a\n.subckt D a\n.ends\n.ends\n.ends\n.ends\n", {},
                       limits)
            .said() == Said{"t.cir:4:1: error: subcircuits lie deeper inside one another than the limit nesting = 2"});

  limits.expression_depth = 3;
  CHECK(NetlistReading("title\n.param a={((1))} b={1+2+x}\n", {}, limits).said().empty());
  CHECK(NetlistReading("title\n.param a={((((1))))}\n", {}, limits).said() ==
        Said{"t.cir:2:14: error: brackets lie deeper inside one another than the limit expression_depth = 3"});
  CHECK(NetlistReading("title\n.param a={1+2+3+x}\n", {}, limits).said() ==
        Said{"t.cir:2:16: error: operators lie deeper inside one another than the limit expression_depth = 3"});

  limits.line_bytes = 10;
  CHECK(NetlistReading("title\nR1 a b 100\nR2 a b 1\n", {}, limits).said().empty());
  const NetlistReading reading("title\nR1 a b 1000\nR2 a b 1\n* a long comment\n", {}, limits);
  CHECK(reading.said() == Said{"t.cir:2:1: error: the line has 11 bytes, more than the limit line_bytes = 10",
                               "t.cir:4:1: error: the line has 16 bytes, more than the limit line_bytes = 10"});
  CHECK(reading.element("R2") == "r R2(a b) = 1");
  CHECK(NetlistReading("title\nR1 a b 1\n+ tc1=1 tc2=2\nR2 a b 1\n", {}, limits).said() ==
        Said{"t.cir:3:1: error: the card goes on in a line longer than the limit line_bytes = 10",
             "t.cir:3:1: error: the line has 13 bytes, more than the limit line_bytes = 10"});
}
