#include "expression/functions.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <fmt/format.h>
#include <limits>

namespace expression {
namespace {

using model::Function;
using Arguments = std::span<const double>;

constexpr std::size_t any_number = std::numeric_limits<std::size_t>::max();

struct Row {
  Function function;
  std::string_view name;
  std::size_t least;
  std::size_t most;
  double (*value)(Arguments);
};

double sign(double x) {
  return x > 0 ? 1.0 : x < 0 ? -1.0 : 0.0;
}

// Half at zero, as ngspice 39 has it (measured); so that a folded source and a simulated one agree.
double step(double x) {
  return x > 0 ? 1.0 : x < 0 ? 0.0 : 0.5;
}

// The middle one of three is x kept between the other two, whichever of them is the larger.
double limit(Arguments a) {
  return std::max(std::min(a[0], std::max(a[1], a[2])), std::min(a[1], a[2]));
}

// a[0] between the points (a[1], a[2]), (a[3], a[4]), ... Points that do not rise have no value.
double table(Arguments a) {
  for (std::size_t i = 3; i < a.size(); i += 2) {
    if (!(a[i] > a[i - 2])) return std::numeric_limits<double>::quiet_NaN();
  }
  if (a[0] <= a[1]) return a[2];
  for (std::size_t i = 3; i < a.size(); i += 2) {
    if (a[0] <= a[i]) return a[i - 1] + (a[i + 1] - a[i - 1]) * ((a[0] - a[i - 2]) / (a[i] - a[i - 2]));
  }
  return a.back();
}

constexpr std::array rows{
    Row{Function::abs, "abs", 1, 1, [](Arguments a) { return std::fabs(a[0]); }},
    Row{Function::sgn, "sgn", 1, 1, [](Arguments a) { return sign(a[0]); }},
    Row{Function::sqrt, "sqrt", 1, 1, [](Arguments a) { return std::sqrt(a[0]); }},
    Row{Function::exp, "exp", 1, 1, [](Arguments a) { return std::exp(a[0]); }},
    Row{Function::ln, "ln", 1, 1, [](Arguments a) { return std::log(a[0]); }},
    Row{Function::log10, "log10", 1, 1, [](Arguments a) { return std::log10(a[0]); }},
    Row{Function::sin, "sin", 1, 1, [](Arguments a) { return std::sin(a[0]); }},
    Row{Function::cos, "cos", 1, 1, [](Arguments a) { return std::cos(a[0]); }},
    Row{Function::tan, "tan", 1, 1, [](Arguments a) { return std::tan(a[0]); }},
    Row{Function::asin, "asin", 1, 1, [](Arguments a) { return std::asin(a[0]); }},
    Row{Function::acos, "acos", 1, 1, [](Arguments a) { return std::acos(a[0]); }},
    Row{Function::atan, "atan", 1, 1, [](Arguments a) { return std::atan(a[0]); }},
    Row{Function::atan2, "atan2", 2, 2, [](Arguments a) { return std::atan2(a[0], a[1]); }},
    Row{Function::sinh, "sinh", 1, 1, [](Arguments a) { return std::sinh(a[0]); }},
    Row{Function::cosh, "cosh", 1, 1, [](Arguments a) { return std::cosh(a[0]); }},
    Row{Function::tanh, "tanh", 1, 1, [](Arguments a) { return std::tanh(a[0]); }},
    Row{Function::asinh, "asinh", 1, 1, [](Arguments a) { return std::asinh(a[0]); }},
    Row{Function::acosh, "acosh", 1, 1, [](Arguments a) { return std::acosh(a[0]); }},
    Row{Function::atanh, "atanh", 1, 1, [](Arguments a) { return std::atanh(a[0]); }},
    Row{Function::floor, "floor", 1, 1, [](Arguments a) { return std::floor(a[0]); }},
    Row{Function::ceil, "ceil", 1, 1, [](Arguments a) { return std::ceil(a[0]); }},
    // Halves to the even neighbour, as ngspice 39 has it (measured).
    Row{Function::round, "round", 1, 1, [](Arguments a) { return std::nearbyint(a[0]); }},
    Row{Function::integer, "int", 1, 1, [](Arguments a) { return std::trunc(a[0]); }},
    Row{Function::min, "min", 1, any_number, [](Arguments a) { return *std::min_element(a.begin(), a.end()); }},
    Row{Function::max, "max", 1, any_number, [](Arguments a) { return *std::max_element(a.begin(), a.end()); }},
    Row{Function::pow, "pow", 2, 2, [](Arguments a) { return std::pow(a[0], a[1]); }},
    Row{Function::power_of_magnitude, "pwr", 2, 2, [](Arguments a) { return std::pow(std::fabs(a[0]), a[1]); }},
    Row{Function::signed_power, "pwrs", 2, 2, [](Arguments a) { return sign(a[0]) * std::pow(std::fabs(a[0]), a[1]); }},
    Row{Function::limit, "limit", 3, 3, limit},
    Row{Function::step, "u", 1, 1, [](Arguments a) { return step(a[0]); }},
    Row{Function::ramp, "uramp", 1, 1, [](Arguments a) { return std::max(a[0], 0.0); }},
    Row{Function::table, "table", 3, any_number, table},
    Row{Function::nominal, "nominal", 1, any_number, [](Arguments a) { return a[0]; }},
};

constexpr bool in_order() {
  for (std::size_t i = 0; i < rows.size(); ++i) {
    if (static_cast<std::size_t>(rows[i].function) != i) return false;
  }
  return rows.size() == static_cast<std::size_t>(Function::nominal) + 1;
}
static_assert(in_order(), "a row's place is its function's number");

const Row& row_of(Function function) {
  return rows[static_cast<std::size_t>(function)];
}

}  // namespace

std::string_view function_name(Function function) {
  return row_of(function).name;
}

std::string wrong_count(Function function, std::size_t count) {
  const Row& row = row_of(function);
  if (function == Function::table) {
    if (count >= 3 && count % 2 == 1) return {};
    return fmt::format("table takes a number and pairs of numbers, not {} arguments", count);
  }
  if (count >= row.least && count <= row.most) return {};
  const std::string_view noun = row.least == 1 ? "argument" : "arguments";
  if (row.most == any_number) return fmt::format("{} takes at least {} {}, not {}", row.name, row.least, noun, count);
  return fmt::format("{} takes {} {}, not {}", row.name, row.least, noun, count);
}

double call(Function function, std::span<const double> arguments) {
  return row_of(function).value(arguments);
}

}  // namespace expression
