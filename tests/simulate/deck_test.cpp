#include "simulate/deck.hpp"

#include <catch2/catch.hpp>

#include "simulate/board.hpp"

using namespace simulate;
using test::Board;

namespace {

Deck deck_of(const Board& board, std::size_t first, std::size_t count, Tolerances tolerances = Tolerances::none) {
  const auto writer = DeckWriter::prepare(board.plan, board.circuit, board.names);
  INFO((writer.ok() ? std::string() : writer.error()));
  REQUIRE(writer.ok());
  auto deck = writer->write(first, count, tolerances);
  INFO((deck.ok() ? std::string() : deck.error()));
  REQUIRE(deck.ok());
  return *deck;
}

}  // namespace

TEST_CASE("copies of a linear network hang on one rail and have nodes of their own") {
  const Deck deck = deck_of(test::divider({100, 200, 300}), 1, 2);
  CHECK(deck.request.deck ==
        "t\n"
        "v0 s1 0 3.3\n"
        "r1_0 s1 n2 10000\n"
        "r2_0 n2 0 200\n"
        "r1_1 s1 n5 10000\n"
        "r2_1 n5 0 300\n"
        ".end\n");
  CHECK(deck.request.vectors == "n2\nn5\n");
  CHECK(deck.places == std::vector<std::uint32_t>{0, 1});
}

TEST_CASE("a rail whose current is wanted or whose volts are overridden is one a copy") {
  Board wanted = test::divider({100, 200});
  wanted.plan.watched_currents = {model::BranchId{0}};
  CHECK(deck_of(wanted, 0, 2).request.vectors == "n2\nv0_0#branch\nn5\nv0_1#branch\n");

  Board held = test::divider({100});
  held.plan.conditions.push_back({model::ConditionKind::bare, {{model::BranchId{0}, 5}}});
  CHECK(deck_of(held, 0, 2).request.deck.find("v0_0 n1 0 3.3\n") != std::string::npos);
  CHECK(deck_of(held, 0, 2).request.deck.find("v0_1 n4 0 5\n") != std::string::npos);
}

TEST_CASE("a nonlinear deck carries its tolerances, each model once, and a source a copy") {
  Board board = test::divider({100, 200});
  board.device(model::DeviceType::diode, {2, 1}, {{"IS", 1e-14}, {"N", 1.05}});
  const std::string deck = deck_of(board, 0, 2, Tolerances::tight).request.deck;
  CHECK(deck ==
        "t\n"
        ".options reltol=1e-9 vntol=1e-12 abstol=1e-15 itl1=500\n"
        ".model dm0 d( is=1e-14 n=1.05)\n"
        "v0_0 n1 0 3.3\nr1_0 n1 n2 10000\nr2_0 n2 0 100\nd3_0 n2 n1 dm0\n"
        "v0_1 n4 0 3.3\nr1_1 n4 n5 10000\nr2_1 n5 0 200\nd3_1 n5 n4 dm0\n"
        ".end\n");
  CHECK(deck_of(board, 0, 1, Tolerances::medium).request.deck.find("reltol=1e-6 vntol=1e-9 abstol=1e-15 itl1=500") !=
        std::string::npos);
}

TEST_CASE("a watched ground needs no vector") {
  Board board = test::divider({100});
  board.watch(0);
  const Deck deck = deck_of(board, 0, 1);
  CHECK(deck.places == std::vector<std::uint32_t>{0, Deck::zero});
  CHECK(deck.request.vector_count == 1);
}

TEST_CASE("constant parts of an expression are worked out before the deck, with the point's value for its variable") {
  Board board;
  board.volts(1, 0, 5);
  const auto grown = board.apply(model::Op::multiply, {board.variable(), board.number(2)});
  const auto expression = board.apply(model::Op::divide, {board.net(1, 2), grown});
  const model::BranchId sensor = board.source(1, 2, expression, true);
  board.resistor(2, 0, 1e3);
  board.sweep(sensor, {10, 20}, true);
  const std::string deck = deck_of(board, 0, 2).request.deck;
  CHECK(deck.find("b1_0 n1 n2 i=(v(n1,n2)/20)\n") != std::string::npos);
  CHECK(deck.find("b1_1 n4 n5 i=(v(n4,n5)/40)\n") != std::string::npos);
}
