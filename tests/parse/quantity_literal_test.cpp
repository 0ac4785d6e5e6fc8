// Literals of a netlist in both readings. Marking codes: IEC 60062:2004 clause 4, tolerance letters clause 5. What
// SPICE takes was measured with ngspice 39, a resistor card a value.
#include <cmath>
#include <cstdlib>
#include <limits>
#include <random>
#include <string>

#include <catch2/catch.hpp>

#include "parse/quantity.hpp"

namespace {

constexpr double none = std::numeric_limits<double>::quiet_NaN();

struct Row {
  const char* text;
  double builder;
  double spice;
  double tolerance = none;
  bool bare_mega = false;
};

bool same(double a, double b) {
  return a == b || (std::isnan(a) && std::isnan(b));
}

void check(const Row& row) {
  INFO(row.text);
  const auto literal = parse::read_literal(row.text);
  if (!literal) FAIL(literal.error());
  CHECK(literal->builder == row.builder);
  INFO("SPICE reading " << literal->spice << ", expected " << row.spice);
  CHECK(same(literal->spice, row.spice));
  INFO("tolerance " << literal->tolerance << ", expected " << row.tolerance);
  CHECK(same(literal->tolerance, row.tolerance));
  CHECK(literal->bare_mega == row.bare_mega);
}

std::string error_of(const std::string& text) {
  const auto literal = parse::read_literal(text);
  return literal ? "read" : literal.error();
}

}  // namespace

TEST_CASE("a number with a SPICE suffix reads the same for SPICE and for the builder") {
  for (const Row& row : std::initializer_list<Row>{{"0", 0, 0},
                                                   {"1e3", 1000, 1000},
                                                   {"1E3", 1000, 1000},
                                                   {"1d3", 1000, 1000},
                                                   {"-5", -5, -5},
                                                   {"+5", 5, 5},
                                                   {".5", 0.5, 0.5},
                                                   {"5.", 5, 5},
                                                   {"10k", 1e4, 1e4},
                                                   {"10K", 1e4, 1e4},
                                                   {"4.7k", 4700, 4700},
                                                   {"4.7kohm", 4700, 4700},
                                                   {"1meg", 1e6, 1e6},
                                                   {"1MEG", 1e6, 1e6},
                                                   {"1MegOhm", 1e6, 1e6},
                                                   {"1m", 1e-3, 1e-3},
                                                   {"1me", 1e-3, 1e-3},
                                                   {"2.2u", 2.2e-6, 2.2e-6},
                                                   {"2.2uF", 2.2e-6, 2.2e-6},
                                                   {"100N", 1e-7, 1e-7},
                                                   {"10p", 1e-11, 1e-11},
                                                   {"5f", 5e-15, 5e-15},
                                                   {"10F", 1e-14, 1e-14},
                                                   {"3g", 3e9, 3e9},
                                                   {"3T", 3e12, 3e12},
                                                   {"2mil", 50.8e-6, 50.8e-6},
                                                   {"5a", 5, 5},
                                                   {"470R", 470, 470},
                                                   {"10kOhm", 1e4, 1e4},
                                                   {"1kR", 1000, 1000},
                                                   {"18Vdc", 18, 18},
                                                   {"1mH", 1e-3, 1e-3},
                                                   {"10K@25C", 1e4, 1e4},
                                                   {"10k\xCE\xA9", 1e4, 1e4},
                                                   {"10\xE2\x84\xA6", 10, 10},
                                                   {"1e3k", 1e6, 1e6},
                                                   {"10\xC2\xB5", 1e-5, 1e-5},
                                                   {"10\xB5"
                                                    "F",
                                                    1e-5, 1e-5},
                                                   {" 10k ", 1e4, 1e4}}) {
    check(row);
    CHECK_FALSE(parse::read_literal(row.text)->odd());
  }
}

TEST_CASE("a marking code stands for its decimal point, and SPICE stops at the letter") {
  for (const Row& row : std::initializer_list<Row>{{"4k7", 4700, 4000},
                                                   {"4K7", 4700, 4000},
                                                   {"4R7", 4.7, 4},
                                                   {"4r7", 4.7, 4},
                                                   {"47K3", 47300, 47000},
                                                   {"2k2", 2200, 2000},
                                                   {"2M2", 2.2e6, 2e-3},
                                                   {"4M7", 4.7e6, 4e-3},
                                                   {"0R1", 0.1, 0},
                                                   {"6R8", 6.8, 6},
                                                   {"82R5", 82.5, 82},
                                                   {"1G5", 1.5e9, 1e9},
                                                   {"1m5", 1.5e-3, 1e-3},
                                                   {"4n7", 4.7e-9, 4e-9},
                                                   {"2p2", 2.2e-12, 2e-12},
                                                   {"3V3", 3.3, 3},
                                                   {"4\xC2\xB5"
                                                    "7",
                                                    4.7e-6, 4e-6},
                                                   {"4\xB5"
                                                    "7",
                                                    4.7e-6, 4e-6},
                                                   {"4k7ohm", 4700, 4000},
                                                   {"-4k7", -4700, -4000},
                                                   {"R47", 0.47, none},
                                                   {"R10", 0.1, none},
                                                   {"R100", 0.1, none},
                                                   {"R0005", 0.0005, none}}) {
    check(row);
    CHECK(parse::read_literal(row.text)->odd());
  }
}

TEST_CASE("a tolerance behind a value is kept, however it is written") {
  for (const Row& row : std::initializer_list<Row>{{"10k 1%", 1e4, 1, 0.01},
                                                   {"10k1%", 1e4, 1e4, 0.01},
                                                   {"10k-1%", 1e4, -1, 0.01},
                                                   {"10k/1%", 1e4, none, 0.01},
                                                   {"10k\xC2\xB1"
                                                    "1%",
                                                    1e4, 1e4, 0.01},
                                                   {"10k\xB1"
                                                    "1%",
                                                    1e4, 1e4, 0.01},
                                                   {"10k+/-1%", 1e4, none, 0.01},
                                                   {"10k +/- 1%", 1e4, none, 0.01},
                                                   {"10k,1%", 1e4, 1, 0.01},
                                                   {"10k \xC2\xB1"
                                                    "1%",
                                                    1e4, none, 0.01},
                                                   {"10k 0.1%", 1e4, 0.1, 0.001},
                                                   {"10k 7%", 1e4, 7, 0.07},
                                                   {"10k 0,5%", 1e4, none, 0.005},
                                                   {"4k7 1%", 4700, 1, 0.01},
                                                   {"1k5%", 1000, 1000, 0.05},
                                                   {"10k 1% 0.1W", 1e4, none, 0.01},
                                                   {"470R 5%", 470, 5, 0.05}}) {
    check(row);
  }
}

TEST_CASE("a tolerance letter behind a marking code is kept") {
  for (const Row& row : std::initializer_list<Row>{{"1R8J", 1.8, 1, 0.05},
                                                   {"27KK", 27000, 27000, 0.1},
                                                   {"4K7F", 4700, 4000, 0.01},
                                                   {"4K7B", 4700, 4000, 0.001},
                                                   {"470RJ", 470, 470, 0.05},
                                                   {"100KJ", 1e5, 1e5, 0.05},
                                                   {"2M2M", 2.2e6, 2e-3, 0.2},
                                                   {"4n7J", 4.7e-9, 4e-9, 0.05},
                                                   {"R47J", 0.47, none, 0.05}}) {
    check(row);
  }
}

TEST_CASE("a letter that is a unit or a potentiometer's taper is no tolerance") {
  for (const Row& row : std::initializer_list<Row>{{"4n7F", 4.7e-9, 4e-9},
                                                   {"10kB", 1e4, 1e4},
                                                   {"10kA", 1e4, 1e4},
                                                   {"10uF", 1e-5, 1e-5},
                                                   {"10pF", 1e-11, 1e-11}}) {
    check(row);
  }
}

TEST_CASE("a bare capital M is mega for the builder, milli for SPICE, and marked as open") {
  for (const Row& row : std::initializer_list<Row>{{"1M", 1e6, 1e-3, none, true},
                                                   {"30M", 30e6, 30e-3, none, true},
                                                   {"1Mohm", 1e6, 1e-3, none, true},
                                                   {"1.5M", 1.5e6, 1.5e-3, none, true},
                                                   {"1M 5%", 1e6, 5, 0.05, true},
                                                   {"1 M", 1e6, none, none, true},
                                                   {"1MJ", 1e6, 1e-3, 0.05, true}}) {
    check(row);
    CHECK(parse::read_literal(row.text)->odd());
  }
}

TEST_CASE("a decimal comma, a blank before the unit and a Greek mu are read as the builder means them") {
  for (const Row& row : std::initializer_list<Row>{{"4,7k", 4700, 7000},
                                                   {"0,5", 0.5, 5},
                                                   {"10\xCE\xBC", 1e-5, 10},
                                                   {"10 k", 1e4, none},
                                                   {"10 k\xCE\xA9", 1e4, none},
                                                   {"1 \xC2\xB5"
                                                    "F",
                                                    1e-6, none},
                                                   {"10 uf", 1e-5, none},
                                                   {"10 Meg", 1e7, none},
                                                   {"10k ohm", 1e4, none},
                                                   {"10 ohm", 10, none},
                                                   {"2.2 F", 2.2, none},
                                                   {"10\xC2\xA0k", 1e4, 10},
                                                   {"100n/50V", 1e-7, none},
                                                   {"10u_16V", 1e-5, 1e-5},
                                                   {"10u 16V", 1e-5, 16}}) {
    check(row);
  }
}

TEST_CASE("both readings are the double nearest to the decimal text") {
  for (const char* text :
       {"4990", "0.1", "0.3", "123456789012345", "1.7976931348623157e308", "5e-324", "9007199254740993", "0.000001",
        "3.14159265358979", "2.2250738585072011e-308", "1e22", "1e23"}) {
    INFO(text);
    CHECK(parse::read_literal(text)->builder == std::strtod(text, nullptr));
    CHECK(parse::read_literal(text)->spice == std::strtod(text, nullptr));
  }
  CHECK(parse::read_literal("4k99")->builder == 4990.0);
  CHECK(parse::read_literal("2.2u")->builder == 2.2e-6);
  CHECK(parse::read_literal("0.1u")->spice == 1e-7);
  CHECK(parse::read_literal("1234567.890123456789k")->builder == 1234567890.123456789);
}

TEST_CASE("a text that is no number is refused, and the message shows it") {
  for (const char* text :
       {"",     " ",     "R",     "NTC",    "NTC10k", "DNP", "~",     "inf",   "nan",   "-",     ".",   "+.",   "1.5.2",
        "0x10", "1.5k2", "4k7k7", "1N4148", "2N2222", "10%", "1k 2k", "10k J", "1e5k7", "4k7.5", "--5", "{10k}"}) {
    CHECK(error_of(text) == "expected a number such as 10k, 4k7, 2.2u or 1e3, found \"" + std::string(text) + "\"");
  }
}

TEST_CASE("a value that no double holds or that can be read in two ways is refused, and the message says why") {
  CHECK(error_of("1e400") == "\"1e400\" is too large or too small for a number");
  CHECK(error_of("1e-400") == "\"1e-400\" is too large or too small for a number");
  CHECK(error_of("1e99999999999999999999") == "\"1e99999999999999999999\" is too large or too small for a number");
  CHECK(error_of("1e300t") == "\"1e300t\" is too large or too small for a number");
  CHECK(error_of("1,000") ==
        "\"1,000\" may be a decimal comma or a separator of thousands; write a point, or no comma");
  CHECK(error_of("4k71%") ==
        "\"4k71%\" leaves open where the value ends and the tolerance begins; put a blank between them");
  CHECK(error_of("10k 150%") == "\"10k 150%\" has a tolerance of 100 % or more");
}

TEST_CASE("no sequence of bytes breaks the reading of a literal") {
  std::mt19937 random(20240511);
  const std::string likely = "0123456789.,+-eEkKmMuRGgTfpn%/ \xC2\xB5\xCE\xA9\xB1@()_VAF";
  std::size_t read = 0;
  for (int run = 0; run < 20000; ++run) {
    std::string text;
    const std::size_t length = random() % 12;
    while (text.size() < length) {
      text += run % 2 ? static_cast<char>(random() % 256) : likely[random() % likely.size()];
    }
    const auto literal = parse::read_literal(text);
    if (!literal) continue;
    ++read;
    INFO(text);
    CHECK(std::isfinite(literal->builder));
    CHECK_FALSE(literal->tolerance >= 1);
  }
  CHECK(read > 500);
}

TEST_CASE("a literal of ten million digits is read or refused like any other") {
  CHECK(parse::read_literal(std::string(10'000'000, '0') + "1k")->builder == 1000);
  CHECK_FALSE(parse::read_literal(std::string(10'000'000, '9')).ok());
}
