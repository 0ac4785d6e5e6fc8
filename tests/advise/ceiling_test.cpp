#include <algorithm>
#include <cmath>
#include <span>
#include <vector>

#include <catch2/catch.hpp>

#include "advise/reach.hpp"
#include "network/linear.hpp"

namespace {

model::Input input_of(double low, double high, double gain = 1) {
  model::Input input;
  input.bits = 12;
  input.nominal_low = low;
  input.nominal_high = high;
  input.gain = gain;
  return input;
}

double ceiling(const model::Input& input, const model::OnePort& form, std::span<const double> ohms) {
  return advise::span_ceiling(input.reading_of(form.open_volts), input.reading_of(form.short_volts), ohms);
}

// The largest clipped span over a fine grid of source resistances.
double by_trying(const model::Input& input, model::OnePort form, double least, double most) {
  double best = 0;
  for (double log_ohms = -2; log_ohms < 9; log_ohms += 1e-4) {
    form.source_ohms = std::pow(10, log_ohms);
    const auto reading = [&](double ohms) {
      return std::clamp(input.reading_of(network::volts_at(form, ohms)), 0.0, 1.0);
    };
    best = std::max(best, std::abs(reading(least) - reading(most)));
  }
  return best;
}

struct Range {
  double least, most, span;
};

}  // namespace

TEST_CASE("the ceiling of a plain divider is (sqrt n - 1)/(sqrt n + 1), whichever side the sensor is on") {
  // n = Rmax/Rmin; derivation both ways round in college physics notes on the geometric mean (Hamilton, Physics 245).
  // Values for n computed from it; the ranges are those of published examples (a 23k..65k sensor, a photoresistor, a
  // Pt100).
  for (const Range r :
       {Range{1e3, 4e3, 1.0 / 3}, Range{1e3, 10e3, 0.519494}, Range{1e3, 100e3, 0.818182}, Range{1e3, 1e6, 0.938693},
        Range{23e3, 65e3, 0.254037}, Range{10e3, 200e3, 0.634512}, Range{600e3, 4e6, 0.441651},
        Range{678.417, 336103.2, 0.914008}, Range{100, 138.5055, 0.081255}}) {
    const std::vector<double> ohms{r.most, std::sqrt(r.least * r.most), r.least};
    CHECK(ceiling(input_of(0, 3.3), {3.3, 0, 10e3}, ohms) == Approx(r.span).margin(6e-7));
    CHECK(ceiling(input_of(0, 3.3), {0, 3.3, 10e3}, ohms) == Approx(r.span).margin(6e-7));
  }
}

TEST_CASE("the ceiling scales with what open and short leave of the range") {
  const std::vector<double> ohms{1e3, 100e3};
  CHECK(ceiling(input_of(0, 3.3), {2.2, 0.55, 10e3}, ohms) == Approx(0.5 * 9 / 11).epsilon(1e-12));
  CHECK(ceiling(input_of(0.3, 3.3), {3.3, 0.3, 10e3}, ohms) == Approx(9.0 / 11).epsilon(1e-12));
}

TEST_CASE("where an end clips the ceiling is what trying every source resistance finds") {
  const std::vector<double> ohms{350, 412e3};
  for (const double gain : {1.0, 2.0, 5.0, 30.0})
    for (const auto& form : {model::OnePort{5, 0, 1}, model::OnePort{-0.5, 3, 1}, model::OnePort{3.3, 0.4, 1},
                             model::OnePort{2, 4, 1}, model::OnePort{4, 3.5, 1}})
      for (const double low : {0.0, 1.0}) {
        const auto input = input_of(low, 3.3, gain);
        CHECK(ceiling(input, form, ohms) == Approx(by_trying(input, form, 350, 412e3)).margin(2e-4));
        CHECK(ceiling(input, form, ohms) >= by_trying(input, form, 350, 412e3) - 1e-12);
      }
}

TEST_CASE("a sensor that does not vary has a ceiling of zero, one that reaches zero ohms the whole way") {
  CHECK(ceiling(input_of(0, 3.3), {3.3, 0, 10e3}, std::vector<double>{}) == 0);
  CHECK(ceiling(input_of(0, 3.3), {3.3, 0, 10e3}, std::vector<double>{1e3}) == 0);
  CHECK(ceiling(input_of(0, 3.3), {3.3, 3.3, 10e3}, std::vector<double>{1e3, 2e3}) == 0);
  CHECK(ceiling(input_of(0, 3.3), {3.3, 0, 10e3}, std::vector<double>{0, 2e3}) == Approx(1).epsilon(1e-12));
  CHECK(ceiling(input_of(0, 3.3), {3.3, 0, 10e3}, std::vector<double>{0, 0}) == 0);
}

TEST_CASE("a monitor's ceiling is what trying every ratio of a divider finds, wherever the range begins") {
  struct Rail {
    double bottom, top, least, most;
  };
  for (const Rail& r : {Rail{0, 3.3, 9, 15}, Rail{1, 2.5, 9, 15}, Rail{0.5, 2.5, 1.2, 1.8}, Rail{0, 4, 0, 4},
                        Rail{1, 5, 0.2, 0.8}, Rail{2, 3, 2.1, 2.9}, Rail{1, 3, -2, 6}, Rail{-1, 1, 0.5, 12}}) {
    double best = 0;
    for (int i = 0; i <= 200000; ++i) {
      const auto reading = [&](double rail) {
        return std::clamp((i / 200000.0 * rail - r.bottom) / (r.top - r.bottom), 0.0, 1.0);
      };
      best = std::max(best, reading(r.most) - reading(r.least));
    }
    CHECK(advise::rail_ceiling(r.bottom, r.top, r.least, r.most).value() == Approx(best).margin(1e-4));
    CHECK(advise::rail_ceiling(r.bottom, r.top, r.least, r.most).value() >= best - 1e-12);
  }
  // 9 to 15 V on 1 to 2.5 V by hand: 2.5/(2.5 - 1) (1 - 9/15) = 2/3; from 0 V 1 - 9/15 = 0.4.
  CHECK(advise::rail_ceiling(1, 2.5, 9, 15).value() == Approx(2.0 / 3).epsilon(1e-12));
  CHECK(advise::rail_ceiling(0, 2.5, 9, 15).value() == Approx(0.4).epsilon(1e-12));
  CHECK_FALSE(advise::rail_ceiling(0, 3.3, -15, -9).has_value());
  CHECK_FALSE(advise::rail_ceiling(3.3, 0, 9, 15).has_value());
}
