#include "divide/no_divider.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <map>
#include <optional>
#include <unordered_set>

#include "base/overloaded.hpp"
#include "base/text.hpp"

namespace divide {
namespace {

bool is_zero(const model::Number& number) {
  return number.fixed() && number.value == 0;
}

bool drives(const model::Part& part) {
  return std::visit(base::overloaded{[](const model::VoltageSource& v) { return !is_zero(v.volts); },
                                     [](const model::CurrentSource& i) { return !is_zero(i.amperes); },
                                     [](const model::VoltageControlled&) { return true; },
                                     [](const model::CurrentControlled&) { return true; },
                                     [](const model::Behavioural&) { return true; }, [](const auto&) { return false; }},
                    part);
}

std::string net_text(const Graph& graph, Node node) {
  return base::printable_short(graph.names().text(graph.nodes().nets(node).front()));
}

// Calls visit(node) for each end by which a part conducts.
template <class Visit>
void for_each_end(const Graph& graph, std::span<const Edge> edges, const Visit& visit) {
  for (const Edge edge : edges)
    for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
      if (graph.pin_use(edge, i) == PinUse::conducts) visit(graph.pin(edge, i));
}

// Where a region leads on through a part that is no way for a walk.
struct Beyond {
  std::string net;
  std::string part;
};

std::optional<Beyond> beyond(const Graph& graph, const Surroundings& around, const Region& region,
                             const std::vector<Node>& also, const std::vector<Node>& walk, bool sources_alone = false) {
  std::unordered_set<Node> nodes(also.begin(), also.end());
  for (const Edge edge : region.edges)
    for (std::size_t i = 0; i < 2; ++i) nodes.insert(graph.pin(edge, i));
  for (const Node node : walk) nodes.erase(node);
  for (const Edge edge : around.edges) {
    if (graph.feeds(edge) || (sources_alone && !is_followed(graph, {&edge, 1}))) continue;
    for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
      if (const Node node = graph.pin(edge, i);
          graph.pin_use(edge, i) == PinUse::conducts && nodes.contains(node) && graph.rails().at(node) == nullptr)
        return Beyond{net_text(graph, node), base::printable_short(graph.name(edge))};
  }
  return std::nullopt;
}

constexpr std::string_view what_arms_are = "this version takes resistances, rails and current sources for arms";

}  // namespace

bool is_driven(const Graph& graph, std::span<const Edge> edges) {
  bool driven = std::any_of(edges.begin(), edges.end(), [&](const Edge edge) { return drives(graph.part(edge)); });
  for_each_end(graph, edges, [&](Node node) {
    const Rail* rail = graph.rails().at(node);
    driven = driven || (rail != nullptr && (!rail->has_volts || rail->sensor || !is_zero(rail->volts)));
  });
  return driven;
}

bool is_followed(const Graph& graph, std::span<const Edge> edges) {
  return std::any_of(edges.begin(), edges.end(), [&](const Edge edge) {
    const model::Part& part = graph.part(edge);
    return std::holds_alternative<model::VoltageControlled>(part) ||
           std::holds_alternative<model::CurrentControlled>(part) || std::holds_alternative<model::Behavioural>(part);
  });
}

std::string missing_rail(const Graph& graph, std::span<const Edge> edges, Node pin) {
  std::map<Node, std::size_t> ends;
  for_each_end(graph, edges, [&](Node node) {
    if (node != pin && graph.rails().at(node) == nullptr) ++ends[node];
  });
  Node best = pin;
  std::size_t most = 2;
  for (const auto& [node, count] : ends) {
    if (count == 1) {
      best = node;
      break;
    }
    if (count > most) best = node, most = count;
  }
  if (best == pin) return {};
  const std::string net = net_text(graph, best);
  return fmt::format("; net {} is no rail: if it is meant to be one, declare [rail.\"{}\"] volts", net, net);
}

std::string dead_end(const Graph& graph, const Surroundings& around, const SensorEdge& sensor, const Walk& walk) {
  if (sensor.is_rail || !walk.far_end) return {};
  const Region& behind = walk.behind_sensor;
  const bool returns =
      std::any_of(behind.returns.begin(), behind.returns.end(), [&](Node node) { return node != walk.nodes.front(); });
  if (behind.reaches_rail() || returns) return {};
  const std::string name = base::printable_short(graph.board().sensors[sensor.sensor].name);
  if (const auto on = beyond(graph, around, behind, {*walk.far_end}, walk.nodes))
    return fmt::format("the far end of sensor {} leads to net {} and on through {} only; {}", name, on->net, on->part,
                       what_arms_are);
  const std::string net = net_text(graph, *walk.far_end);
  return fmt::format(
      "net {}, the far end of sensor {}, leads to no rail, so nothing flows through the sensor: if it is "
      "meant to be a rail, declare [rail.\"{}\"] volts",
      net, name, net);
}

std::string blocked_arm(const Graph& graph, const Surroundings& around, const Walk& walk) {
  for (const bool dead_end_alone : {true, false})
    for (const auto& at_node : walk.off)
      for (const OffWalk& off : at_node) {
        const bool leads_on =
            off.whole.reaches_rail() || off.whole.reaches_sensor_far_end || !off.whole.returns.empty();
        if (dead_end_alone && leads_on) continue;
        if (const auto on = beyond(graph, around, off.whole, {}, walk.nodes, !dead_end_alone))
          return fmt::format("{} leads to net {} and on through {}{}; {}", base::printable_short(graph.name(off.edge)),
                             on->net, on->part, leads_on ? "" : " only", what_arms_are);
      }
  return {};
}

}  // namespace divide
