// Node voltages of networks small enough to be computed by hand.
#include <cmath>
#include <vector>

#include <catch2/catch.hpp>

#include "board.hpp"
#include "network/linear.hpp"

using network_test::Board;
using network_test::node;

namespace {

double volts(const Board& board, std::uint32_t n, std::vector<model::Override> overrides = {}) {
  return network::node_volts(board.network, overrides).value().at(n);
}

}  // namespace

TEST_CASE("a divider of equal resistors reads half, one of a tenth above 90.9 per cent") {
  // Common practice, no source: 50 % at Rx = R, 90.9 % at Rx = R/10 with the sensor above.
  Board board;
  board.volts(1, 0, 3.3);
  const auto sensor = board.resistor(1, 2, 10e3);
  board.resistor(2, 0, 10e3);
  CHECK(volts(board, 2) / 3.3 == Approx(0.5).epsilon(1e-15));
  CHECK(volts(board, 2, {{sensor, 1e3}}) / 3.3 == Approx(10.0 / 11).epsilon(1e-15));
  CHECK(volts(board, 2, {{sensor, 1e3}}) / 3.3 == Approx(0.909).margin(5e-4));
}

TEST_CASE("a potentiometer at mid travel on 30 V sags to 14.2857 V under 500 kohm") {
  // Nagoor Kani, Control Systems, 3rd ed. 2015, example 2.1.
  Board board;
  board.volts(1, 0, 30);
  board.resistor(1, 2, 50e3);
  board.resistor(2, 0, 50e3);
  CHECK(volts(board, 2) == Approx(15).epsilon(1e-14));
  board.resistor(2, 0, 500e3);
  CHECK(volts(board, 2) == Approx(14.2857).margin(5e-5));
}

TEST_CASE("a loaded potentiometer strays by no more than the published bounds") {
  // Bounds 7.5, 0.75 and 0.15 %: rclab.de, "Das belastete Potentiometer"; exact values computed from m x^2 (1-x)/(1 + m
  // x (1-x)).
  struct Case {
    double load_over_pot, bound, exact, at;
  };
  for (const Case c :
       {Case{2, 0.075, 0.066726, 0.67836}, Case{20, 0.0075, 0.007326, 0.66789}, Case{100, 0.0015, 0.001478, 0.66691}}) {
    Board board;
    board.volts(1, 0, 1);
    const auto upper = board.resistor(1, 2, 1);
    const auto lower = board.resistor(2, 0, 1);
    board.resistor(2, 0, c.load_over_pot * 10e3);
    double worst = 0;
    for (int i = 1; i < 1000; ++i) {
      const double x = i / 1000.0;
      worst = std::max(worst, x - volts(board, 2, {{upper, 10e3 * (1 - x)}, {lower, 10e3 * x}}));
    }
    CHECK(worst < c.bound);
    CHECK(worst == Approx(c.exact).margin(2e-6));
    CHECK(c.at - volts(board, 2, {{upper, 10e3 * (1 - c.at)}, {lower, 10e3 * c.at}}) == Approx(c.exact).margin(1e-6));
  }
}

TEST_CASE("one microampere out of 10 kohm over 10 kohm moves the tap by 5 mV") {
  // Computed from V = Vth - I Rth; two circuit simulators give 1.645 V.
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 10e3);
  board.resistor(2, 0, 10e3);
  const auto leakage = board.amperes(2, 0, 1e-6);
  CHECK(volts(board, 2) == Approx(1.645).epsilon(1e-14));
  CHECK(volts(board, 2, {{leakage, -1e-6}}) == Approx(1.655).epsilon(1e-14));
}

TEST_CASE("leakage through a source resistance makes the error of the published examples") {
  // ST10F276 user manual UM0404, p. 386: 100 nA in 50 kohm is about 5 mV. M68HC16 manual: 50 nA in 1 Mohm is 50 mV.
  struct Case {
    double ohms, amperes, error;
  };
  for (const Case c : {Case{50e3, 100e-9, 5e-3}, Case{1e6, 50e-9, 50e-3}}) {
    Board board;
    board.volts(1, 0, 2);
    board.resistor(1, 2, c.ohms);
    board.amperes(2, 0, c.amperes);
    CHECK(2 - volts(board, 2) == Approx(c.error).epsilon(1e-12));
  }
}

TEST_CASE("a T network divides as its two stages") {
  // 9 V, 1k in series, 2k down, 3k on, 6k down: the second stage loads the first with 9k. By hand: 2k || 9k = 18/11 k.
  Board board;
  board.volts(1, 0, 9);
  board.resistor(1, 2, 1e3);
  board.resistor(2, 0, 2e3);
  board.resistor(2, 3, 3e3);
  board.resistor(3, 0, 6e3);
  CHECK(volts(board, 2) == Approx(9 * 18.0 / 29).epsilon(1e-14));
  CHECK(volts(board, 3) == Approx(9 * 18.0 / 29 * 2 / 3).epsilon(1e-14));
}

TEST_CASE("a bridge with equal ratios carries nothing across, whatever joins its middle") {
  Board board;
  board.volts(1, 0, 5);
  board.resistor(1, 2, 1e3);
  const auto arm = board.resistor(2, 0, 2e3);
  board.resistor(1, 3, 10e3);
  board.resistor(3, 0, 20e3);
  const auto middle = board.resistor(2, 3, 47);
  CHECK(volts(board, 2) - volts(board, 3) == Approx(0).margin(1e-15));
  // Unbalanced and the middle open: each half is a divider.
  CHECK(volts(board, 2, {{arm, 1e3}, {middle, network_test::infinite}}) == Approx(2.5).epsilon(1e-14));
  CHECK(volts(board, 3, {{arm, 1e3}, {middle, network_test::infinite}}) == Approx(10.0 / 3).epsilon(1e-14));
}

TEST_CASE("a source behind a resistance sags with its load") {
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 10);
  board.resistor(2, 0, 320);
  CHECK(volts(board, 1) == Approx(3.3).epsilon(1e-15));
  CHECK(volts(board, 2) == Approx(3.2).epsilon(1e-14));
}

TEST_CASE("controlled sources follow what controls them") {
  Board board;
  const auto sense = board.volts(1, 0, 2);
  board.resistor(1, 0, 1e3);                                          // 2 mA through it, out of the source
  board.add(model::VoltageControlled{{3, {}}, false}, {2, 0, 1, 0});  // E: 6 V
  board.resistor(2, 0, 1e3);
  const auto g = board.add(model::VoltageControlled{{1e-3, {}}, true}, {0, 3, 1, 0});  // G: 2 mA from ground into 3
  board.resistor(3, 0, 500);
  board.add(model::CurrentControlled{{5, {}}, {}, true}, {0, 4}, sense);  // F: 5 times -2 mA into 4
  board.resistor(4, 0, 100);
  board.add(model::CurrentControlled{{1e3, {}}, {}, false}, {5, 0}, sense);  // H: 1 kohm times -2 mA
  board.resistor(5, 0, 1e3);
  CHECK(volts(board, 2) == Approx(6).epsilon(1e-14));
  CHECK(volts(board, 3) == Approx(1).epsilon(1e-14));
  CHECK(volts(board, 4) == Approx(-1).epsilon(1e-14));  // the source's own current runs from minus to plus: -2 mA
  CHECK(volts(board, 5) == Approx(-2).epsilon(1e-14));
  CHECK(volts(board, 3, {{g, 2e-3}}) == Approx(2).epsilon(1e-14));  // an override may be of a gain
}

TEST_CASE("a transconductance across its own terminals is a resistor") {
  Board board;
  board.volts(1, 0, 10);
  board.resistor(1, 2, 1e3);
  board.add(model::VoltageControlled{{1e-3, {}}, true}, {2, 0, 2, 0});
  CHECK(volts(board, 2) == Approx(5).epsilon(1e-14));
}

TEST_CASE("inductors and zero ohms are shorts, capacitors and parts without a model are open") {
  Board board;
  board.volts(1, 0, 4);
  board.inductor(1, 2);
  board.resistor(2, 3, 1e3);
  const auto jumper = board.resistor(3, 4, 0);
  board.resistor(4, 0, 1e3);
  board.capacitor(4, 5);
  board.add(model::Unmodelled{}, {5, 0, 1});
  board.add(model::Device{}, {4, 0});
  CHECK(network::node_volts(board.network).value() == std::vector<double>{0, 4, 4, 2, 2, 0});
  CHECK(volts(board, 3, {{jumper, 1e3}}) == Approx(8.0 / 3).epsilon(1e-14));  // a zero that is overridden is no short
}

TEST_CASE("an override to zero ohms shorts, and the last of two overrides counts") {
  Board board;
  const auto rail = board.volts(1, 0, 4);
  const auto upper = board.resistor(1, 2, 1e3);
  board.resistor(2, 0, 1e3);
  CHECK(volts(board, 2, {{upper, 0}}) == 4);
  CHECK(volts(board, 2, {{rail, 9}, {upper, 0}, {rail, 8}}) == 8);
}

TEST_CASE("a ladder of 2000 nodes agrees with its closed form") {
  // Equal rungs r and sides s: 1 V at the head decays as sinh((N + 1 - k) a)/sinh((N + 1) a) towards a grounded end,
  // with cosh a = 1 + s/(2 r), the solution of the difference equation of a ladder. Computed from that formula.
  constexpr std::uint32_t nodes = 2000;
  Board board;
  board.volts(1, 0, 1);
  for (std::uint32_t k = 1; k <= nodes; ++k) {
    board.resistor(k, k == nodes ? 0 : k + 1, 1.0);
    if (k > 1) board.resistor(k, 0, 1e4);
  }
  const auto found = network::node_volts(board.network).value();
  const double a = std::acosh(1 + 1.0 / 2e4);
  for (const std::uint32_t k : {1U, 2U, 10U, 200U, 1000U, 1999U, 2000U})
    CHECK(found[k] == Approx(std::sinh((nodes + 1.0 - k) * a) / std::sinh(nodes * a)).epsilon(1e-9));
}
