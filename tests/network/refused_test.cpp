// Networks without a single solution are refused, and harmless ones are not.
#include <vector>

#include <catch2/catch.hpp>

#include "board.hpp"
#include "network/linear.hpp"

using network_test::Board;
using network_test::infinite;

namespace {

std::string refusal(const Board& board, std::vector<model::Override> overrides = {}) {
  return network::node_volts(board.network, overrides).error();
}

constexpr const char* floats = "a node has no conducting way to ground";
constexpr const char* fight = "a voltage source is shorted or works against another one";
constexpr const char* no_single = "the network has no single solution";

}  // namespace

TEST_CASE("an island of resistors floats") {
  Board board;
  board.volts(1, 0, 5);
  board.resistor(1, 0, 1e3);
  board.capacitor(1, 2);
  board.resistor(2, 3, 1e3);
  CHECK(refusal(board) == floats);
}

TEST_CASE("a node that only a current source feeds floats, and one that an open resistor leaves does") {
  Board board;
  board.amperes(0, 1, 1e-3);
  const auto shunt = board.resistor(1, 0, 1e3);
  CHECK(network::node_volts(board.network).ok());
  const std::vector<model::Override> open{{shunt, infinite}};
  CHECK(network::node_volts(board.network, open).error() == floats);
}

TEST_CASE("a node that only controls a source floats") {
  Board board;
  board.add(model::VoltageControlled{{2, {}}, false}, {1, 0, 2, 0});
  board.resistor(1, 0, 1e3);
  CHECK(refusal(board) == floats);
}

TEST_CASE("nodes behind open branches only are at zero and do no harm") {
  Board board;
  board.volts(1, 0, 5);
  board.resistor(1, 0, 1e3);
  board.capacitor(1, 2);
  board.capacitor(2, 3);
  board.inductor(3, 4);
  CHECK(network::node_volts(board.network).value() == std::vector<double>{0, 5, 0, 0, 0});
  board.network.node_count = 9;
  CHECK(network::node_volts(board.network).value().size() == 9);
}

TEST_CASE("an empty network is ground alone") {
  CHECK(network::node_volts(model::Network{}).value() == std::vector<double>{0});
}

TEST_CASE("a network of ground and shorts alone has no unknown") {
  Board board;
  board.resistor(1, 0, 0);
  board.resistor(1, 0, 10);
  CHECK(network::node_volts(board.network).value() == std::vector<double>{0, 0});
}

TEST_CASE("sources that fight are refused, equal or not") {
  for (const double other : {3.3, 5.0}) {
    Board board;
    board.volts(1, 0, 5);
    board.volts(2, 0, other);
    const auto jumper = board.resistor(1, 2, 0);
    CHECK(refusal(board) == fight);
    CHECK(refusal(board, {{jumper, 0}}) == fight);
    const std::vector<model::Override> apart{{jumper, 1}};
    CHECK(network::node_volts(board.network, apart).ok());
  }
}

TEST_CASE("a shorted voltage source is refused") {
  Board board;
  board.volts(1, 0, 5);
  board.inductor(1, 0);
  CHECK(refusal(board) == fight);
}

TEST_CASE("three sources in a ring are refused") {
  Board board;
  board.volts(1, 0, 1);
  board.volts(2, 1, 1);
  board.volts(2, 0, 2);
  CHECK(refusal(board) == fight);
}

TEST_CASE("a controlled current into a node that nothing else holds is refused") {
  Board board;
  board.volts(1, 0, 5);
  board.resistor(1, 0, 1e3);
  board.add(model::VoltageControlled{{1e-3, {}}, true}, {2, 0, 1, 0});
  CHECK(refusal(board) == no_single);
}

TEST_CASE("an amplifier whose loop gain is exactly one is refused") {
  Board board;
  board.add(model::VoltageControlled{{3, {}}, false}, {1, 0, 2, 0});
  board.resistor(1, 2, 20e3);
  board.resistor(2, 0, 10e3);
  board.amperes(0, 2, 1e-6);
  CHECK(refusal(board) == no_single);
}

TEST_CASE("a negative resistance that cancels what it is parallel to is refused") {
  Board board;
  board.amperes(0, 1, 1e-3);
  board.resistor(1, 0, 3e3);
  board.resistor(1, 0, 6e3);
  const auto negative = board.resistor(1, 0, -2e3);
  CHECK(refusal(board) == no_single);
  const std::vector<model::Override> more{{negative, -4e3}};
  CHECK(network::node_volts(board.network, more).value()[1] == Approx(4).epsilon(1e-13));
}

TEST_CASE("an ideal follower in front of an ideal source is refused where they meet") {
  Board board;
  board.volts(1, 0, 5);
  board.volts(2, 0, 3);
  board.add(model::VoltageControlled{{1, {}}, false}, {2, 0, 1, 0});
  CHECK(refusal(board) == no_single);
}

TEST_CASE("a current-controlled source without its voltage source is refused") {
  Board board;
  board.volts(1, 0, 5);
  const auto load = board.resistor(1, 0, 1e3);
  board.add(model::CurrentControlled{{1, {}}, {}, true}, {1, 0}, load);
  CHECK(refusal(board) == "a current-controlled source has no voltage source that controls it");
}

TEST_CASE("an infinite source is refused") {
  Board board;
  board.volts(1, 0, infinite);
  board.resistor(1, 0, 1e3);
  CHECK(refusal(board) == "a branch of the network has an infinite value");
}

TEST_CASE("a value that is no number is refused, and so is a residual that nothing overrides") {
  Board board;
  board.volts(1, 0, 5);
  const auto load = board.resistor(1, 0, 1e3);
  CHECK(refusal(board, {{load, std::numeric_limits<double>::quiet_NaN()}}) == "a branch of the network has no number");
  std::get<model::Resistor>(board.network.branches[load.index()].part).ohms.residual = model::ExpressionId{0};
  CHECK(refusal(board) == "a branch of the network has no number");
  const std::vector<model::Override> held{{load, 500}};
  CHECK(network::node_volts(board.network, held).ok());
}
