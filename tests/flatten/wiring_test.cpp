#include <set>

#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;

TEST_CASE("ground has many spellings at the top level and one net") {
  Deck d;
  for (const char* name : {"0", "gnd", "GND", "Gnd!", "/GND"})
    d.element(std::string("R") + name, std::string("a ") + name, 1.0);
  d.element("R2", "a AGND", 1.0);
  d.flatten();
  for (std::size_t i = 0; i < 5; ++i) CHECK(d.circuit.pin(d.circuit.elements[i], 1) == model::ground);
  CHECK(d.pins("R2") == "a AGND");
  CHECK(d.circuit.nets.size() == 3);
  CHECK(d.text(d.circuit.nets[0].name) == "0");
}

TEST_CASE("names of nets are folded and keep their first spelling") {
  Deck d;
  d.element("R1", "ADC_In 0", 1.0);
  d.element("R2", "adc_in 0", 1.0);
  d.flatten();
  CHECK(d.pins("R2") == "ADC_In 0");
}

TEST_CASE("each ? is an unconnected pin of its own") {
  Deck d;
  d.part("U1", "? ? a", "MCU");
  d.flatten();
  const model::Element& element = d.at("U1");
  const std::set<model::NetId> nets{d.circuit.pin(element, 0), d.circuit.pin(element, 1), d.circuit.pin(element, 2)};
  CHECK(nets.size() == 3);
}

TEST_CASE("inner elements and nets are named by their path and outer nets keep their names") {
  Deck d;
  d.subcircuit("S", "p");
  d.element("R3", "p n5", 1.0);
  d.element("R4", "N5 0", 1.0);
  d.ends();
  d.part("X1", "top", "S");
  d.part("X2", "top", "S");
  d.flatten();
  CHECK(d.pins("X1.R3") == "top X1.n5");
  CHECK(d.pins("X1.R4") == "X1.n5 0");
  CHECK(d.pins("X2.R3") == "top X2.n5");
  CHECK(d.at("X2.R3").letter == 'r');
}

TEST_CASE("a port named GND is the port, an inner net named gnd that is no port is ground") {
  Deck d;
  d.subcircuit("SA", "in GND");
  d.element("R1", "in gnd", 1.0);
  d.ends();
  d.subcircuit("SB", "in");
  d.element("R1", "in gnd", 1.0);
  d.ends();
  d.part("X1", "a low", "SA");
  d.part("X2", "a", "SB");
  d.flatten();
  CHECK(d.pins("X1.R1") == "a low");
  CHECK(d.pins("X2.R1") == "a 0");
}

TEST_CASE("node 0 is ground inside every subcircuit even where a header lists it") {
  Deck d;
  d.subcircuit("SA", "in 0");
  d.element("R1", "in 0", 1.0);
  d.ends();
  d.part("X1", "a b", "SA");
  d.flatten();
  CHECK(d.pins("X1.R1") == "a 0");
}

TEST_CASE("global nets are seen from inside unless a port has their name") {
  Deck d;
  d.global("VDD");
  d.subcircuit("SA", "in");
  d.element("R1", "in vdd", 1.0);
  d.ends();
  d.subcircuit("SB", "vdd");
  d.element("R1", "vdd 0", 1.0);
  d.ends();
  d.part("X1", "a", "SA");
  d.part("X2", "b", "SB");
  d.flatten();
  CHECK(d.pins("X1.R1") == "a VDD");
  CHECK(d.pins("X2.R1") == "b 0");
}

TEST_CASE("each ? inside an instance is a net of its own") {
  Deck d;
  d.subcircuit("SA", "in");
  d.part("U1", "in ? ?", "IC");
  d.ends();
  d.part("X1", "a", "SA");
  d.flatten();
  const model::Element& element = d.at("X1.U1");
  CHECK(d.circuit.pin(element, 1) != d.circuit.pin(element, 2));
}

TEST_CASE("a header that lists a port twice is an error") {
  Deck d;
  d.subcircuit("SA", "in in");
  d.ends();
  d.part("X1", "a b", "SA");
  d.flatten();
  CHECK(d.said() == "error at 200: subcircuit SA lists the port in twice\n");
}
