#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using base::Level;
using fixtures::findings_of;
using fixtures::set_limit;
using fixtures::sound_input;
using model::RuleId;

TEST_CASE("engine-gap: simulator and closed form apart is an error at the worst point") {
  auto input = sound_input();
  input.figures.engine_gap_lsb = 0.3;
  input.figures.engine_gap_point = 1;
  const auto found = findings_of(RuleId::engine_gap, input);
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::error);
  CHECK(*found[0].value == 0.3);
  CHECK(*found[0].limit == 0.01);
  CHECK(found[0].unit == "LSB");
  CHECK(*found[0].at == 25);
  CHECK(found[0].message ==
        "ngspice and the closed form differ by 0.3 LSB at 25 degC, where 0.01 LSB is the most accepted: one of them is "
        "wrong, so trust neither before it is known which");
}

TEST_CASE("engine-gap: exactly the limit passes") {
  auto input = sound_input();
  input.figures.engine_gap_lsb = 0.01;
  CHECK(findings_of(RuleId::engine_gap, input).empty());
  input.figures.engine_gap_lsb = 0.0100001;
  CHECK(findings_of(RuleId::engine_gap, input).size() == 1);
}

TEST_CASE("engine-gap: on a nonlinear network points solved alone are held against the sweep") {
  auto input = sound_input();
  input.figures.engine_gap_lsb.reset();
  input.sweep->alone_difference = 0.25 * 3.3 / 4096;
  const auto found = findings_of(RuleId::engine_gap, input);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].value == Approx(0.25));
  CHECK_FALSE(found[0].at);
  CHECK(found[0].message ==
        "points of this nonlinear network that were solved again alone differ by 0.25 LSB from the sweep, where 0.01 "
        "LSB is "
        "the most accepted: the circuit may have more than one solution");
  set_limit(input, "engine-gap", 0.3);
  CHECK(findings_of(RuleId::engine_gap, input).empty());
}

TEST_CASE("engine-gap: on a range that runs downwards an LSB has a size all the same") {
  auto input = sound_input();
  input.divider.input = fixtures::converter_input(12, 0, -5);
  input.figures.engine_gap_lsb.reset();
  input.sweep->alone_difference = 5.0 / 4096;
  CHECK(*findings_of(RuleId::engine_gap, input).at(0).value == Approx(1));
}
