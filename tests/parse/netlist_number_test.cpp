#include <fmt/format.h>
#include <random>

#include <catch2/catch.hpp>

#include "parse/cards/number.hpp"
#include "parse/quantity.hpp"

TEST_CASE("netlist numbers: plain forms have the value that their decimal text has") {
  CHECK(parse::plain_number("4.7k") == 4700.0);
  CHECK(parse::plain_number("100n") == 1e-7);
  CHECK(parse::plain_number("10Meg") == 1e7);
  CHECK(parse::plain_number("-3.3") == -3.3);
  CHECK(parse::plain_number("+.5m") == 0.0005);
  CHECK(parse::plain_number("1e-14") == 1e-14);
  CHECK(parse::plain_number("0") == 0.0);
}

TEST_CASE("netlist numbers: what may have two readings or is no number is left to the quantity grammar") {
  for (const char* const text : {"", "-", ".", "k", "4k7", "1M", "10kohm", "10R", "1e", "1e5k", "1e999", "10k1%",
                                 "1.2.3", "123456789012345678901"}) {
    INFO(text);
    CHECK_FALSE(parse::plain_number(text).has_value());
  }
}

TEST_CASE("netlist numbers: whatever the short way takes, the quantity grammar reads as the same plain number") {
  std::mt19937 random(3);
  const std::vector<std::string> suffixes{"",  "k", "K", "meg", "MEG", "m",    "u",   "U", "n", "p",
                                          "g", "G", "t", "T",   "e3",  "e-12", "E+5", "f", "M"};
  int taken = 0;
  for (int run = 0; run < 5000; ++run) {
    std::string text = random() % 4 == 0 ? "-" : "";
    text += fmt::format("{}", random() % 100000);
    if (random() % 2 == 0) text += fmt::format(".{:0{}}", random() % 1000, 1 + random() % 6);
    text += suffixes[random() % suffixes.size()];
    INFO(text);
    const auto plain = parse::plain_number(text);
    if (!plain) continue;
    ++taken;
    const auto literal = parse::read_literal(text);
    REQUIRE(literal.ok());
    CHECK_FALSE(literal->odd());
    CHECK(literal->builder == *plain);
  }
  CHECK(taken > 3000);
}
