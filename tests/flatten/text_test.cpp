#include <cmath>
#include <string>

#include <catch2/catch.hpp>

#include "base/names.hpp"
#include "expression/evaluate.hpp"
#include "flatten/flatten.hpp"
#include "parse/netlist.hpp"

namespace {

// A netlist's text, read and flattened.
struct Board {
  source::Sources sources;
  base::NameTable names;
  source::Diagnostics diagnostics;
  model::Netlist netlist;
  model::Circuit circuit;

  explicit Board(const std::string& text, const flatten::Options& options = {}) {
    const source::Limits limits;
    const source::SourceId root = sources.add({"board.cir", text, {}});
    const parse::Includer none = [](const std::string&, source::Place) -> base::Result<source::SourceId> {
      return base::Error{"no such file"};
    };
    netlist = parse::read_netlist(root, sources, names, none, limits, diagnostics);
    circuit = flatten::flatten(netlist, names, options, limits, diagnostics);
  }

  const model::Element& at(std::string_view name) const {
    for (const model::Element& element : circuit.elements) {
      if (names.text(element.name) == name) return element;
    }
    throw std::runtime_error("no element " + std::string(name));
  }
  const model::Number& resistance(std::string_view name) const { return std::get<model::Resistor>(at(name).part).ohms; }

  std::string said() const {
    std::string all;
    for (const source::Diagnostic& one : diagnostics) all += source::headline(sources, one) + "\n";
    return all;
  }
};

}  // namespace

TEST_CASE("a board's text with a thermistor model in a subcircuit flattens to a swept resistor") {
  flatten::Options options;
  options.sweeps = {{"XCAB.XRT1", "T"}};
  const Board board(
      "thermistor on a cabin board\n"
      ".param rpull=10k beta={3000+435}\n"
      "V1 vdd 0 3.3\n"
      "XCAB vdd adc 0 cabin\n"
      ".subckt cabin vdd out GND\n"
      "Rp vdd out {rpull}\n"
      "XRT1 out GND NTC PARAMS: R25=10k BETA={beta}\n"
      ".ends\n"
      ".subckt NTC a b PARAMS: T R25 BETA=4000\n"
      "G1 a b VALUE={V(a,b)/(R25*exp(BETA*(1/(T+273.15)-1/298.15)))}\n"
      ".ends\n"
      ".end\n",
      options);
  CHECK(board.said().empty());
  CHECK(board.resistance("XCAB.Rp").value == 10e3);
  const model::Number& swept = board.resistance("XCAB.XRT1.G1");
  REQUIRE_FALSE(swept.fixed());
  expression::Leaves leaves;
  leaves.variable = [](std::uint32_t) { return 85.0; };
  // The beta equation, computed from R25 exp(B (1/T - 1/T25)).
  CHECK(std::get<double>(expression::evaluate(board.circuit.expressions, swept.residual, leaves)) ==
        Approx(10e3 * std::exp(3435 * (1 / 358.15 - 1 / 298.15))).epsilon(1e-13));
  const model::ReadingCount count = flatten::count_cards(board.netlist);
  CHECK(count.modelled == count.cards);
}

TEST_CASE("errors of flattening point at line and column of the text") {
  const Board board(
      "errors\n"
      ".param a={b} b={2*a}\n"
      "R1 n1 0 {rx*2}\n"
      "R2 n1 0 {ln(0-1)}\n"
      "R3 n1 0 10k\n"
      "r3 n2 0 10k\n"
      "X1 n1 n2 one\n"
      "X2 n1 one\n"
      "F1 n1 0 V9 2\n"
      ".subckt one p PARAMS: q\n"
      "R1 p 0 {q}\n"
      ".ends\n"
      ".end\n");
  CHECK(board.said() ==
        "board.cir:3:10: error: parameter rx is not defined\n"
        "board.cir:4:10: error: ln(-1) has no finite value\n"
        "board.cir:6:1: error: R3 stands twice in its scope\n"
        "board.cir:7:1: error: X1 has 2 pins, and subcircuit one has 1 port\n"
        "board.cir:8:1: error: X2 gives no value for q, which subcircuit one has no default for\n"
        "board.cir:9:9: error: F1 is controlled by the current of V9, and there is no such voltage source here\n"
        "board.cir:2:8: error: parameter a needs itself: a -> b -> a\n");
}

TEST_CASE("marking codes and a bare M in a text are suspect for their elements") {
  const Board board(
      "values\n"
      "R1 a 0 4k7\n"
      "R2 a 0 1M\n"
      "R3 a 0 10k 1%\n"
      ".param rx=2k2\n"
      "R4 a 0 {rx*10}\n"
      ".end\n");
  CHECK(board.resistance("R1").value == 4700);
  CHECK(board.resistance("R2").value == 1e6);
  CHECK(board.resistance("R3").value == 10e3);
  CHECK(board.resistance("R4").value == 22e3);
  REQUIRE(board.circuit.suspects.size() == 4);
  CHECK(board.circuit.suspects[1].spice == 1e-3);
  CHECK(board.circuit.suspects[3].spice == 20e3);
  CHECK(board.circuit.details[0].tolerance == 0.01);
}
