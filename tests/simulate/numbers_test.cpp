#include "simulate/numbers.hpp"

#include <cmath>
#include <random>

#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

namespace {

std::string number(double value) {
  std::string out;
  simulate::append_number(out, value);
  return out;
}

std::string literal(double value) {
  std::string out;
  simulate::append_literal(out, value);
  return out;
}

std::vector<double> random_numbers(std::size_t count) {
  std::mt19937_64 random(11);
  std::uniform_real_distribution<double> exponent(-12, 12);
  std::vector<double> values(count);
  for (double& value : values) value = std::pow(10.0, exponent(random)) * (random() % 2 == 0 ? 1 : -1);
  return values;
}

}  // namespace

TEST_CASE("a number is written in the shortest form that reads back the same, and never as minus zero") {
  CHECK(number(4700) == "4700");
  CHECK(number(0.1) == "0.1");
  CHECK(number(-0.0) == "0");
  CHECK(number(1e5) == "1e+05");
  for (const double value : random_numbers(200)) CHECK(std::stod(number(value)) == value);
}

TEST_CASE("a literal in an expression is plain while it is short, and else a sum of two short ones") {
  CHECK(literal(298.15) == "298.15");
  CHECK(literal(-2.5) == "(-2.5)");
  CHECK(literal(0) == "0");
  CHECK(literal(1.2345678901234567) == "(1.234567890e+00+1.234568003e-10)");
}

// 4.4e-16: the library's own reader of numbers is one or two units of the last place off.
TEST_CASE("the simulator reads a number of an element line to within two units of its last place") {
  const std::vector<double> values = random_numbers(200);
  std::string deck = "t\n";
  std::vector<std::string> names;
  for (std::size_t i = 0; i < values.size(); ++i) {
    names.push_back("n" + std::to_string(i));
    deck += "v" + std::to_string(i) + " " + names.back() + " 0 " + number(values[i]) + "\n";
  }
  const simulate::Answer answer = test::raw(deck + ".end\n", names);
  REQUIRE(answer.verdict == simulate::Verdict::solved);
  for (std::size_t i = 0; i < values.size(); ++i) CHECK(std::fabs(answer.values[i] / values[i] - 1) <= 4.5e-16);
}

TEST_CASE("the simulator keeps all digits of a literal in an expression") {
  const std::vector<double> values = random_numbers(200);
  std::string deck = "t\nv0 one 0 1\n";
  std::vector<std::string> names;
  for (std::size_t i = 0; i < values.size(); ++i) {
    names.push_back("n" + std::to_string(i));
    deck += "b" + std::to_string(i) + " " + names.back() + " 0 v=v(one)*" + literal(values[i]) + "\n";
  }
  const simulate::Answer answer = test::raw(deck + ".end\n", names);
  REQUIRE(answer.verdict == simulate::Verdict::solved);
  for (std::size_t i = 0; i < values.size(); ++i) CHECK(std::fabs(answer.values[i] / values[i] - 1) <= 1e-15);
}
