// Linear networks through the real simulator, against closed forms.
#include <cmath>

#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

using test::Board;

// Voltage division: V = 3.3 Rx / (10k + Rx), Kirchhoff's laws.
TEST_CASE("a plain divider is exact to the last digits at every point of the sweep") {
  const std::vector<double> ohms = test::geometric(300, 300e3, 101);
  const model::Solution solution = test::solve(test::divider(ohms));
  CHECK(solution.rung == model::Rung::linear);
  REQUIRE(solution.volts.size() == 101);
  for (std::size_t i = 0; i < ohms.size(); ++i) {
    const double expected = 3.3 * ohms[i] / (10e3 + ohms[i]);
    CHECK(std::fabs(solution.volts[i] - expected) < 2e-15 * 3.3);
  }
}

// Common practice, no source: at Rx = R half the supply, at Rx = R/10 (sensor above) 90.9 % of it.
TEST_CASE("a divider of equal resistances gives half the supply, one of R/10 below R gives a tenth less than all") {
  const model::Solution solution = test::solve(test::divider({10e3, 100e3}));
  CHECK(solution.volts[0] == Approx(1.65).epsilon(1e-15));
  CHECK(solution.volts[1] / 3.3 == Approx(0.90909).margin(1e-5));
}

// Computed: 3.3 V / 2 - 1 uA * 5 kohm = 1.645 V. A common example of input leakage.
TEST_CASE("a leakage of 1 uA out of 10k over 10k at 3.3 V gives 1.645 V, its other sign 1.655 V") {
  Board board = test::divider({10e3});
  const model::BranchId leakage = board.amperes(2, 0, 0);
  board.plan.conditions = {{model::ConditionKind::nominal, {}},
                           {model::ConditionKind::leakage_high, {{leakage, -1e-6}}},
                           {model::ConditionKind::leakage_low, {{leakage, 1e-6}}}};
  const model::Solution solution = test::solve(board);
  REQUIRE(solution.volts.size() == 3);
  CHECK(solution.volts[0] == Approx(1.65).epsilon(1e-14));
  CHECK(solution.volts[1] == Approx(1.655).epsilon(1e-14));
  CHECK(solution.volts[2] == Approx(1.645).epsilon(1e-14));
}

TEST_CASE("a held value wins over a swept one, in its own condition only") {
  Board board = test::divider({10e3, 30e3});
  board.plan.conditions.push_back({model::ConditionKind::bare, {{model::BranchId{2}, 90e3}}});
  const model::Solution solution = test::solve(board);
  REQUIRE(solution.volts.size() == 4);
  CHECK(solution.volts[0] == Approx(1.65).epsilon(1e-14));
  CHECK(solution.volts[1] == Approx(2.475).epsilon(1e-14));
  CHECK(solution.volts[2] == Approx(2.97).epsilon(1e-14));
  CHECK(solution.volts[3] == Approx(2.97).epsilon(1e-14));
}

TEST_CASE("a leakage held at minus zero is a leakage of zero") {
  Board board = test::divider({10e3});
  const model::BranchId leakage = board.amperes(2, 0, 1);
  board.plan.conditions = {{model::ConditionKind::nominal, {{leakage, -0.0}}}};
  CHECK(test::solve(board).volts[0] == Approx(1.65).epsilon(1e-14));
}

TEST_CASE("a swept rail moves its divider in proportion, and is itself read back") {
  Board board;
  const model::BranchId rail = board.volts(1, 0, 0);
  board.resistor(1, 2, 30e3);
  board.resistor(2, 0, 10e3);
  board.watch(2);
  board.watch(1);
  board.sweep(rail, {0, 6, 12.5});
  const model::Solution solution = test::solve(board);
  REQUIRE(solution.volts.size() == 6);
  CHECK(solution.volts[0] == 0.0);
  CHECK(solution.volts[2] == Approx(1.5).epsilon(1e-14));
  CHECK(solution.volts[4] == Approx(3.125).epsilon(1e-14));
  CHECK(solution.volts[5] == 12.5);
}

TEST_CASE("zero ohms and inductors are shorts: no milliohm of the simulator's own is left") {
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 0);
  board.add(model::Inductor{{1e-6, {}}}, {2, 3});
  board.resistor(3, 4, 1e-3);
  board.resistor(4, 5, 1e-3);
  board.resistor(5, 0, 0);
  board.nominal();
  board.watch(2);
  board.watch(4);
  board.watch(5);
  const model::Solution solution = test::solve(board);
  CHECK(solution.volts[0] == Approx(3.3).epsilon(1e-15));
  CHECK(solution.volts[1] == Approx(1.65).epsilon(1e-14));
  CHECK(solution.volts[2] == 0.0);
}

TEST_CASE("a resistance swept through zero is a short at that point only") {
  Board board = test::divider({1e3, 0, 10e3});
  const model::Solution solution = test::solve(board);
  CHECK(solution.volts[0] == Approx(0.3).epsilon(1e-14));
  CHECK(solution.volts[1] == 0.0);
  CHECK(solution.volts[2] == Approx(1.65).epsilon(1e-14));
}

TEST_CASE("a resistance swept to zero ties its node to the rail that all copies share") {
  Board board;
  board.volts(2, 0, 3.3);
  const model::BranchId upper = board.resistor(2, 1, 1);
  board.resistor(1, 0, 10e3);
  board.sweep(upper, {10e3, 0, 10e3});
  board.watch(1);
  const model::Solution solution = test::solve(board);
  CHECK(solution.volts[0] == Approx(1.65).epsilon(1e-14));
  CHECK(solution.volts[1] == Approx(3.3).epsilon(1e-15));
  CHECK(solution.volts[2] == Approx(1.65).epsilon(1e-14));
}

TEST_CASE("a resistance held at zero is a short in its condition only") {
  Board board = test::divider({10e3});
  board.plan.conditions.push_back({model::ConditionKind::bare, {{model::BranchId{1}, 0}}});
  const model::Solution solution = test::solve(board);
  CHECK(solution.volts[0] == Approx(1.65).epsilon(1e-14));
  CHECK(solution.volts[1] == Approx(3.3).epsilon(1e-15));
}

TEST_CASE("capacitors and parts without a model draw nothing") {
  Board board = test::divider({10e3});
  board.add(model::Capacitor{{1e-7, {}}}, {2, 0});
  board.add(model::Unmodelled{}, {2, 1, 0});
  CHECK(test::solve(board).volts[0] == Approx(1.65).epsilon(1e-14));
}

// Ohm's law: 3.3 V / 20 kohm.
TEST_CASE("a watched current is counted from plus through the source") {
  Board board;
  const model::BranchId rail = board.volts(1, 0, 3.3);
  const model::BranchId lower = board.resistor(1, 0, 1);
  board.sweep(lower, {20e3, 10e3});
  board.watch(1);
  board.plan.watched_currents = {rail};
  const model::Solution solution = test::solve(board);
  REQUIRE(solution.amperes.size() == 2);
  CHECK(solution.amperes[0] == Approx(-165e-6).epsilon(1e-14));
  CHECK(solution.amperes[1] == Approx(-330e-6).epsilon(1e-14));
}

TEST_CASE("a sweep that needs several decks has all its points in order") {
  const std::vector<double> ohms = test::geometric(1, 1e6, 1001);
  const model::Solution solution = test::solve(test::divider(ohms));
  REQUIRE(solution.volts.size() == 1001);
  for (std::size_t i = 0; i < ohms.size(); ++i)
    CHECK(solution.volts[i] == Approx(3.3 * ohms[i] / (10e3 + ohms[i])).epsilon(1e-14));
}

TEST_CASE("a plan without points is solved, and empty") {
  Board board = test::divider({});
  CHECK(test::solve(board).volts.empty());
}

TEST_CASE("numbers of any size come through: 1 pohm below 1 Gohm") {
  Board board;
  board.volts(1, 0, 1);
  board.resistor(1, 2, 1.2345678901234567e9);
  board.resistor(2, 0, 9.8765432109876543e-13);
  board.nominal();
  board.watch(2);
  CHECK(test::solve(board).volts[0] == Approx(9.8765432109876543e-13 / 1.2345678901234567e9).epsilon(1e-13));
}
