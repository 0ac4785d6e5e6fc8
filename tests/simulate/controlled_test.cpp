// Controlled sources; expected values computed from their definitions (from memory: SPICE's E, G, F and H).
#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

using test::Board;

TEST_CASE("a voltage-controlled voltage is gain times its controlling voltage") {
  Board board = test::divider({10e3});
  board.add(model::VoltageControlled{{2, {}}, false}, {3, 0, 2, 0});
  board.resistor(3, 0, 1e3);
  board.watch(3);
  CHECK(test::solve(board).volts[1] == Approx(3.3).epsilon(1e-14));
}

TEST_CASE("a voltage-controlled current flows from its first pin through the source into its second") {
  Board board = test::divider({10e3});
  board.add(model::VoltageControlled{{1e-3, {}}, true}, {3, 0, 2, 0});
  board.resistor(3, 0, 1e3);
  board.watch(3);
  CHECK(test::solve(board).volts[1] == Approx(-1.65).epsilon(1e-14));
}

TEST_CASE("current-controlled sources follow the current of their own copy's source") {
  Board board;
  board.volts(1, 0, 5);
  const model::BranchId sensor = board.resistor(1, 2, 1);
  const model::BranchId meter = board.volts(2, 0, 0);
  board.plan.network.branches.reserve(8);
  const model::BranchId volts = board.add(model::CurrentControlled{{1e3, {}}, {}, false}, {3, 0});
  const model::BranchId amperes = board.add(model::CurrentControlled{{2, {}}, {}, true}, {0, 4});
  board.plan.network.branches[volts.index()].through = meter;
  board.plan.network.branches[amperes.index()].through = meter;
  board.resistor(3, 0, 1e3);
  board.resistor(4, 0, 1e3);
  board.sweep(sensor, {1e3, 5e3});
  board.watch(3);
  board.watch(4);
  const model::Solution solution = test::solve(board);
  REQUIRE(solution.volts.size() == 4);
  CHECK(solution.volts[0] == Approx(5).epsilon(1e-14));
  CHECK(solution.volts[1] == Approx(10).epsilon(1e-14));
  CHECK(solution.volts[2] == Approx(1).epsilon(1e-14));
  CHECK(solution.volts[3] == Approx(2).epsilon(1e-14));
}

TEST_CASE("a gain can be swept") {
  Board board;
  board.volts(1, 0, 1);
  const model::BranchId amplifier = board.add(model::VoltageControlled{{1, {}}, false}, {2, 0, 1, 0});
  board.resistor(2, 0, 1e3);
  board.sweep(amplifier, {1, -2.5});
  board.watch(2);
  const model::Solution solution = test::solve(board);
  CHECK(solution.volts == std::vector<double>{1, -2.5});
}
