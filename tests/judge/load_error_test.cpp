#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using base::Level;
using fixtures::accurate_to;
using fixtures::findings_of;
using fixtures::set_limit;
using fixtures::sound_input;
using model::LoadKind;
using model::RuleId;

namespace {

model::AuditedInput loaded(double lsb, double measurand) {
  auto input = sound_input();
  input.figures.load_error_lsb = lsb;
  input.figures.load_error_point = 0;
  input.figures.load_error_measurand = measurand;
  input.figures.load_error_measurand_point = 2;
  input.figures.largest_load = {LoadKind::part, "R9"};
  input.figures.largest_load_measurand = {LoadKind::part, "R9"};
  return input;
}

}  // namespace

TEST_CASE("load-error: without a declared accuracy more than an LSB of 12 bits is a warning") {
  const auto found = findings_of(RuleId::load_error, loaded(7.031, 0.8));
  REQUIRE(found.size() == 1);
  CHECK(found[0].level == Level::warning);
  CHECK(*found[0].value == 7.031);
  CHECK(*found[0].limit == 1);
  CHECK(found[0].unit == "LSB");
  CHECK(*found[0].at == -40);
  CHECK(
      found[0].message ==
      "what loads the divider bends the reading by up to 7.03 LSB, at -40 degC, where 1 LSB is the most accepted; R9 "
      "contributes most; a lighter load, less resistance in the arms or a buffer lessens it (or role = \"arm\", where "
      "firmware reckons with the part)");
}

TEST_CASE("load-error: with a declared accuracy a quarter of it is the limit, in the measurand") {
  const auto sensor = accurate_to(2);
  const auto found = findings_of(RuleId::load_error, loaded(7.03, 0.8), &sensor);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].value == 0.8);
  CHECK(*found[0].limit == 0.5);
  CHECK(found[0].unit == "degC");
  CHECK(*found[0].at == 125);
  CHECK(
      found[0].message ==
      "what loads the divider bends the reading by up to 0.8 degC, at 125 degC, where 0.5 degC is the most accepted (a "
      "quarter of the declared accuracy); R9 contributes most; a lighter load, less resistance in the arms or a buffer "
      "lessens it (or role = \"arm\", where firmware reckons with the part)");
}

TEST_CASE("load-error: exactly a quarter of the accuracy passes, and LSB do not matter then") {
  const auto sensor = accurate_to(2);
  CHECK(findings_of(RuleId::load_error, loaded(99, 0.5), &sensor).empty());
  CHECK(findings_of(RuleId::load_error, loaded(99, 0.5000001), &sensor).size() == 1);
}

TEST_CASE("load-error: exactly one LSB passes") {
  CHECK(findings_of(RuleId::load_error, loaded(1, 5)).empty());
  CHECK(findings_of(RuleId::load_error, loaded(1.001, 5)).size() == 1);
}

TEST_CASE("load-error: beyond 12 bits the limit is 1/4096 of the range") {
  auto input = loaded(16, 5);
  input.divider.input.bits = 16;
  CHECK(findings_of(RuleId::load_error, input).empty());
  input.figures.load_error_lsb = 17;
  const auto found = findings_of(RuleId::load_error, input);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].limit == 16);
  CHECK(found[0].message.find("where 16 LSB is the most accepted (1/4096 of the range)") != std::string::npos);
}

TEST_CASE("load-error: below 12 bits the limit is one LSB") {
  auto input = loaded(1.5, 5);
  input.divider.input.bits = 8;
  CHECK(*findings_of(RuleId::load_error, input).at(0).limit == 1);
}

TEST_CASE("load-error: a declared limit is in LSB, whatever the accuracy") {
  const auto sensor = accurate_to(2);
  auto input = loaded(7, 0.1);
  set_limit(input, "load-error", 7);
  CHECK(findings_of(RuleId::load_error, input, &sensor).empty());
  set_limit(input, "load-error", 6.5);
  const auto found = findings_of(RuleId::load_error, input, &sensor);
  REQUIRE(found.size() == 1);
  CHECK(*found[0].limit == 6.5);
  CHECK(found[0].unit == "LSB");
}

TEST_CASE("load-error: where the error has no size in the measurand it is judged in LSB") {
  const auto sensor = accurate_to(2);
  auto input = loaded(7, 0);
  input.figures.load_error_measurand.reset();
  CHECK(findings_of(RuleId::load_error, input, &sensor).at(0).unit == "LSB");
  input.figures.load_error_lsb.reset();
  CHECK(findings_of(RuleId::load_error, input, &sensor).empty());
}

TEST_CASE("load-error: where leakage leads, the resistance before the pin is what would help") {
  auto input = loaded(20, 0.8);
  input.figures.largest_load = {LoadKind::leakage, "leakage"};
  input.figures.pin_source_ohms = 105e3;
  CHECK(findings_of(RuleId::load_error, input).at(0).message ==
        "what loads the divider bends the reading by up to 20 LSB, at -40 degC, where 1 LSB is the most accepted; "
        "leakage contributes most; less resistance between the arms and the pin, or less leakage, lessens it (the "
        "pin sees up to 105 kohm)");
}

TEST_CASE("load-error: what would help follows what is named") {
  auto input = loaded(20, 0.8);
  const auto message = [&](LoadKind kind, const char* name) {
    input.figures.largest_load = {kind, name};
    return findings_of(RuleId::load_error, input).at(0).message;
  };
  CHECK(message(LoadKind::rail_resistance, "the source resistance of a rail")
            .ends_with(
                "the source resistance of a rail contributes most; a stiffer rail or less current out of it lessens "
                "it, and on one rail a divider and its range sag alike"));
  CHECK(message(LoadKind::input_resistance, "the input resistance")
            .ends_with("the input resistance contributes most; less resistance in the arms and before the pin, or a "
                       "buffer, lessens it"));
  CHECK(message(LoadKind::devices, "D1, D2")
            .ends_with("D1, D2 contributes most; less resistance in the arms and before the pin, or parts that conduct "
                       "less within the range, lessens it"));
}

TEST_CASE("load-error: the contributor is that of the point and unit that the sentence speaks of") {
  const auto sensor = accurate_to(2);
  auto input = loaded(20, 0.8);
  input.figures.largest_load = {LoadKind::leakage, "leakage"};
  CHECK(findings_of(RuleId::load_error, input, &sensor).at(0).message.find("; R9 contributes most") !=
        std::string::npos);
  CHECK(findings_of(RuleId::load_error, input).at(0).message.find("; leakage contributes most") != std::string::npos);
}
