#include "divide/divide.hpp"

#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"
#include "divide/bind.hpp"
#include "divide/graph.hpp"
#include "divide/inputs.hpp"
#include "divide/one_input.hpp"

namespace divide {
namespace {

bool is_wanted(const model::Input& input, const std::vector<std::string>& only) {
  return only.empty() || std::any_of(only.begin(), only.end(),
                                     [&](const std::string& glob) { return base::glob_match(glob, input.name); });
}

}  // namespace

model::Division divide(const Request& request, source::Diagnostics& diagnostics) {
  const std::size_t before = source::count(diagnostics, base::Level::error);
  const NameIndex index(request.circuit, request.names);
  const Board board = bind_parts(request.circuit, request.sheet, index, diagnostics);
  const Nodes nodes(request.circuit, board);
  const Rails rails = find_rails(request.circuit, request.sheet, board, nodes, index, diagnostics);
  const std::vector<model::Input> inputs = bind_inputs(request.sheet, nodes, rails, index, diagnostics);

  model::Division division;
  for (const model::NetId net : board.assumed_grounds)
    division.assumptions.push_back(
        {fmt::format("net {} is taken for ground by its name", base::printable_short(index.text(net)))});
  if (source::count(diagnostics, base::Level::error) != before) return division;
  const Graph graph(request.circuit, board, nodes, rails, index);
  const BrokenCards broken(request.netlist, request.sources, request.names);
  for (const model::Input& input : inputs)
    if (is_wanted(input, request.only))
      division.dividers.push_back(
          divide_input({graph, request.sheet, request.netlist, request.sources, broken, inputs}, input));
  return division;
}

}  // namespace divide
