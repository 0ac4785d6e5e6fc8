// rail-gap and off-scale.
#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using base::Level;
using fixtures::findings_of;
using fixtures::set_limit;
using fixtures::sound_input;
using fixtures::volts;
using model::RuleId;

namespace {

// The sound input with these readings at 9, 12 and 16 V of a watched rail, and leakage that moves each by `leakage`.
model::AuditedInput reading(const std::vector<double>& readings, double leakage = 0) {
  auto input = sound_input();
  const model::Input& converter = input.divider.input;
  auto points = fixtures::solved({9, 12, 16}, readings, converter);
  std::vector<double> up;
  std::vector<double> down;
  for (const double u : readings) {
    up.push_back(converter.volts_of(u + leakage));
    down.push_back(converter.volts_of(u - leakage));
  }
  points.leakage_high = volts(up);
  points.leakage_low = volts(down);
  input.sweep = judge::curve_of(converter, points, "voltage", "V");
  input.figures = judge::figures_of(input.divider, points, *input.sweep);
  input.figures.load_error_lsb.reset();
  return input;
}

void set_reach(model::AuditedInput& input) {
  input.figures.span_reachable = 0.81;
  input.figures.best_part = "R7";
  input.figures.best_ohms = 14200;
}

}  // namespace

TEST_CASE("rail-gap: a reading that comes close to an end is a warning at that place") {
  const auto found = findings_of(RuleId::rail_gap, reading({0.3, 0.5, 0.99}));
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::warning);
  CHECK(*found[0].value == Approx(0.01));
  CHECK(*found[0].limit == 0.02);
  CHECK(found[0].unit == "fraction");
  CHECK(*found[0].at == 16);
  CHECK(found[0].message ==
        "the gap to the high end of the range is 1 % at 16 V, where 2 % is the least accepted; other arm values, less "
        "gain "
        "or a wider range would keep it off the end");
}

TEST_CASE("rail-gap: it names the resistor that keeps both ends clear, if there is one") {
  auto input = reading({0.011, 0.5, 0.8});
  set_reach(input);
  const auto found = findings_of(RuleId::rail_gap, input);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].at == 9);
  CHECK(found[0].message ==
        "the gap to the low end of the range is 1.1 % at 9 V, where 2 % is the least accepted; R7 = 14.2 kohm reaches "
        "81 % "
        "of the range with both ends clear");
}

TEST_CASE("rail-gap: where leakage alone takes the gap it says so") {
  const auto found = findings_of(RuleId::rail_gap, reading({0.3, 0.5, 0.97}, 0.015));
  REQUIRE(found.size() == 1);
  CHECK(*found[0].value == Approx(0.015));
  CHECK(found[0].message ==
        "the gap to the high end of the range is 1.5 % at 16 V, where 2 % is the least accepted; without leakage it is "
        "3 %, "
        "so a smaller resistance at the pin would do");
}

TEST_CASE("rail-gap: both ends can be too close, each told at its own place") {
  const auto found = findings_of(RuleId::rail_gap, reading({0.01, 0.5, 0.99}));
  REQUIRE(found.size() == 2);
  CHECK(*found[0].at == 9);
  CHECK(*found[1].at == 16);
}

TEST_CASE("rail-gap: exactly the limit passes") {
  auto input = reading({0.25, 0.5, 0.875});
  set_limit(input, "rail-gap", *input.figures.gap_high);
  CHECK(findings_of(RuleId::rail_gap, input).empty());
  set_limit(input, "rail-gap", *input.figures.gap_high + 1e-9);
  CHECK(findings_of(RuleId::rail_gap, input).size() == 1);
}

TEST_CASE("rail-gap: it is silent beside off-scale at the same end only") {
  const auto input = reading({0.01, 0.5, 1.2});
  const auto found = findings_of(RuleId::rail_gap, input);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].at == 9);
  CHECK(findings_of(RuleId::off_scale, input).size() == 1);
}

TEST_CASE("rail-gap: where off-scale is off it speaks for it") {
  auto input = reading({0.3, 0.5, 1.2});
  fixtures::set_level(input, "off-scale", std::nullopt);
  CHECK(findings_of(RuleId::off_scale, input).empty());
  const auto found = findings_of(RuleId::rail_gap, input);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].value == Approx(-0.2));
}

TEST_CASE("rail-gap: a reading past the end by less than off-scale minds is still too close") {
  const auto found = findings_of(RuleId::rail_gap, reading({0.3, 0.5, 1 + 0.25 / 4096}));
  REQUIRE(found.size() == 1);
  CHECK(found[0].message.find("is -0.0061 % at 16 V") != std::string::npos);
}

TEST_CASE("off-scale: a reading past an end is an error that says by how much and from where on") {
  // 0.9 at 12 V and 1.2 at 16 V: the line between them reaches 1 at a third of the way, 13.333 V
  const auto found = findings_of(RuleId::off_scale, reading({0.675, 0.9, 1.2}));
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::error);
  CHECK(*found[0].value == Approx(0.2));
  CHECK(*found[0].limit == Approx(0.5 / 4096));
  CHECK(found[0].unit == "fraction");
  CHECK(*found[0].at == 16);
  CHECK(found[0].message ==
        "the reading passes the high end of the range by 20 % at 16 V, where 0.0122 % (half an LSB) is the most "
        "accepted; "
        "it crosses the end at 13.333 V; other arm values, less gain or a wider range would keep it on scale");
}

TEST_CASE("off-scale: it names the resistor that keeps the reading on scale, if there is one") {
  auto input = reading({-0.25, 0.25, 0.5});
  set_reach(input);
  CHECK(findings_of(RuleId::off_scale, input).at(0).message ==
        "the reading passes the low end of the range by 25 % at 9 V, where 0.0122 % (half an LSB) is the most "
        "accepted; it "
        "crosses the end at 10.5 V; R7 = 14.2 kohm reaches 81 % of the range and stays on scale");
}

TEST_CASE("off-scale: leakage that alone pushes the reading over is told apart") {
  const auto found = findings_of(RuleId::off_scale, reading({0.3, 0.5, 0.96}, 0.05));
  REQUIRE(found.size() == 1);
  CHECK(*found[0].value == Approx(0.01));
  CHECK(found[0].message.find("; without leakage it stays on scale, so a smaller resistance at the pin would do") !=
        std::string::npos);
}

TEST_CASE("off-scale: a reading that never is on scale has no crossing") {
  CHECK(findings_of(RuleId::off_scale, reading({1.5, 1.7, 2}))
            .at(0)
            .message.find("it is past the end over the whole sweep") != std::string::npos);
}

TEST_CASE("off-scale: half an LSB past the end passes, a quarter more does not") {
  CHECK(findings_of(RuleId::off_scale, reading({0.3, 0.5, 1})).empty());
  auto input = reading({0.3, 0.5, 1});
  input.figures.gap_high = -0.5 / 4096;
  CHECK(findings_of(RuleId::off_scale, input).empty());
  input.figures.gap_high = -0.75 / 4096;
  CHECK(findings_of(RuleId::off_scale, input).size() == 1);
}

TEST_CASE("off-scale: a declared offset error, in LSB or in volts at the pin, is allowed for") {
  auto input = reading({0.3, 0.5, 1});
  input.figures.gap_high = -2.0 / 4096;
  input.divider.input.offset_error = {2, true};
  CHECK(findings_of(RuleId::off_scale, input).empty());
  input.divider.input.offset_error = {1.9, true};
  const auto found = findings_of(RuleId::off_scale, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].message.find("(the converter's offset error) is the most accepted") != std::string::npos);
  input.divider.input.offset_error = {3.3 * 3 / 4096, false};
  CHECK(findings_of(RuleId::off_scale, input).empty());
  input.divider.input.offset_error = {3.3 * 1 / 4096, false};
  CHECK(findings_of(RuleId::off_scale, input).size() == 1);
}

TEST_CASE("off-scale: a declared limit is the excess that still passes") {
  auto input = reading({0.3, 0.5, 1.25});
  set_limit(input, "off-scale", 0.25);
  input.figures.gap_high = -0.25;
  CHECK(findings_of(RuleId::off_scale, input).empty());
  input.figures.gap_high = -0.26;
  CHECK(findings_of(RuleId::off_scale, input).at(0).message.find("where 25 % (the declared limit)") !=
        std::string::npos);
}

TEST_CASE("off-scale: the crossing is that of the envelope, leakage included") {
  // 1 - 0.1 is where the nominal reading stands when the envelope crosses: halfway from 0.8 at 12 V to 1 at 16 V
  const auto found = findings_of(RuleId::off_scale, reading({0.6, 0.8, 1.0}, 0.1));
  REQUIRE(found.size() == 1);
  CHECK(found[0].message.find("it crosses the end at 14 V") != std::string::npos);
}

TEST_CASE("off-scale: on a range that runs downwards the high end is the one of the lowest volts") {
  auto input = sound_input();
  input.divider.input = fixtures::converter_input(12, 0, -5);
  auto points = fixtures::solved({9, 12, 16}, {0.6, 0.8, 1.0}, input.divider.input);
  points.leakage_high = volts({-2.5, -3.5, -4.5}, 0, -5);
  points.leakage_low = volts({-3.5, -4.5, -5.5}, 0, -5);
  input.sweep = judge::curve_of(input.divider.input, points, "voltage", "V");
  input.figures = judge::figures_of(input.divider, points, *input.sweep);
  const auto found = findings_of(RuleId::off_scale, input);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].value == Approx(0.1));
  CHECK(found[0].message.find("passes the high end of the range by 10 % at 16 V") != std::string::npos);
  CHECK(found[0].message.find("it crosses the end at 14 V") != std::string::npos);
}

TEST_CASE("off-scale: an offset that cannot be held against the range excuses nothing") {
  auto input = reading({0.3, 0.5, 1});
  input.figures.gap_high = -0.5;
  input.divider.input.offset_error = {0.001, false};
  input.divider.input.nominal_high = input.divider.input.nominal_low;
  CHECK(findings_of(RuleId::off_scale, input).size() == 1);
}

TEST_CASE("off-scale: an offset in volts at the pin counts for as many LSB more as the gain says") {
  auto input = reading({0.3, 0.5, 1});
  input.divider.input.gain = 4;
  input.divider.input.offset_error = {3.3 / 4096, false};  // four LSB of the reading
  input.figures.gap_high = -4.0 / 4096;
  CHECK(findings_of(RuleId::off_scale, input).empty());
  input.figures.gap_high = -4.1 / 4096;
  CHECK(findings_of(RuleId::off_scale, input).size() == 1);
}

TEST_CASE("rail-gap and off-scale: no advice on arms where the rail itself begins at or below the range") {
  auto input = reading({0, 0.5, 0.9});
  input.sweep->sensor_ohms.clear();
  input.sweep->unit = "V";
  input.sweep->at = {0, 2, 4};
  input.divider.upper_rail = "BATT";
  input.divider.lower_rail = "0";
  CHECK(findings_of(RuleId::rail_gap, input)
            .at(0)
            .message.ends_with("; no divider lifts 0 V off it; judge the rail over the range in which it is used, or "
                               "begin the converter's range lower"));
  input.figures.gap_low = -0.1;
  CHECK(findings_of(RuleId::off_scale, input).at(0).message.find("; no divider lifts 0 V off it") != std::string::npos);
  // A divider to another rail can lift it.
  input.divider.lower_rail = "+3V3";
  CHECK(findings_of(RuleId::off_scale, input).at(0).message.find("no divider lifts") == std::string::npos);
}
