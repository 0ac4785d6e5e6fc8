#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;
using model::CardFate;
using trees::Function;
using trees::Op;
using Why = model::Unmodelled::Why;

TEST_CASE("sources with a gain are controlled by voltage, and a gain may be an expression of parameters") {
  Deck d;
  d.parameter("A", 1e5);
  d.element("E1", "out 0 p n", d.name("A"));
  d.element("G1", "out 0 p n", 1e-3);
  d.flatten();
  const auto& e = std::get<model::VoltageControlled>(d.at("E1").part);
  CHECK(e.gain.value == 1e5);
  CHECK_FALSE(e.drives_current);
  CHECK(std::get<model::VoltageControlled>(d.at("G1").part).drives_current);
  CHECK(d.pins("G1") == "out 0 p n");
}

TEST_CASE("a source controlled by a current finds its voltage source in its own scope, before or after it") {
  Deck d;
  d.subcircuit("S", "p");
  d.element("F1", "p 0", 2.0, "V1");
  d.element("V1", "p q", 0.0);
  d.element("R1", "q 0", 1.0);
  d.ends();
  d.element("V1", "a 0", 1.0);
  d.part("X1", "a", "S");
  d.element("H1", "b 0", 50.0, "v1");
  d.flatten();
  CHECK(std::get<model::CurrentControlled>(d.at("X1.F1").part).through == model::ElementId{2});
  CHECK(std::get<model::CurrentControlled>(d.at("X1.F1").part).drives_current);
  CHECK(std::get<model::CurrentControlled>(d.at("H1").part).through == model::ElementId{0});
  CHECK_FALSE(std::get<model::CurrentControlled>(d.at("H1").part).drives_current);
}

TEST_CASE("a source controlled by what is no voltage source is an error") {
  Deck d;
  d.element("R1", "a 0", 1.0);
  const auto card = d.element("F1", "a 0", 2.0, "R1").card;
  d.flatten();
  CHECK(d.said() == "error at 105: F1 is controlled by the current of R1, and there is no such voltage source here\n");
  CHECK(d.netlist.cards[card.index()].fate == CardFate::error);
}

TEST_CASE("a behavioural source keeps a tree whose leaves are nets and elements of the flat circuit") {
  Deck d;
  d.subcircuit("S", "p");
  d.element("B1", "p 0", d.tree.op(Op::multiply, {d.tree.volts("p", "m"), d.tree.named(Op::amperes, "V1")}));
  d.element("V1", "m 0", 1.0);
  d.ends();
  d.part("X1", "a", "S");
  d.flatten();
  const auto& b = std::get<model::Behavioural>(d.at("X1.B1").part);
  const model::ExpressionPool& pool = d.circuit.expressions;
  const model::ExpressionNode& volts = pool[pool.argument(pool[b.expression], 0)];
  const model::ExpressionNode& amperes = pool[pool.argument(pool[b.expression], 1)];
  CHECK(d.text(d.circuit.nets[volts.index].name) == "a");
  CHECK(d.text(d.circuit.nets[volts.index2].name) == "X1.m");
  CHECK(d.text(d.circuit.elements[amperes.index].name) == "X1.V1");
  CHECK_FALSE(b.drives_current);
}

TEST_CASE("a behavioural source of a fixed number keeps it as a tree of one node") {
  Deck d;
  d.parameter("v", 2.5);
  d.element("B1", "a 0", d.name("v"));
  d.element("E1", "b 0", 1.5);
  d.flatten();
  CHECK(d.circuit.expressions[std::get<model::Behavioural>(d.at("B1").part).expression].number == 2.5);
  CHECK(d.circuit.expressions[std::get<model::Behavioural>(d.at("E1").part).expression].number == 1.5);
}

TEST_CASE("an expression of a net that no element has is an error, and so is an unknown source or function") {
  Deck d;
  d.element("B1", "a 0", d.tree.volts("nowhere"));
  d.element("B2", "b 0", d.tree.named(Op::amperes, "V9"));
  d.element("B3", "c 0", d.tree.named(Op::user_call, "lookup"));
  d.flatten();
  CHECK(d.said() ==
        "error at 0: no element has a net nowhere\n"
        "error at 10: there is no voltage source V9 here\n"
        "error at 20: the function lookup is not known\n");
}

TEST_CASE("a current source that is its own voltage by a resistance is a resistor") {
  Deck d;
  auto& t = d.tree;
  d.parameter("R25", 10e3);
  d.element("G1", "a b", t.op(Op::divide, {t.volts("a", "b"), t.op(Op::multiply, {t.parameter("R25"), t.number(2)})}));
  d.element("G2", "a b", t.op(Op::multiply, {t.number(1e-3), t.op(Op::subtract, {t.volts("a"), t.volts("b")})}));
  auto& b = d.element("B1", "a b", t.op(Op::negate, {t.op(Op::divide, {t.volts("b", "a"), t.number(50)})}));
  b.drives_current = true;
  d.element("G3", "a b a b", 1e-3);
  d.element("G4", "a 0", t.op(Op::divide, {t.volts("a"), t.number(7)}));
  d.flatten();
  CHECK(d.ohms("G1") == 20e3);
  CHECK(d.ohms("G2") == 1000);
  CHECK(d.ohms("B1") == 50);
  CHECK(d.ohms("G3") == 1000);
  CHECK(d.pins("G3") == "a b");
  CHECK(d.ohms("G4") == 7);
}

TEST_CASE("a current source is no resistor where the voltage, the sign or the law is another") {
  Deck d;
  auto& t = d.tree;
  d.element("R1", "a c", 1.0);
  d.element("R2", "b 0", 1.0);
  d.element("G1", "a b", t.op(Op::divide, {t.volts("a", "c"), t.number(5)}));
  d.element("G2", "a b", t.op(Op::divide, {t.volts("b", "a"), t.number(5)}));
  d.element("G3", "a b", t.op(Op::multiply, {t.volts("a", "b"), t.volts("a", "b")}));
  d.element("G4", "a b", t.op(Op::divide, {t.number(5), t.volts("a", "b")}));
  d.element("G5", "a b", t.op(Op::divide, {t.volts("a", "b"), t.op(Op::add, {t.number(1), t.volts("c")})}));
  d.element("E6", "a b", t.op(Op::divide, {t.volts("a", "b"), t.number(5)}));
  d.flatten();
  for (const char* name : {"G1", "G2", "G3", "G4", "G5", "E6"}) {
    INFO(name);
    CHECK(std::holds_alternative<model::Behavioural>(d.at(name).part));
  }
}

TEST_CASE("a source without an expression is kept without a model and names what it is") {
  Deck d;
  d.part("E1", "a 0", "POLY");
  d.flatten();
  CHECK(d.unmodelled("E1").why == Why::unsupported);
  CHECK(d.text(d.unmodelled("E1").wanted) == "POLY");
}
