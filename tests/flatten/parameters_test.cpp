#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;
using model::CardFate;
using trees::Op;

TEST_CASE("a parameter may be defined after its use and through others") {
  Deck d;
  d.element("R1", "a 0", d.name("Rtop"));
  d.parameter("Rtop", d.tree.op(Op::multiply, {d.tree.number(2), d.tree.parameter("half")}));
  d.parameter("HALF", 5e3);
  d.flatten();
  CHECK(d.ohms("R1") == 10e3);
  CHECK(d.said().empty());
}

TEST_CASE("a parameter that is but the name of another has its value") {
  Deck d;
  d.parameter("a", d.word("b"));
  d.parameter("b", 7.0);
  d.element("R1", "a 0", d.name("a"));
  d.flatten();
  CHECK(d.ohms("R1") == 7);
}

TEST_CASE("of two definitions in one scope the later counts") {
  Deck d;
  d.parameter("x", 1.0);
  d.parameter("x", 2.0);
  d.element("R1", "a 0", d.name("x"));
  d.flatten();
  CHECK(d.ohms("R1") == 2);  // ngspice 39, measured
}

TEST_CASE("parameters that need one another are one error with the chain") {
  Deck d;
  d.parameter("a", d.name("b"));
  d.parameter("b", d.name("c"));
  d.parameter("c", d.name("a"));
  const auto id = d.element("R1", "n 0", d.name("a")).card;
  d.flatten();
  CHECK(d.said() == "error at 7: parameter a needs itself: a -> b -> c -> a\n");
  CHECK(d.netlist.cards[id.index()].fate == CardFate::error);
  CHECK(d.netlist.cards[0].fate == CardFate::error);
}

TEST_CASE("a parameter that needs itself is an error though nobody uses it") {
  Deck d;
  d.parameter("a", d.name("a"));
  d.flatten();
  CHECK(d.said() == "error at 7: parameter a needs itself: a -> a\n");
}

TEST_CASE("a chain of parameters as long as the netlist is worked out") {
  Deck d;
  const int length = 20'000;
  for (int i = 0; i < length; ++i) d.parameter("p" + std::to_string(i), d.name("p" + std::to_string(i + 1)));
  d.parameter("p" + std::to_string(length), 3.0);
  d.element("R1", "a 0", d.name("p0"));
  d.flatten();
  CHECK(d.said().empty());
  CHECK(d.ohms("R1") == 3);
}

TEST_CASE("an undefined parameter is an error at its name, with the nearest one that is defined") {
  Deck d;
  d.parameter("Rtop", 1.0);
  d.element("R1", "a 0", d.name("Rtopp"));
  d.element("R2", "a 0", d.name("zzzzzz"));
  d.flatten();
  CHECK(d.said() ==
        "error at 0: parameter Rtopp is not defined; did you mean Rtop\n"
        "error at 10: parameter zzzzzz is not defined\n");
}

TEST_CASE("a parameter without a value is told once at its own card however many use it") {
  Deck d;
  d.parameter("x", d.tree.op(Op::divide, {d.tree.number(1), d.tree.number(0)}));
  const auto first = d.element("R1", "a 0", d.name("x")).card;
  const auto second = d.element("R2", "a 0", d.name("x")).card;
  d.flatten();
  CHECK(d.said() == "error at 20: division by zero\n");
  CHECK(d.netlist.cards[first.index()].fate == CardFate::error);
  CHECK(d.netlist.cards[second.index()].fate == CardFate::error);
}

TEST_CASE("a failed parameter in a branch that is not taken does no harm to the element") {
  Deck d;
  d.subcircuit("S", "p");
  d.parameter("bad", d.tree.op(Op::divide, {d.tree.number(1), d.tree.number(0)}));
  d.element("R1", "p 0", d.tree.op(Op::choose, {d.tree.number(1), d.tree.number(5), d.tree.parameter("bad")}));
  d.ends();
  d.part("X1", "a", "S");
  d.flatten();
  CHECK(d.ohms("X1.R1") == 5);
  CHECK(d.said().empty());
}

TEST_CASE("instance values win over defaults, defaults over outer parameters, and inner ones may use them") {
  Deck d;
  d.parameter("R", 1.0);
  d.parameter("k", 100.0);
  d.subcircuit("S", "p", {{"R", 2.0}, {"Q", d.tree.op(Op::multiply, {d.tree.parameter("R"), d.tree.number(10)})}});
  d.parameter("sum", d.tree.op(Op::add, {d.tree.parameter("R"), d.tree.parameter("k")}));
  d.element("R1", "p 0", d.name("R"));
  d.element("R2", "p 0", d.name("Q"));
  d.element("R3", "p 0", d.name("sum"));
  d.ends();
  d.part("X1", "a", "S");
  d.part("X2", "a", "S", {{"r", 3.0}});
  d.element("R1", "a 0", d.name("R"));
  d.flatten();
  CHECK(d.ohms("X1.R1") == 2);
  CHECK(d.ohms("X1.R2") == 20);
  CHECK(d.ohms("X1.R3") == 102);
  CHECK(d.ohms("X2.R1") == 3);
  CHECK(d.ohms("X2.R2") == 30);
  CHECK(d.ohms("X2.R3") == 103);
  CHECK(d.ohms("R1") == 1);
}

TEST_CASE("an instance's values are worked out where the instance stands") {
  Deck d;
  d.parameter("R", 5.0);
  d.subcircuit("S", "p", {{"R", 2.0}});
  d.element("R1", "p 0", d.name("R"));
  d.ends();
  d.part("X1", "a", "S", {{"R", d.name("R")}});
  d.part("X2", "a", "S", {{"R", d.word("R")}});
  d.flatten();
  CHECK(d.ohms("X1.R1") == 5);
  CHECK(d.ohms("X2.R1") == 5);
}

TEST_CASE("a default that names itself means the parameter outside") {
  Deck d;
  d.parameter("R", 5.0);
  d.subcircuit("S", "p", {{"R", d.name("R")}});
  d.element("R1", "p 0", d.name("R"));
  d.ends();
  d.part("X1", "a", "S");
  d.flatten();
  CHECK(d.ohms("X1.R1") == 5);
  CHECK(d.said().empty());
}

TEST_CASE("a subcircuit sees the parameters of the one that instantiates it") {
  Deck d;
  d.parameter("R", 1e3);
  d.subcircuit("inner", "p");
  d.element("R1", "p 0", d.name("R"));
  d.ends();
  d.subcircuit("outer", "p", {{"R", 2e3}});
  d.part("X1", "p", "inner");
  d.ends();
  d.part("X1", "a", "outer", {{"R", 5e3}});
  d.part("X2", "a", "inner");
  d.flatten();
  CHECK(d.ohms("X1.X1.R1") == 5e3);  // ngspice 39, measured
  CHECK(d.ohms("X2.R1") == 1e3);
}

TEST_CASE("a parameter without default that an instance does not give is one error that names it") {
  Deck d;
  d.subcircuit("NTC_10K", "a b", {{"T", {}}, {"R25", {}}, {"BETA", 3435.0}});
  const auto inner = d.element("R1", "a b", d.name("T")).card;
  d.ends();
  const auto card = d.part("X1", "p 0", "NTC_10K", {{"R25", 10e3}}).card;
  d.part("X2", "p 0", "NTC_10K", {{"T", 1.0}, {"R25", 10e3}});
  d.flatten();
  CHECK(d.said() == "error at 300: X1 gives no value for T, which subcircuit NTC_10K has no default for\n");
  CHECK(d.netlist.cards[card.index()].fate == CardFate::error);
  CHECK(d.netlist.cards[inner.index()].fate == CardFate::error);
  CHECK(d.ohms("X2.R1") == 1);
}

TEST_CASE("a value for a parameter that the subcircuit has not is a note") {
  Deck d;
  d.subcircuit("S", "p", {{"R", 2.0}});
  d.element("R1", "p 0", d.name("R"));
  d.ends();
  d.part("X1", "a", "S", {{"R", 3.0}, {"tol", 5.0}});
  d.flatten();
  CHECK(d.said() == "note at 320: X1 gives a value for tol, which is no parameter of subcircuit S\n");
  CHECK(d.ohms("X1.R1") == 3);
}

TEST_CASE("trouble in an instance's value is told at the card of the instance") {
  Deck d;
  d.subcircuit("S", "p", {{"R", 2.0}});
  d.element("R1", "p 0", d.name("R"));
  d.ends();
  const auto card = d.part("X1", "a", "S", {{"R", d.name("nothing")}}).card;
  d.flatten();
  CHECK(d.said() == "error at 10: parameter nothing is not defined\n");
  CHECK(d.netlist.cards[card.index()].fate == CardFate::error);
}
