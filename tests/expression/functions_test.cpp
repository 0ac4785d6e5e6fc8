#include <catch2/catch.hpp>

#include "expression/evaluate.hpp"
#include "tests/expression/trees.hpp"

using expression::Trouble;
using trees::Function;
using trees::Op;

namespace {

double value(Function function, std::initializer_list<double> arguments) {
  base::NameTable names;
  trees::Builder build{names, {}};
  const model::ExpressionId tree = build.call(function, arguments);
  return std::get<double>(expression::evaluate(build.pool, tree, {}));
}

Trouble trouble(Function function, std::initializer_list<double> arguments) {
  base::NameTable names;
  trees::Builder build{names, {}};
  const model::ExpressionId tree = build.call(function, arguments);
  return std::get<Trouble>(expression::evaluate(build.pool, tree, {}));
}

double value(Op op, std::initializer_list<double> operands) {
  base::NameTable names;
  trees::Builder build{names, {}};
  std::vector<model::ExpressionId> ids;
  for (const double operand : operands) ids.push_back(build.number(operand));
  return std::get<double>(expression::evaluate(build.pool, build.op(op, ids), {}));
}

}  // namespace

// Values computed from the functions' definitions with 15 digits (tables of elementary functions).
TEST_CASE("each function of one argument has its textbook value") {
  CHECK(value(Function::abs, {-3.5}) == 3.5);
  CHECK(value(Function::sgn, {-2}) == -1);
  CHECK(value(Function::sgn, {0}) == 0);
  CHECK(value(Function::sqrt, {2}) == Approx(1.41421356237310).epsilon(1e-14));
  CHECK(value(Function::exp, {1}) == Approx(2.71828182845905).epsilon(1e-14));
  CHECK(value(Function::ln, {10}) == Approx(2.30258509299405).epsilon(1e-14));
  CHECK(value(Function::log10, {1000}) == Approx(3).epsilon(1e-14));
  CHECK(value(Function::sin, {1}) == Approx(0.841470984807897).epsilon(1e-14));
  CHECK(value(Function::cos, {1}) == Approx(0.540302305868140).epsilon(1e-14));
  CHECK(value(Function::tan, {1}) == Approx(1.55740772465490).epsilon(1e-14));
  CHECK(value(Function::asin, {1}) == Approx(1.57079632679490).epsilon(1e-14));
  CHECK(value(Function::acos, {0}) == Approx(1.57079632679490).epsilon(1e-14));
  CHECK(value(Function::atan, {1}) == Approx(0.785398163397448).epsilon(1e-14));
  CHECK(value(Function::sinh, {1}) == Approx(1.17520119364380).epsilon(1e-14));
  CHECK(value(Function::cosh, {1}) == Approx(1.54308063481524).epsilon(1e-14));
  CHECK(value(Function::tanh, {1}) == Approx(0.761594155955765).epsilon(1e-14));
  CHECK(value(Function::asinh, {1}) == Approx(0.881373587019543).epsilon(1e-14));
  CHECK(value(Function::acosh, {2}) == Approx(1.31695789692482).epsilon(1e-14));
  CHECK(value(Function::atanh, {0.5}) == Approx(0.549306144334055).epsilon(1e-14));
}

TEST_CASE("functions that round go the way their names say") {
  CHECK(value(Function::floor, {-1.5}) == -2);
  CHECK(value(Function::ceil, {-1.5}) == -1);
  CHECK(value(Function::integer, {-1.5}) == -1);
  CHECK(value(Function::round, {1.6}) == 2);
  CHECK(value(Function::round, {2.5}) == 2);  // ngspice 39, measured: nint(2.5) is 2
}

TEST_CASE("powers of negative numbers differ by function as netlists define them") {
  CHECK(value(Function::pow, {-2, 3}) == -8);
  CHECK(value(Function::power_of_magnitude, {-2, 3}) == 8);
  CHECK(value(Function::signed_power, {-2, 2}) == -4);
}

TEST_CASE("functions of several arguments have their definitions' values") {
  CHECK(value(Function::atan2, {1, -1}) == Approx(2.35619449019234).epsilon(1e-14));
  CHECK(value(Function::min, {3, 1, 2}) == 1);
  CHECK(value(Function::max, {3, 1, 2}) == 3);
  CHECK(value(Function::limit, {5, 0, 3}) == 3);
  CHECK(value(Function::limit, {-5, 0, 3}) == 0);
  CHECK(value(Function::limit, {2, 3, 0}) == 2);
  CHECK(value(Function::nominal, {4700, 0.01}) == 4700);
}

TEST_CASE("the unit step is half at zero and the ramp begins there") {
  CHECK(value(Function::step, {-1}) == 0);
  CHECK(value(Function::step, {0}) == 0.5);  // ngspice 39, measured
  CHECK(value(Function::step, {1}) == 1);
  CHECK(value(Function::ramp, {-1}) == 0);
  CHECK(value(Function::ramp, {2.5}) == 2.5);
}

TEST_CASE("a table is linear between its points and level outside") {
  CHECK(value(Function::table, {-1, 0, 10, 2, 20}) == 10);
  CHECK(value(Function::table, {0.5, 0, 10, 2, 20}) == 12.5);
  CHECK(value(Function::table, {2, 0, 10, 2, 20, 4, 0}) == 20);
  CHECK(value(Function::table, {3, 0, 10, 2, 20, 4, 0}) == 10);
  CHECK(value(Function::table, {9, 0, 10, 2, 20, 4, 0}) == 0);
  CHECK(value(Function::table, {9, 1, 7}) == 7);
}

TEST_CASE("each operator has its arithmetic value") {
  CHECK(value(Op::negate, {2}) == -2);
  CHECK(value(Op::logical_not, {2}) == 0);
  CHECK(value(Op::logical_not, {0}) == 1);
  CHECK(value(Op::add, {2, 3}) == 5);
  CHECK(value(Op::subtract, {2, 3}) == -1);
  CHECK(value(Op::multiply, {2, 3}) == 6);
  CHECK(value(Op::divide, {3, 2}) == 1.5);
  CHECK(value(Op::power, {2, 10}) == 1024);
  CHECK(value(Op::remainder, {5, 3}) == 2);
  CHECK(value(Op::less, {2, 3}) == 1);
  CHECK(value(Op::less_equal, {3, 3}) == 1);
  CHECK(value(Op::greater, {2, 3}) == 0);
  CHECK(value(Op::greater_equal, {2, 3}) == 0);
  CHECK(value(Op::equal, {3, 3}) == 1);
  CHECK(value(Op::not_equal, {3, 3}) == 0);
  CHECK(value(Op::logical_and, {1, 2}) == 1);
  CHECK(value(Op::logical_or, {0, 0}) == 0);
  CHECK(value(Op::choose, {1, 7, 8}) == 7);
}

TEST_CASE("a function outside its domain says which call has no value") {
  CHECK(trouble(Function::ln, {-1}).message == "ln(-1) has no finite value");
  CHECK(trouble(Function::ln, {0}).message == "ln(0) has no finite value");
  CHECK(trouble(Function::sqrt, {-4}).message == "sqrt(-4) has no finite value");
  CHECK(trouble(Function::exp, {1000}).message == "exp(1000) has no finite value");
  CHECK(trouble(Function::pow, {-8, 0.5}).message == "pow(-8, 0.5) has no finite value");
  CHECK(trouble(Function::table, {1, 0, 1, 0, 2}).message == "the points of table do not rise");
}

TEST_CASE("a wrong number of arguments is said with the number that was expected") {
  CHECK(trouble(Function::ln, {1, 2}).message == "ln takes 1 argument, not 2");
  CHECK(trouble(Function::limit, {1, 2}).message == "limit takes 3 arguments, not 2");
  CHECK(trouble(Function::min, {}).message == "min takes at least 1 argument, not 0");
  CHECK(trouble(Function::table, {1, 2}).message == "table takes a number and pairs of numbers, not 2 arguments");
  CHECK(trouble(Function::table, {1, 2, 3, 4}).message == "table takes a number and pairs of numbers, not 4 arguments");
}
