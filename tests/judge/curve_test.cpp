#include <cmath>
#include <limits>

#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using fixtures::converter_input;
using fixtures::volts;
using judge::code_of;
using judge::curve_of;

namespace {

// Sensor above a fixed resistor R: V = supply R/(R + Rx).
judge::Solved below_sensor(double fixed_ohms, const std::vector<double>& sensor_ohms,
                           const std::vector<double>& supply) {
  judge::Solved out;
  out.at = sensor_ohms;
  out.sensor_ohms = sensor_ohms;
  for (std::size_t i = 0; i < sensor_ohms.size(); ++i) {
    out.nominal.pin.push_back(supply[i] * fixed_ohms / (fixed_ohms + sensor_ohms[i]));
    out.nominal.low.push_back(0);
    out.nominal.high.push_back(supply[i]);
  }
  out.bare = out.nominal;
  return out;
}

}  // namespace

TEST_CASE("A divider reads 50 % where the sensor equals the fixed resistor and 90.9 % where it is a tenth") {
  // common practice, no source
  const auto sweep = curve_of(converter_input(), below_sensor(10e3, {10e3, 1e3}, {3.3, 3.3}), "x", "ohm");
  CHECK(sweep.pin_volts[0] == Approx(1.65).epsilon(1e-12));
  CHECK(sweep.pin_volts[1] == Approx(3.3 / 1.1).epsilon(1e-12));
  CHECK(sweep.code == std::vector<long long>{2048, 3724});  // 4096/1.1 = 3723.6
}

TEST_CASE("A supply that moves from point to point cancels where the range ends at it") {
  const auto sweep =
      curve_of(converter_input(12, 0, 3.3), below_sensor(10e3, {10e3, 10e3, 10e3}, {3.3, 2.9, 5.0}), "x", "ohm");
  for (const double volt : sweep.pin_volts) CHECK(volt == Approx(1.65).epsilon(1e-15));
  for (const double volt : sweep.bare_volts) CHECK(volt == Approx(1.65).epsilon(1e-15));
}

TEST_CASE("Each condition is read against the ends of the range under that same condition") {
  judge::Solved solved = below_sensor(10e3, {10e3}, {3.3});
  solved.leakage_high = judge::Solved::Volts{{1.7}, {0}, {3.4}};  // pin and reference rise together: still one half
  const auto sweep = curve_of(converter_input(), solved, "x", "ohm");
  CHECK(sweep.pin_high[0] == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("A bare divider without ends of its own is read against the nominal ends") {
  judge::Solved solved = below_sensor(10e3, {10e3}, {3.0});
  solved.bare = {{2.0}, {}, {}};
  CHECK(curve_of(converter_input(), solved, "x", "ohm").bare_volts[0] == Approx(3.3 * 2 / 3).epsilon(1e-12));
  solved.bare = {{2.0}, {0}, {4.0}};
  CHECK(curve_of(converter_input(), solved, "x", "ohm").bare_volts[0] == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("A gain makes the range at the pin smaller by as much") {
  const auto input = converter_input(12, 0, 3.2, 16);
  judge::Solved solved;
  solved.at = {0, 1};
  solved.nominal = volts({0.1, 0.2}, 0, 3.2);
  solved.bare = solved.nominal;
  const auto sweep = curve_of(input, solved, "x", "");
  CHECK(sweep.pin_volts[1] == Approx(0.2).epsilon(1e-12));
  CHECK(sweep.code == std::vector<long long>{2048, 4095});
  CHECK(input.lsb_volts() == Approx(0.2 / 4096).epsilon(1e-12));
}

TEST_CASE("A range around zero reads in offset binary") {
  judge::Solved solved;
  solved.at = {0, 1, 2};
  solved.nominal = volts({-2.5, 0, 1.25}, -2.5, 2.5);
  solved.bare = solved.nominal;
  const auto sweep = curve_of(converter_input(12, -2.5, 2.5), solved, "x", "");
  CHECK(sweep.code == std::vector<long long>{0, 2048, 3072});
  CHECK(sweep.pin_volts[2] == Approx(1.25).epsilon(1e-12));
}

TEST_CASE("On a range that runs downwards the envelope is still lowest volts first") {
  judge::Solved solved;
  solved.at = {0};
  solved.nominal = volts({-1.25}, 0, -5);
  solved.leakage_high = volts({-1.20}, 0, -5);
  solved.leakage_low = volts({-1.30}, 0, -5);
  solved.bare = solved.nominal;
  const auto sweep = curve_of(converter_input(12, 0, -5), solved, "x", "");
  CHECK(sweep.code[0] == 1024);
  CHECK(sweep.pin_low[0] == Approx(-1.30).epsilon(1e-12));
  CHECK(sweep.pin_high[0] == Approx(-1.20).epsilon(1e-12));
}

TEST_CASE("The envelope spans nominal and both signs of the leakage, whichever way each moves the pin") {
  judge::Solved solved;
  solved.at = {0, 1, 2};
  solved.nominal = volts({1.0, 2.0, 3.0});
  solved.leakage_high = volts({1.1, 1.9, 3.05});
  solved.leakage_low = volts({0.8, 2.2, 3.10});
  solved.bare = solved.nominal;
  const auto sweep = curve_of(converter_input(), solved, "x", "");
  CHECK(sweep.pin_low[0] == Approx(0.8).epsilon(1e-12));
  CHECK(sweep.pin_high[0] == Approx(1.1).epsilon(1e-12));
  CHECK(sweep.pin_low[1] == Approx(1.9).epsilon(1e-12));
  CHECK(sweep.pin_high[1] == Approx(2.2).epsilon(1e-12));
  CHECK(sweep.pin_low[2] == Approx(3.0).epsilon(1e-12));
  CHECK(sweep.pin_high[2] == Approx(3.1).epsilon(1e-12));
}

TEST_CASE("Codes round: the first transition is at 1/8192 of the range of 12 bits, and full scale stays 4095") {
  // INT(V/Vref 4096 + 0.5): a microcontroller manual's formula for its own converter; it gives 4096 at V = Vref
  CHECK(code_of(0, 12) == 0);
  CHECK(code_of(std::nextafter(1.0 / 8192, 0.0), 12) == 0);
  CHECK(code_of(1.0 / 8192, 12) == 1);
  CHECK(code_of(0.5, 12) == 2048);
  CHECK(code_of(4094.5 / 4096, 12) == 4095);
  CHECK(code_of(1, 12) == 4095);
}

TEST_CASE("Readings off scale, without bound or without number give a code of the range") {
  constexpr double infinity = std::numeric_limits<double>::infinity();
  CHECK(code_of(-3, 12) == 0);
  CHECK(code_of(7, 12) == 4095);
  CHECK(code_of(infinity, 24) == 16777215);
  CHECK(code_of(-infinity, 24) == 0);
  CHECK(code_of(std::numeric_limits<double>::quiet_NaN(), 12) == 0);
  CHECK(code_of(1, 1) == 1);
}

TEST_CASE("A count of 10 bits over 5.12 V is 5 mV") {
  // a microcontroller manual's worked example
  CHECK(converter_input(10, 0, 5.12).lsb_volts() == Approx(5e-3).epsilon(1e-12));
}

TEST_CASE("The curve keeps measurand, sensor, rung and the difference of points solved alone") {
  judge::Solved solved = below_sensor(10e3, {1e3, 2e3}, {3.3, 3.3});
  solved.at = {-40, 125};
  solved.rung = model::Rung::single;
  solved.stepped = true;
  solved.alone_difference = 1e-6;
  const auto sweep = curve_of(converter_input(), solved, "temperature", "degC");
  CHECK(sweep.measurand == "temperature");
  CHECK(sweep.unit == "degC");
  CHECK(sweep.at == std::vector<double>{-40, 125});
  CHECK(sweep.sensor_ohms == std::vector<double>{1e3, 2e3});
  CHECK(sweep.rung == model::Rung::single);
  CHECK(sweep.stepped);
  CHECK(sweep.alone_difference == 1e-6);
}
