// The corner of a box, against trying every corner.
#include "network/corner.hpp"

#include <algorithm>
#include <array>
#include <random>
#include <vector>

#include <catch2/catch.hpp>

using network::extreme;
using network::Quotient;
using network::Wanted;

namespace {

double at(Quotient base, const std::vector<Quotient>& moves, unsigned up) {
  for (std::size_t i = 0; i < moves.size(); ++i) {
    const double sign = (up >> i & 1U) != 0 ? 1 : -1;
    base.over += sign * moves[i].over;
    base.under += sign * moves[i].under;
  }
  return base.over / base.under;
}

}  // namespace

TEST_CASE("The extreme of a quotient is that of all corners of the box, whatever the divisor's sign") {
  std::mt19937 random(20240611);
  std::uniform_real_distribution<double> about(-1, 1);
  for (int trial = 0; trial < 2000; ++trial) {
    const Quotient base{about(random), trial % 2 == 0 ? 2.0 : -2.0};
    std::vector<Quotient> moves(static_cast<std::size_t>(trial % 6));
    for (auto& move : moves) move = {about(random), 0.3 * about(random)};
    double most = -1e9;
    double least = 1e9;
    for (unsigned up = 0; up < 1U << moves.size(); ++up) {
      most = std::max(most, at(base, moves, up));
      least = std::min(least, at(base, moves, up));
    }
    std::vector<signed char> signs(moves.size());
    CHECK(extreme(base, moves, Wanted::largest, signs) == Approx(most).margin(1e-12));
    CHECK(extreme(base, moves, Wanted::smallest, signs) == Approx(least).margin(1e-12));
  }
}

TEST_CASE("A sign may turn only because the others have moved the quotient") {
  // At the nominal 1/1 the second source does nothing; once the first has made it 1.5 it lowers what it raised before.
  const std::array<Quotient, 2> moves{Quotient{0.5, 0}, Quotient{0.1, 0.09}};
  std::array<signed char, 2> signs{};
  CHECK(extreme({1, 1}, moves, Wanted::largest, signs) == Approx(1.4 / 0.91).epsilon(1e-12));
  CHECK(signs == std::array<signed char, 2>{1, -1});
}

TEST_CASE("A source without effect goes with the side that is asked for") {
  const std::array<Quotient, 2> moves{Quotient{0, 0}, Quotient{1e-15, 1e-15}};
  std::array<signed char, 2> signs{};
  extreme({2, 2}, moves, Wanted::largest, signs);
  CHECK(signs == std::array<signed char, 2>{1, 1});
  extreme({2, 2}, moves, Wanted::smallest, signs);
  CHECK(signs == std::array<signed char, 2>{-1, -1});
}

TEST_CASE("Where the divisor may be zero within the box there is no extreme") {
  const std::array<Quotient, 2> moves{Quotient{0, 0.6}, Quotient{0, 0.4}};
  std::array<signed char, 2> signs{};
  CHECK(std::isnan(extreme({1, 1}, moves, Wanted::largest, signs)));
  CHECK(std::isnan(extreme({1, -0.9}, moves, Wanted::smallest, signs)));
  CHECK(std::isnan(extreme({1, 0}, {}, Wanted::largest, {})));
  CHECK(extreme({1, 1.5}, moves, Wanted::largest, signs) == Approx(2).epsilon(1e-12));
}
