#include "advise/reach.hpp"

#include <algorithm>
#include <cmath>
#include <vector>

#include <catch2/catch.hpp>

#include "dividers.hpp"
#include "network/linear.hpp"

using advise::resistor_offers;
using advise_test::Made;
using network_test::node;

namespace {

// A 10 kohm thermistor of B 3435 from -40 to 125 degC: R25 exp(B (1/T - 1/T25)).
std::vector<double> thermistor() {
  std::vector<double> ohms;
  for (int i = 0; i <= 100; ++i) ohms.push_back(10e3 * std::exp(3435 * (1 / (233.15 + 1.65 * i) - 1 / 298.15)));
  return ohms;
}

// The best resistor where one branch sweeps through these values.
std::optional<advise::Reach> best_over(const model::Divider& divider, const std::vector<double>& values,
                                       double gap_limit) {
  const model::SweptValues swept{divider.whole.swept.front().branch, false, values};
  return resistor_offers(divider, {&swept, 1}, gap_limit).best;
}

double geometric_mean(const std::vector<double>& ohms) {
  return std::sqrt(ohms.front() * ohms.back());
}

struct Tried {
  double span, gap;
};

// Span and smaller gap of the pin by solving the whole network for each state: the long way round.
Tried tried(const model::Divider& divider, model::BranchId fixed, double ohms, const std::vector<double>& sensor) {
  double low = 1, high = 0, least = 1, most = 0;
  const std::size_t leakages = divider.whole.leakages.size();
  for (unsigned signs = 0; signs <= 1U << leakages; ++signs)  // every corner, and at last none of them
    for (const double value : sensor) {
      const bool none = signs == 1U << leakages;
      std::vector<model::Override> held{{fixed, ohms}, {divider.whole.swept.front().branch, value}};
      for (std::size_t i = 0; i < leakages && !none; ++i)
        held.push_back(
            {divider.whole.leakages[i], ((signs >> i & 1U) != 0 ? 1 : -1) * divider.whole.leakage_amperes[i]});
      const auto volts = network::node_volts(divider.whole.network, held).value();
      const double top = divider.whole.high.valid() ? volts[divider.whole.high.index()] : divider.input.nominal_high;
      const double reading = volts[divider.whole.probe.index()] / top * divider.input.gain;
      low = std::min(low, reading);
      high = std::max(high, reading);
      if (!none) continue;
      least = std::min(least, reading);
      most = std::max(most, reading);
    }
  return {std::clamp(most, 0.0, 1.0) - std::clamp(least, 0.0, 1.0), std::min(low, 1 - high)};
}

// The largest span with the gap kept over a fine grid of the fixed resistor.
double by_trying(const model::Divider& divider, model::BranchId fixed, double present,
                 const std::vector<double>& sensor, double gap_limit) {
  double best = -1;
  for (double decade = -3; decade <= 3; decade += 2e-3) {
    const auto at = tried(divider, fixed, present * std::pow(10, decade), {sensor.front(), sensor.back()});
    if (at.gap >= gap_limit) best = std::max(best, at.span);
  }
  return best;
}

}  // namespace

TEST_CASE("the best resistor of a plain divider is the geometric mean of the sensor's ends, above or below") {
  const auto sensor = thermistor();
  for (Made made :
       {advise_test::sensor_below(10e3), advise_test::sensor_above(10e3), advise_test::sensor_below(1.5e6)}) {
    const auto reach = best_over(made.finished(), sensor, 0).value();
    CHECK(reach.part == "R1");
    CHECK(reach.ohms == Approx(geometric_mean(sensor)).epsilon(1e-6));
    const double k = std::sqrt(sensor.front() / sensor.back());
    CHECK(reach.span_use == Approx((k - 1) / (k + 1)).epsilon(1e-12));
  }
}

TEST_CASE("the best resistor of published ranges is their geometric mean") {
  // Ranges of published examples (a 23k..65k sensor whose answer takes 39k, a photoresistor, a Pt100); optima computed.
  struct Range {
    double least, most, best;
  };
  for (const Range r :
       {Range{23e3, 65e3, 38665.2}, Range{10e3, 200e3, 44721.4}, Range{600e3, 4e6, 1549193.3},
        Range{678.417, 336103.2, 15100.26}, Range{3603, 32650, 10846.10}, Range{100, 138.5055, 117.6884}}) {
    Made made = advise_test::sensor_below(2 * r.most);
    CHECK(best_over(made.finished(), std::vector<double>{r.most, r.least}, 0).value().ohms ==
          Approx(r.best).epsilon(2e-6));
  }
}

TEST_CASE("39 kohm against 23 to 65 kohm reads 380 and 640 of 1023") {
  // Published answer (electronics.stackexchange): about 260 steps.
  Made made = advise_test::sensor_below(39e3);
  made.finished();
  const auto at = [&](double ohms) {
    const std::vector<model::Override> held{{made.sensor, ohms}};
    return 1023 * network::node_volts(made.divider.whole.network, held).value()[2] / 3.3;
  };
  CHECK(at(23e3) == Approx(380).margin(1));
  CHECK(at(65e3) == Approx(640).margin(1));
}

TEST_CASE("a plain divider has both its gaps at their largest where its span is") {
  const auto sensor = thermistor();
  for (Made made : {advise_test::sensor_below(10e3), advise_test::sensor_above(10e3)}) {
    const auto& divider = made.finished();
    const double gap = 1 / (1 + std::sqrt(sensor.front() / sensor.back()));  // 1 - u_hi = u_lo = (1 - span)/2
    CHECK(best_over(divider, sensor, gap).value().ohms == Approx(geometric_mean(sensor)).epsilon(1e-6));
    CHECK_FALSE(best_over(divider, sensor, gap + 1e-6).has_value());
  }
}

TEST_CASE("where the gap limit binds, the best resistor keeps it exactly") {
  // A 3.3 V divider on a 3 V range: the cold end reads 1.1 Rmax/(R + Rmax), to be 0.98 at most; by hand R = Rmax
  // (1.1/0.98 - 1).
  const auto sensor = thermistor();
  for (const double gap_limit : {0.015, 0.01, 0.0}) {
    Made made = advise_test::sensor_below(10e3);
    made.divider.input.nominal_high = 3;
    const auto reach = best_over(made.finished(), sensor, gap_limit).value();
    CHECK(reach.ohms == Approx(sensor.front() * (1.1 / (1 - gap_limit) - 1)).epsilon(1e-9));
    CHECK(reach.span_use == Approx(1 - gap_limit - 1.1 * sensor.back() / (reach.ohms + sensor.back())).epsilon(1e-9));
  }
}

TEST_CASE("leakage in the envelope moves the best resistor to where the gap limit holds with it") {
  const auto sensor = thermistor();
  Made made = advise_test::sensor_below(10e3);
  made.board.resistor(2, 3, 100e3);
  made.divider.whole.probe = node(3);
  made.leak(3, 500e-9);
  const auto& divider = made.finished();
  // At the geometric mean the envelope's upper gap is 0.0451 less 500 nA through the tap's and the sense resistance:
  // 0.0278.
  CHECK(tried(divider, made.fixed, geometric_mean(sensor), sensor).gap == Approx(0.0282).margin(5e-5));
  const double gap_limit = 0.0288;
  const auto reach = best_over(divider, sensor, gap_limit).value();
  const auto at = tried(divider, made.fixed, reach.ohms, sensor);
  CHECK(at.gap == Approx(gap_limit).margin(1e-9));
  CHECK(at.span == Approx(reach.span_use).epsilon(1e-9));
  CHECK(reach.ohms > 1.01 * geometric_mean(sensor));
  const double wanted = by_trying(divider, made.fixed, 10e3, sensor, gap_limit);
  CHECK(reach.span_use >= wanted - 1e-12);
  CHECK(reach.span_use == Approx(wanted).margin(1e-4));
  // Without the leakage the same limit does not bind.
  made.divider.whole.leakage_amperes = {0};
  CHECK(best_over(divider, sensor, gap_limit).value().ohms == Approx(geometric_mean(sensor)).epsilon(1e-6));
}

TEST_CASE(
    "leakages with signs of their own hold the best resistor to the gap limit where an end of the range leaks too") {
  const auto sensor = thermistor();
  Made made = advise_test::sensor_below(10e3);
  made.board.resistor(1, 3, 10e3);
  made.board.resistor(3, 0, 200e3);
  made.divider.whole.high = node(3);  // 3.143 V: a cold sensor passes it where R1 is too small
  made.leak(2, 1e-6);
  made.leak(3, 1e-6);
  const auto& divider = made.finished();
  const double gap_limit = 0.02;
  const auto reach = best_over(divider, sensor, gap_limit).value();
  const auto at = tried(divider, made.fixed, reach.ohms, {sensor.front(), sensor.back()});
  CHECK(at.gap == Approx(gap_limit).margin(1e-9));
  const double wanted = by_trying(divider, made.fixed, 10e3, sensor, gap_limit);
  CHECK(reach.span_use >= wanted - 1e-12);
  CHECK(reach.span_use == Approx(wanted).margin(1e-3));
}

TEST_CASE("an end of the range that is a net is read at that very point") {
  const auto sensor = thermistor();
  Made made = advise_test::with_volts(3.3);
  made.board.resistor(1, 3, 200);  // the rail's net, node 3, sags with the divider's current
  made.fixed = made.element(made.divider.upper, "R1", 3, 2, 10e3);
  made.sensor = made.element(made.divider.lower, "RT1", 2, 0, 1);
  advise_test::sweep_sensor(made);
  made.divider.whole.high = node(3);
  const auto reach = best_over(made.finished(), sensor, 0).value();
  CHECK(reach.ohms == Approx(geometric_mean(sensor)).epsilon(1e-6));  // the sag cancels
  made.divider.whole.high = {};
  CHECK(std::abs(best_over(made.finished(), sensor, 0).value().ohms - geometric_mean(sensor)) >
        100);  // and here it does not
}

TEST_CASE("of several fixed resistors the one that reaches most is named") {
  const auto sensor = thermistor();
  Made made = advise_test::sensor_below(200);
  const auto parallel = made.element(made.divider.lower, "R2", 2, 0, 1e6);
  const auto& divider = made.finished();
  const auto reach = best_over(divider, sensor, 0.02).value();
  CHECK(reach.part == "R1");
  const double by_upper = by_trying(divider, made.fixed, 200, sensor, 0.02);
  const double by_parallel = by_trying(divider, parallel, 1e6, sensor, 0.02);
  CHECK(by_upper > by_parallel);
  CHECK(reach.span_use == Approx(by_upper).margin(1e-4));
}

TEST_CASE("the divider of a supply monitor is set so that the highest supply keeps the gap") {
  Made made = advise_test::with_volts(12);
  made.fixed = made.element(made.divider.upper, "R1", 1, 2, 100e3);
  made.element(made.divider.lower, "R2", 2, 0, 10e3);
  made.divider.whole.swept = {{made.rail, model::SweptQuantity::volts, {}}};
  const auto reach = best_over(made.finished(), std::vector<double>{9, 12, 15}, 0.02).value();
  CHECK(reach.span_use == Approx(0.98 * (1 - 9.0 / 15)).epsilon(1e-9));
  const double upper = reach.part == "R1" ? reach.ohms : 100e3;
  const double lower = reach.part == "R2" ? reach.ohms : 10e3;
  CHECK(15 * lower / (upper + lower) == Approx(0.98 * 3.3).epsilon(1e-9));
}

TEST_CASE("where every reading clips alike the present value stays") {
  Made made = advise_test::sensor_below(10e3);
  made.divider.input.nominal_low = 1.6;
  made.divider.input.nominal_high = 1.7;
  const auto reach = best_over(made.finished(), std::vector<double>{1e6, 100}, -100).value();
  CHECK(reach.ohms == 10e3);
  CHECK(reach.span_use == 1);
}

TEST_CASE("branches that move together are followed point by point") {
  // A potentiometer as two resistors, its wiper the pin, with R1 above it: the reading rises with travel.
  Made made = advise_test::with_volts(3.3);
  made.fixed = made.element(made.divider.upper, "R1", 1, 3, 10e3);
  const auto top = made.board.resistor(3, 2, 1);
  const auto bottom = made.board.resistor(2, 0, 1);
  std::vector<model::SweptValues> swept{{top, false, {}}, {bottom, false, {}}};
  for (int i = 0; i <= 100; ++i) {
    swept[0].values.push_back(10e3 * (1 - i / 100.0));
    swept[1].values.push_back(10e3 * i / 100.0);
  }
  made.divider.whole.swept = {{top, model::SweptQuantity::ohms, {}}, {bottom, model::SweptQuantity::ohms, {}}};
  // At the far end the reading is 10k/(R1 + 10k): by hand, 0.9 at R1 = 10k/9; the other gap is zero.
  const auto reach = resistor_offers(made.finished(), swept, -1).best.value();
  CHECK(reach.ohms == 0);  // the smaller, the better: as a link
  CHECK(reach.span_use == Approx(1).epsilon(1e-12));
  for (auto& value : swept[1].values) value = std::max(value, 500.0);
  const auto held = resistor_offers(made.finished(), swept, 0.025).best.value();
  CHECK(held.ohms == Approx(10e3 / 0.975 - 10e3).epsilon(1e-6));
}

TEST_CASE("without a fixed resistor to vary, or without a sweep to follow, there is nothing") {
  const std::vector<double> sensor{1e3, 1e4};
  Made good = advise_test::sensor_below(10e3);
  CHECK(best_over(good.finished(), sensor, 0).has_value());
  CHECK_FALSE(best_over(good.finished(), std::vector<double>{}, 0).has_value());
  CHECK_FALSE(best_over(good.finished(), sensor, 0.6).has_value());

  Made residual = advise_test::sensor_below(10e3);
  const std::vector<model::SweptValues> variable{{residual.sensor, true, sensor}};
  CHECK_FALSE(resistor_offers(residual.finished(), variable, 0).best.has_value());
  const std::vector<model::SweptValues> ohms{{residual.sensor, false, sensor}};
  CHECK(resistor_offers(residual.finished(), ohms, 0).best.value().ohms == Approx(std::sqrt(1e7)).epsilon(1e-6));

  Made nameless = advise_test::sensor_below(10e3);
  nameless.divider.upper.clear();
  CHECK_FALSE(best_over(nameless.finished(), sensor, 0).has_value());

  Made jumper = advise_test::sensor_below(0);
  CHECK_FALSE(best_over(jumper.finished(), sensor, 0).has_value());

  CHECK_FALSE(resistor_offers(good.finished(), {}, 0).best.has_value());
}

TEST_CASE(
    "a linearising resistor across the sensor is offered to be left out, and not in place of the one that sets the "
    "span") {
  // By hand: with R2 across it the sensor of 1 to 9 kohm is 0.9 to 4.74 kohm; R1 at their geometric mean reaches
  // (sqrt k - 1)/(sqrt k + 1) of that k. Without R2, R1 as it is: 9/(9 + 2) - 1/(1 + 2).
  const std::vector<double> sensor{1e3, 9e3};
  for (const double ohms : {2e3, 60.0}) {
    Made made = advise_test::sensor_below(ohms);
    made.element(made.divider.lower, "R2", 2, 0, 10e3);
    made.divider.whole.sensor_plus = node(2);
    made.divider.whole.sensor_minus = node(0);
    const model::SweptValues swept{made.sensor, false, sensor};
    const auto offers = resistor_offers(made.finished(), {&swept, 1}, 0);
    const double k = (9.0 * 10 / 19) / (1.0 * 10 / 11);
    CHECK(offers.best.value().part == "R1");
    CHECK(offers.best->span_use == Approx((std::sqrt(k) - 1) / (std::sqrt(k) + 1)).epsilon(1e-9));
    if (ohms != 2e3) {
      CHECK_FALSE(offers.other.has_value());  // R1 is far off: nothing else does as well
      continue;
    }
    CHECK(offers.other.value().part == "R2");
    CHECK(std::isinf(offers.other->ohms));
    CHECK(offers.other->span_use == Approx(9.0 / 11 - 1.0 / 3).epsilon(1e-12));
  }
}

TEST_CASE("a resistor in series with the sensor that only costs span is best as a link") {
  Made made = advise_test::with_volts(3.3);
  made.fixed = made.element(made.divider.upper, "R1", 1, 2, 3e3);
  made.element(made.divider.lower, "R2", 2, 3, 3.3e3);
  made.sensor = made.element(made.divider.lower, "RT1", 3, 0, 1);
  advise_test::sweep_sensor(made);
  const model::SweptValues swept{made.sensor, false, {1e3, 9e3}};
  const auto offers = resistor_offers(made.finished(), {&swept, 1}, 0);
  CHECK(offers.best.value().part == "R1");
  CHECK(offers.other.value().part == "R2");
  CHECK(offers.other->ohms == 0);
  CHECK(offers.other->span_use == Approx(0.5).epsilon(1e-12));  // 9/12 - 1/4, by hand
}

TEST_CASE("only resistors are offered, and only where they reach something") {
  const std::vector<double> sensor{1e3, 9e3};
  Made source = advise_test::sensor_below(3e3);
  source.divider.upper.front().name = "B1";
  CHECK_FALSE(best_over(source.finished(), sensor, 0).has_value());
  source.divider.upper.front().name = "XBED1.r1";
  CHECK(best_over(source.finished(), sensor, 0).has_value());

  Made dangling = advise_test::with_volts(3.3);
  dangling.fixed = dangling.element(dangling.divider.upper, "R1", 1, 2, 10e3);
  dangling.element(dangling.divider.lower, "R2", 2, 0, 10e3);
  dangling.sensor = dangling.element(dangling.divider.lower, "RT1", 2, 3, 1);  // its other end goes nowhere
  advise_test::sweep_sensor(dangling);
  const model::SweptValues swept{dangling.sensor, false, sensor};
  const auto offers = resistor_offers(dangling.finished(), {&swept, 1}, 0);
  CHECK_FALSE(offers.best.has_value());
  CHECK_FALSE(offers.other.has_value());
}

TEST_CASE("a resistor across the sensor that takes more than half of the span has no such purpose") {
  // By hand: 100 ohm across 1 to 9 kohm leaves k = 1.0877, and with R1 at its best 2.1 % of the range; without it R1 =
  // 1 kohm reaches 9/10 - 1/2.
  Made made = advise_test::sensor_below(1e3);
  made.element(made.divider.lower, "R2", 2, 0, 100);
  made.divider.whole.sensor_plus = node(2);
  made.divider.whole.sensor_minus = node(0);
  const model::SweptValues swept{made.sensor, false, {1e3, 9e3}};
  const auto offers = resistor_offers(made.finished(), {&swept, 1}, 0);
  CHECK(offers.best.value().part == "R2");
  CHECK(std::isinf(offers.best->ohms));
  CHECK(offers.best->span_use == Approx(0.4).epsilon(1e-12));
  CHECK_FALSE(offers.other.has_value());
}
