#include <cmath>

#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;
using trees::Op;

TEST_CASE("the builder's reading counts and a different one of SPICE is noted with both") {
  Deck d;
  d.element("R1", "a 0", d.odd(4700, 4000));
  d.element("R2", "a 0", d.odd(0.1, std::nan("")));
  d.element("R3", "a 0", d.odd(10e3, 10e3, 0.01));
  d.flatten();
  CHECK(d.ohms("R1") == 4700);
  CHECK(d.ohms("R2") == 0.1);
  REQUIRE(d.circuit.suspects.size() == 2);
  CHECK(d.circuit.suspects[0].element == model::ElementId{0});
  CHECK(d.circuit.suspects[0].builder == 4700);
  CHECK(d.circuit.suspects[0].spice == 4000);
  CHECK(d.circuit.suspects[0].where.begin.offset == 33);
  CHECK(std::isnan(d.circuit.suspects[1].spice));
}

TEST_CASE("a bare M on a resistor is mega by size where milli would be less than an ohm") {
  Deck d;
  d.element("R1", "a 0", d.bare_m(1e-3));
  d.element("R2", "a 0", d.bare_m(2.0));
  d.element("C1", "a 0", d.bare_m(1e-3));
  d.flatten();
  CHECK(d.ohms("R1") == 1e6);
  CHECK(d.ohms("R2") == 2);
  CHECK(std::get<model::Capacitor>(d.at("C1").part).farads.value == 1e-3);
  REQUIRE(d.circuit.suspects.size() == 1);
  CHECK(d.circuit.suspects[0].builder == 1e6);
  CHECK(d.circuit.suspects[0].spice == 1e-3);
}

TEST_CASE("a bare M on a resistor is what the declarations say it is") {
  const auto ohms = [](model::BareM bare_m, double milli) {
    Deck d;
    d.options.bare_m = bare_m;
    d.element("R1", "a 0", d.bare_m(milli));
    d.flatten();
    return d.ohms("R1");
  };
  CHECK(ohms(model::BareM::milli, 1e-3) == 1e-3);
  CHECK(ohms(model::BareM::mega, 1e-3) == 1e6);
  CHECK(ohms(model::BareM::mega, 2.0) == 2e9);
}

TEST_CASE("an odd literal within an expression is suspect for the element, with the values of the whole") {
  Deck d;
  d.element("R1", "a 0", d.tree.op(Op::multiply, {d.tree.number(2), d.tree.odd(4700, 4000)}));
  d.flatten();
  CHECK(d.ohms("R1") == 9400);
  REQUIRE(d.circuit.suspects.size() == 1);
  CHECK(d.circuit.suspects[0].builder == 9400);
  CHECK(d.circuit.suspects[0].spice == 8000);
  CHECK(d.circuit.suspects[0].where.begin.offset == 10);
}

TEST_CASE("an odd literal behind a parameter is suspect for every element that uses it") {
  Deck d;
  d.parameter("R", d.odd(4700, 4000));
  d.parameter("twice", d.tree.op(Op::multiply, {d.tree.number(2), d.tree.parameter("R")}));
  d.element("R1", "a 0", d.name("twice"));
  d.element("R2", "a 0", 5.0);
  d.subcircuit("S", "p", {{"v", 1.0}});
  d.element("R1", "p 0", d.name("v"));
  d.ends();
  d.part("X1", "a", "S", {{"v", d.name("twice")}});
  d.flatten();
  REQUIRE(d.circuit.suspects.size() == 2);
  CHECK(d.circuit.suspects[0].builder == 9400);
  CHECK(d.circuit.suspects[0].spice == 8000);
  CHECK(d.text(d.circuit.elements[d.circuit.suspects[1].element.index()].name) == "X1.R1");
}

TEST_CASE("a bare M behind a parameter is mega for a resistor by size and milli for others") {
  Deck d;
  d.parameter("big", d.bare_m(1e-3));
  d.element("R1", "a 0", d.name("big"));
  d.element("R2", "a 0", d.tree.odd(2.2e6, 2.2e-3));
  d.element("V1", "a 0", d.name("big"));
  d.flatten();
  CHECK(d.ohms("R1") == 1e6);
  CHECK(d.ohms("R2") == 2.2e6);
  CHECK(std::get<model::VoltageSource>(d.at("V1").part).volts.value == 1e-3);
  CHECK(d.circuit.suspects.size() == 2);
}

TEST_CASE("an odd literal that SPICE cannot read makes its reading of the whole none") {
  Deck d;
  d.element("R1", "a 0", d.tree.op(Op::add, {d.tree.number(1), d.tree.odd(0.47, std::nan(""))}));
  d.flatten();
  CHECK(d.ohms("R1") == 1.47);
  REQUIRE(d.circuit.suspects.size() == 1);
  CHECK(std::isnan(d.circuit.suspects[0].spice));
}

TEST_CASE("odd literals of models, device parameters and behavioural sources are suspect for their elements") {
  Deck d;
  d.model("DZ", "D", {{"bv", d.odd(4.7, 4)}});
  d.part("D1", "a k", "DZ");
  d.part("D2", "a k", "DZ", {{"area", d.odd(1.5, 1)}});
  d.element("B1", "a 0", d.tree.op(Op::multiply, {d.tree.volts("a"), d.tree.odd(4700, 4000)}));
  d.flatten();
  REQUIRE(d.circuit.suspects.size() == 4);
  CHECK(d.circuit.suspects[0].builder == 4.7);
  CHECK(d.circuit.suspects[1].element == model::ElementId{1});
  CHECK(d.circuit.suspects[3].element == model::ElementId{2});
  CHECK(d.circuit.suspects[3].builder == 4700);
}
