#include "divide/graph.hpp"

#include <numeric>
#include <utility>

namespace divide {
namespace {

PinUse device_pin_use(model::DeviceType type, std::size_t pin) {
  constexpr std::size_t gate = 1;
  if (type == model::DeviceType::nmos || type == model::DeviceType::pmos)
    return pin == gate ? PinUse::senses : PinUse::conducts;
  if (type == model::DeviceType::voltage_switch) return pin >= 2 ? PinUse::senses : PinUse::conducts;
  return PinUse::conducts;
}

}  // namespace

Graph::Graph(const model::Circuit& circuit, const Board& board, const Nodes& nodes, const Rails& rails,
             const NameIndex& index)
    : circuit_(circuit), board_(board), nodes_(nodes), rails_(rails), index_(index) {
  index_edges();
}

void Graph::index_edges() {
  const auto edge_count = static_cast<Edge>(circuit_.elements.size() + board_.extras.size());
  const auto each = [&](const auto& visit) {
    for (Edge edge = 0; edge < edge_count; ++edge) {
      if (!is_extra(edge) && (board_.removed[edge] || rails_.spent[edge])) continue;
      const bool sensor = is_extra(edge) && extra(edge).sensor;
      if (sensor && pin(edge, 0) == pin(edge, 1)) continue;  // shorted: it moves nothing
      if (!sensor && pin_count(edge) >= 2 && is_short(part(edge))) {
        visit(shorts_, pin(edge, 0), edge);
        continue;
      }
      for (std::size_t i = 0; i < pin_count(edge); ++i) visit(touching_, pin(edge, i), edge);
    }
  };
  touching_.first.assign(nodes_.size() + 1, 0);
  shorts_.first.assign(nodes_.size() + 1, 0);
  each([](Lists& lists, Node node, Edge) { ++lists.first[node + 1]; });
  for (Lists* lists : {&touching_, &shorts_}) {
    std::partial_sum(lists->first.begin(), lists->first.end(), lists->first.begin());
    lists->edges.resize(lists->first.back());
  }
  auto next_touching = touching_.first;
  auto next_short = shorts_.first;
  each([&](Lists& lists, Node node, Edge edge) {
    lists.edges[(&lists == &touching_ ? next_touching : next_short)[node]++] = edge;
  });
}

std::span<const Edge> Graph::edges_at(Node node) const {
  return std::span(touching_.edges).subspan(touching_.first[node], touching_.first[node + 1] - touching_.first[node]);
}

std::span<const Edge> Graph::shorts_in(Node node) const {
  return std::span(shorts_.edges).subspan(shorts_.first[node], shorts_.first[node + 1] - shorts_.first[node]);
}

Node Graph::pin(Edge edge, std::size_t i) const {
  if (is_extra(edge)) return nodes_.of(i == 0 ? extra(edge).plus : extra(edge).minus);
  return nodes_.of(circuit_.pin(circuit_.elements[edge], i));
}

PinUse Graph::pin_use(Edge edge, std::size_t i) const {
  const model::Part& it = part(edge);
  if (std::holds_alternative<model::Capacitor>(it) || std::holds_alternative<model::Unmodelled>(it))
    return PinUse::nothing;
  if (const auto* device = std::get_if<model::Device>(&it))
    return device_pin_use(circuit_.models[device->model.index()].type, i);
  return i < 2 ? PinUse::conducts : PinUse::senses;
}

std::string Graph::name(Edge edge) const {
  if (is_extra(edge)) return extra(edge).name;
  return std::string(index_.text(model::ElementId{edge}));
}

std::optional<model::Role> Graph::role(Edge edge) const {
  if (element(edge).valid()) return board_.roles[element(edge).index()];
  // A stand-in for an instance: the declaration gave its role to all that the instance holds.
  const model::InstanceId instance = index_.instance(extra(edge).name);
  if (!instance.valid() || circuit_.instances[instance.index()].element_count == 0) return std::nullopt;
  return board_.roles[circuit_.instances[instance.index()].first_element];
}

std::uint32_t Graph::order(Edge edge) const {
  if (!is_extra(edge) || extra(edge).element.valid()) return element(edge).value;
  const model::InstanceId instance = index_.instance(extra(edge).name);
  return instance.valid() ? circuit_.instances[instance.index()].first_element : edge;
}

bool Graph::is_way(Edge edge) const {
  return std::holds_alternative<model::Resistor>(part(edge)) ||
         std::holds_alternative<model::VoltageSource>(part(edge));
}

bool Graph::feeds(Edge edge) const {
  return is_way(edge) || std::holds_alternative<model::CurrentSource>(part(edge));
}

}  // namespace divide
