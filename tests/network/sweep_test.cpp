// Many points of one network: the short way against the long way.
#include "network/sweep.hpp"

#include <cmath>
#include <vector>

#include <catch2/catch.hpp>

#include "board.hpp"

using network_test::Board;
using network_test::node;

namespace {

struct Bench {
  Board board;
  model::BranchId rail, upper, sensor, leakage, reference;
  std::vector<model::NodeId> watched{node(3), node(4), node(2)};
};

// A 3.3 V rail behind 2 ohm, a divider, a sense resistor with leakage, and a reference tap.
Bench bench() {
  Bench made;
  auto& board = made.board;
  made.rail = board.volts(1, 0, 3.3);
  board.resistor(1, 2, 2);
  made.upper = board.resistor(2, 3, 10e3);
  made.sensor = board.resistor(3, 0, 10e3);
  board.resistor(3, 4, 100e3);
  board.resistor(4, 0, 10e6);
  made.leakage = board.amperes(4, 0, 0);
  made.reference = board.resistor(2, 0, 1e3);
  return made;
}

std::vector<double> decades(double from, double to, std::size_t points) {
  std::vector<double> values;
  for (std::size_t i = 0; i < points; ++i)
    values.push_back(from * std::pow(to / from, static_cast<double>(i) / static_cast<double>(points - 1)));
  return values;
}

// Every point by a solve of its own.
std::vector<double> long_way(const Bench& b, const std::vector<model::SweptValues>& swept, std::size_t points,
                             const std::vector<model::Override>& held) {
  std::vector<double> all;
  for (std::size_t p = 0; p < points; ++p) {
    auto overrides = held;
    for (const auto& branch : swept) overrides.push_back({branch.branch, branch.values[p]});
    const auto volts = network::node_volts(b.board.network, overrides).value();
    for (const auto watched : b.watched) all.push_back(volts[watched.index()]);
  }
  return all;
}

void check_against_long_way(const Bench& b, const std::vector<model::SweptValues>& swept, std::size_t points,
                            const std::vector<model::Override>& held) {
  const auto found = network::sweep_volts(b.board.network, swept, points, held, b.watched).value();
  const auto wanted = long_way(b, swept, points, held);
  REQUIRE(found.size() == wanted.size());
  for (std::size_t i = 0; i < found.size(); ++i) CHECK(found[i] == Approx(wanted[i]).epsilon(1e-12).margin(1e-14));
}

}  // namespace

TEST_CASE("a swept sensor gives the volts of solves one by one") {
  const Bench b = bench();
  for (const double leakage : {0.0, 1e-7, -1e-7}) {
    check_against_long_way(b, {{b.sensor, false, decades(350, 412e3, 101)}}, 101, {{b.leakage, leakage}});
    check_against_long_way(b, {{b.sensor, false, decades(1e9, 1e-3, 101)}}, 101, {{b.leakage, leakage}});
  }
}

TEST_CASE("a swept resistor between two rails, and one fed by a current source, give the volts of solves one by one") {
  Bench b = bench();
  check_against_long_way(b, {{b.upper, false, decades(1e2, 1e5, 11)}}, 11, {});
  Bench fed;
  fed.board.volts(1, 0, 5);
  fed.board.resistor(1, 0, 1e3);
  fed.board.amperes(0, 2, 1e-3);
  fed.sensor = fed.board.resistor(2, 0, 100);
  fed.upper = fed.board.resistor(1, 0, 1e3);
  fed.watched = {node(1), node(2)};
  check_against_long_way(fed, {{fed.sensor, false, decades(18, 390, 101)}}, 101, {});
  check_against_long_way(fed, {{fed.upper, false, decades(18, 390, 101)}}, 101, {});
}

TEST_CASE("a swept rail, and a swept current, give the volts of solves one by one") {
  const Bench b = bench();
  std::vector<double> volts;
  for (int i = 0; i <= 100; ++i) volts.push_back(-2 + 0.2 * i);
  check_against_long_way(b, {{b.rail, false, volts}}, 101, {{b.leakage, 1e-6}});
  for (double& value : volts) value *= 1e-9;
  check_against_long_way(b, {{b.leakage, false, volts}}, 101, {});
}

TEST_CASE("two swept resistors give the volts of solves one by one") {
  const Bench b = bench();
  check_against_long_way(b, {{b.sensor, false, decades(1e2, 1e5, 21)}, {b.upper, false, decades(1e5, 1e2, 21)}}, 21,
                         {});
}

TEST_CASE("a swept resistor may be zero, constant, or of a point or two") {
  const Bench b = bench();
  check_against_long_way(b, {{b.sensor, false, {0, 10, 1e3, 0}}}, 4, {});
  check_against_long_way(b, {{b.sensor, false, {1e3, 1e3, 1e3}}}, 3, {});
  check_against_long_way(b, {{b.sensor, false, {1e3}}}, 1, {});
  check_against_long_way(b, {{b.sensor, false, {1e3, 2e3}}}, 2, {});
  check_against_long_way(b, {}, 2, {});
  check_against_long_way(b, {{b.sensor, false, {1e3}}}, 0, {});
}

TEST_CASE("a swept value wins over a held one") {
  const Bench b = bench();
  const std::vector<model::SweptValues> swept{{b.sensor, false, {1e3, 2e3, 4e3}}};
  const std::vector<model::Override> held{{b.sensor, 7}};
  CHECK(network::sweep_volts(b.board.network, swept, 3, held, b.watched).value() == long_way(b, swept, 3, {}));
}

TEST_CASE("a sweep says at which point it has no solution, and refuses too few values") {
  const Bench b = bench();
  const std::vector<model::SweptValues> short_of_values{{b.upper, false, {1e3, 0}}};
  CHECK(network::sweep_volts(b.board.network, short_of_values, 3, {}, b.watched).error() ==
        "a swept branch has fewer values than the sweep has points");
  Bench rails;
  rails.board.volts(1, 0, 5);
  rails.board.volts(2, 0, 3);
  rails.sensor = rails.board.resistor(1, 2, 1e3);
  const std::vector<model::SweptValues> meeting{{rails.sensor, false, {1e3, 0}}};
  CHECK(network::sweep_volts(rails.board.network, meeting, 2, {}, {}).error() ==
        "at point 2 of the sweep a voltage source is shorted or works against another one");
}

TEST_CASE("a free resistor as a link and as an open circuit is what solving the network so gives") {
  const Bench made = bench();
  for (const auto branch : {made.upper, made.sensor, made.reference}) {
    const network::Overrides nominal;
    const auto free =
        network::FreeBranch::make(made.board.network, branch, 10, 10e6, {}, {&nominal, 1}, made.watched).value();
    for (const double ohms : {0.0, network_test::infinite}) {
      const std::vector<model::Override> held{{branch, ohms}};
      const auto volts = network::node_volts(made.board.network, held).value();
      for (std::size_t w = 0; w < made.watched.size(); ++w)
        CHECK(free.volts(0, w, ohms) == Approx(volts[made.watched[w].index()]).epsilon(1e-9).margin(1e-9));
    }
  }
}

TEST_CASE("a resistor that alone holds a node has no volts as an open circuit") {
  Board board;
  board.volts(1, 0, 3.3);
  const auto only = board.resistor(1, 2, 1e3);
  const network::Overrides nominal;
  const std::vector<model::NodeId> watched{node(2)};
  const auto free = network::FreeBranch::make(board.network, only, 1, 1e6, {}, {&nominal, 1}, watched).value();
  CHECK(std::isnan(free.volts(0, 0, network_test::infinite)));
}
