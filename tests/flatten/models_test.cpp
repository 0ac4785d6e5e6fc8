#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;
using model::CardFate;
using trees::Op;
using Why = model::Unmodelled::Why;

namespace {

std::string listed(const Deck& d, const model::DeviceModel& model) {
  std::string list;
  for (const model::DeviceParameter& parameter : model.parameters) list += d.text(parameter.name) + " ";
  return list;
}

}  // namespace

TEST_CASE("a device keeps what counts at DC, drops charges in silence, and notes what is not known") {
  Deck d;
  d.model("DX", "D",
          {{"is", 1e-14}, {"cjo", 4e-12}, {"n", 1.1}, {"wobble", 3.0}, {"mfg", d.word("anyone")}, {"zap", 1.0}});
  d.part("D1", "a k", "DX");
  d.part("D2", "a k", "dx");
  d.flatten();
  REQUIRE(d.circuit.models.size() == 1);
  CHECK(listed(d, d.circuit.models[0]) == "is n ");
  CHECK(d.circuit.models[0].type == model::DeviceType::diode);
  CHECK(std::get<model::Device>(d.at("D2").part).model == model::DeviceModelId{0});
  CHECK(d.said() == "note at 0: model DX is used without wobble, zap: not known for its type, or without a number\n");
}

TEST_CASE("each letter takes the types of its kind") {
  Deck d;
  d.model("QN", "NPN", {{"bf", 100.0}});
  d.model("QP", "pnp");
  d.model("JN", "NJF", {{"vto", -2.0}});
  d.model("MN", "NMOS", {{"level", 3.0}, {"theta", 0.1}});
  d.model("MP", "PMOS");
  d.model("S1", "SW", {{"ron", 1.0}});
  d.part("Q1", "c b e", "QN");
  d.part("Q2", "c b e s", "QP");
  d.part("J1", "a b c", "JN");
  d.part("M1", "a b c e", "MN", {{"w", 1e-5}, {"l", 1e-6}});
  d.part("M2", "a b c e", "MP");
  d.part("S1", "a b c e", "S1").switched_off = true;
  d.part("D1", "a b", "QN");
  d.flatten();
  using model::DeviceType;
  const auto type = [&](const char* name) {
    return d.circuit.models[std::get<model::Device>(d.at(name).part).model.index()].type;
  };
  CHECK(type("Q1") == DeviceType::npn);
  CHECK(type("Q2") == DeviceType::pnp);
  CHECK(type("J1") == DeviceType::njf);
  CHECK(type("M1") == DeviceType::nmos);
  CHECK(type("M2") == DeviceType::pmos);
  CHECK(type("S1") == DeviceType::voltage_switch);
  CHECK(std::get<model::Device>(d.at("S1").part).starts_off);
  CHECK(d.unmodelled("D1").why == Why::no_model);
  const model::Range range = std::get<model::Device>(d.at("M1").part).parameters;
  REQUIRE(range.count == 2);
  CHECK(d.circuit.device_parameters[range.first].value == 1e-5);
  CHECK(d.said().empty());
}

TEST_CASE("a device of an unknown model is kept with its pins and the name it wants") {
  Deck d;
  const auto card = d.part("D1", "a k", "LED_GREEN").card;
  d.flatten();
  CHECK(d.unmodelled("D1").why == Why::no_model);
  CHECK(d.text(d.unmodelled("D1").wanted) == "LED_GREEN");
  CHECK(d.pins("D1") == "a k");
  CHECK(d.netlist.cards[card.index()].fate == CardFate::unmodelled);
}

TEST_CASE("a model of a type or level without a whitelist leaves its devices without a model") {
  Deck d;
  d.model("MX", "NMOS", {{"level", 54.0}});
  d.model("MV", "VDMOS");
  d.part("M1", "a b c e", "MX");
  d.part("M2", "a b c", "MV");
  d.flatten();
  CHECK(d.unmodelled("M1").why == Why::unsupported);
  CHECK(d.text(d.unmodelled("M2").wanted) == "MV");
  CHECK(d.netlist.cards[0].fate == CardFate::unmodelled);
  CHECK(d.netlist.cards[1].fate == CardFate::unmodelled);
}

TEST_CASE("a model parameter of another level is left out with a note") {
  Deck d;
  d.model("MX", "NMOS", {{"level", 1.0}, {"theta", 0.1}});
  d.part("M1", "a b c e", "MX");
  d.flatten();
  CHECK(d.said() == "note at 0: model MX is used without theta: not known for its type, or without a number\n");
}

TEST_CASE("an element's own parameter that its kind has not is left out with a note") {
  Deck d;
  d.model("DX", "D");
  d.part("D1", "a k", "DX", {{"area", 2.0}, {"wobble", 1.0}, {"temp", 50.0}});
  d.flatten();
  CHECK(std::get<model::Device>(d.at("D1").part).parameters.count == 1);
  CHECK(d.said() == "note at 120: D1 is used without wobble: not known for its kind, or without a number\n");
}

TEST_CASE("a model inside a subcircuit takes its parameters from each instance, one without any is made once") {
  Deck d;
  d.subcircuit("S", "p", {{"cur", 1e-14}});
  d.model("DV", "D", {{"is", d.name("cur")}});
  d.model("DF", "D", {{"is", 1e-12}});
  d.part("D1", "p 0", "DV");
  d.part("D2", "p 0", "DF");
  d.ends();
  d.part("X1", "a", "S");
  d.part("X2", "a", "S", {{"cur", 3e-14}});
  d.flatten();
  const auto model = [&](const char* name) { return std::get<model::Device>(d.at(name).part).model; };
  CHECK(d.circuit.models[model("X1.D1").index()].parameters[0].value == 1e-14);
  CHECK(d.circuit.models[model("X2.D1").index()].parameters[0].value == 3e-14);
  CHECK(model("X1.D2") == model("X2.D2"));
  CHECK(d.circuit.models.size() == 3);
}

TEST_CASE("an error in a model is told once at the model and leaves its devices without one") {
  Deck d;
  d.model("DX", "D", {{"is", d.name("nothing")}});
  const auto card = d.part("D1", "a k", "DX").card;
  d.part("D2", "a k", "DX");
  d.flatten();
  CHECK(d.said() == "error at 0: parameter nothing is not defined\n");
  CHECK(d.netlist.cards[0].fate == CardFate::error);
  CHECK(d.netlist.cards[card.index()].fate == CardFate::error);
  CHECK(d.unmodelled("D2").why == Why::broken_card);
}
