// What goes wrong inside the library, deck by deck: every failure is told, whatever the return codes say.
#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

using simulate::Answer;
using simulate::Verdict;

namespace {

Answer answer_to(const std::string& elements, const std::vector<std::string>& vectors = {"n1"}) {
  return test::raw("t\n" + elements + ".end\n", vectors);
}

}  // namespace

TEST_CASE("a clean deck is solved and says nothing") {
  const Answer answer = answer_to("v1 n1 0 3.3\nr1 n1 0 1000\n", {"n1", "v1#branch"});
  CHECK(answer.verdict == Verdict::solved);
  CHECK(answer.text.empty());
  CHECK_FALSE(answer.stepped);
  REQUIRE(answer.values.size() == 2);
  CHECK(answer.values[0] == Approx(3.3));
  CHECK(answer.values[1] == Approx(-3.3e-3));
}

TEST_CASE("what the library cannot read is told while it loads") {
  const auto refused = [](const std::string& elements) {
    const Answer answer = answer_to(elements);
    INFO(elements);
    CHECK(answer.verdict == Verdict::load_text);
    CHECK_FALSE(answer.text.empty());
    CHECK(answer.values.empty());
  };
  refused("v1 n1 0 1\n1x n1 0 5\n");                 // no such element
  refused("v1 n1 0 1\nd1 n1 0 nowhere\n");           // no such model
  refused("v1 n1 0 1\nr1 n1 0 1\nr1 n1 0 2\n");      // one name twice
  refused("v1 n1 0 1\nb1 n2 0 v=(1+\nr1 n2 0 1\n");  // an expression that does not end
  refused("v1 n1 0 1\nxa n1 0 nowhere\n");           // no such subcircuit
  refused("v1 n1 0 1\nr1 n1 0 1\n$r2 n1 0 1\n");     // a line that would be dropped
  refused("v1 n1 0 1\n.model dm d(nonsense=5)\nd1 n1 0 dm\n");
}

TEST_CASE("a deck without .end is refused") {
  CHECK(test::raw("t\nv1 n1 0 1\nr1 n1 0 1\n", {"n1"}).verdict != Verdict::solved);
}

TEST_CASE("what the library cannot solve is told, even where it gives numbers") {
  const auto unsolved = [](const std::string& elements) {
    const Answer answer = answer_to(elements);
    INFO(elements << answer.text);
    CHECK(answer.verdict == Verdict::analysis_text);
    CHECK_FALSE(answer.text.empty());
  };
  unsolved("v1 n1 0 1\nv2 n1 0 2\nr1 n1 0 1\n");                                   // two sources in parallel
  unsolved("v1 n1 0 1\nr1 n1 0 1\nr2 n2 n3 1\nc1 n3 0 1n\n");                      // a node in the air
  unsolved("v1 n1 0 1\nr1 n1 n2 1k\nr2 n2 0 -1k\n");                               // a singular matrix
  unsolved("v1 n1 0 1\nb1 n2 0 v=ternary_fcn(gt0(v(n2)-0.5),0,1)\nr1 n2 0 1k\n");  // no solution
  unsolved("v1 n1 0 -1\nb1 n2 0 v=ln(v(n1))\nr1 n2 0 1k\n");                       // not a number
  unsolved("v1 n1 n1 1\nr1 n1 0 1\n");                                             // a source on one node
  unsolved("v1 n1 0 1\nr1 n1 0\n");                                                // a missing value
}

TEST_CASE("when the library asks for its own end, that is told") {
  CHECK(answer_to("v1 n1 0 {nowhere}\nr1 n1 0 1\n").verdict == Verdict::controlled_exit);
}

TEST_CASE("a vector that is not there is told") {
  CHECK(answer_to("v1 n1 0 1\nr1 n1 0 1\n", {"n2"}).verdict == Verdict::bad_vector);
  CHECK(answer_to("").verdict == Verdict::bad_vector);
}

TEST_CASE("a deck finds nothing of the deck before it") {
  const std::string good = "t\nv1 n1 0 1\nr1 n1 0 1\n.end\n";
  const std::string unread = "t\nv1 n1 0 2\nr1 n1 0 1\nx1 n1 nowhere\n.end\n";
  const std::string other = "t\nv1 n2 0 1\nr1 n2 0 1\n.end\n";
  const std::vector<Answer> answers = test::raw_all({good, unread, good, other, good}, {"n1"});
  REQUIRE(answers.size() == 5);
  CHECK(answers[0].verdict == Verdict::solved);
  CHECK(answers[1].verdict == Verdict::load_text);
  CHECK(answers[2].verdict == Verdict::solved);
  CHECK(answers[3].verdict == Verdict::bad_vector);
  CHECK(answers[4].verdict == Verdict::solved);
}

TEST_CASE("a count of vectors that is not theirs is told") {
  CHECK(answer_to("v1 n1 0 1\nr1 n1 0 1\n", {"n1\nn1"}).verdict == Verdict::bad_vector);
}
