// Converter inputs of the sheet, bound to nets, with every key and default filled in.
#pragma once

#include <vector>

#include "divide/bind.hpp"
#include "divide/rails.hpp"
#include "model/divider.hpp"

namespace divide {

// In the order of the converters' declarations, a glob's nets in the netlist's order. Errors: a net that is not there,
// an input of two converters, a count other than expect_inputs, an [input.NAME] that is no input, an end that is no
// net.
[[nodiscard]] std::vector<model::Input> bind_inputs(const model::Sheet& sheet, const Nodes& nodes, const Rails& rails,
                                                    const NameIndex& index, source::Diagnostics& diagnostics);

}  // namespace divide
