// The one-port form: three numbers in place of a network.
#include <cmath>
#include <vector>

#include <catch2/catch.hpp>

#include "board.hpp"
#include "network/linear.hpp"

using network_test::Board;
using network_test::infinite;
using network_test::node;

namespace {

void check_form(const base::Result<model::OnePort>& form, double open_volts, double short_volts, double source_ohms) {
  REQUIRE(form.ok());
  CHECK(form->open_volts == Approx(open_volts).epsilon(1e-12).margin(1e-14));
  CHECK(form->short_volts == Approx(short_volts).epsilon(1e-12).margin(1e-14));
  CHECK(form->source_ohms == Approx(source_ohms).epsilon(1e-12));
}

}  // namespace

TEST_CASE("the plain divider's source resistance is its fixed resistor, sensor below or above") {
  Board below;
  below.volts(1, 0, 3.3);
  below.resistor(1, 2, 4700);
  const auto sensor = below.resistor(2, 0, 1e3);
  check_form(network::one_port(below.network, sensor, node(2)), 3.3, 0, 4700);

  Board above;
  above.volts(1, 0, 3.3);
  const auto other = above.resistor(1, 2, 1e3);
  above.resistor(2, 0, 4700);
  check_form(network::one_port(above.network, other, node(2)), 0, 3.3, 4700);
}

TEST_CASE("a linearising resistor parallel to the sensor lowers source resistance and open volts") {
  Board board;
  board.volts(1, 0, 3);
  board.resistor(1, 2, 10e3);
  const auto sensor = board.resistor(2, 0, 10e3);
  board.resistor(2, 0, 20e3);
  check_form(network::one_port(board.network, sensor, node(2)), 2, 0, 20e3 / 3);
}

TEST_CASE("split arms, a sense resistor and a pull-down behind it are in the one-port form") {
  // 5 V - 1k - sensor - 2k - ground, probe between sensor and 2k through 8k with 90k to ground behind. By hand: the
  // lower arm is 2k || 98k = 1.96k; the probe reads 90/98 of its node.
  Board board;
  board.volts(1, 0, 5);
  board.resistor(1, 2, 1e3);
  const auto sensor = board.resistor(2, 3, 500);
  board.resistor(3, 0, 2e3);
  board.resistor(3, 4, 8e3);
  board.resistor(4, 0, 90e3);
  check_form(network::one_port(board.network, sensor, node(4)), 0, 5 * 1.96 / 2.96 * 90 / 98, 2960);
}

TEST_CASE("leakage shifts open and short volts by what it does to each") {
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 10e3);
  const auto sensor = board.resistor(2, 0, 10e3);
  board.resistor(2, 3, 1e6);
  const auto leakage = board.amperes(3, 0, 0);
  const std::vector<model::Override> held{{leakage, 100e-9}};
  check_form(network::one_port(board.network, sensor, node(3), held), 3.3 - 0.1 - 0.001, -0.1, 10e3);
}

TEST_CASE("the sensor comes back from its reading") {
  // Computed from Rx = R u/(1 - u) and R (1 - u)/u: 3.3 V, 1.2 V read, 10 kohm fixed.
  CHECK(network::ohms_at({3.3, 0, 10e3}, 1.2) == Approx(5714.286).margin(5e-4));
  CHECK(network::ohms_at({0, 3.3, 10e3}, 1.2) == Approx(17500).margin(1e-8));
  const model::OnePort form{2.9, 0.3, 8200};
  for (double ohms = 1e-3; ohms < 1e9; ohms *= 7)
    CHECK(network::ohms_at(form, network::volts_at(form, ohms)) ==
          Approx(ohms).epsilon(1e-9 + 1e-15 * std::max(ohms / 8200, 8200 / ohms)));
}

TEST_CASE("no sensor gives a voltage beyond the open and the short circuit") {
  CHECK(std::isnan(network::ohms_at({3.3, 0, 10e3}, 3.4)));
  CHECK(std::isnan(network::ohms_at({3.3, 0, 10e3}, -0.1)));
  CHECK(std::isnan(network::ohms_at({1, 1, 10e3}, 1)));
  CHECK(network::ohms_at({3.3, 0, 10e3}, 0) == 0);
  CHECK(network::ohms_at({3.3, 0, 10e3}, 3.3) == infinite);
  CHECK(network::volts_at({3.3, 0.5, 10e3}, infinite) == 3.3);
  CHECK(network::volts_at({3.3, 0.5, 10e3}, 0) == Approx(0.5).epsilon(1e-15));
}

TEST_CASE("a voltage divider's Thevenin resistance is its arms in parallel") {
  // R Rx/(R + Rx); a potentiometer's largest is a quarter of it, at mid travel.
  Board board;
  board.volts(1, 0, 3.3);
  const auto upper = board.resistor(1, 2, 10e3);
  board.resistor(2, 0, 30e3);
  CHECK(network::thevenin_ohms(board.network, node(2), node(0)).value() == Approx(7500).epsilon(1e-13));
  CHECK(network::thevenin_ohms(board.network, node(2), node(0), upper).value() == Approx(30e3).epsilon(1e-13));
  const std::vector<model::Override> equal{{upper, 30e3}};
  CHECK(network::thevenin_ohms(board.network, node(2), node(0), {}, equal).value() == Approx(15e3).epsilon(1e-13));
  CHECK(network::thevenin_ohms(board.network, node(1), node(0)).value() == 0);
  CHECK(network::thevenin_ohms(board.network, node(2), node(2)).value() == 0);
}

TEST_CASE("a resistor whose ends are both rails has no one-port form") {
  Board board;
  board.volts(1, 0, 5);
  board.volts(2, 0, 3.3);
  const auto between = board.resistor(1, 2, 1e3);
  board.resistor(2, 0, 1e3);
  CHECK(network::one_port(board.network, between, node(2)).error() ==
        "the resistor sees a source resistance that is not above zero");
}

TEST_CASE("a resistor that shorts a rail to itself has no one-port form") {
  Board board;
  board.volts(1, 0, 5);
  board.inductor(1, 2);
  const auto shorted = board.resistor(1, 2, 1e3);
  CHECK_FALSE(network::one_port(board.network, shorted, node(2)).ok());
}

TEST_CASE("a resistor fed by a current source alone, or by nothing, has no one-port form") {
  Board fed;
  fed.amperes(0, 1, 1e-3);
  const auto sensor = fed.resistor(1, 0, 100);
  CHECK(network::one_port(fed.network, sensor, node(1)).error() ==
        "with the resistor open a node has no conducting way to ground");
  CHECK(network::node_volts(fed.network).value()[1] == Approx(0.1).epsilon(1e-15));

  Board loose;
  loose.volts(1, 0, 5);
  const auto dangling = loose.resistor(1, 2, 1e3);
  loose.capacitor(2, 0);
  CHECK(network::one_port(loose.network, dangling, node(2)).error() ==
        "no finite resistance is seen between the nodes");
  CHECK_FALSE(network::thevenin_ohms(loose.network, node(2), node(0), dangling).ok());
}

TEST_CASE("the quotient of two voltages has a one-port form of its own") {
  // 3.3 V over 3 kohm, 1 kohm and the resistor R: the tap above R over the node above the 1 kohm is R/(1k + R) (by
  // hand).
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 3e3);
  board.resistor(2, 3, 1e3);
  const auto sensor = board.resistor(3, 0, 1);
  const auto over = network::one_port(board.network, sensor, node(3)).value();
  const auto under = network::one_port(board.network, sensor, node(2)).value();
  const auto form = network::quotient_form(over, under).value();
  CHECK(form.open_volts == Approx(1).epsilon(1e-12));
  CHECK(form.short_volts == Approx(0).margin(1e-12));
  CHECK(form.source_ohms == Approx(1e3).epsilon(1e-12));
  for (const double ohms : {1.0, 100.0, 5e3, 1e7})
    CHECK(network::volts_at(form, ohms) == Approx(ohms / (1e3 + ohms)).epsilon(1e-12));
}

TEST_CASE("a quotient whose divisor passes zero has no form") {
  CHECK_FALSE(network::quotient_form({3, 1, 1e3}, {2, -1, 1e3}).ok());
  CHECK_FALSE(network::quotient_form({3, 1, 1e3}, {2, 0, 1e3}).ok());
  CHECK_FALSE(network::quotient_form({3, 1, 1e3}, {0, 2, 1e3}).ok());
}
