#include "divide/sensors.hpp"

#include <algorithm>

#include "base/overloaded.hpp"
#include "divide/walk.hpp"

namespace divide {
namespace {

bool rail_is_reached(const Graph& graph, Node pin, std::size_t sensor) {
  for (const Node node : resistive_reach(graph, pin))
    if (const Rail* rail = graph.rails().at(node); rail != nullptr && rail->sensor == sensor) return true;
  return false;
}

// The first ideal rail of the surroundings whose voltage depends on a parameter.
const Rail* rail_moved_by(const Graph& graph, const Surroundings& around, std::uint32_t variable) {
  for (const Node node : around.rails)
    if (const Rail* rail = graph.rails().at(node); depends_on(graph, rail->volts.residual, variable)) return rail;
  return nullptr;
}

// The elements of an instance among the surroundings.
std::vector<Edge> edges_of(const Graph& graph, const Surroundings& around, model::InstanceId instance) {
  const auto& whole = graph.circuit().instances[instance.index()];
  std::vector<Edge> found;
  std::copy_if(around.edges.begin(), around.edges.end(), std::back_inserter(found), [&](Edge edge) {
    return edge >= whole.first_element && edge < whole.first_element + whole.element_count;
  });
  return found;
}

// Whether a parameter moves anything here that belongs to the sensor: several sensors may share one .param.
bool parameter_is_here(const Graph& graph, const Surroundings& around, const BoundSensor& bound) {
  const auto moves = [&](Edge edge) { return depends_on(graph, expression_of(graph.part(edge)), *bound.variable); };
  if (rail_moved_by(graph, around, *bound.variable) != nullptr) return true;
  if (bound.instance.valid()) {
    const auto own = edges_of(graph, around, bound.instance);
    return std::any_of(own.begin(), own.end(), moves);
  }
  return std::binary_search(around.edges.begin(), around.edges.end(), bound.element.value) &&
         moves(bound.element.value);
}

std::optional<SensorEdge> parameter_edge(const Graph& graph, const Surroundings& around, std::size_t sensor) {
  const BoundSensor& bound = graph.board().sensors[sensor];
  SensorEdge edge{sensor, false, 0, 0, {}};
  if (bound.instance.valid() && bound.plus.valid()) {
    edge.plus = graph.nodes().of(bound.plus);
    edge.minus = graph.nodes().of(bound.minus);
    edge.edges = edges_of(graph, around, bound.instance);
    return edge;
  }
  // The element itself, or of an instance with other than two ends its first resistance that depends on the parameter.
  for (const Edge candidate :
       bound.instance.valid() ? edges_of(graph, around, bound.instance) : std::vector<Edge>{bound.element.value}) {
    if (!graph.is_way(candidate) || !depends_on(graph, expression_of(graph.part(candidate)), *bound.variable)) continue;
    edge.plus = graph.pin(candidate, 0);
    edge.minus = graph.pin(candidate, 1);
    edge.edges = {candidate};
    return edge;
  }
  if (const Rail* rail = rail_moved_by(graph, around, *bound.variable)) {
    edge.is_rail = true;
    edge.plus = edge.minus = rail->node;
    return edge;
  }
  return std::nullopt;
}

}  // namespace

model::ExpressionId expression_of(const model::Part& part) {
  return std::visit(base::overloaded{[](const model::Resistor& r) { return r.ohms.residual; },
                                     [](const model::VoltageSource& v) { return v.volts.residual; },
                                     [](const model::CurrentSource& i) { return i.amperes.residual; },
                                     [](const model::VoltageControlled& e) { return e.gain.residual; },
                                     [](const model::CurrentControlled& f) { return f.gain.residual; },
                                     [](const model::Behavioural& b) { return b.expression; },
                                     [](const auto&) { return model::ExpressionId{}; }},
                    part);
}

bool depends_on(const Graph& graph, model::ExpressionId tree, std::uint32_t variable) {
  if (!tree.valid()) return false;
  const auto& pool = graph.circuit().expressions;
  std::vector<model::ExpressionId> open{tree};
  while (!open.empty()) {
    const auto& node = pool[open.back()];
    open.pop_back();
    if (node.op == model::Op::variable && node.index == variable) return true;
    for (std::size_t i = 0; i < node.argument_count; ++i) open.push_back(pool.argument(node, i));
  }
  return false;
}

std::vector<std::size_t> sensors_in(const Graph& graph, const Surroundings& around, Node pin) {
  const auto& sensors = graph.board().sensors;
  std::vector<std::size_t> found;
  for (std::size_t i = 0; i < sensors.size(); ++i) {
    bool here = false;
    if (sensors[i].kind->moves == sensor::Moves::rail)
      here = rail_is_reached(graph, pin, i);
    else if (sensors[i].variable)
      here = parameter_is_here(graph, around, sensors[i]);
    else
      here = std::any_of(around.edges.begin(), around.edges.end(),
                         [&](Edge edge) { return graph.is_extra(edge) && graph.extra(edge).sensor == i; });
    if (here) found.push_back(i);
  }
  return found;
}

std::optional<SensorEdge> sensor_edge(const Graph& graph, const Surroundings& around, std::size_t sensor) {
  const BoundSensor& bound = graph.board().sensors[sensor];
  if (bound.kind->moves == sensor::Moves::parameter) return parameter_edge(graph, around, sensor);
  SensorEdge edge{sensor, false, 0, 0, {}};
  if (bound.kind->moves == sensor::Moves::rail) {
    edge.is_rail = true;
    for (const Rail& rail : graph.rails().rails)
      if (rail.sensor == sensor) edge.plus = edge.minus = rail.node;
    return edge;
  }
  edge.plus = graph.nodes().of(bound.plus);
  edge.minus = graph.nodes().of(bound.minus);
  for (const Edge candidate : around.edges)
    if (graph.is_extra(candidate) && graph.extra(candidate).sensor == sensor) edge.edges = {candidate};
  return edge;
}

}  // namespace divide
