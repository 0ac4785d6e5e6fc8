// Sources that are expressions, through the real simulator, against the same expression in C++.
#include <cmath>

#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

using model::ExpressionId;
using model::Function;
using model::Op;
using test::Board;

namespace {

// The value of an expression of v = V(1), which is swept over `volts`, as a voltage source of its own.
template <class Build>
std::vector<double> values(const std::vector<double>& volts, Build build) {
  Board board;
  const model::BranchId drive = board.volts(1, 0, 0);
  board.resistor(1, 0, 1e3);
  const ExpressionId expression = build(board, board.net(1));
  board.source(2, 0, expression, false);
  board.resistor(2, 0, 1e3);
  board.sweep(drive, volts);
  board.watch(2);
  return test::solve(board).volts;
}

const std::vector<double> drives{-2.7, -1.5, -0.4, 0.3, 0.8, 1.5, 2.6, 7.25};

template <class Build, class Expected>
void agree(const char* what, Build build, Expected expected) {
  const std::vector<double> found = values(drives, build);
  REQUIRE(found.size() == drives.size());
  for (std::size_t i = 0; i < drives.size(); ++i) {
    INFO(what << " at " << drives[i]);
    CHECK(found[i] == Approx(expected(drives[i])).epsilon(1e-12).margin(1e-14));
  }
}

}  // namespace

TEST_CASE("operators of an expression mean in the simulator what they mean to us") {
  const auto with = [](Op op, double other) {
    return [op, other](Board& b, ExpressionId v) { return b.apply(op, {v, b.number(other)}); };
  };
  agree("add", with(Op::add, 1.2345678901234), [](double v) { return v + 1.2345678901234; });
  agree("subtract", with(Op::subtract, -1.5), [](double v) { return v + 1.5; });
  agree("multiply", with(Op::multiply, -2.5), [](double v) { return v * -2.5; });
  agree("divide", with(Op::divide, 3), [](double v) { return v / 3; });
  agree("even power", with(Op::power, 2), [](double v) { return std::pow(v, 2); });
  agree("odd power", with(Op::power, 3), [](double v) { return std::pow(v, 3); });
  agree("remainder", with(Op::remainder, 0.7), [](double v) { return std::fmod(v, 0.7); });
  agree("less", with(Op::less, 0.75), [](double v) { return v < 0.75 ? 1 : 0; });
  agree("less_equal", with(Op::less_equal, 0.75), [](double v) { return v <= 0.75 ? 1 : 0; });
  agree("greater", with(Op::greater, 0.75), [](double v) { return v > 0.75 ? 1 : 0; });
  agree("greater_equal", with(Op::greater_equal, 0.75), [](double v) { return v >= 0.75 ? 1 : 0; });
  agree("equal", with(Op::equal, 1.5), [](double v) { return v == 1.5 ? 1 : 0; });
  agree("not_equal", with(Op::not_equal, 1.5), [](double v) { return v != 1.5 ? 1 : 0; });
  agree("and", with(Op::logical_and, 2), [](double) { return 1; });
  agree("or", with(Op::logical_or, 0), [](double) { return 1; });
  agree(
      "negate",
      [](Board& b, ExpressionId v) { return b.apply(Op::negate, {b.apply(Op::negate, {b.apply(Op::negate, {v})})}); },
      [](double v) { return -v; });
  agree(
      "not",
      [](Board& b, ExpressionId v) {
        return b.apply(Op::logical_not, {b.apply(Op::greater, {v, b.number(1)})});
      },
      [](double v) { return v > 1 ? 0 : 1; });
  agree(
      "choose",
      [](Board& b, ExpressionId v) {
        return b.apply(Op::choose, {b.apply(Op::less, {v, b.number(0)}), b.number(-7), v});
      },
      [](double v) { return v < 0 ? -7 : v; });
}

TEST_CASE("functions of an expression mean in the simulator what they mean to us") {
  const auto of = [](Function function) {
    return [function](Board& b, ExpressionId v) { return b.call(function, {v}); };
  };
  const auto of_positive = [](Function function) {
    return [function](Board& b, ExpressionId v) { return b.call(function, {b.apply(Op::add, {v, b.number(4)})}); };
  };
  const auto of_small = [](Function function) {
    return [function](Board& b, ExpressionId v) { return b.call(function, {b.apply(Op::divide, {v, b.number(8)})}); };
  };
  agree("abs", of(Function::abs), [](double v) { return std::fabs(v); });
  agree("sgn", of(Function::sgn), [](double v) { return v > 0 ? 1 : -1; });
  agree("sqrt", of_positive(Function::sqrt), [](double v) { return std::sqrt(v + 4); });
  agree("exp", of(Function::exp), [](double v) { return std::exp(v); });
  agree("ln", of_positive(Function::ln), [](double v) { return std::log(v + 4); });
  agree("log10", of_positive(Function::log10), [](double v) { return std::log10(v + 4); });
  agree("sin", of(Function::sin), [](double v) { return std::sin(v); });
  agree("cos", of(Function::cos), [](double v) { return std::cos(v); });
  agree("tan", of_small(Function::tan), [](double v) { return std::tan(v / 8); });
  agree("asin", of_small(Function::asin), [](double v) { return std::asin(v / 8); });
  agree("acos", of_small(Function::acos), [](double v) { return std::acos(v / 8); });
  agree("atan", of(Function::atan), [](double v) { return std::atan(v); });
  agree("sinh", of(Function::sinh), [](double v) { return std::sinh(v); });
  agree("cosh", of(Function::cosh), [](double v) { return std::cosh(v); });
  agree("tanh", of(Function::tanh), [](double v) { return std::tanh(v); });
  agree("asinh", of(Function::asinh), [](double v) { return std::asinh(v); });
  agree("acosh", of_positive(Function::acosh), [](double v) { return std::acosh(v + 4); });
  agree("atanh", of_small(Function::atanh), [](double v) { return std::atanh(v / 8); });
  agree("floor", of(Function::floor), [](double v) { return std::floor(v); });
  agree("ceil", of(Function::ceil), [](double v) { return std::ceil(v); });
  agree("round", of(Function::round), [](double v) { return std::nearbyint(v); });
  agree("integer", of(Function::integer), [](double v) { return std::trunc(v); });
  agree("step", of(Function::step), [](double v) { return v > 0 ? 1 : 0; });
  agree("ramp", of(Function::ramp), [](double v) { return v > 0 ? v : 0; });
}

TEST_CASE("functions of several arguments mean in the simulator what they mean to us") {
  const auto with = [](Function function, std::vector<double> others) {
    return [function, others](Board& b, ExpressionId v) {
      std::vector<ExpressionId> arguments{v};
      for (const double other : others) arguments.push_back(b.number(other));
      return b.call(function, arguments);
    };
  };
  agree("atan2", with(Function::atan2, {-1.5}), [](double v) { return std::atan2(v, -1.5); });
  agree(
      "atan2, turned",
      [](Board& b, ExpressionId v) {
        return b.call(Function::atan2, {b.number(0.5), v});
      },
      [](double v) { return std::atan2(0.5, v); });
  agree("min", with(Function::min, {1, 0.5}), [](double v) { return std::fmin(v, 0.5); });
  agree("max", with(Function::max, {-1, 0.5}), [](double v) { return std::fmax(v, 0.5); });
  agree("pow", with(Function::pow, {3}), [](double v) { return std::pow(v, 3); });
  agree("power_of_magnitude", with(Function::power_of_magnitude, {1.7}),
        [](double v) { return std::pow(std::fabs(v), 1.7); });
  agree("signed_power", with(Function::signed_power, {1.7}),
        [](double v) { return std::copysign(std::pow(std::fabs(v), 1.7), v); });
  agree("limit", with(Function::limit, {2, -1}), [](double v) { return std::fmin(std::fmax(v, -1), 2); });
  agree("nominal", with(Function::nominal, {0.1}), [](double v) { return v; });
  agree("table", with(Function::table, {-1, 10, 0, 20, 2, 14}), [](double v) {
    if (v <= -1) return 10.0;
    if (v <= 0) return 20 + 10 * v;
    return v <= 2 ? 20 - 3 * v : 14.0;
  });
}

// The beta equation R = R25 exp(B (1/T - 1/298.15)) with R25 = 10k, B = 3435.
TEST_CASE("a sensor made of a source is the resistance of its equation at each temperature, to full precision") {
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 10e3);
  const auto kelvin = board.apply(Op::add, {board.variable(), board.number(273.15)});
  const auto inverse =
      board.apply(Op::subtract, {board.apply(Op::divide, {board.number(1), kelvin}), board.number(1 / 298.15)});
  const auto growth = board.call(Function::exp, {board.apply(Op::multiply, {board.number(3435), inverse})});
  const auto ohms = board.apply(Op::multiply, {board.number(10e3), growth});
  const model::BranchId sensor = board.source(2, 0, board.apply(Op::divide, {board.net(2), ohms}), true);
  std::vector<double> celsius;
  for (int i = 0; i <= 100; ++i) celsius.push_back(-40 + 1.65 * i);
  board.sweep(sensor, celsius, true);
  board.watch(2);
  const model::Solution solution = test::solve(board);
  CHECK(solution.rung == model::Rung::tight);
  CHECK(solution.alone_difference < 1e-12);
  for (std::size_t i = 0; i < celsius.size(); ++i) {
    const double expected_ohms = 10e3 * std::exp(3435 * (1 / (celsius[i] + 273.15) - 1 / 298.15));
    CHECK(solution.volts[i] == Approx(3.3 * expected_ohms / (10e3 + expected_ohms)).epsilon(1e-13));
  }
}

TEST_CASE("an expression of the swept parameter alone is a plain source with all its digits") {
  Board board;
  const auto expression =
      board.apply(Op::add, {board.number(0.5), board.apply(Op::multiply, {board.variable(), board.number(0.01)})});
  const model::BranchId sensor = board.source(1, 0, expression, false);
  board.resistor(1, 2, 1e3);
  board.resistor(2, 0, 1e3);
  board.sweep(sensor, {-40, 23.4567890123456}, true);
  board.watch(2);
  const model::Solution solution = test::solve(board);
  CHECK(solution.volts[0] == Approx(0.05).epsilon(1e-14));
  CHECK(solution.volts[1] == Approx((0.5 + 0.234567890123456) / 2).epsilon(1e-14));
}

TEST_CASE("an expression may ask for the current of a source in its network") {
  Board board;
  board.volts(1, 0, 3);
  board.resistor(1, 2, 1e3);
  const model::BranchId meter = board.volts(2, 0, 0);
  board.source(3, 0, board.apply(Op::multiply, {board.current(meter), board.number(2e3)}), false);
  board.resistor(3, 0, 1e3);
  board.nominal();
  board.watch(3);
  CHECK(test::solve(board).volts[0] == Approx(6).epsilon(1e-13));
}

TEST_CASE("a difference of nets is taken with its sign, ground on either side included") {
  Board board;
  board.volts(1, 0, 3);
  board.volts(2, 0, 1);
  board.source(3, 0, board.net(1, 2), false);
  board.source(4, 0, board.net(0, 2), false);
  board.source(5, 0, board.net(2, 2), false);
  for (unsigned node = 1; node <= 5; ++node) board.resistor(node, 0, 1e3);
  board.nominal();
  for (unsigned node = 3; node <= 5; ++node) board.watch(node);
  CHECK(test::solve(board).volts == std::vector<double>{2, -1, 0});
}
