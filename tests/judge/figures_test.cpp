#include <cmath>
#include <limits>

#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using fixtures::converter_input;
using fixtures::solved;
using fixtures::volts;

namespace {

model::Figures figures(const model::Input& input, const judge::Solved& points) {
  model::Divider divider;
  divider.input = input;
  return judge::figures_of(divider, points, judge::curve_of(input, points, "x", ""));
}

}  // namespace

TEST_CASE("The span of sqrt(Rmin Rmax) over a range of 100 is 9/11") {
  // computed from (sqrt n - 1)/(sqrt n + 1), n = 100: 0.818182; R = sqrt(Rmin Rmax) = 10 k of 1 k to 100 k
  const auto input = converter_input();
  const auto found = figures(input, solved({0, 1}, {1.0 / 11, 100.0 / 110}, input));
  CHECK(*found.span_use == Approx(9.0 / 11).epsilon(1e-12));
  CHECK(*found.gap_low == Approx(1.0 / 11).epsilon(1e-12));
  CHECK(*found.gap_high == Approx(1.0 / 11).epsilon(1e-12));
  CHECK(found.gap_low_point == 0);
  CHECK(found.gap_high_point == 1);
}

TEST_CASE("The span counts only what the converter sees of the swing") {
  const auto input = converter_input();
  CHECK(*figures(input, solved({0, 1, 2}, {-0.5, 0.2, 0.4}, input)).span_use == Approx(0.4));
  CHECK(*figures(input, solved({0, 1, 2}, {0.25, 0.5, 3}, input)).span_use == Approx(0.75));
  CHECK(*figures(input, solved({0, 1, 2}, {1.5, 2, 3}, input)).span_use == 0);
  CHECK(*figures(input, solved({0, 1, 2}, {-1.5, -2, -3}, input)).span_use == 0);
}

TEST_CASE("The span is of the nominal reading and the gaps are of the envelope") {
  const auto input = converter_input();
  auto points = solved({0, 1}, {0.1, 0.9}, input);
  points.leakage_high = volts({3.3 * 0.15, 3.3 * 0.97});
  points.leakage_low = volts({3.3 * 0.04, 3.3 * 0.85});
  const auto found = figures(input, points);
  CHECK(*found.span_use == Approx(0.8));
  CHECK(*found.gap_low == Approx(0.04));
  CHECK(*found.gap_high == Approx(0.03));
}

TEST_CASE("A gap is negative past the end, by as much as the reading passes it") {
  const auto input = converter_input();
  const auto found = figures(input, solved({0, 1, 2}, {-0.125, 0.5, 1.25}, input));
  CHECK(*found.gap_low == Approx(-0.125));
  CHECK(*found.gap_high == Approx(-0.25));
  CHECK(found.gap_high_point == 2);
}

TEST_CASE("A microampere into 10k over 10k is 6.2 LSB of 12 bits over 3.3 V") {
  // computed from I Rth: 1 uA x 5 kohm = 5 mV
  const auto input = converter_input();
  auto points = solved({0}, {0.5}, input);
  points.leakage_high = volts({1.655});
  points.leakage_low = volts({1.645});
  CHECK(*figures(input, points).load_error_lsb == Approx(5e-3 / (3.3 / 4096)).epsilon(1e-9));
  CHECK(*figures(input, points).load_error_lsb == Approx(6.206).epsilon(1e-4));
}

TEST_CASE("100 nA into 50 kohm is about one count of 10 bits over 5 V") {
  // a microcontroller manual's worked example, printed as one count
  const auto input = converter_input(10, 0, 5);
  auto points = solved({0}, {0.4}, input);
  points.leakage_low = volts({2.0 - 5e-3}, 0, 5);
  CHECK(*figures(input, points).load_error_lsb == Approx(1).epsilon(0.03));
}

TEST_CASE("The load error is the larger side of the envelope, leakage and load together") {
  const auto input = converter_input(10, 0, 1024);  // an LSB is a volt
  auto points = solved({0, 1}, {0.5, 0.25}, input);
  points.nominal = volts({511, 253}, 0, 1024);       // the load takes 1 and 3
  points.leakage_high = volts({514, 255}, 0, 1024);  // 2 above and 1 below the bare divider
  points.leakage_low = volts({508, 251}, 0, 1024);   // 4 and 5 below it
  const auto found = figures(input, points);
  CHECK(*found.load_error_lsb == Approx(5).epsilon(1e-12));
  CHECK(found.load_error_point == 1);
}

TEST_CASE("The load error is measured only where the bare divider is on scale, both ends included") {
  const auto input = converter_input(10, 0, 1024);
  auto points = solved({0, 1, 2}, {0, 1, 1.01}, input);
  points.nominal = volts({2, 1021, 900}, 0, 1024);
  CHECK(*figures(input, points).load_error_lsb == Approx(3).epsilon(1e-12));
  points.bare = volts({-1, 1025, 2000}, 0, 1024);
  CHECK_FALSE(figures(input, points).load_error_lsb);
  CHECK_FALSE(figures(input, points).load_error_measurand);
}

TEST_CASE("The load error in the measurand is the error over the bare divider's slope, at its own worst place") {
  // bare u = x^2/100: slope x/50. Errors of 1/100 everywhere but 2/100 at x = 8: 0.5/x kelvin, 1/8 at x = 8.
  const auto input = converter_input();
  const std::vector<double> at{1, 2, 4, 7, 8};
  std::vector<double> bare;
  std::vector<double> pin;
  for (const double x : at) {
    bare.push_back(x * x / 100);
    pin.push_back(bare.back() + (x == 8 ? 0.02 : 0.01));
  }
  auto points = solved(at, pin, input);
  points.bare = solved(at, bare, input).nominal;
  const auto found = figures(input, points);
  CHECK(found.load_error_point == 4);
  CHECK(*found.load_error_lsb == Approx(0.02 * 4096).epsilon(1e-9));
  CHECK(found.load_error_measurand_point == 0);
  CHECK(*found.load_error_measurand == Approx(0.5).epsilon(1e-9));
}

TEST_CASE("Slopes have the same size however the sweep runs") {
  const auto input = converter_input();
  auto up = solved({0, 1, 3}, {0.1, 0.2, 0.4}, input);
  auto down = solved({3, 1, 0}, {0.4, 0.2, 0.1}, input);
  for (auto* points : {&up, &down}) {
    for (double& volt : points->nominal.pin) volt += 0.033;
    CHECK(*figures(input, *points).load_error_measurand == Approx(0.1).epsilon(1e-9));
  }
}

TEST_CASE("Where the bare divider is flat the load error has no size in the measurand") {
  const auto input = converter_input();
  auto points = solved({0, 1, 2}, {0.5, 0.5, 0.5}, input);
  points.nominal = volts({1.6, 1.6, 1.6});
  CHECK(figures(input, points).load_error_lsb);
  CHECK_FALSE(figures(input, points).load_error_measurand);
  points.at = {0};
  points.nominal = volts({1.6});
  points.bare = volts({1.65});
  CHECK_FALSE(figures(input, points).load_error_measurand);
}

TEST_CASE("A steep bend between few points does not turn the slope at the end around") {
  // u = 1, 0.1, 0.01: the parabola through them rises again at the end, where the curve falls by 0.09 a step
  const auto input = converter_input();
  auto points = solved({0, 1, 2}, {1, 0.1, 0.01}, input);
  points.nominal = volts({3.3, 0.33, 0.033 + 0.033});
  CHECK(*figures(input, points).load_error_measurand == Approx(0.01 / 0.09).epsilon(1e-9));
}

TEST_CASE("The slope of an NTC divider comes within 1 % of the exact one at 101 points") {
  // computed from u = Rt/(R + Rt), R(T) = R0 exp(B(1/T - 1/T0)): du/dT = -(B/T^2) u (1 - u); IEC 60539-1 terms
  const auto input = converter_input();
  std::vector<double> at;
  std::vector<double> bare;
  for (int i = 0; i <= 100; ++i) at.push_back(-40 + 1.65 * i);
  for (const double t : at) {
    const double ratio = std::exp(3977 * (1 / (t + 273.15) - 1 / 298.15));
    bare.push_back(ratio / (1 + ratio));
  }
  for (const std::size_t i : {std::size_t{0}, std::size_t{50}, std::size_t{100}}) {
    auto points = solved(at, bare, input);
    points.nominal.pin[i] += 0.0033;
    const double kelvin = at[i] + 273.15;
    const double slope = 3977 / (kelvin * kelvin) * bare[i] * (1 - bare[i]);
    CHECK(*figures(input, points).load_error_measurand == Approx(0.001 / slope).epsilon(0.01));
  }
}

TEST_CASE("A slope that comes with the points counts before theirs, but where it is no number") {
  const auto input = converter_input();
  auto points = solved({0, 1, 2}, {0.1, 0.2, 0.3}, input);
  for (double& volt : points.nominal.pin) volt += 0.033;
  points.bare_slope = {0.05, 0.5, 0.5};
  CHECK(*figures(input, points).load_error_measurand == Approx(0.01 / 0.05).epsilon(1e-9));
  points.bare_slope = {std::numeric_limits<double>::quiet_NaN(), 0.5, 0.5};
  CHECK(*figures(input, points).load_error_measurand == Approx(0.01 / 0.1).epsilon(1e-9));
}

TEST_CASE("The engine gap is the largest difference in LSB, and absent without a closed form") {
  const auto input = converter_input(10, 0, 1024);
  auto points = solved({0, 1, 2}, {0.5, 0.25, 0.125}, input);
  CHECK_FALSE(figures(input, points).engine_gap_lsb);
  points.closed_form = volts({512, 256.25, 128}, 0, 1024);
  CHECK(*figures(input, points).engine_gap_lsb == Approx(0.25).epsilon(1e-9));
  CHECK(figures(input, points).engine_gap_point == 1);
}

TEST_CASE("The engine gap also covers the leakage's two signs") {
  const auto input = converter_input(10, 0, 1024);
  auto points = solved({0, 1, 2}, {0.5, 0.25, 0.125}, input);
  points.closed_form = points.nominal;
  points.leakage_high = points.closed_form_high = volts({520, 260, 130}, 0, 1024);
  points.leakage_low = points.closed_form_low = volts({500, 250, 120}, 0, 1024);
  CHECK(*figures(input, points).engine_gap_lsb == Approx(0).margin(1e-9));
  points.closed_form_low->pin[2] += 0.5;
  CHECK(*figures(input, points).engine_gap_lsb == Approx(0.5).epsilon(1e-9));
  CHECK(figures(input, points).engine_gap_point == 2);
}

TEST_CASE("With a gain an LSB at the pin is smaller by as much") {
  const auto input = converter_input(10, 0, 1024, 8);
  auto points = solved({0, 1}, {0.5, 0.25}, input);
  points.nominal.pin[0] += 0.5;  // an LSB is an eighth of a volt here
  CHECK(*figures(input, points).load_error_lsb == Approx(4).epsilon(1e-9));
}

TEST_CASE("A sweep without points has no figures") {
  CHECK_FALSE(figures(converter_input(), {}).span_use);
  CHECK_FALSE(figures(converter_input(), {}).gap_low);
}

TEST_CASE("Of points with equal errors the first is named") {
  const auto input = converter_input(10, 0, 1024);
  auto points = solved({0, 1, 2}, {0.5, 0.25, 0.125}, input);
  for (double& volt : points.nominal.pin) volt += 2;
  points.closed_form = volts({513, 257, 129}, 0, 1024);
  CHECK(figures(input, points).load_error_point == 0);
  CHECK(figures(input, points).engine_gap_point == 0);
}
