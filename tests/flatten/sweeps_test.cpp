#include <cmath>

#include <catch2/catch.hpp>

#include "tests/flatten/deck.hpp"

using decks::Deck;
using trees::Function;
using trees::Op;

namespace {

// The beta equation of a thermistor; as sensor models write it, a current source.
model::ExpressionId thermistor(Deck& d, const char* plus, const char* minus) {
  auto& t = d.tree;
  const auto kelvin = t.op(Op::add, {t.parameter("T"), t.number(273.15)});
  const auto slope =
      t.op(Op::subtract, {t.op(Op::divide, {t.number(1), kelvin}), t.op(Op::divide, {t.number(1), t.number(298.15)})});
  const auto ohms =
      t.op(Op::multiply,
           {t.parameter("R25"),
            t.call(Function::exp, std::vector<model::ExpressionId>{t.op(Op::multiply, {t.parameter("BETA"), slope})})});
  return t.op(Op::divide, {t.volts(plus, minus), ohms});
}

double beta_ohms(double celsius) {
  return 10e3 * std::exp(3435 * (1 / (celsius + 273.15) - 1 / 298.15));
}

}  // namespace

TEST_CASE("an instance's parameter that is swept stays free inside that instance and a number in others") {
  Deck d;
  d.options.sweeps = {{"xrt1", "t"}};
  d.subcircuit("NTC", "a b", {{"T", {}}, {"R25", {}}, {"BETA", 3435.0}});
  d.element("G1", "a b", thermistor(d, "a", "b"));
  d.ends();
  d.part("XRT1", "adc 0", "NTC", {{"R25", 10e3}});
  d.part("XRT2", "adc 0", "NTC", {{"R25", 10e3}, {"T", 50.0}});
  d.flatten();
  CHECK(d.said().empty());
  const auto& swept = std::get<model::Resistor>(d.at("XRT1.G1").part).ohms;
  REQUIRE_FALSE(swept.fixed());
  CHECK(d.at_variable(swept, 50) == Approx(beta_ohms(50)).epsilon(1e-13));
  CHECK(d.at_variable(swept, -40) == Approx(beta_ohms(-40)).epsilon(1e-13));
  CHECK(d.ohms("XRT2.G1") == Approx(beta_ohms(50)).epsilon(1e-13));
  REQUIRE(d.circuit.swept.size() == 1);
  CHECK(d.circuit.swept[0].found);
  CHECK(d.circuit.swept[0].instance == model::InstanceId{0});
  CHECK(d.circuit.swept[0].sensor == "xrt1");
  CHECK(std::isnan(d.circuit.swept[0].nominal));
}

TEST_CASE("a swept instance may lie inside others, and its value in the netlist is kept") {
  Deck d;
  d.options.sweeps = {{"X1.XS", "R"}};
  d.subcircuit("S", "p", {{"R", 2.0}});
  d.element("R1", "p 0", d.tree.op(Op::multiply, {d.tree.parameter("R"), d.tree.number(3)}));
  d.ends();
  d.subcircuit("Board", "p");
  d.part("XS", "p", "S", {{"R", 7.0}});
  d.part("XT", "p", "S");
  d.ends();
  d.part("X1", "a", "Board");
  d.part("X2", "a", "Board");
  d.flatten();
  CHECK(d.at_variable(std::get<model::Resistor>(d.at("X1.XS.R1").part).ohms, 10) == 30);
  CHECK(d.ohms("X1.XT.R1") == 6);
  CHECK(d.ohms("X2.XS.R1") == 21);
  CHECK(d.text(d.circuit.instances[d.circuit.swept[0].instance.index()].name) == "X1.XS");
  CHECK(d.circuit.swept[0].nominal == 7);
}

TEST_CASE("a .param of the top level that is swept stays free wherever it is used") {
  Deck d;
  d.options.sweeps = {{"RT1", "RT"}};
  d.parameter("rt", 2000.0);
  d.parameter("half", d.tree.op(Op::divide, {d.tree.parameter("RT"), d.tree.number(2)}));
  d.element("RT1", "a 0", d.name("half"));
  d.element("V1", "b 0", d.name("RT"));
  d.flatten();
  CHECK(d.at_variable(std::get<model::Resistor>(d.at("RT1").part).ohms, 500) == 250);
  CHECK(d.at_variable(std::get<model::VoltageSource>(d.at("V1").part).volts, 500) == 500);
  CHECK(d.circuit.swept[0].found);
  CHECK_FALSE(d.circuit.swept[0].instance.valid());
  CHECK(d.circuit.swept[0].nominal == 2000);
}

TEST_CASE("an instance whose subcircuit has no such parameter means the one of the top level") {
  Deck d;
  d.options.sweeps = {{"X1", "T"}};
  d.parameter("T", 25.0);
  d.subcircuit("S", "p");
  d.element("R1", "p 0", d.name("T"));
  d.ends();
  d.part("X1", "a", "S");
  d.flatten();
  CHECK(d.at_variable(std::get<model::Resistor>(d.at("X1.R1").part).ohms, 3) == 3);
  CHECK_FALSE(d.circuit.swept[0].instance.valid());
}

TEST_CASE("every request has its entry in order, found or not, and its own variable") {
  Deck d;
  d.options.sweeps = {{"nowhere", "x"}, {"R1", "a"}, {"R2", "b"}, {"R3", "a"}};
  d.parameter("a", 1.0);
  d.parameter("b", 2.0);
  d.element("R1", "n 0", d.name("a"));
  d.element("R2", "n 0", d.name("b"));
  d.flatten();
  REQUIRE(d.circuit.swept.size() == 4);
  CHECK_FALSE(d.circuit.swept[0].found);
  CHECK(d.text(d.circuit.swept[0].parameter) == "x");
  CHECK(d.circuit.swept[1].variable == 1);
  CHECK(d.circuit.swept[2].variable == 2);
  CHECK(d.circuit.swept[3].found);
  CHECK(d.circuit.swept[3].variable == 1);  // the same parameter, the same variable
  CHECK(d.at_variable(std::get<model::Resistor>(d.at("R2").part).ohms, 4, 2) == 4);
}

TEST_CASE("a model or a device that rests on a swept parameter is kept without one") {
  Deck d;
  d.options.sweeps = {{"any", "x"}};
  d.parameter("x", 1.0);
  d.model("DX", "D", {{"is", d.name("x")}});
  d.part("D1", "a 0", "DX");
  d.flatten();
  CHECK(d.unmodelled("D1").why == model::Unmodelled::Why::unsupported);
}

TEST_CASE("a swept parameter may divide by what would be zero at its value in the netlist") {
  Deck d;
  d.options.sweeps = {{"any", "x"}};
  d.parameter("x", 0.0);
  d.element("R1", "a 0", d.tree.op(Op::divide, {d.tree.number(10), d.tree.parameter("x")}));
  d.flatten();
  CHECK(d.said().empty());
  CHECK(d.at_variable(std::get<model::Resistor>(d.at("R1").part).ohms, 2) == 5);
}
