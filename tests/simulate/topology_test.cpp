#include "simulate/topology.hpp"

#include <algorithm>
#include <numeric>

#include <catch2/catch.hpp>

#include "simulate/board.hpp"

using test::Board;

namespace {

std::vector<std::uint32_t> apart(const Board& board) {
  std::vector<std::uint32_t> roots(board.plan.network.node_count);
  std::iota(roots.begin(), roots.end(), 0U);
  return roots;
}

bool all_reach(const Board& board) {
  const std::vector<bool> reached = simulate::reaches_ground(board.plan.network, board.circuit, apart(board));
  return std::find(reached.begin(), reached.end(), false) == reached.end();
}

bool loops(const Board& board) {
  return simulate::has_voltage_loop(board.plan.network, apart(board));
}

}  // namespace

TEST_CASE("resistors and voltage sources lead to ground, capacitors and current sources do not") {
  const auto good = [] {
    Board board;
    board.volts(1, 0, 1);
    board.resistor(1, 2, 1);
    return board;
  };
  CHECK(all_reach(good()));

  Board capacitor = good();
  capacitor.add(model::Capacitor{{1e-9, {}}}, {2, 3});
  CHECK_FALSE(all_reach(capacitor));

  Board current = good();
  current.amperes(0, 3, 1e-3);
  CHECK_FALSE(all_reach(current));
}

TEST_CASE("a controlled current leads to ground only where it depends on its own ends") {
  Board conductance;
  conductance.add(model::VoltageControlled{{1e-3, {}}, true}, {1, 0, 1, 0});
  CHECK(all_reach(conductance));

  Board elsewhere;
  elsewhere.volts(2, 0, 1);
  elsewhere.add(model::VoltageControlled{{1e-3, {}}, true}, {1, 0, 2, 0});
  CHECK_FALSE(all_reach(elsewhere));

  Board expression;
  expression.source(1, 0, expression.apply(model::Op::divide, {expression.net(1), expression.number(1e3)}), true);
  CHECK(all_reach(expression));

  Board foreign;
  foreign.volts(2, 0, 1);
  foreign.source(1, 0, foreign.apply(model::Op::divide, {foreign.net(2), foreign.number(1e3)}), true);
  CHECK_FALSE(all_reach(foreign));
}

TEST_CASE("junctions and channels lead to ground, gates and controlling pins do not") {
  Board diode;
  diode.device(model::DeviceType::diode, {1, 0}, {});
  CHECK(all_reach(diode));

  Board gate;
  gate.volts(1, 0, 1);
  gate.device(model::DeviceType::nmos, {1, 2, 0, 0}, {});
  CHECK_FALSE(all_reach(gate));
  gate.resistor(2, 0, 1);
  CHECK(all_reach(gate));

  Board contact;
  contact.device(model::DeviceType::voltage_switch, {1, 0, 2, 0}, {});
  CHECK_FALSE(all_reach(contact));

  Board transistor;
  transistor.device(model::DeviceType::npn, {1, 2, 0}, {});
  CHECK(all_reach(transistor));
}

TEST_CASE("voltage sources of every kind may not close a loop") {
  Board board;
  board.volts(1, 0, 1);
  board.volts(2, 1, 1);
  CHECK_FALSE(loops(board));
  board.add(model::VoltageControlled{{1, {}}, false}, {2, 0, 1, 0});
  CHECK(loops(board));
}
