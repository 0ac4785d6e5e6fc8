#include <cmath>

#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;
using model::CardFate;
using Why = model::Unmodelled::Why;

namespace {
const double none = std::nan("");
}

TEST_CASE("two-terminal parts keep name, pins, letter and value, in the netlist's order") {
  Deck d;
  d.element("V1", "vcc 0", 3.3);
  d.element("R1", "vcc adc", 10e3);
  d.element("c1", "adc GND", 1e-7);
  d.element("L1", "a b", 1e-6);
  d.element("I1", "0 a", 1e-3);
  d.flatten();
  REQUIRE(d.circuit.elements.size() == 5);
  CHECK(d.said().empty());
  CHECK(d.pins("V1") == "vcc 0");
  CHECK(d.pins("R1") == "vcc adc");
  CHECK(d.pins("c1") == "adc 0");
  CHECK(std::get<model::VoltageSource>(d.at("V1").part).volts.value == 3.3);
  CHECK(d.ohms("R1") == 10e3);
  CHECK(std::get<model::Capacitor>(d.at("c1").part).farads.value == 1e-7);
  CHECK(std::get<model::Inductor>(d.at("L1").part).henries.value == 1e-6);
  CHECK(std::get<model::CurrentSource>(d.at("I1").part).amperes.value == 1e-3);
  CHECK(d.at("c1").letter == 'c');
  CHECK(d.circuit.elements[1].name == d.at("R1").name);
  CHECK_FALSE(d.at("R1").instance.valid());
  CHECK(d.circuit.details.empty());
}

TEST_CASE("a resistor's value may stand behind a key or in its model") {
  Deck d;
  d.model("__R2", "r", {{"r", 10e6}, {"tc1", 1e-4}});
  d.element("R1", "a 0", {}, "", {{"r", 4700.0}});
  d.element("R2", "a 0", {}, "__R2");
  d.element("R3", "a 0", d.word("__R2"));
  d.element("R4", "a 0", {}, "", {{"Resistance", 22.0}});
  d.flatten();
  CHECK(d.ohms("R1") == 4700);
  CHECK(d.ohms("R2") == 10e6);
  CHECK(d.ohms("R3") == 10e6);
  CHECK(d.ohms("R4") == 22);
  REQUIRE(d.circuit.details.size() == 2);
  CHECK(d.circuit.details[0].element == model::ElementId{1});
  CHECK(d.circuit.details[0].tc1 == 1e-4);
  CHECK(std::isnan(d.circuit.details[0].tolerance));
}

TEST_CASE("a model of type RES multiplies the card's value and gives its spread, one of type R does not") {
  Deck d;
  d.model("R_R1", "RES", {{"R", 2.0}, {"DEV", d.odd(0.05, 5)}});
  d.model("RM", "R", {{"r", 2.0}});
  d.element("R1", "a 0", 10e3, "R_R1");
  d.element("R2", "a 0", 10e3, "RM");
  d.flatten();
  CHECK(d.ohms("R1") == 20e3);
  CHECK(d.ohms("R2") == 10e3);
  REQUIRE(d.circuit.details.size() == 1);
  CHECK(d.circuit.details[0].tolerance == 0.05);
}

TEST_CASE("tolerance and temperature coefficients of a card go into the detail of its element") {
  Deck d;
  d.element("R1", "a 0", d.odd(10e3, 1, 0.01));
  d.element("R2", "a 0", 10e3, "", {{"tol", 1.0}, {"tc1", 5e-5}, {"tc2", 1e-7}, {"mfg", d.word("anyone")}});
  d.element("R3", "a 0", 10e3, "", {{"tol", d.odd(0.05, 5)}});
  d.element("R4", "a 0", 10e3, "", {{"pwr", 0.1}});
  d.flatten();
  REQUIRE(d.circuit.details.size() == 3);
  CHECK(d.circuit.details[0].tolerance == 0.01);
  CHECK(d.circuit.details[1].tolerance == 0.01);
  CHECK(d.circuit.details[1].tc1 == 5e-5);
  CHECK(d.circuit.details[1].tc2 == 1e-7);
  CHECK(d.circuit.details[2].tolerance == 0.05);
}

TEST_CASE("m resistors in parallel are one of a part of the resistance") {
  Deck d;
  d.element("R1", "a 0", 10e3, "", {{"m", 4.0}});
  d.flatten();
  CHECK(d.ohms("R1") == 2500);
}

TEST_CASE("an inductor with a series resistance is that resistance at DC, and one across a capacitor is refused") {
  Deck d;
  d.element("L1", "a b", 1e-6, "", {{"Rser", 0.25}});
  d.element("C1", "a b", 1e-6, "", {{"Rpar", 1e7}});
  d.element("C2", "a b", 1e-6, "", {{"Rser", 0.1}});
  d.flatten();
  CHECK(d.ohms("L1") == 0.25);
  CHECK(d.unmodelled("C1").why == Why::broken_card);
  CHECK(std::holds_alternative<model::Capacitor>(d.at("C2").part));
  CHECK(
      d.said() ==
      "error at 110: the resistance across a capacitor (C1) is not followed by this version: write it as a resistor\n");
}

TEST_CASE("a voltage source with a series resistance is a source and a resistor before its plus pin") {
  Deck d;
  d.element("V1", "VCC 0", 3.3, "", {{"Rser", 1000.0}});
  d.element("V2", "a b", 1.0, "", {{"Rser", 0.0}});
  d.element("V3", "a b", 1.0, "", {{"Rser", d.word("nothing")}});
  d.element("V4", "a b", 1.0, "", {{"Rser", -1.0}});
  d.subcircuit("SUPPLY", "out");
  d.element("V1", "out 0", 5.0, "", {{"Rser", 2.0}});
  d.ends();
  d.part("X1", "VDD", "SUPPLY");
  d.flatten();
  CHECK(d.pins("V1") == "V1.VCC 0");
  CHECK(d.pins("V1.Rser") == "VCC V1.VCC");
  CHECK(d.ohms("V1.Rser") == 1000);
  CHECK(d.pins("V2") == "a b");
  CHECK(d.unmodelled("V3").why == Why::broken_card);
  CHECK(d.unmodelled("V4").why == Why::broken_card);
  CHECK(d.pins("X1.V1.Rser") == "VDD X1.V1.VDD");
  CHECK(d.circuit.instances.at(0).element_count == 2);
  CHECK(d.said() == "error at 210: Rser of V3 is no resistance\nerror at 310: Rser of V4 is no resistance\n");
}

TEST_CASE("a value that is none is told at its place: digits that make no number, a parameter without braces") {
  Deck d;
  d.parameter("RUP", 1000.0);
  d.element("R1", "a b", d.word("1.0.0k"), "1.0.0k");
  d.element("R2", "a b", d.word("RUP"), "RUP");
  d.element("R3", "a b", d.word("RNONE"), "RNONE");
  d.element("C1", "a b", d.word("100n_X7R"), "100n_X7R");
  d.flatten();
  CHECK(d.unmodelled("R1").why == Why::bad_value);
  CHECK(d.unmodelled("R2").why == Why::parameter_name);
  CHECK(d.unmodelled("R3").why == Why::no_value);
  CHECK(d.unmodelled("C1").why == Why::bad_value);
  CHECK(d.said() ==
        "warning at 105: R1 has no value: \"1.0.0k\" is no number\n"
        "warning at 205: R2 has no value: \"RUP\" is a parameter, and stands without braces\n");
}

TEST_CASE("what a parameter of a broken card is worth is not known, whatever another card says") {
  Deck d;
  d.parameter("R", 1000.0);
  d.netlist.scopes[0].parameters.push_back({{d.names.intern("R"), 100}, {}, d.card(), true});
  const auto used = d.element("R1", "a b", d.name("R")).card;
  d.parameter("S", d.name("R"));
  d.flatten();
  CHECK(d.unmodelled("R1").why == Why::broken_card);
  CHECK(d.netlist.faults.at(used).reason == "it needs parameter R, which could not be read");
  CHECK(d.netlist.faults.at(used).cause == model::CardId{1});
  CHECK(d.netlist.faults.at(model::CardId{3}).cause == model::CardId{1});
}

TEST_CASE("what uses a broken model or subcircuit is broken too, whatever another card says") {
  Deck d;
  d.model("DX", "D");
  d.netlist.scopes[0].models.push_back({d.names.intern("DX"), {}, d.card(), {}, true});
  d.part("D1", "a b", "DX");
  d.element("R1", "a b", 1000.0, "DX");
  d.subcircuit("S", "p");
  d.ends();
  d.subcircuit("S", "p");
  d.scope().broken = true;
  d.ends();
  const auto used = d.part("X1", "a", "S").card;
  d.flatten();
  CHECK(d.unmodelled("D1").why == Why::broken_card);
  CHECK(d.unmodelled("R1").why == Why::broken_card);
  CHECK(d.unmodelled("X1").why == Why::broken_card);
  CHECK(d.netlist.faults.at(used).reason == "subcircuit S cannot be used");
}

TEST_CASE("a circuit that is cut at its limit says so") {
  Deck d;
  d.limits.elements = 2;
  for (const char* name : {"R1", "R2", "R3", "R4"}) d.element(name, "a b", 1000.0);
  d.flatten();
  CHECK(d.circuit.cut == "the flat circuit has more elements than the limit elements = 2");
  Deck whole;
  whole.limits.elements = 2;
  whole.element("R1", "a b", 1000.0);
  whole.element("R2", "a b", 1000.0);
  whole.flatten();
  CHECK(whole.circuit.cut.empty());
}

TEST_CASE("a part without a value, or with a word in its place, is kept without a model") {
  Deck d;
  const auto bare_card = d.element("R1", "a 0", {}).card;
  d.element("RT1", "a 0", d.word("NTC"), "NTC");
  d.element("R2", "a 0", d.word("DNP"));
  d.element("C1", "a 0", d.word("~"));
  d.element("V1", "a 0", d.word("BAT"));
  d.flatten();
  CHECK(d.unmodelled("R1").why == Why::no_value);
  CHECK_FALSE(d.unmodelled("R1").wanted.valid());
  CHECK(d.unmodelled("RT1").why == Why::no_value);
  CHECK(d.text(d.unmodelled("RT1").wanted) == "NTC");
  CHECK(d.unmodelled("R2").why == Why::not_fitted);
  CHECK(d.unmodelled("C1").why == Why::no_value);
  CHECK(d.unmodelled("V1").why == Why::no_value);
  CHECK(d.netlist.cards[bare_card.index()].fate == CardFate::unmodelled);
  CHECK(d.said().empty());
}

TEST_CASE("letters without a meaning and parts that do not fit their letter keep all their pins") {
  Deck d;
  d.part("U1", "a b c d", "MCU");
  d.part("J1", "x y", "CONN").letter = '?';
  d.part("RV1", "a w b", "10k");
  d.part("W1", "a b", "V1");
  d.part("U2", "", "__U2");
  d.flatten();
  CHECK(d.unmodelled("U1").why == Why::unknown_letter);
  CHECK(d.text(d.unmodelled("U1").wanted) == "MCU");
  CHECK(d.pins("U1") == "a b c d");
  CHECK(d.unmodelled("J1").why == Why::unsupported);
  CHECK(d.at("J1").letter == 'j');
  CHECK(d.unmodelled("RV1").why == Why::unsupported);
  CHECK(d.pins("RV1") == "a w b");
  CHECK(d.unmodelled("W1").why == Why::unsupported);
  CHECK(d.at("U2").pin_count == 0);
}

TEST_CASE("a negative resistance is an error at its value, and zero is a short") {
  Deck d;
  d.element("R0", "a b", 0.0);
  d.element("R1", "a b", -5.0);
  const auto odd_card = d.element("R2", "a b", d.odd(-4700, -4000)).card;
  d.flatten();
  CHECK(d.ohms("R0") == 0);
  CHECK(d.said() ==
        "error at 100: a resistance cannot be negative, and R1 is -5 ohm\n"
        "error at 233: a resistance cannot be negative, and R2 is -4.7 kohm\n");
  CHECK(d.netlist.cards[odd_card.index()].fate == CardFate::error);
  CHECK(d.unmodelled("R1").why == Why::broken_card);  // its pins stay, so that nothing passes for checked
  CHECK(d.pins("R1") == "a b");
}

TEST_CASE("a value that is not finite is an error") {
  Deck d;
  d.element("R1", "a b", none);
  d.element("V1", "a b", std::numeric_limits<double>::infinity());
  d.flatten();
  CHECK(d.said() ==
        "error at 0: the value is not a finite number\n"
        "error at 100: the value is not a finite number\n");
}

TEST_CASE("an expression that has no value is an error at the byte that has it") {
  Deck d;
  const auto bad = d.tree.op(trees::Op::divide, {d.tree.number(1), d.tree.number(0)});
  d.element("R1", "a b", bad);
  d.flatten();
  CHECK(d.said() == "error at 20: division by zero\n");
}

TEST_CASE("a resistor that depends on a voltage is kept without a model") {
  Deck d;
  d.element("R1", "a b", d.tree.volts("a"));
  d.flatten();
  CHECK(d.unmodelled("R1").why == Why::unsupported);
  CHECK(d.said().empty());
}

TEST_CASE("the second of two elements of one name is an error and keeps its pins without a model") {
  Deck d;
  d.element("R1", "a b", 1.0);
  d.element("r1", "b c", 2.0);
  d.flatten();
  CHECK(d.said() == "error at 100: R1 stands twice in its scope\n");
  REQUIRE(d.circuit.elements.size() == 2);
  CHECK(std::holds_alternative<model::Resistor>(d.circuit.elements[0].part));
  CHECK(std::holds_alternative<model::Unmodelled>(d.circuit.elements[1].part));
}

TEST_CASE("the four fates of the cards add up to the cards") {
  Deck d;
  d.element("R1", "a b", 1.0);
  d.element("R2", "a b", -1.0);
  d.part("U1", "a b", "MCU");
  d.netlist.cards[d.card().index()].fate = CardFate::skipped;
  d.flatten();
  const model::ReadingCount count = flatten::count_cards(d.netlist);
  CHECK(count.cards == 4);
  CHECK(count.modelled == 1);
  CHECK(count.error == 1);
  CHECK(count.unmodelled == 1);
  CHECK(count.skipped == 1);
}

TEST_CASE("more elements than the limit allows are an error at the first one too many") {
  Deck d;
  d.limits.elements = 2;
  for (const char* name : {"R1", "R2", "R3", "R4"}) d.element(name, "a b", 1.0);
  d.flatten();
  CHECK(d.said() == "error at 200: the flat circuit has more elements than the limit elements = 2\n");
}

TEST_CASE("a netlist without a single scope is an empty circuit with ground") {
  Deck d;
  d.netlist.scopes.clear();
  d.flatten();
  REQUIRE(d.circuit.nets.size() == 1);
  CHECK(d.text(d.circuit.nets[0].name) == "0");
}

TEST_CASE("words behind values that are no models are told in one note") {
  Deck d;
  d.model("RMOD", "R", {{"tc1", 0.001}});
  d.element("R1", "a b", 1000.0, "garbage");
  d.element("R2", "a b", 1000.0, "RMOD");
  d.element("C1", "a b", 1e-9, "X7R");
  d.flatten();
  CHECK(d.said() ==
        "note at 105: \"garbage\" behind the value of R1 is no model and is not used; so it is with 1 more\n");
}

TEST_CASE("a source without a value has none, and one taken at time zero is listed") {
  Deck d;
  d.element("V1", "a 0", {});
  d.element("V2", "b 0", 0.0).at_time_zero = true;
  d.flatten();
  CHECK(d.unmodelled("V1").why == Why::no_value);
  REQUIRE(d.circuit.at_time_zero.size() == 1);
  CHECK(d.text(d.circuit.elements[d.circuit.at_time_zero[0].index()].name) == "V2");
}
