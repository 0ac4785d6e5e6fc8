#include <cmath>

#include <catch2/catch.hpp>

#include "declared.hpp"
#include "sensor/law.hpp"

using sensor_test::declared;

TEST_CASE("the kinds of this version are found by name, each with its measurand and what it moves") {
  REQUIRE(sensor::kinds().size() == 5);
  for (const auto& kind : sensor::kinds()) {
    CHECK(sensor::find_kind(kind.name)->measurand == kind.measurand);
    CHECK((kind.make == nullptr) == (kind.moves != sensor::Moves::ohms));
  }
  CHECK(sensor::find_kind("ntc")->unit == "degC");
  CHECK(sensor::find_kind("rtd")->measurand == "temperature");
  CHECK(sensor::find_kind("photoresistor")->unit == "lx");
  CHECK(sensor::find_kind("voltage")->moves == sensor::Moves::rail);
  CHECK(sensor::find_kind("parameter")->moves == sensor::Moves::parameter);
  CHECK(sensor::find_kind("thermistor") == nullptr);
  CHECK(sensor::find_kind("") == nullptr);
}

TEST_CASE("a kind without a resistance, or no kind at all, has no law") {
  CHECK(sensor::law_of(declared("voltage", {})).error() == "a sensor of kind \"voltage\" has no resistance of its own");
  CHECK(sensor::law_of(declared("parameter", {})).error() ==
        "a sensor of kind \"parameter\" has no resistance of its own");
  CHECK(sensor::law_of(declared("nct\x1b", {})).error() ==
        "\"nct\\x1b\" is no kind of sensor: expected one of ntc, rtd, photoresistor, voltage, parameter");
}

TEST_CASE("a key given as text where a number belongs is refused") {
  auto declaration = declared("rtd", {});
  declaration.settings.push_back({"r0", std::string{"hundred"}, {}});
  CHECK(sensor::law_of(declaration).error() == "kind \"rtd\": \"r0\" must be a number");
}

TEST_CASE("a sweep has both ends exactly, in either direction and either spacing") {
  for (const auto spacing : {model::Spacing::linear, model::Spacing::logarithmic}) {
    const auto up = sensor::sweep_points(0.1, 1000.7, 101, spacing).value();
    const auto down = sensor::sweep_points(1000.7, 0.1, 101, spacing).value();
    REQUIRE(up.size() == 101);
    CHECK(up.front() == 0.1);
    CHECK(up.back() == 1000.7);
    CHECK(down.front() == 1000.7);
    CHECK(down.back() == 0.1);
    for (std::size_t i = 1; i < up.size(); ++i) CHECK(up[i] > up[i - 1]);
  }
}

TEST_CASE("linear points are equally far apart, logarithmic ones in equal proportion") {
  const auto linear = sensor::sweep_points(-40, 125, 101, model::Spacing::linear).value();
  CHECK(linear[50] == 42.5);
  CHECK(linear[1] == Approx(-38.35).epsilon(1e-14));
  const auto decades = sensor::sweep_points(1, 10000, 5, model::Spacing::logarithmic).value();
  for (int i = 0; i < 5; ++i) CHECK(decades[static_cast<std::size_t>(i)] == Approx(std::pow(10, i)).epsilon(1e-14));
}

TEST_CASE("one point of a sweep is its start") {
  CHECK(sensor::sweep_points(3, 9, 1, model::Spacing::linear).value() == std::vector<double>{3});
}

TEST_CASE("a sweep that cannot be made is refused with the reason") {
  CHECK(sensor::sweep_points(0, 1, 0, model::Spacing::linear).error() == "a sweep needs at least one point");
  CHECK(sensor::sweep_points(0, 100, 5, model::Spacing::logarithmic).error() ==
        "logarithmic spacing needs both ends above zero, not 0 to 100");
  CHECK(sensor::sweep_points(-2, -1, 5, model::Spacing::logarithmic).error() ==
        "logarithmic spacing needs both ends above zero, not -2 to -1");
  CHECK_FALSE(sensor::sweep_points(0, std::nan(""), 5, model::Spacing::linear).ok());
  CHECK_FALSE(sensor::sweep_points(1, HUGE_VAL, 5, model::Spacing::logarithmic).ok());
}

TEST_CASE("the spacing is the declared one, else the kind's") {
  auto light = declared("photoresistor", {});
  CHECK(sensor::spacing_of(light) == model::Spacing::logarithmic);
  light.spacing = model::Declared<model::Spacing>{model::Spacing::linear, {}};
  CHECK(sensor::spacing_of(light) == model::Spacing::linear);
  CHECK(sensor::spacing_of(declared("ntc", {})) == model::Spacing::linear);
  CHECK(sensor::spacing_of(declared("voltage", {})) == model::Spacing::linear);
}
