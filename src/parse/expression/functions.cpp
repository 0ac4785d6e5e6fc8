#include "parse/expression/functions.hpp"

#include <algorithm>
#include <array>

#include "base/names.hpp"

namespace parse {
namespace {

using model::Function;

// log is the natural logarithm, as in ngspice (manual, chapter on parameters). The spread functions take a nominal
// value and a tolerance; with one argument, flat and gauss are a deviation around zero (see the tree builder).
constexpr std::array functions{
    FunctionName{"abs", Function::abs},
    FunctionName{"acos", Function::acos},
    FunctionName{"acosh", Function::acosh},
    FunctionName{"agauss", Function::nominal, 2, 3},
    FunctionName{"arccos", Function::acos},
    FunctionName{"arcsin", Function::asin},
    FunctionName{"arctan", Function::atan},
    FunctionName{"asin", Function::asin},
    FunctionName{"asinh", Function::asinh},
    FunctionName{"atan", Function::atan},
    FunctionName{"atan2", Function::atan2, 2, 2},
    FunctionName{"atanh", Function::atanh},
    FunctionName{"aunif", Function::nominal, 2, 2},
    FunctionName{"ceil", Function::ceil},
    FunctionName{"cos", Function::cos},
    FunctionName{"cosh", Function::cosh},
    FunctionName{"exp", Function::exp},
    FunctionName{"flat", Function::nominal, 1, 2},
    FunctionName{"floor", Function::floor},
    FunctionName{"gauss", Function::nominal, 1, 3},
    FunctionName{"int", Function::integer},
    FunctionName{"limit", Function::limit, 3, 3},
    FunctionName{"ln", Function::ln},
    FunctionName{"log", Function::ln},
    FunctionName{"log10", Function::log10},
    FunctionName{"max", Function::max, 1, any_number},
    FunctionName{"mc", Function::nominal, 2, 2},
    FunctionName{"min", Function::min, 1, any_number},
    FunctionName{"nint", Function::round},
    FunctionName{"pow", Function::pow, 2, 2},
    FunctionName{"pwl", Function::table, 3, any_number},
    FunctionName{"pwr", Function::power_of_magnitude, 2, 2},
    FunctionName{"pwrs", Function::signed_power, 2, 2},
    FunctionName{"round", Function::round},
    FunctionName{"sgn", Function::sgn},
    FunctionName{"sin", Function::sin},
    FunctionName{"sinh", Function::sinh},
    FunctionName{"sqrt", Function::sqrt},
    FunctionName{"stp", Function::step},
    FunctionName{"table", Function::table, 3, any_number},
    FunctionName{"tan", Function::tan},
    FunctionName{"tanh", Function::tanh},
    FunctionName{"u", Function::step},
    FunctionName{"unif", Function::nominal, 2, 2},
    FunctionName{"uramp", Function::ramp},
};

}  // namespace

const FunctionName* find_function(std::string_view name) {
  const auto* const found = std::find_if(functions.begin(), functions.end(), [name](const FunctionName& known) {
    return base::same_name(known.name, name);
  });
  return found == functions.end() ? nullptr : found;
}

}  // namespace parse
