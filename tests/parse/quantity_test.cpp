// Quantities of declarations. Prefixes: SI (M mega, m milli); marking codes: IEC 60062:2004 clause 4.
#include "parse/quantity.hpp"

#include <string>

#include <catch2/catch.hpp>

using parse::Unit;

namespace {

struct Row {
  const char* text;
  Unit unit;
  double value;
};

void check(std::initializer_list<Row> rows) {
  for (const Row& row : rows) {
    INFO(row.text);
    const auto value = parse::read_quantity(row.text, row.unit);
    if (!value) FAIL(value.error());
    CHECK(*value == row.value);
  }
}

std::string error_of(const char* text, Unit unit) {
  const auto value = parse::read_quantity(text, unit);
  return value ? "read" : value.error();
}

}  // namespace

TEST_CASE("a plain number is a quantity of every unit") {
  for (const Unit unit : {Unit::none, Unit::ohm, Unit::volt, Unit::ampere, Unit::farad, Unit::henry, Unit::second,
                          Unit::hertz, Unit::watt, Unit::fraction, Unit::degc, Unit::kelvin, Unit::lux}) {
    check({{"1e3", unit, 1000}, {"-40", unit, -40}, {"0.25", unit, 0.25}, {" +7 ", unit, 7}});
  }
}

TEST_CASE("in declarations M is mega, m is milli, and both k and K are kilo") {
  check({{"1M", Unit::ohm, 1e6},
         {"1m", Unit::ohm, 1e-3},
         {"10k", Unit::ohm, 1e4},
         {"10K", Unit::ohm, 1e4},
         {"1G", Unit::ohm, 1e9},
         {"1T", Unit::ohm, 1e12},
         {"1meg", Unit::ohm, 1e6},
         {"5u", Unit::ampere, 5e-6},
         {"5\xC2\xB5"
          "A",
          Unit::ampere, 5e-6},
         {"5 \xCE\xBC"
          "A",
          Unit::ampere, 5e-6},
         {"10f", Unit::farad, 1e-14},
         {"10F", Unit::farad, 10}});
}

TEST_CASE("a unit may stand behind the prefix, with or without a blank") {
  check({{"10 kOhm", Unit::ohm, 1e4},
         {"10k\xCE\xA9", Unit::ohm, 1e4},
         {"10 \xE2\x84\xA6", Unit::ohm, 10},
         {"470R", Unit::ohm, 470},
         {"2.5 V", Unit::volt, 2.5},
         {"300mV", Unit::volt, 0.3},
         {"100nA", Unit::ampere, 1e-7},
         {"2.2 uF", Unit::farad, 2.2e-6},
         {"8pF", Unit::farad, 8e-12},
         {"10 uH", Unit::henry, 1e-5},
         {"2.5us", Unit::second, 2.5e-6},
         {"1 kHz", Unit::hertz, 1000},
         {"1k", Unit::hertz, 1000},
         {"125 mW", Unit::watt, 0.125},
         {"10 lx", Unit::lux, 10},
         {"1klux", Unit::lux, 1000},
         {"25 degC", Unit::degc, 25},
         {"-40\xC2\xB0"
          "C",
          Unit::degc, -40},
         {"3435 K", Unit::kelvin, 3435},
         {"3435K", Unit::kelvin, 3435},
         {"1%", Unit::fraction, 0.01},
         {"0.7 %", Unit::fraction, 0.007},
         {"50 ppm", Unit::fraction, 50e-6}});
}

TEST_CASE("marking codes are read in declarations too") {
  check({{"4k7", Unit::ohm, 4700},
         {"4R7", Unit::ohm, 4.7},
         {"R47", Unit::ohm, 0.47},
         {"2M2", Unit::ohm, 2.2e6},
         {"4k7 ohm", Unit::ohm, 4700},
         {"3V3", Unit::volt, 3.3},
         {"2u2", Unit::farad, 2.2e-6},
         {"2m5", Unit::ampere, 2.5e-3}});
}

TEST_CASE("a quantity that is none says what was expected, and what stands there") {
  CHECK(error_of("", Unit::ohm) == "expected a resistance such as \"10k\", found \"\"");
  CHECK(error_of("ten", Unit::ohm) == "expected a resistance such as \"10k\", found \"ten\"");
  CHECK(error_of("10 V", Unit::ohm) == "expected a resistance such as \"10k\", found \"10 V\", which is in volts");
  CHECK(error_of("10 kHz", Unit::ohm) == "expected a resistance such as \"10k\", found \"10 kHz\", which is in hertz");
  CHECK(error_of("4,7k", Unit::ohm) ==
        "expected a resistance such as \"10k\", found \"4,7k\"; write a point in place of the comma");
  CHECK(error_of("1%", Unit::volt) == "expected a voltage such as \"3.3 V\", found \"1%\", which is a fraction");
  CHECK(error_of("10k 1%", Unit::ohm) == "expected a resistance such as \"10k\", found \"10k 1%\"");
  CHECK(error_of("4R7", Unit::volt) == "expected a voltage such as \"3.3 V\", found \"4R7\"");
  CHECK(error_of("3V3", Unit::ohm) == "expected a resistance such as \"10k\", found \"3V3\"");
  CHECK(error_of("5 k", Unit::degc) == "expected a temperature such as \"25 degC\", found \"5 k\"");
  CHECK(error_of("10m%", Unit::fraction) == "expected a fraction such as \"1%\" or \"50 ppm\", found \"10m%\"");
  CHECK(error_of("5 a", Unit::ampere) == "expected a current such as \"100 nA\", found \"5 a\"");
  CHECK(error_of("1.2.3", Unit::second) == "expected a time such as \"2.5 us\", found \"1.2.3\"");
  CHECK(error_of("x", Unit::none) == "expected a number, found \"x\"");
  CHECK(error_of("inf", Unit::none) == "expected a number, found \"inf\"");
  CHECK(error_of("nan", Unit::lux) == "expected a brightness such as \"10 lx\", found \"nan\"");
  CHECK(error_of("1e400", Unit::ohm) == "\"1e400\" is too large or too small for a number");
  CHECK(error_of("10\x1b[31m", Unit::ohm) == "expected a resistance such as \"10k\", found \"10\\x1b[31m\"");
}
