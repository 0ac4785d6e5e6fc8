// Chunks and the ladder, with answers made up here in place of a simulator's.
#include "simulate/plan_run.hpp"

#include <catch2/catch.hpp>

#include "simulate/board.hpp"

using namespace simulate;
using test::Board;

namespace {

Board nonlinear(std::size_t points) {
  Board board = test::divider(test::geometric(1e3, 1e5, points));
  board.device(model::DeviceType::diode, {2, 1}, {{"is", 1e-14}});
  return board;
}

Answer solved(const Deck& deck, double value = 1, bool stepped = false) {
  return {Verdict::solved, stepped, "", std::vector<double>(deck.request.vector_count, value)};
}

Answer failed(std::string text) {
  return {Verdict::analysis_text, false, std::move(text), {}};
}

// "26 tight": the copies of a deck and its tolerances.
std::string shape(const Deck& deck) {
  const std::string& text = deck.request.deck;
  const bool tight = text.find("reltol=1e-9") != std::string::npos;
  const bool medium = text.find("reltol=1e-6") != std::string::npos;
  return std::to_string(deck.places.size()) + (tight ? " tight" : medium ? " medium" : "");
}

struct Course {
  std::vector<std::string> decks;
  model::Outcome outcome;
};

// Runs a plan to its end; `reply` answers each deck.
template <class Reply>
Course run(const Board& board, Reply reply) {
  PlanRun plan(board.plan, board.circuit, board.names);
  Course course;
  while (const Deck* deck = plan.deck()) {
    course.decks.push_back(shape(*deck));
    plan.take(reply(*deck));
  }
  course.outcome = plan.outcome();
  return course;
}

using Decks = std::vector<std::string>;

}  // namespace

TEST_CASE("a linear plan goes in even chunks of about a hundred copies, without tolerances and once only") {
  const auto reply = [](const Deck& deck) { return solved(deck); };
  CHECK(run(test::divider(test::geometric(1, 2, 101)), reply).decks == Decks{"101"});
  CHECK(run(test::divider(test::geometric(1, 2, 303)), reply).decks == Decks{"101", "101", "101"});
  CHECK(run(test::divider({1, 2}), reply).decks == Decks{"2"});
}

TEST_CASE("a large network goes in chunks of fewer copies") {
  Board board = test::divider(test::geometric(1, 2, 101));
  for (int i = 0; i < 1000; ++i) board.resistor(2, 0, 1e6);
  const Course course = run(board, [](const Deck& deck) { return solved(deck); });
  CHECK(course.decks.size() == 34);
  for (const std::string& deck : course.decks) CHECK((deck == "2" || deck == "3"));
}

TEST_CASE(
    "a nonlinear plan goes in chunks of at most 26 copies, and its first, last and extreme points once more alone") {
  double value = 0;
  const Course course = run(nonlinear(101), [&](const Deck& deck) {
    Answer answer = solved(deck);
    for (double& volts : answer.values) volts = value += 0.01;
    return answer;
  });
  CHECK(course.decks == Decks{"25 tight", "25 tight", "25 tight", "26 tight", "1 tight", "1 tight"});
  REQUIRE(course.outcome.solution.has_value());
  CHECK(course.outcome.solution->rung == model::Rung::tight);
  // Alone the first point came as 1.02 against 0.01 within its chunk, the last as 1.03 against 1.01.
  CHECK(course.outcome.solution->alone_difference == Approx(1.01));
}

TEST_CASE("a chunk that fails goes up the ladder whole, then in halves, and the rung is the highest that was needed") {
  int count = 0;
  const Course course = run(nonlinear(4), [&](const Deck& deck) { return ++count <= 2 ? failed("no") : solved(deck); });
  CHECK(course.decks == Decks{"4 tight", "4 medium", "2 medium", "2 medium", "1 medium", "1 medium"});
  REQUIRE(course.outcome.solution.has_value());
  CHECK(course.outcome.solution->rung == model::Rung::medium);
}

TEST_CASE("stepping is taken on the last rung only, and is told") {
  const Course course = run(nonlinear(2), [](const Deck& deck) { return solved(deck, 1, true); });
  CHECK(course.decks == Decks{"2 tight", "2 medium", "1 medium", "1 tight", "1 medium", "1 tight"});
  REQUIRE(course.outcome.solution.has_value());
  CHECK(course.outcome.solution->rung == model::Rung::single);
  CHECK(course.outcome.solution->stepped);
}

TEST_CASE("a point that fails on every rung fails the plan with what the simulator said, made printable") {
  const Course course = run(nonlinear(2), [](const Deck&) { return failed("bad \x1b[31m news"); });
  CHECK(course.decks == Decks{"2 tight", "2 medium", "1 medium", "1 tight", "1 medium"});
  CHECK_FALSE(course.outcome.solution.has_value());
  CHECK(course.outcome.failure == "ngspice found no clean operating point: bad \\x1b[31m news");
}

TEST_CASE("a linear chunk that fails is halved until one point fails alone") {
  const Course course = run(test::divider({1, 2, 3, 4}), [](const Deck&) { return failed("no"); });
  CHECK(course.decks == Decks{"4", "2", "1"});
  CHECK(course.outcome.failure == "ngspice found no clean operating point: no");
}

TEST_CASE("a value beyond any that a board can have is a failure, not a result") {
  const Course course = run(test::divider({1}), [](const Deck& deck) { return solved(deck, 1e32); });
  CHECK(course.outcome.failure == "ngspice gave a value beyond any that a board can have");
}

TEST_CASE("a plan that is given up stays given up") {
  const Board board = test::divider({1});
  PlanRun plan(board.plan, board.circuit, board.names);
  REQUIRE(plan.deck() != nullptr);
  plan.give_up("enough");
  CHECK(plan.deck() == nullptr);
  CHECK(plan.outcome().failure == "enough");
}
