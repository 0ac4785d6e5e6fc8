#include <cmath>

#include <catch2/catch.hpp>

#include "declared.hpp"
#include "sensor/law.hpp"

using sensor_test::declared;
using sensor_test::law;

TEST_CASE("measured photoresistors come back from the gamma of their two points") {
  struct Cell {
    double ohms_at_1lx, ohms_at_100lx, gamma;
  };
  // CdS cells between 1 and 100 lx, as a university's table of measured parts prints them (sci.utah.edu/~gk/lum); gamma
  // = |log R1 - log R2|/|log E1 - log E2|, as data sheets of photoresistors define it.
  for (const Cell cell : {Cell{13e3, 0.9e3, 0.5799}, Cell{15e3, 1.1e3, 0.5673}, Cell{120e3, 7e3, 0.6170},
                          Cell{130e3, 8e3, 0.6054}, Cell{160e3, 9e3, 0.6249}}) {
    const auto part = law("photoresistor",
                          {{"ohms_at_10lx", std::sqrt(cell.ohms_at_1lx * cell.ohms_at_100lx)}, {"gamma", cell.gamma}});
    CHECK(part.ohms(1) == Approx(cell.ohms_at_1lx).epsilon(2e-4));
    CHECK(part.ohms(100) == Approx(cell.ohms_at_100lx).epsilon(2e-4));
  }
}

TEST_CASE("a photoresistor is R10 (E/10)^-gamma") {
  const auto part = law("photoresistor", {{"ohms_at_10lx", 10e3}, {"gamma", 0.7}});
  // Computed from the formula.
  CHECK(part.ohms(1) == Approx(50118.7).margin(0.05));
  CHECK(part.ohms(10) == Approx(10e3).epsilon(1e-15));
  CHECK(part.ohms(50) == Approx(3241.3).margin(0.05));
  CHECK(part.ohms(100) == Approx(1995.3).margin(0.05));
}

TEST_CASE("light to ohms and back is the same light") {
  const auto part = law("photoresistor", {{"ohms_at_10lx", 10e3}, {"gamma", 0.7}});
  for (double lux = 1e-3; lux < 2e5; lux *= 3.7)
    CHECK(part.measurand(part.ohms(lux)).value() == Approx(lux).epsilon(1e-12));
  CHECK_FALSE(part.measurand(0).has_value());
  CHECK_FALSE(part.measurand(-3).has_value());
  CHECK_FALSE(part.measurand(HUGE_VAL).has_value());
}

TEST_CASE("a photoresistor's range must stay above darkness") {
  CHECK(sensor::law_of(declared("photoresistor", {{"ohms_at_10lx", 10e3}, {"gamma", 0.7}}, 0, 1000)).error() ==
        "\"from\" = 0 lx leaves the law's validity: the power law of a photoresistor holds above 0 lx, where the "
        "resistance is a "
        "finite number");
  CHECK(sensor::law_of(declared("photoresistor", {{"ohms_at_10lx", 10e3}, {"gamma", 0.7}}, 1, -5))
            .error()
            .find("\"to\" = -5 lx") == 0);
}

TEST_CASE("a photoresistor needs its resistance at 10 lx and gamma, both above zero") {
  CHECK(sensor::law_of(declared("photoresistor", {{"gamma", 0.7}})).error() ==
        "kind \"photoresistor\": \"ohms_at_10lx\" is missing");
  CHECK(sensor::law_of(declared("photoresistor", {{"ohms_at_10lx", 10e3}})).error() ==
        "kind \"photoresistor\": \"gamma\" is missing");
  CHECK(sensor::law_of(declared("photoresistor", {{"ohms_at_10lx", 10e3}, {"gamma", 0}})).error() ==
        "kind \"photoresistor\": \"gamma\" must be above zero, not 0");
}
