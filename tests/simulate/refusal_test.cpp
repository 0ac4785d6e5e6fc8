// Plans that never reach the simulator.
#include <limits>

#include <catch2/catch.hpp>

#include "simulate/deck.hpp"
#include "simulate/worker_access.hpp"

using test::Board;

namespace {

const double infinite = std::numeric_limits<double>::infinity();
const double not_a_number = std::numeric_limits<double>::quiet_NaN();

std::string refusal(const Board& board) {
  const auto writer = simulate::DeckWriter::prepare(board.plan, board.circuit, board.names);
  if (!writer.ok()) return writer.error();
  const auto deck = writer->write(0, board.plan.points * board.plan.conditions.size(), simulate::Tolerances::none);
  return deck.ok() ? "" : deck.error();
}

}  // namespace

TEST_CASE("a value that is infinite or no number is refused wherever it stands") {
  CHECK(refusal(test::divider({1e3, infinite})) == "a value of the network is not a finite number");
  CHECK(refusal(test::divider({not_a_number})) == "a value of the network is not a finite number");

  Board held = test::divider({1e3});
  held.plan.conditions[0].held = {{model::BranchId{0}, not_a_number}};
  CHECK(refusal(held) == "a value of the network is not a finite number");

  Board own = test::divider({1e3});
  own.amperes(2, 0, -infinite);
  CHECK(refusal(own) == "a value of the network is not a finite number");
}

TEST_CASE("a value that is an expression of a swept quantity, and is not swept, is refused") {
  Board board = test::divider({1e3});
  board.add(model::Resistor{{0, board.variable()}}, {2, 0});
  CHECK(refusal(board) == "a value of the network is not a finite number");
}

TEST_CASE("a negative resistance is refused, for the simulator would take it in silence") {
  CHECK(refusal(test::divider({-1e3})) == "a resistance of the network is negative");
}

TEST_CASE("a node that only a capacitor reaches has no DC path, and neither has one behind a current source") {
  Board capacitor = test::divider({1e3});
  capacitor.add(model::Capacitor{{1e-9, {}}}, {2, 3});
  capacitor.resistor(3, 4, 1e3);
  CHECK(refusal(capacitor) == "a node of the network has no DC path to ground");

  Board current = test::divider({1e3});
  current.amperes(0, 3, 1e-3);
  CHECK(refusal(current) == "a node of the network has no DC path to ground");

  Board watched = test::divider({1e3});
  watched.plan.network.node_count = 4;
  watched.watch(3);
  CHECK(refusal(watched) == "a node of the network has no DC path to ground");
}

TEST_CASE("a node that is only a capacitor's far end does not matter") {
  Board board = test::divider({1e3});
  board.add(model::Capacitor{{1e-9, {}}}, {2, 3});
  CHECK(refusal(board).empty());
}

TEST_CASE("voltage sources in parallel are refused, of equal volts too") {
  Board board = test::divider({1e3});
  board.volts(1, 0, 3.3);
  CHECK(refusal(board) == "voltage sources of the network form a loop");
}

TEST_CASE("a short across a source is refused, at the one point where it occurs too") {
  Board fixed;
  fixed.volts(1, 0, 3.3);
  fixed.resistor(1, 0, 0);
  fixed.nominal();
  CHECK(refusal(fixed) == "a voltage source of the network is shorted");

  Board swept;
  swept.volts(1, 0, 3.3);
  const model::BranchId part = swept.resistor(1, 0, 1);
  swept.sweep(part, {10, 0});
  CHECK(refusal(swept) == "a voltage source of the network is shorted");
}

TEST_CASE("a short that joins two rails is refused") {
  Board board;
  board.volts(1, 0, 3.3);
  board.volts(2, 0, 5);
  const model::BranchId part = board.resistor(1, 2, 1);
  board.sweep(part, {10, 0});
  CHECK(refusal(board) == "a zero resistance closes a loop of voltage sources");
}

TEST_CASE("a device's parameter that is not in the table never reaches a deck") {
  Board board = test::divider({1e3});
  board.device(model::DeviceType::diode, {2, 1}, {{"is) .include x", 1}});
  CHECK(refusal(board) == "the simulator's d models do not take the parameter is) .include x");

  Board level = test::divider({1e3});
  level.device(model::DeviceType::nmos, {2, 1, 0, 0}, {{"level", 8}});
  CHECK(refusal(level) == "level 8 of nmos models is not simulated");
}

TEST_CASE("a device with a number of pins that its model does not take is refused") {
  Board board = test::divider({1e3});
  board.device(model::DeviceType::nmos, {2, 1, 0}, {});
  CHECK(refusal(board) == "a device of the network has a number of pins that its model does not take");
}

TEST_CASE("an expression that asks for what is not in the network is refused") {
  Board board = test::divider({1e3});
  board.source(2, 0, board.net(99), true);
  CHECK(refusal(board) == "the expression of a source depends on a net outside its network");

  Board current = test::divider({1e3});
  current.source(2, 0, current.current(model::BranchId{1}), true);
  CHECK(refusal(current) == "the expression of a source depends on a current outside its network");
}

TEST_CASE("an expression that grows beyond all bounds is refused, not written") {
  Board board = test::divider({1e3});
  model::ExpressionId tree = board.net(2);
  for (int i = 0; i < 60; ++i) tree = board.apply(model::Op::add, {tree, tree});
  board.source(2, 0, tree, true);
  CHECK(refusal(board) == "the expression of a source is too long for the simulator");
}

TEST_CASE("a plan that contradicts itself is refused rather than read past its ends") {
  Board few = test::divider({1e3, 2e3});
  few.plan.points = 3;
  CHECK(refusal(few) == "the plan contradicts itself: a swept branch has not one value a point");

  Board watched = test::divider({1e3});
  watched.watch(77);
  CHECK(refusal(watched) == "the plan contradicts itself: a watched node is not there");
}

TEST_CASE("a refused plan fails with its sentence and costs the other plans nothing") {
  Board board = test::divider({10e3});
  std::vector<model::Plan> plans{board.plan, test::divider({-1}).plan, board.plan};
  const std::vector<model::Outcome> outcomes = test::solve(test::real_worker(), board, plans);
  CHECK(outcomes[0].solution.has_value());
  CHECK(outcomes[1].failure == "a resistance of the network is negative");
  CHECK(outcomes[2].solution.has_value());
}
