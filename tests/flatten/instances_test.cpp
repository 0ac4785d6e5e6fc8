#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;
using model::CardFate;
using Why = model::Unmodelled::Why;

TEST_CASE("subcircuits three deep expand with full paths and their runs of elements nest") {
  Deck d;
  d.subcircuit("inner", "a");
  d.element("R1", "a m", 1.0);
  d.element("R2", "m 0", 2.0);
  d.ends();
  d.subcircuit("middle", "a");
  d.element("R1", "a n", 3.0);
  d.part("X1", "n", "inner");
  d.ends();
  d.subcircuit("outer", "a");
  d.part("XM", "a", "middle");
  d.element("R9", "a 0", 9.0);
  d.ends();
  d.element("R1", "in 0", 7.0);
  d.part("XO", "in", "outer");
  d.flatten();
  CHECK(d.pins("XO.XM.X1.R1") == "XO.XM.n XO.XM.X1.m");
  CHECK(d.ohms("XO.XM.X1.R2") == 2);
  REQUIRE(d.circuit.elements.size() == 5);
  CHECK(d.text(d.circuit.elements[4].name) == "XO.R9");
  REQUIRE(d.circuit.instances.size() == 3);
  const model::Instance& outer = d.circuit.instances[0];
  CHECK(d.text(outer.name) == "XO");
  CHECK(outer.first_element == 1);
  CHECK(outer.element_count == 4);
  CHECK_FALSE(outer.parent.valid());
  const model::Instance& inner = d.circuit.instances[2];
  CHECK(d.text(inner.name) == "XO.XM.X1");
  CHECK(d.text(inner.subcircuit) == "inner");
  CHECK(inner.parent == model::InstanceId{1});
  CHECK(inner.first_element == 2);
  CHECK(inner.element_count == 2);
  CHECK(inner.pin_count == 1);
  CHECK(d.text(d.circuit.nets[d.circuit.pin(inner, 0).index()].name) == "XO.XM.n");
  CHECK(d.at("XO.XM.X1.R1").instance == model::InstanceId{2});
  CHECK(d.at("XO.R9").instance == model::InstanceId{0});
}

TEST_CASE("a subcircuit defined inside another is seen there and hides one outside") {
  Deck d;
  d.subcircuit("leaf", "a");
  d.element("R1", "a 0", 1.0);
  d.ends();
  d.subcircuit("outer", "a");
  d.subcircuit("leaf", "a");
  d.element("R1", "a 0", 2.0);
  d.ends();
  d.part("X1", "a", "leaf");
  d.ends();
  d.part("X1", "in", "outer");
  d.part("X2", "in", "leaf");
  d.flatten();
  CHECK(d.ohms("X1.X1.R1") == 2);
  CHECK(d.ohms("X2.R1") == 1);
}

TEST_CASE("an instance of an unknown subcircuit keeps its pins and the name it wants") {
  Deck d;
  const auto id = d.part("XU1", "a b c", "ADC8").card;
  d.flatten();
  CHECK(d.unmodelled("XU1").why == Why::missing_subcircuit);
  CHECK(d.text(d.unmodelled("XU1").wanted) == "ADC8");
  CHECK(d.pins("XU1") == "a b c");
  CHECK(d.netlist.cards[id.index()].fate == CardFate::unmodelled);
  CHECK(d.said().empty());
}

TEST_CASE("a wrong number of pins is an error that gives both numbers") {
  Deck d;
  d.subcircuit("NTC", "a b");
  d.element("R1", "a b", 1.0);
  d.ends();
  d.part("X1", "p q r", "NTC");
  d.part("X2", "p", "NTC");
  d.flatten();
  CHECK(d.said() ==
        "error at 300: X1 has 3 pins, and subcircuit NTC has 2 ports\n"
        "error at 400: X2 has 1 pin, and subcircuit NTC has 2 ports\n");
  CHECK(d.pins("X1") == "p q r");
  CHECK(d.unmodelled("X1").why == Why::broken_card);
}

TEST_CASE("a subcircuit that contains itself is an error, through others too") {
  Deck d;
  d.subcircuit("A", "p");
  d.part("X1", "p", "B");
  d.ends();
  d.subcircuit("B", "p");
  d.part("X2", "p", "A");
  d.ends();
  d.part("X0", "in", "A");
  d.flatten();
  CHECK(d.said() == "error at 400: subcircuit A contains itself (in X0.X1)\n");
}

TEST_CASE("instances deeper inside one another than the limit are an error that names it") {
  Deck d;
  d.limits.nesting = 2;
  d.subcircuit("A", "p");
  d.element("R1", "p 0", 1.0);
  d.ends();
  d.subcircuit("B", "p");
  d.part("XA", "p", "A");
  d.ends();
  d.subcircuit("C", "p");
  d.part("XB", "p", "B");
  d.ends();
  d.part("XB", "in", "B");
  d.part("XC", "in", "C");
  d.flatten();
  CHECK(d.ohms("XB.XA.R1") == 1);
  CHECK(d.said() == "error at 400: XA lies deeper inside other instances than the limit nesting = 2 (in XC.XB)\n");
}

TEST_CASE("an instance that would grow beyond the limit of elements is not expanded at all") {
  Deck d;
  d.limits.elements = 1000;
  d.subcircuit("S0", "p");
  d.ends();
  for (int i = 1; i <= 40; ++i) {  // 2^40 empty instances
    d.subcircuit("S" + std::to_string(i), "p");
    d.part("XA", "p", "S" + std::to_string(i - 1));
    d.part("XB", "p", "S" + std::to_string(i - 1));
    d.ends();
  }
  d.part("X1", "in", "S40");
  d.flatten();
  CHECK(d.said() == "error at 16200: with X1 the flat circuit has more elements than the limit elements = 1000\n");
  CHECK(d.circuit.instances.empty());
}

TEST_CASE("a problem of a subcircuit is said once with the number of its instances and one example") {
  Deck d;
  d.subcircuit("S", "p");
  d.element("R1", "p 0", -1.0);
  d.ends();
  d.subcircuit("T", "p");
  d.part("XS", "p", "S");
  d.ends();
  for (int i = 1; i <= 12; ++i) d.part("X" + std::to_string(i), "in", i == 1 ? "T" : "S");
  d.flatten();
  CHECK(d.said() == "error at 100: a resistance cannot be negative, and R1 is -1 ohm (in 12 instances, e.g. X1.XS)\n");
}

TEST_CASE("elements of a subcircuit that nothing instantiates have the fate of their letter and model") {
  Deck d;
  d.model("DX", "D");
  d.model("POT", "potentiometer");
  const auto pot = model::CardId{1};
  d.subcircuit("S", "p");
  const auto resistor = d.element("R1", "p 0", 1.0).card;
  const auto known = d.part("D1", "p 0", "DX").card;
  const auto unknown = d.part("D2", "p 0", "DY").card;
  const auto part = d.part("U1", "p 0", "IC").card;
  const auto missing = d.part("X1", "p 0", "NOWHERE").card;
  d.ends();
  d.flatten();
  const auto fate = [&](model::CardId id) { return d.netlist.cards[id.index()].fate; };
  CHECK(fate(resistor) == CardFate::modelled);
  CHECK(fate(known) == CardFate::modelled);
  CHECK(fate(unknown) == CardFate::unmodelled);
  CHECK(fate(part) == CardFate::unmodelled);
  CHECK(fate(missing) == CardFate::unmodelled);
  CHECK(fate(pot) == CardFate::unmodelled);
  CHECK(d.circuit.elements.empty());
  const model::ReadingCount count = flatten::count_cards(d.netlist);
  CHECK(count.modelled + count.unmodelled + count.skipped + count.error == count.cards);
}
