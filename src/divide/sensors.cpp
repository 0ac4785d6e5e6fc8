#include "divide/sensors.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <set>

#include "base/text.hpp"
#include "divide/walk.hpp"

namespace divide {
namespace {

bool depends(const Graph& graph, model::ExpressionId tree, std::uint32_t variable) {
  return depends_on(graph.circuit().expressions, tree, variable);
}

// The first rail of the surroundings whose voltage depends on a parameter.
const Rail* rail_moved_by(const Graph& graph, const Surroundings& around, std::uint32_t variable) {
  for (const Rail* rail : rails_of(graph, around))
    if (depends(graph, rail->volts.residual, variable)) return rail;
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

// The declared part's own elements among the surroundings.
std::vector<Edge> own_edges(const Graph& graph, const Surroundings& around, const BoundSensor& bound) {
  if (bound.instance.valid()) return edges_of(graph, around, bound.instance);
  if (!std::binary_search(around.edges.begin(), around.edges.end(), bound.element.value)) return {};
  return {bound.element.value};
}

// Nothing where the parameter moves neither the declared part here nor a rail: what else depends on it has no ends of
// its own.
std::optional<SensorEdge> parameter_edge(const Graph& graph, const Surroundings& around, std::size_t sensor) {
  const BoundSensor& bound = graph.board().sensors[sensor];
  SensorEdge edge{sensor, false, 0, 0, {}};
  const auto moves = [&](Edge own) { return depends(graph, expression_of(graph.part(own)), *bound.variable); };
  const std::vector<Edge> own = own_edges(graph, around, bound);
  const bool moves_own = std::any_of(own.begin(), own.end(), moves);
  if (moves_own && bound.instance.valid() && bound.plus.valid()) {
    edge.plus = graph.nodes().of(bound.plus);
    edge.minus = graph.nodes().of(bound.minus);
    edge.edges = own;
    return edge;
  }
  // The element itself, or of an instance with other than two ends its first resistance that depends on the parameter.
  for (const Edge candidate : own) {
    if (!graph.is_way(candidate) || !moves(candidate)) continue;
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

// The sensor as one edge; nothing where it has no two ends here.
std::optional<SensorEdge> sensor_edge(const Graph& graph, const Surroundings& around, std::size_t sensor) {
  const BoundSensor& bound = graph.board().sensors[sensor];
  if (bound.kind->moves == sensor::Moves::parameter) return parameter_edge(graph, around, sensor);
  SensorEdge edge{sensor, false, 0, 0, {}};
  const Changes changes = changes_by(graph, around, sensor);
  if (bound.kind->moves == sensor::Moves::rail) {
    edge.is_rail = true;
    edge.plus = edge.minus = changes.rails.front();
    return edge;
  }
  edge.plus = graph.nodes().of(bound.plus);
  edge.minus = graph.nodes().of(bound.minus);
  edge.edges = changes.edges;
  return edge;
}

// Sensors that share a parameter move the same things: those that are not here themselves are told by the ones that
// are.
void drop_told(const Graph& graph, std::vector<Mover>& movers) {
  const auto& sensors = graph.board().sensors;
  std::vector<std::uint32_t> walked;
  for (const Mover& mover : movers)
    if (mover.walk && sensors[mover.sensor].variable) walked.push_back(*sensors[mover.sensor].variable);
  std::erase_if(movers, [&](const Mover& mover) {
    const auto& variable = sensors[mover.sensor].variable;
    return !mover.walk && variable && std::find(walked.begin(), walked.end(), *variable) != walked.end();
  });
}

// The nodes by which a node was met, the start of the surroundings last.
std::vector<Node> trail_from(const Surroundings& around, Node node) {
  std::vector<Node> trail{node};
  for (auto at = around.met_through.find(node); at != around.met_through.end() && at->second.through != no_edge;
       at = around.met_through.find(trail.back()))
    trail.push_back(at->second.from);
  return trail;
}

// The shortest of the trails from what a sensor changes.
std::vector<Node> shortest_trail(const Graph& graph, const Surroundings& around, const Changes& changes) {
  std::vector<Node> nodes = changes.rails;
  for (const Edge edge : changes.edges)
    for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
      if (graph.rails().ideal_at(graph.pin(edge, i)) == nullptr) nodes.push_back(graph.pin(edge, i));
  std::vector<Node> best;
  for (const Node node : nodes) {
    std::vector<Node> trail = trail_from(around, node);
    if (best.empty() || trail.size() < best.size()) best = std::move(trail);
  }
  return best;
}

// The sensors that change anything, without asking each of the board's for it: most networks have one of thousands.
std::set<std::size_t> sensors_here(const Graph& graph, const Surroundings& around) {
  std::set<std::size_t> here;
  bool has_expressions = false;
  for (const Edge edge : around.edges) {
    if (graph.is_extra(edge) && graph.extra(edge).sensor) here.insert(*graph.extra(edge).sensor);
    has_expressions = has_expressions || expression_of(graph.part(edge)).valid();
  }
  for (const Rail* rail : rails_of(graph, around)) {
    if (rail->sensor) here.insert(*rail->sensor);
    has_expressions = has_expressions || rail->volts.residual.valid();
  }
  const auto& sensors = graph.board().sensors;
  for (std::size_t i = 0; has_expressions && i < sensors.size(); ++i)
    if (sensors[i].variable && !changes_by(graph, around, i).none()) here.insert(i);
  return here;
}

bool is_plain(const Graph& graph, Edge edge) {
  return graph.is_way(edge) && graph.role(edge) != model::Role::load;
}

}  // namespace

Changes changes_by(const Graph& graph, const Surroundings& around, std::size_t sensor) {
  const BoundSensor& bound = graph.board().sensors[sensor];
  Changes changes;
  for (const Edge edge : around.edges) {
    const bool own = graph.is_extra(edge) && graph.extra(edge).sensor == sensor;
    if (own || (bound.variable && depends(graph, expression_of(graph.part(edge)), *bound.variable)))
      changes.edges.push_back(edge);
  }
  for (const Rail* rail : rails_of(graph, around))
    if (rail->sensor == sensor || (bound.variable && depends(graph, rail->volts.residual, *bound.variable)))
      changes.rails.push_back(rail->node);
  return changes;
}

std::vector<Mover> movers_of(const Graph& graph, const Surroundings& around, Node pin) {
  std::vector<Mover> movers;
  for (const std::size_t i : sensors_here(graph, around)) {
    Mover mover{i, sensor_edge(graph, around, i), std::nullopt};
    if (mover.edge && !mover.edge->is_rail && mover.edge->plus == mover.edge->minus) mover.edge.reset();
    if (mover.edge) mover.walk = find_walk(graph, *mover.edge, pin);
    movers.push_back(std::move(mover));
  }
  drop_told(graph, movers);
  return movers;
}

std::string way_in(const Graph& graph, const Surroundings& around, Node pin, std::size_t sensor) {
  const Changes changes = changes_by(graph, around, sensor);
  const std::vector<Node> trail = shortest_trail(graph, around, changes);
  const auto rail_name = [&](Node node) { return base::printable_short(graph.rails().at(node)->name); };
  for (std::size_t i = trail.size(); i-- > 0;) {  // from the start on
    const Node node = trail[i];
    if (i + 1 == trail.size()) {
      if (node == pin) continue;
      const std::string net = graph.rails().at(node) != nullptr
                                  ? rail_name(node)
                                  : base::printable_short(graph.names().text(graph.nodes().nets(node).front()));
      return fmt::format(" through {}, an end of its range", net);
    }
    const Edge through = around.met_through.at(node).through;
    if (!is_plain(graph, through)) return fmt::format(" through {}", base::printable_short(graph.name(through)));
    if (graph.rails().at(node) != nullptr && changes.rails != std::vector{node})
      return fmt::format(" through rail {}", rail_name(node));
  }
  const auto here = [&](Edge edge) {
    for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
      if (!trail.empty() && graph.pin(edge, i) == trail.front()) return true;
    return false;
  };
  for (const Edge edge : changes.edges)
    if (here(edge) && (!is_plain(graph, edge) || graph.board().sensors[sensor].variable))
      return fmt::format(" through {}", base::printable_short(graph.name(edge)));
  return {};
}

}  // namespace divide
