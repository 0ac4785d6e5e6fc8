// Networks drawn at random with a fixed seed: the one-port form and a direct solve must agree.
#include <cmath>
#include <random>
#include <vector>

#include <catch2/catch.hpp>

#include "board.hpp"
#include "network/linear.hpp"

using network_test::Board;
using network_test::node;

namespace {

// A tree that reaches every node, further resistors between any two, a rail, and a current into the last node.
Board random_board(std::mt19937& random, double decades_down, double decades_up) {
  std::uniform_real_distribution<double> decade(decades_down, decades_up);
  std::uniform_int_distribution<std::uint32_t> count(3, 12);
  const std::uint32_t nodes = count(random);
  const auto ohms = [&] { return std::pow(10, decade(random)); };
  Board board;
  board.volts(1, 0, 5);
  // Arguments are evaluated in no fixed order, so each draw is a statement of its own.
  for (std::uint32_t n = 2; n <= nodes; ++n) {
    const std::uint32_t earlier = std::uniform_int_distribution<std::uint32_t>(0, n - 1)(random);
    board.resistor(n, earlier, ohms());
  }
  std::uniform_int_distribution<std::uint32_t> any(0, nodes);
  for (std::uint32_t i = 0; i < nodes; ++i) {
    const std::uint32_t a = any(random);
    const std::uint32_t b = any(random);
    if (a != b) board.resistor(a, b, ohms());
  }
  board.amperes(0, nodes, 5.0 / std::pow(10, decades_up));
  return board;
}

// Node voltages of such a board by star-mesh transformation: a node k with conductances g to its neighbours goes, and
// each pair of them gets g_ik g_jk / sum g more between them. Only positive numbers are added, so nothing cancels (the
// argument of Grassmann, Taksar and Heyman, 1985, for Markov chains).
std::vector<double> by_star_and_mesh(const Board& board) {
  const std::size_t nodes = board.network.node_count;
  std::vector<std::vector<double>> g(nodes, std::vector<double>(nodes, 0.0));
  std::vector<double> amperes(nodes, 0.0);
  for (const auto& branch : board.network.branches) {
    const std::size_t a = branch.nodes[0].index();
    const std::size_t b = branch.nodes[1].index();
    if (const auto* r = std::get_if<model::Resistor>(&branch.part)) g[a][b] = g[b][a] = g[a][b] + 1 / r->ohms.value;
    if (const auto* i = std::get_if<model::CurrentSource>(&branch.part)) amperes[b] += i->amperes.value;
  }
  std::vector<double> sum(nodes, 0.0);
  for (std::size_t k = nodes - 1; k >= 2; --k) {
    for (std::size_t j = 0; j < k; ++j) sum[k] += g[k][j];
    for (std::size_t i = 0; i < k; ++i) {
      amperes[i] += amperes[k] * g[k][i] / sum[k];
      for (std::size_t j = 0; j < k; ++j)
        if (i != j) g[i][j] += g[k][i] * g[k][j] / sum[k];
    }
  }
  std::vector<double> volts(nodes, 0.0);
  volts[1] = 5;
  for (std::size_t k = 2; k < nodes; ++k) {
    double total = amperes[k];
    for (std::size_t j = 0; j < k; ++j) total += g[k][j] * volts[j];
    volts[k] = total / sum[k];
  }
  return volts;
}

}  // namespace

TEST_CASE("one-port form and direct solve agree on random resistive networks") {
  std::mt19937 random(20240607);
  int compared = 0;
  for (int round = 0; round < 400; ++round) {
    const Board board = random_board(random, 1, 6);
    const model::BranchId sensor{1 + static_cast<std::uint32_t>(random() % (board.network.branches.size() - 2))};
    const auto probe = node(board.network.node_count - 1);
    const auto form = network::one_port(board.network, sensor, probe);
    if (!form) continue;
    ++compared;
    for (const double ohms : {1e-2, 1.0, 333.0, 47e3, 1e6, 1e9}) {
      const std::vector<model::Override> held{{sensor, ohms}};
      const double direct = network::node_volts(board.network, held).value()[probe.index()];
      CHECK(network::volts_at(*form, ohms) == Approx(direct).epsilon(1e-9).margin(1e-12));
    }
  }
  CHECK(compared > 250);
}

TEST_CASE(
    "networks from a milliohm to a gigohm are solved as exactly as by eliminating node after node without "
    "subtraction") {
  std::mt19937 random(20240608);
  for (int round = 0; round < 300; ++round) {
    const Board board = random_board(random, -3, 9);
    const auto volts = network::node_volts(board.network).value();
    const auto wanted = by_star_and_mesh(board);
    for (std::size_t n = 1; n < volts.size(); ++n) CHECK(volts[n] == Approx(wanted[n]).epsilon(1e-9));
  }
}

TEST_CASE("a milliohm between gigohms loses nothing") {
  // By hand: 2 V over 1G + 1m + 1G, the tap on either side of the milliohm; all in one matrix of conductances 12
  // decades apart.
  Board board;
  board.volts(1, 0, 2);
  board.resistor(1, 2, 1e9);
  board.resistor(2, 3, 1e-3);
  const auto lower = board.resistor(3, 0, 1e9);
  CHECK(network::node_volts(board.network).value()[2] == Approx(1 + 5e-13).epsilon(1e-14));
  const auto form = network::one_port(board.network, lower, node(2)).value();
  CHECK(form.open_volts == Approx(2).epsilon(1e-12));
  CHECK(form.short_volts == Approx(2e-12).epsilon(1e-3));
  CHECK(form.source_ohms == Approx(1e9).epsilon(1e-12));
  const auto link = network::one_port(board.network, {2}, node(2)).value();
  CHECK(link.source_ohms == Approx(2e9).epsilon(1e-12));
  CHECK(network::volts_at(link, 1e-3) == Approx(1).epsilon(1e-12));
}
