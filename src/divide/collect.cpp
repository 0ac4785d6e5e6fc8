#include "divide/collect.hpp"

#include <algorithm>
#include <functional>
#include <unordered_map>
#include <unordered_set>

#include "divide/leaves.hpp"

namespace divide {
namespace {

bool is_idle(const Graph& graph, Edge edge) {
  for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
    if (graph.pin_use(edge, i) != PinUse::nothing) return false;
  return true;
}

bool conducts_at(const Graph& graph, Edge edge, Node node) {
  for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
    if (graph.pin(edge, i) == node && graph.pin_use(edge, i) == PinUse::conducts) return true;
  return false;
}

class Collector {
 public:
  explicit Collector(const Graph& graph) : graph_(graph) {}

  Surroundings run(std::span<const Node> starts) {
    // One start after the other: what the first one reaches was met from there.
    std::size_t at = 0;
    for (const Node start : starts) {
      meet(start, start, no_edge);
      for (; at < found_.nodes.size(); ++at) {
        const Node node = found_.nodes[at];
        for (const Edge edge : graph_.edges_at(node)) look_at(edge, node);
      }
    }
    for (auto* list : {&found_.edges, &found_.idle}) {
      std::sort(list->begin(), list->end());
      list->erase(std::unique(list->begin(), list->end()), list->end());
    }
    return std::move(found_);
  }

 private:
  void meet(Node node, Node from, Edge through) {
    if (!found_.met_through.emplace(node, Meeting{from, through}).second) return;
    (graph_.rails().ideal_at(node) != nullptr ? found_.rails : found_.nodes).push_back(node);
  }

  void look_at(Edge edge, Node node) {
    if (is_idle(graph_, edge)) found_.idle.push_back(edge);
    if (conducts_at(graph_, edge, node)) take(edge, node);
  }

  // A source whose current somebody measures. That of a rail feeds the whole board: no cut network can tell it.
  void take_measured(model::ElementId source, Edge by, Node node) {
    if (graph_.rails().spent[source.index()])
      found_.measured_rails.push_back({by, source});
    else if (seen_edges_.insert(source.value).second)
      take_ends(source.value, node, by);
  }

  void take(Edge edge, Node node) {
    if (!seen_edges_.insert(edge).second) return;
    take_ends(edge, node, edge);
    const model::Part& part = graph_.part(edge);
    if (const auto* controlled = std::get_if<model::CurrentControlled>(&part))
      take_measured(controlled->through, edge, node);
    if (const auto* behavioural = std::get_if<model::Behavioural>(&part))
      for_each_leaf(
          graph_.circuit().expressions, behavioural->expression,
          [&](model::NetId net) { meet(graph_.nodes().of(net), node, edge); },
          [&](model::ElementId source) { take_measured(source, edge, node); });
  }

  void take_ends(Edge edge, Node from, Edge through) {
    found_.edges.push_back(edge);
    for (std::size_t i = 0; i < graph_.pin_count(edge); ++i) meet(graph_.pin(edge, i), from, through);
  }

  const Graph& graph_;
  Surroundings found_;
  std::unordered_set<Edge> seen_edges_;
};

class Builder {
 public:
  Builder(const Graph& graph, bool ideal_rails) : graph_(graph), ideal_rails_(ideal_rails) {
    const Node ground = graph.nodes().of(model::ground);
    known_.emplace(ground, model::ground_node);
    built_.nodes.emplace_back(ground, model::ground_node);
  }

  Built run(std::span<const Edge> edges, std::span<const Node> nodes) {
    for (const Node node : nodes) number(node);
    for (const Edge edge : edges) add(edge);
    for (const auto& [edge, branch] : built_.edges) link(edge, branch);
    for (const auto& [node, id] : built_.nodes)
      for (const model::NetId net : graph_.nodes().nets(node)) built_.network.nets.emplace_back(net, id);
    std::sort(built_.network.nets.begin(), built_.network.nets.end());
    std::sort(built_.nodes.begin(), built_.nodes.end());
    return std::move(built_);
  }

 private:
  model::NodeId number(Node node) {
    const auto [known, fresh] = known_.emplace(node, model::NodeId{built_.network.node_count});
    if (!fresh) return known->second;
    const model::NodeId id{built_.network.node_count++};
    built_.nodes.emplace_back(node, id);
    if (const Rail* rail = graph_.rails().at(node)) add_rail(*rail, id);
    return id;
  }

  model::BranchId push(model::Branch branch) {
    const model::BranchId id{static_cast<std::uint32_t>(built_.network.branches.size())};
    built_.network.branches.push_back(std::move(branch));
    return id;
  }

  void add_rail(const Rail& rail, model::NodeId id) {
    model::NodeId top = id;
    if (rail.ohms != 0 && !ideal_rails_) {
      top = model::NodeId{built_.network.node_count++};
      push({model::Resistor{{rail.ohms, {}}}, {top, id}, 2, model::BranchOrigin::rail_resistance, {}, {}});
    }
    const auto source =
        push({model::VoltageSource{rail.volts}, {top, model::ground_node}, 2, model::BranchOrigin::rail, {}, {}});
    built_.rails.emplace_back(*graph_.rails().of[rail.node], source);
  }

  void add(Edge edge) {
    model::Branch branch;
    branch.part = graph_.part(edge);
    branch.node_count = static_cast<std::uint8_t>(std::min(graph_.pin_count(edge), branch.nodes.size()));
    for (std::size_t i = 0; i < branch.node_count; ++i) branch.nodes[i] = number(graph_.pin(edge, i));
    branch.origin = graph_.is_extra(edge) ? graph_.extra(edge).origin : model::BranchOrigin::element;
    branch.element = graph_.element(edge);
    if (std::holds_alternative<model::Device>(branch.part) || std::holds_alternative<model::Behavioural>(branch.part))
      built_.network.linear = false;
    if (const auto* behavioural = std::get_if<model::Behavioural>(&branch.part))
      for_each_leaf(
          graph_.circuit().expressions, behavioural->expression,
          [&](model::NetId net) { number(graph_.nodes().of(net)); }, [](model::ElementId) {});
    built_.edges.emplace_back(edge, push(std::move(branch)));
  }

  // A current-controlled source names the branch whose current it follows.
  void link(Edge edge, model::BranchId branch) {
    const auto* controlled = std::get_if<model::CurrentControlled>(&graph_.part(edge));
    if (controlled != nullptr)
      built_.network.branches[branch.index()].through = built_.branch(controlled->through.value);
  }

  const Graph& graph_;
  bool ideal_rails_;
  Built built_;
  std::unordered_map<Node, model::NodeId> known_;
};

}  // namespace

model::NodeId Built::node(Node node) const {
  const auto at = std::lower_bound(nodes.begin(), nodes.end(), node,
                                   [](const auto& entry, Node wanted) { return entry.first < wanted; });
  return at != nodes.end() && at->first == node ? at->second : model::NodeId{};
}

model::BranchId Built::branch(Edge edge) const {
  const auto at = std::find_if(edges.begin(), edges.end(), [edge](const auto& entry) { return entry.first == edge; });
  return at != edges.end() ? at->second : model::BranchId{};
}

std::vector<const Rail*> rails_of(const Graph& graph, const Surroundings& around) {
  std::vector<const Rail*> rails;
  for (const auto* nodes : {&around.rails, &around.nodes})
    for (const Node node : *nodes)
      if (const Rail* rail = graph.rails().at(node)) rails.push_back(rail);
  return rails;
}

std::vector<Edge> drawing_from(const Graph& graph, const Surroundings& around, Node node) {
  std::unordered_set<Node> seen{node};
  std::unordered_set<Edge> drawing;
  std::vector<Node> open{node};
  while (!open.empty()) {
    const Node at = open.back();
    open.pop_back();
    if (graph.rails().ideal_at(at) != nullptr) continue;
    for (const Edge edge : graph.edges_at(at)) {
      const bool conducts = conducts_at(graph, edge, at);
      if ((!conducts && !is_idle(graph, edge)) || !drawing.insert(edge).second || !conducts) continue;
      for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
        if (graph.pin_use(edge, i) == PinUse::conducts && seen.insert(graph.pin(edge, i)).second)
          open.push_back(graph.pin(edge, i));
    }
  }
  std::vector<Edge> found;
  for (const auto* list : {&around.edges, &around.idle})
    std::copy_if(list->begin(), list->end(), std::back_inserter(found),
                 [&](Edge edge) { return drawing.contains(edge); });
  return found;
}

Surroundings collect(const Graph& graph, std::span<const Node> starts) {
  return Collector(graph).run(starts);
}

Built build(const Graph& graph, std::span<const Edge> edges, std::span<const Node> nodes, bool ideal_rails) {
  return Builder(graph, ideal_rails).run(edges, nodes);
}

}  // namespace divide
