// Subcircuits, parameters, models, what is passed over.
#include <catch2/catch.hpp>

#include "netlist_reading.hpp"

using parse_test::NetlistReading;
using Said = std::vector<std::string>;

TEST_CASE("netlist scopes: subcircuits nest, and each holds its own cards") {
  const NetlistReading reading(
      "title\n.subckt OUTER a b PARAMS: T R25=10k\n.param k={2*T}\n.subckt inner x y\nR1 x y 1\n.ends inner\nX1 a b "
      "inner\n.ends OUTER\nX2 c d OUTER\n");
  const auto& scopes = reading.netlist().scopes;
  REQUIRE(scopes.size() == 3);
  CHECK(reading.said().empty());
  CHECK(reading.name(scopes[1].name) == "OUTER");
  CHECK(reading.words(scopes[1].ports) == "a b");
  CHECK(reading.show(scopes[1].defaults) == "T=nothing R25=10000");
  CHECK(reading.show(scopes[1].parameters) == "k=(* 2 T)");
  CHECK(scopes[1].parent.value == 0);
  CHECK(scopes[1].scopes == std::vector{model::ScopeId{2}});
  CHECK(scopes[0].scopes == std::vector{model::ScopeId{1}});
  CHECK(scopes[2].parent.value == 1);
  CHECK(scopes[2].elements.size() == 1);
  CHECK(scopes[0].elements.size() == 1);
}

TEST_CASE("netlist scopes: defaults may stand without PARAMS:, in quotes, in braces or bare") {
  const NetlistReading reading("title\n.subckt S a b p=1 q={p*2} r='q' v = w t\n.ends\n");
  CHECK(reading.words(reading.netlist().scopes[1].ports) == "a b");
  CHECK(reading.show(reading.netlist().scopes[1].defaults) == "p=1 q=(* p 2) r=q v=word w t=nothing");
}

TEST_CASE("netlist scopes: names of subcircuits and ports are any words") {
  const NetlistReading reading("title\n.SUBCKT S861(C1)_5000 1 2 GND VCC_3V3 PARAMS: TOL=0\n.ENDS\n");
  CHECK(reading.name(reading.netlist().scopes[1].name) == "S861(C1)_5000");
  CHECK(reading.words(reading.netlist().scopes[1].ports) == "1 2 GND VCC_3V3");
}

TEST_CASE("netlist scopes: several parameters stand on a card, with and without equals signs") {
  const NetlistReading reading(
      "title\n.param a=1 b={2*a} c=a*2 d = 'c + 1' e 5 f=(1+2)*x g=4k7 i=-a j=b\n.PARAM RT 2000\n");
  CHECK(reading.said().empty());
  CHECK(reading.show(reading.top().parameters) ==
        "a=1 b=(* 2 a) c=(* a 2) d=(+ c 1) e=5 f=(* (+ 1 2) x) g=4700|4000 i=(neg a) j=b RT=2000");
}

TEST_CASE("netlist scopes: models keep type and entries, and a key may stand alone") {
  const NetlistReading reading(
      "title\n.model __R2 r( r=10Meg tc1=100u )\n.model MX VDMOS(Rg=3 pchan mfg=AB)\n.model D1 D IS=1e-14\n");
  CHECK(reading.said().empty());
  REQUIRE(reading.top().models.size() == 3);
  CHECK(reading.name(reading.top().models[0].type) == "r");
  CHECK(reading.assignments(reading.top().models[0].parameters) == "r=10000000 tc1=0.0001");
  CHECK(reading.assignments(reading.top().models[1].parameters) == "Rg=3 pchan=nothing mfg=word AB");
  CHECK(reading.assignments(reading.top().models[2].parameters) == "IS=1e-14");
}

TEST_CASE("netlist scopes: global nets are listed") {
  const NetlistReading reading("title\n.global VCC GND\n");
  REQUIRE(reading.netlist().globals.size() == 2);
  CHECK(reading.name(reading.netlist().globals[1].name) == "GND");
}

TEST_CASE("netlist scopes: analyses are skipped with one note that lists them") {
  const NetlistReading reading("title\n.op\nR1 a b 1\n.TRAN 1 2\n.plot v(a)\n.op\n");
  CHECK(reading.fates() == "1 0 4 0");
  CHECK(reading.said() ==
        Said{"t.cir:2:1: note: analyses, options and output are not followed: .op, .tran, .plot (4 cards)"});
}

TEST_CASE("netlist scopes: a control block is skipped whole, whatever is in it") {
  const NetlistReading reading("title\n.control\nrun {\n'\n.subckt\n.endc\nR1 a b 1\n");
  CHECK(reading.fates() == "1 0 5 0");
  CHECK(reading.said() == Said{"t.cir:2:1: note: a control block of 3 lines is skipped: nothing in it is run"});
}

TEST_CASE("netlist scopes: what stands behind a .control without .endc counts as not read") {
  const NetlistReading reading("title\nR1 a b 1\n.control\nrun\nR9 a 0 1k\n.param p=1\n.model DX D\n.subckt S x\n");
  CHECK(reading.said() == Said{"t.cir:3:1: error: .control has no .endc, so no card from here on counts as read"});
  CHECK(reading.fates() == "1 0 0 6");
  CHECK(reading.show(reading.top().parameters) == "p=nothing");
  CHECK(reading.top().parameters[0].broken);
  CHECK(reading.top().models.at(0).broken);
  CHECK(reading.netlist().scopes.at(1).broken);
}

TEST_CASE("netlist scopes: what stands behind a .subckt without .ends counts as not read, for it and for the board") {
  // The forgotten .ends may be the one of OUT or of IN: nobody knows whose R9 is.
  const NetlistReading reading(
      "title\nR1 a b 1\n.subckt OUT x y\nR1 x y 1k\n.subckt IN x y\n.param p=1\nR1 x y 1k\n.ends\nR9 a 0 1k\n.model DX "
      "D\n"
      ".op\n.end\n");
  CHECK(reading.said() ==
        Said{"t.cir:3:1: error: the subcircuit OUT has no .ends, so no card from here on counts as read",
             "t.cir:11:1: note: analyses, options and output are not followed: .op (1 card)"});
  CHECK(reading.fates() == "1 0 1 9");
  CHECK(reading.netlist().scopes.at(1).broken);
  CHECK(reading.netlist().scopes.at(2).broken);
  CHECK(reading.top().parameters.at(0).broken);
  CHECK(reading.top().models.at(0).broken);
  CHECK(reading.netlist().faults.at(model::CardId{2}).cause == model::CardId{1});
}

TEST_CASE("netlist scopes: a header that cannot be read keeps its cards from the board, and its users from it") {
  for (const char* header : {".subckt S x y p={", ".subckt S x y p=", ".subckt"}) {
    INFO(header);
    const NetlistReading reading("title\n" + std::string(header) + "\nR9 x y 1k\n.ends\nR1 a b 1\n");
    CHECK(reading.said().size() == 1);
    CHECK(reading.fates() == "3 0 0 1");
    CHECK(reading.top().elements.size() == 1);
    CHECK(reading.netlist().scopes.at(1).broken);
  }
}

TEST_CASE("netlist scopes: parameters and models on cards that are not read are known to be unknown") {
  const auto broken = [](const std::string& text) {
    const NetlistReading reading(text);
    std::string names;
    for (const model::ParameterCard& card : reading.top().parameters)
      if (card.broken) names += reading.name(card.name.name) + " ";
    for (const model::ModelCard& card : reading.top().models)
      if (card.broken) names += reading.name(card.name) + " ";
    return names;
  };
  CHECK(broken("title\n.param R=1k\n.param R={2k\n") == "R ");
  CHECK(broken("title\n.param A = 1 B={2*} C= 'x' D=\n") == "A B C D ");
  CHECK(broken("title\n.param A {2*}\n") == "A ");
  CHECK(broken("title\n.model DX D is={\n") == "DX ");
  CHECK(broken("title\n.if (x)\n.param R=2k\n.model DX D\n.endif\n") == "R DX ");
}

TEST_CASE("netlist scopes: cards behind .end are counted as skipped, with one warning at the first") {
  const NetlistReading reading("title\nR1 a b 1\n.end\n\nR2 a b 1\nR3 a b {\n");
  CHECK(reading.fates() == "2 0 2 0");
  CHECK(reading.said() == Said{"t.cir:5:1: warning: 2 cards behind .end, from this one on, are skipped"});
}

TEST_CASE("netlist scopes: conditional cards are told once and nothing up to .endif is taken") {
  const NetlistReading reading("title\n.if (x)\nR1 a b 1\n.if (y)\n.endif\n.else\nR2 a b 1\n.endif\nR3 a b 1\n");
  CHECK(reading.fates() == "1 0 0 7");
  CHECK(reading.top().elements.size() == 1);
  CHECK(reading.said() == Said{"t.cir:2:1: error: conditional cards are not followed by this version: all cards from "
                               "here to .endif are not read"});
}

TEST_CASE(
    "netlist scopes: a subcircuit or model that stands twice is an error where the texts differ, and a note else") {
  const NetlistReading reading(
      "title\n.subckt D a b\nR1 a b 10k\n.ends\n.model DX D(is=1e-14)\n.subckt d A  B ; again\nr1 a b\n+ 10K\n.ends\n"
      ".subckt D a b\nR1 a b 20k\n.ends\n.model DX D(is=1e-3)\n.model DX D(is=1e-14)\n");
  CHECK(reading.said() == Said{"t.cir:6:1: note: this definition stands twice with the same text; so it is with 1 more",
                               "t.cir:10:1: error: subcircuit D stands twice and says something else at t.cir:2",
                               "t.cir:13:1: error: model DX stands twice and says something else at t.cir:5"});
  CHECK_FALSE(reading.netlist().scopes.at(2).broken);
  CHECK(reading.netlist().scopes.at(3).broken);
  CHECK(reading.top().models.at(1).broken);
  CHECK_FALSE(reading.top().models.at(2).broken);
}

TEST_CASE("netlist scopes: a model of a subcircuit may have the name of another one outside") {
  CHECK(NetlistReading("title\n.model DX D(is=1)\n.subckt S a\n.model DX D(is=2)\n.ends\n").said().empty());
}
