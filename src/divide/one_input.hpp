// The divider of one input.
#pragma once

#include "divide/divide.hpp"
#include "divide/graph.hpp"
#include "divide/touch.hpp"
#include "model/divider.hpp"

namespace divide {

// What finding one input needs of its board.
struct InputRequest {
  const Graph& graph;
  const model::Sheet& sheet;
  const model::Netlist& netlist;
  const source::Sources& sources;
  const BrokenCards& broken;
  const std::vector<model::Input>& inputs;  // all of them: each loads the network that it is on
};

[[nodiscard]] model::Divider divide_input(const InputRequest& request, const model::Input& input);

}  // namespace divide
