#include <cmath>

#include <catch2/catch.hpp>

#include "declared.hpp"
#include "sensor/law.hpp"

using sensor_test::declared;
using sensor_test::law;

namespace {

sensor::Law steinhart_hart_10k() {
  return law("ntc", {{"a", 1.129241e-3}, {"b", 2.341077e-4}, {"c", 8.775468e-8}});
}

// The B that a part has between two temperatures: B = ln(ratio)/(1/T1 - 1/T2).
double beta_of(double ratio, double cold, double hot) {
  return std::log(ratio) / (1 / (cold + 273.15) - 1 / (hot + 273.15));
}

std::string refusal(std::vector<std::pair<std::string, double>> settings) {
  return sensor::law_of(declared("ntc", std::move(settings))).error();
}

struct Row {
  double degrees, ohms;
};

}  // namespace

TEST_CASE("the published 10 kohm curve is met from its Steinhart-Hart coefficients") {
  const auto curve = steinhart_hart_10k();
  // The "10K3" set. Coefficients: manual of a 109 temperature probe, p. 18; resistances: that of its steel version,
  // appendix C-1.
  for (const Row row : {Row{-40, 336103.2}, Row{-30, 176804.8}, Row{-20, 97006.9}, Row{-10, 55303.9}, Row{0, 32650.9},
                        Row{1, 31030.8}, Row{25, 10000}}) {
    CHECK(curve.measurand(row.ohms).value() == Approx(row.degrees).margin(0.005));
    CHECK(curve.ohms(row.degrees) == Approx(row.ohms).epsilon(3e-4));
  }
  // The same curve in the manuals of a heat pump for hot water (p. 21) and of a welding machine (p. 14), rounded there.
  for (const Row row : {Row{5, 25390}, Row{10, 19900}, Row{20, 12490}, Row{30, 8057}, Row{40, 5327}, Row{50, 3603},
                        Row{55, 2986}, Row{60, 2488}, Row{65, 2083}})
    CHECK(curve.measurand(row.ohms).value() == Approx(row.degrees).margin(0.015));
  for (const Row row : {Row{90, 917.7}, Row{95, 788.5}, Row{100, 680}})
    CHECK(curve.measurand(row.ohms).value() == Approx(row.degrees).margin(0.081));
}

TEST_CASE("the Steinhart-Hart resistance is the root of the equation") {
  const auto curve = steinhart_hart_10k();
  // Computed from 1/T = a + b ln R + c (ln R)^3 solved for R in closed form.
  for (const Row row : {Row{-40, 336049.695}, Row{0, 32649.919}, Row{25, 9999.986}, Row{50, 3601.098},
                        Row{100, 678.417}, Row{125, 340.552}})
    CHECK(curve.ohms(row.degrees) == Approx(row.ohms).epsilon(2e-6));
}

TEST_CASE("the published 100 kohm probe reads 25 degC at 100 kohm") {
  // Manual of a 107 temperature probe, p. 17; 24.99994 computed from its coefficients.
  const auto curve = law("ntc", {{"a", 8.271111e-4}, {"b", 2.088020e-4}, {"c", 8.059200e-8}});
  CHECK(curve.measurand(100e3).value() == Approx(24.99994).margin(5e-6));
}

TEST_CASE("the published bridge of the 10 kohm curve gives its ratio") {
  // Vs/Vx = 24900/(Rs + 24900): manual of a 109 temperature probe, p. 18; ratios computed from it and the table's
  // resistances.
  const auto curve = steinhart_hart_10k();
  CHECK(24900 / (curve.ohms(0) + 24900) == Approx(0.4326605).margin(1e-5));
  CHECK(24900 / (curve.ohms(25) + 24900) == Approx(0.7134670).margin(1e-5));
}

TEST_CASE("the B equation gives the values computed from R25 exp(B (1/T - 1/T25))") {
  const auto part = law("ntc", {{"r25", 10e3}, {"beta", 3977}});
  for (const Row row : {Row{-40, 412134.57}, Row{0, 33900.42}, Row{25, 10e3}, Row{50, 3563.13}, Row{85, 1070.31},
                        Row{100, 684.94}, Row{125, 350.76}})
    CHECK(part.ohms(row.degrees) == Approx(row.ohms).epsilon(2e-5));
  struct Case {
    double beta, at_0, at_100;
  };
  for (const Case c : {Case{3380, 28223.7, 1024.32}, Case{3435, 28704.3, 987.04}, Case{3950, 33620.6, 697.52}}) {
    const auto other = law("ntc", {{"r25", 10e3}, {"beta", c.beta}});
    CHECK(other.ohms(0) == Approx(c.at_0).epsilon(1e-5));
    CHECK(other.ohms(100) == Approx(c.at_100).epsilon(1e-5));
  }
}

TEST_CASE("the B equation meets the tables of service manuals") {
  // R120 = 7.465 kohm, B = 4057 (an air conditioner's service manual, p. 88), printed to two or three digits and with
  // 273 for 273.15.
  const double r25 = 7465 * std::exp(4057 * (1 / 298.0 - 1 / 393.0));
  const auto part = law("ntc", {{"r25", r25}, {"beta", 4057}});
  for (const Row row :
       {Row{30, 160e3}, Row{50, 70e3}, Row{70, 34e3}, Row{90, 17.5e3}, Row{100, 13.0e3}, Row{110, 9.8e3}})
    CHECK(part.ohms(row.degrees) == Approx(row.ohms).epsilon(0.015));
}

TEST_CASE("resistance ratios of MIL-PRF-23648F table I come back from their B") {
  // Ratios A 19.8, B 29.4, C 48.7, read as R25/R125 (meaning from memory).
  for (const double ratio : {19.8, 29.4, 48.7}) {
    const auto part = law("ntc", {{"r25", 5e3}, {"beta", beta_of(ratio, 25, 125)}});
    CHECK(part.ohms(25) / part.ohms(125) == Approx(ratio).epsilon(1e-12));
  }
  CHECK(beta_of(19.8, 25, 125) == Approx(3544.26).margin(0.005));  // computed from ln(ratio)/(1/298.15 - 1/398.15)
}

TEST_CASE("the B equation is Steinhart-Hart with c = 0") {
  const auto beta = law("ntc", {{"r25", 10e3}, {"beta", 3977}});
  const double b = 1.0 / 3977;
  const auto other = law("ntc", {{"a", 1 / 298.15 - std::log(10e3) * b}, {"b", b}, {"c", 0}});
  for (const double t : {-40.0, 0.0, 25.0, 125.0}) CHECK(other.ohms(t) == Approx(beta.ohms(t)).epsilon(1e-11));
}

TEST_CASE("temperature to ohms and back is the same temperature") {
  for (const auto& part : {steinhart_hart_10k(), law("ntc", {{"r25", 10e3}, {"beta", 3435}}),
                           law("ntc", {{"a", 1.129241e-3}, {"b", 2.5e-4}, {"c", -8e-8}})})
    for (double t = -60; t <= 200; t += 7) CHECK(part.measurand(part.ohms(t)).value() == Approx(t).margin(1e-9));
}

TEST_CASE("a resistance that no temperature gives has no measurand") {
  const auto beta = law("ntc", {{"r25", 10e3}, {"beta", 3435}});
  CHECK_FALSE(beta.measurand(0).has_value());
  CHECK_FALSE(beta.measurand(-5).has_value());
  CHECK_FALSE(beta.measurand(1e-9).has_value());  // would be above infinite temperature
  CHECK_FALSE(beta.measurand(HUGE_VAL).has_value());
  CHECK_FALSE(steinhart_hart_10k().measurand(0).has_value());
  CHECK_FALSE(law("ntc", {{"a", 1.129241e-3}, {"b", 2.5e-4}, {"c", -8e-8}}).measurand(1e20).has_value());
}

TEST_CASE("an ntc takes r25 and beta or a, b and c, and says which is missing") {
  CHECK(refusal({}) == "kind \"ntc\": needs \"r25\" and \"beta\", or \"a\", \"b\" and \"c\"");
  CHECK(refusal({{"r25", 10e3}}) == "kind \"ntc\": \"beta\" is missing");
  CHECK(refusal({{"beta", 3435}}) == "kind \"ntc\": \"r25\" is missing");
  CHECK(refusal({{"a", 1e-3}, {"b", 2e-4}}) == "kind \"ntc\": \"c\" is missing");
  CHECK(refusal({{"r25", 10e3}, {"beta", 3435}, {"c", 8e-8}}) ==
        "kind \"ntc\": give \"r25\" and \"beta\", or \"a\", \"b\" and \"c\", not some of both");
}

TEST_CASE("an ntc with numbers that make no thermistor is refused") {
  CHECK(refusal({{"r25", 0}, {"beta", 3435}}) == "kind \"ntc\": \"r25\" must be above zero, not 0");
  CHECK(refusal({{"r25", 10e3}, {"beta", -3435}}) == "kind \"ntc\": \"beta\" must be above zero, not -3435");
  CHECK(refusal({{"r25", std::nan("")}, {"beta", 3435}}) == "kind \"ntc\": \"r25\" must be a number");
  CHECK(refusal({{"a", 1e-3}, {"b", -2e-4}, {"c", 8e-8}}) == "kind \"ntc\": \"b\" must be above zero, not -0.0002");
  CHECK(refusal({{"a", -1}, {"b", 2e-4}, {"c", -8e-8}}) ==
        "kind \"ntc\": with these \"a\", \"b\" and \"c\" the resistance falls at no temperature");
}

TEST_CASE("a range that leaves an ntc's validity is refused with the validity") {
  CHECK(sensor::law_of(declared("ntc", {{"r25", 10e3}, {"beta", 3435}}, -273.15, 100)).error() ==
        "\"from\" = -273.15 degC leaves the law's validity: the B equation holds above -273.15 degC, where the "
        "resistance is a "
        "finite number");
  CHECK(sensor::law_of(declared("ntc", {{"r25", 10e3}, {"beta", 3435}}, 20, -300)).error().find("\"to\" = -300 degC") ==
        0);
  CHECK(
      sensor::law_of(declared("ntc", {{"r25", 10e3}, {"beta", 3435}}, -272.9, 100)).error().find("\"from\" = -272.9") ==
      0);
  // c below zero: 1/T is largest at ln R = sqrt(b/(-3c)); computed: 1/T = 1e-3 + (2/3) b sqrt(b/(-3c)) = 4.4021e-3.
  const auto turning = [](double from) {
    return sensor::law_of(declared("ntc", {{"a", 1e-3}, {"b", 2.5e-4}, {"c", -2e-7}}, from, 100));
  };
  CHECK(turning(-45).ok());
  CHECK(
      turning(-47).error().find("\"from\" = -47 degC leaves the law's validity: with these \"a\", \"b\" and \"c\" the "
                                "Steinhart-Hart ") == 0);
}
