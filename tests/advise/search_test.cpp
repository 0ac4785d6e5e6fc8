#include "advise/search.hpp"

#include <algorithm>
#include <cmath>

#include <catch2/catch.hpp>

namespace {

// A hill in log ohms, one decade wide.
double hill(double ohms, double top) {
  return std::exp(-std::pow(std::log10(ohms / top), 2));
}

}  // namespace

TEST_CASE("the search finds a smooth top wherever it lies within three decades") {
  for (const double top : {1.0001, 3.0, 47.0, 1e3, 2.2e4, 9.9e5}) {
    const auto found = advise::largest_span(1e3, [&](double ohms) { return advise::Trial{hill(ohms, top), 1}; });
    CHECK(found.value().ohms == Approx(top).epsilon(1e-6));
  }
}

TEST_CASE("a top beyond three decades is sought no further") {
  const auto found = advise::largest_span(1e3, [](double ohms) { return advise::Trial{hill(ohms, 1e9), 1}; });
  CHECK(found.value().ohms == Approx(1e6).epsilon(1e-6));
}

TEST_CASE("the largest span with room is where the room ends, when it ends before the top") {
  const auto found = advise::largest_span(1e3, [](double ohms) {
    return advise::Trial{hill(ohms, 5e4), std::log10(2.345e3 / ohms)};
  });
  CHECK(found.value().ohms == Approx(2.345e3).epsilon(1e-9));
  const auto other = advise::largest_span(1e3, [](double ohms) {
    return advise::Trial{hill(ohms, 20), std::log10(ohms / 456.7)};
  });
  CHECK(other.value().ohms == Approx(456.7).epsilon(1e-9));
}

TEST_CASE("room in a gap far narrower than a grid step is found") {
  const auto found = advise::largest_span(1e3, [](double ohms) {
    return advise::Trial{hill(ohms, 1e3), 1e-4 - std::abs(std::log10(ohms / 7.77e3))};
  });
  CHECK(found.value().ohms == Approx(7.77e3).epsilon(5e-4));
}

TEST_CASE("without room anywhere there is nothing") {
  CHECK_FALSE(advise::largest_span(1e3, [](double ohms) { return advise::Trial{hill(ohms, 1e3), -0.01}; }).has_value());
  CHECK_FALSE(advise::largest_span(1e3, [](double) { return advise::Trial{0.5, std::nan("")}; }).has_value());
}

TEST_CASE("on level ground the nearest value is taken") {
  const auto level = [](double from, double to) {
    return [=](double ohms) {
      return advise::Trial{ohms >= from && ohms <= to ? 1.0 : 1 - std::abs(std::log10(ohms / from)) / 9, 1};
    };
  };
  CHECK(advise::largest_span(1e3, level(200, 9e3)).value().ohms == 1e3);
  CHECK(advise::largest_span(1e3, level(3.21e3, 9e4)).value().ohms == Approx(3.21e3).epsilon(1e-6));
  CHECK(advise::largest_span(1e3, level(10, 123)).value().ohms == Approx(123).epsilon(1e-6));
}
