// Values of expression trees: folding a tree of a netlist into a number or a residual, and evaluating a flat tree.
#pragma once

#include <cstddef>
#include <cstdint>
#include <functional>
#include <string>
#include <variant>

#include "model/circuit.hpp"
#include "model/expression.hpp"

namespace expression {

// Why a tree has no value, and which byte of the card's source to point at.
struct Trouble {
  std::string message;  // one sentence without a full stop
  std::uint32_t offset = 0;
};

template <class T>
using Outcome = std::variant<T, Trouble>;

// How the literals of a tree are taken.
enum class Literals : std::uint8_t {
  builder,  // as the builder of the board reads them
  milli,    // likewise, but a bare M is SPICE's milli
  spice,    // as SPICE reads them
};

// Whether a number node is a literal with a bare M: its builder's reading is exactly mega where SPICE's is milli.
[[nodiscard]] bool is_bare_mega(const model::ExpressionNode& node);

// What the leaves of a netlist's tree mean where it stands. A lookup that fails gives the sentence that says so.
struct Meaning {
  std::function<std::variant<model::Number, std::string>(base::NameId)> parameter;
  std::function<std::variant<model::NetId, std::string>(base::NameId)> net;
  std::function<std::variant<model::ElementId, std::string>(base::NameId)> source;
  std::function<std::string(base::NameId)> unknown_function;  // what to say of a function that is not known
  double temperature = 27;                                    // degC
  Literals literals = Literals::builder;
};

// However much the caller allows: deeper trees, and residuals that unfold to more nodes, are trouble.
inline constexpr std::size_t deepest_tree = 1000;
inline constexpr std::size_t largest_tree = 100'000;

// Folds `tree` of pool `from`: a number where every leaf is one, else a residual tree written into `into`, whose leaves
// are numbers, variables, net voltages and source currents of the flat circuit. What a ? b : c, && and || do not need
// is not folded. Trouble: an unknown name; a wrong number of arguments; a number outside its function's domain (ln of
// -1), division by zero, or any result that is not finite; nesting beyond `depth`, the residuals of parameters
// included.
[[nodiscard]] Outcome<model::Number> reduce(const model::ExpressionPool& from, model::ExpressionId tree,
                                            const Meaning& meaning, model::ExpressionPool& into,
                                            std::size_t depth = 200);

// Adds a node to a pool of flat trees: a number, or an operator of operands that are numbers or residuals of that pool.
// In flat trees the `index` and `index2` of operators and calls hold how deep they are and how many nodes they unfold
// to.
model::ExpressionId add_number(model::ExpressionPool& pool, double value, std::uint32_t offset = 0);
model::ExpressionId add_binary(model::ExpressionPool& pool, model::Op op, const model::Number& left,
                               const model::Number& right);

// What the leaves of a flat tree are worth. A missing function means that such leaves are trouble.
struct Leaves {
  std::function<double(std::uint32_t variable)> variable;
  std::function<double(model::NetId plus, model::NetId minus)> net_volts;
  std::function<double(model::ElementId source)> amperes;
};

// The number of a flat tree. Trouble as in reduce().
[[nodiscard]] Outcome<double> evaluate(const model::ExpressionPool& pool, model::ExpressionId tree,
                                       const Leaves& leaves);

// Whether a flat tree asks for a net voltage or a current: then it is behavioural, not a value that a sweep can list.
[[nodiscard]] bool is_behavioural(const model::ExpressionPool& pool, model::ExpressionId tree);

}  // namespace expression
