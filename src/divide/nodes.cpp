#include "divide/nodes.hpp"

#include <numeric>

#include "base/disjoint_sets.hpp"

namespace divide {

bool is_short(const model::Part& part) {
  if (std::holds_alternative<model::Inductor>(part)) return true;
  const auto* resistor = std::get_if<model::Resistor>(&part);
  return resistor != nullptr && resistor->ohms.fixed() && resistor->ohms.value == 0;
}

Nodes::Nodes(const model::Circuit& circuit, const Board& board) : node_of_net_(circuit.nets.size()) {
  base::DisjointSets joined(circuit.nets.size());
  for (std::size_t i = 0; i < circuit.elements.size(); ++i) {
    const auto& element = circuit.elements[i];
    if (!board.removed[i] && element.pin_count >= 2 && is_short(element.part))
      joined.join(circuit.pin(element, 0).value, circuit.pin(element, 1).value);
  }
  for (const Extra& extra : board.extras)
    if (!extra.sensor && is_short(extra.part)) joined.join(extra.plus.value, extra.minus.value);
  for (const model::NetId net : board.assumed_grounds) joined.join(net.value, model::ground.value);

  std::vector<Node> node_of_root(circuit.nets.size());
  Node count = 0;
  for (std::uint32_t net = 0; net < circuit.nets.size(); ++net) {
    const std::uint32_t root = joined.find(net);
    if (root == net) node_of_root[net] = count++;
    node_of_net_[net] = node_of_root[root];
  }
  first_net_.assign(count + 1, 0);
  for (const Node node : node_of_net_) ++first_net_[node + 1];
  std::partial_sum(first_net_.begin(), first_net_.end(), first_net_.begin());
  nets_.resize(circuit.nets.size());
  auto next = first_net_;
  for (std::uint32_t net = 0; net < circuit.nets.size(); ++net) nets_[next[node_of_net_[net]]++] = model::NetId{net};
}

std::span<const model::NetId> Nodes::nets(Node node) const {
  return std::span(nets_).subspan(first_net_[node], first_net_[node + 1] - first_net_[node]);
}

}  // namespace divide
