// Expressions of behavioural sources as ngspice reads them, with our own names and fully in parentheses.
#pragma once

#include <functional>
#include <optional>
#include <string>

#include "base/result.hpp"
#include "model/circuit.hpp"

namespace simulate {

// What the leaves are called in a deck. Both append to the text and give false where there is no such thing in the
// network.
struct LeafNames {
  std::function<bool(std::string& out, model::NetId plus, model::NetId minus)> net_volts;  // "v(n1,n2)"
  std::function<bool(std::string& out, model::ElementId source)> amperes;                  // "i(v1)"
};

// The number of a tree that asks for no voltage and no current, with `variable` for every swept parameter (NaN: none is
// swept); nothing for a tree that does ask. Error: the number does not exist.
[[nodiscard]] base::Result<std::optional<double>> constant_value(const model::ExpressionPool& pool,
                                                                 model::ExpressionId tree, double variable);

// Appends a flat tree. Parts of it that are constant at this point are evaluated here, in full precision. Error: an
// operation that the simulator does not know, a leaf outside the network, a constant part without a value, or a text
// that grows too long.
[[nodiscard]] base::Result<base::Done> append_expression(std::string& out, const model::ExpressionPool& pool,
                                                         model::ExpressionId tree, double variable,
                                                         const LeafNames& leaves);

}  // namespace simulate
