#include "divide/walk.hpp"

#include <algorithm>
#include <deque>
#include <unordered_map>
#include <unordered_set>

namespace divide {
namespace {

class Walker {
 public:
  Walker(const Graph& graph, const SensorEdge& sensor, Node pin)
      : graph_(graph), sensor_(sensor), pin_(pin), own_(sensor.edges.begin(), sensor.edges.end()) {}

  std::optional<Walk> run() {
    spread();
    const auto start = choose_start();
    if (!start) return std::nullopt;
    for (Node at = *start;; at = from_.at(at).first) {
      walk_.nodes.push_back(at);
      on_walk_.insert(at);
      if (at == pin_) break;
      walk_.steps.push_back(edges_between(at, from_.at(at).first));
    }
    for (const auto& step : walk_.steps) walk_edges_.insert(step.begin(), step.end());
    note_far_end(*start);
    for (const Node node : walk_.nodes) walk_.off.push_back(off_walk(node));
    return std::move(walk_);
  }

 private:
  // A rail behind a resistance bounds arms as an ideal one does: what else hangs on it is no part of them.
  [[nodiscard]] bool is_rail(Node node) const { return graph_.rails().at(node) != nullptr; }
  [[nodiscard]] bool is_load(Edge edge) const { return graph_.role(edge) == model::Role::load; }
  [[nodiscard]] bool is_way(Edge edge) const { return graph_.is_way(edge) && !own_.contains(edge) && !is_load(edge); }
  [[nodiscard]] bool feeds(Edge edge) const { return graph_.feeds(edge) && !own_.contains(edge); }

  // Breadth first from the pin; a swept rail may be entered, other ideal rails may not.
  void spread() {
    std::deque<Node> open{pin_};
    from_.emplace(pin_, std::pair<Node, Edge>{pin_, 0});
    while (!open.empty()) {
      const Node node = open.front();
      open.pop_front();
      if (is_rail(node) && node != pin_) continue;
      for (const Edge edge : graph_.edges_at(node)) {
        if (!is_way(edge)) continue;
        const Node next = graph_.other_end(edge, node);
        const bool barred = is_rail(next) && !(sensor_.is_rail && next == sensor_.plus);
        if (barred || !from_.emplace(next, std::pair{node, edge}).second) continue;
        depth_[next] = depth_[node] + 1;
        open.push_back(next);
      }
    }
  }

  [[nodiscard]] std::optional<Node> choose_start() const {
    std::optional<Node> best;
    for (const Node end : {sensor_.plus, sensor_.minus}) {
      if (!from_.contains(end) || (is_rail(end) && !sensor_.is_rail)) continue;
      if (!best || depth(end) < depth(*best)) best = end;
      if (sensor_.is_rail) break;
    }
    return best;
  }

  [[nodiscard]] std::size_t depth(Node node) const {
    const auto at = depth_.find(node);
    return at == depth_.end() ? 0 : at->second;
  }

  [[nodiscard]] std::vector<Edge> edges_between(Node a, Node b) const {
    std::vector<Edge> found;
    for (const Edge edge : graph_.edges_at(a))
      if (is_way(edge) && graph_.other_end(edge, a) == b) found.push_back(edge);
    return found;
  }

  void note_far_end(Node start) {
    if (sensor_.is_rail) return;
    const Node far = sensor_.plus == start ? sensor_.minus : sensor_.plus;
    if (is_rail(far) || on_walk_.contains(far)) return;
    walk_.far_end = far;
    walk_.behind_sensor = explore({}, far, false);
  }

  [[nodiscard]] std::vector<OffWalk> off_walk(Node node) const {
    std::vector<OffWalk> found;
    if (is_rail(node)) return found;
    for (const Edge edge : graph_.edges_at(node)) {
      if (!feeds(edge) || walk_edges_.contains(edge)) continue;
      const bool listed =
          std::any_of(found.begin(), found.end(), [edge](const OffWalk& off) { return off.edge == edge; });
      if (!listed) found.push_back(branch(edge, node));
    }
    return found;
  }

  [[nodiscard]] OffWalk branch(Edge first, Node node) const {
    OffWalk off{first, explore(first, node, true), {}};
    const auto& edges = off.whole.edges;
    if (std::none_of(edges.begin(), edges.end(), [this](Edge edge) { return is_load(edge); }))
      off.kept = off.whole;
    else if (!is_load(first))
      off.kept = explore(first, node, false);
    return off;
  }

  // All that an edge at a node leads to, or that the node leads to where no edge is given.
  [[nodiscard]] Region explore(std::optional<Edge> first, Node node, bool with_load) const {
    Region region;
    std::unordered_set<Edge> taken;
    std::unordered_set<Node> seen{node};
    std::vector<std::pair<Edge, Node>> open;
    const auto push_all = [&](Node at) {
      for (const Edge edge : graph_.edges_at(at))
        if (feeds(edge) && (with_load || !is_load(edge))) open.emplace_back(edge, at);
    };
    if (first)
      open.emplace_back(*first, node);
    else
      push_all(node);
    while (!open.empty()) {
      const auto [edge, from] = open.back();
      open.pop_back();
      if (!taken.insert(edge).second) continue;
      region.edges.push_back(edge);
      const Node next = graph_.other_end(edge, from);
      if (note_bound(next, node, region) || !seen.insert(next).second) continue;
      push_all(next);
    }
    return region;
  }

  // Whether a node ends a region; says so there. What comes back to where it began leads nowhere.
  bool note_bound(Node node, Node begin, Region& region) const {
    if (is_rail(node)) {
      region.rails.push_back(node);
    } else if (on_walk_.contains(node)) {
      if (node != begin) region.returns.push_back(node);
    } else if (walk_.far_end && node == *walk_.far_end) {
      region.reaches_sensor_far_end = true;
    } else {
      return false;
    }
    return true;
  }

  const Graph& graph_;
  const SensorEdge& sensor_;
  Node pin_;
  std::unordered_set<Edge> own_;
  std::unordered_map<Node, std::pair<Node, Edge>> from_;  // towards the pin
  std::unordered_map<Node, std::size_t> depth_;
  std::unordered_set<Node> on_walk_;
  std::unordered_set<Edge> walk_edges_;
  Walk walk_;
};

}  // namespace

std::optional<Walk> find_walk(const Graph& graph, const SensorEdge& sensor, Node pin) {
  return Walker(graph, sensor, pin).run();
}

std::vector<Node> resistive_reach(const Graph& graph, Node start) {
  std::vector<Node> reached{start};
  std::unordered_set<Node> seen{start};
  for (std::size_t at = 0; at < reached.size(); ++at) {
    const Node node = reached[at];
    if (graph.rails().at(node) != nullptr) continue;
    for (const Edge edge : graph.edges_at(node)) {
      if (!graph.feeds(edge)) continue;
      const Node next = graph.other_end(edge, node);
      if (seen.insert(next).second) reached.push_back(next);
    }
  }
  return reached;
}

}  // namespace divide
