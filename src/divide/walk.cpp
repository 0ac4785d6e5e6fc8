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
  [[nodiscard]] bool is_way(Edge edge) const { return graph_.is_way(edge) && !own_.contains(edge); }

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
    std::unordered_set<Edge> taken;
    std::unordered_set<Node> seen{far};
    std::vector<Node> open{far};
    while (!open.empty()) {
      const Node node = open.back();
      open.pop_back();
      for (const Edge edge : graph_.edges_at(node)) {
        if (!graph_.feeds(edge) || own_.contains(edge) || !taken.insert(edge).second) continue;
        walk_.behind_sensor.push_back(edge);
        const Node next = graph_.other_end(edge, node);
        if (!is_rail(next) && !on_walk_.contains(next) && seen.insert(next).second) open.push_back(next);
      }
    }
  }

  [[nodiscard]] std::vector<OffWalk> off_walk(Node node) const {
    std::vector<OffWalk> found;
    if (graph_.rails().ideal_at(node) != nullptr) return found;
    for (const Edge edge : graph_.edges_at(node)) {
      if (!graph_.feeds(edge) || own_.contains(edge) || walk_edges_.contains(edge)) continue;
      const bool listed =
          std::any_of(found.begin(), found.end(), [edge](const OffWalk& off) { return off.edge == edge; });
      if (!listed) found.push_back(explore(edge, node));
    }
    return found;
  }

  [[nodiscard]] OffWalk explore(Edge first, Node node) const {
    OffWalk off;
    off.edge = first;
    std::unordered_set<Edge> taken;
    std::unordered_set<Node> seen;
    std::vector<std::pair<Edge, Node>> open{{first, node}};
    while (!open.empty()) {
      const auto [edge, from] = open.back();
      open.pop_back();
      if (!taken.insert(edge).second) continue;
      off.region.push_back(edge);
      const Node next = graph_.other_end(edge, from);
      if (is_rail(next))
        off.reaches_rail = true;
      else if (on_walk_.contains(next))
        off.returns.push_back(next);
      else if (walk_.far_end && next == *walk_.far_end)
        off.reaches_sensor_far_end = true;
      else if (seen.insert(next).second)
        push_ways(next, taken, open);
    }
    return off;
  }

  void push_ways(Node node, const std::unordered_set<Edge>& taken, std::vector<std::pair<Edge, Node>>& open) const {
    for (const Edge edge : graph_.edges_at(node))
      if (graph_.feeds(edge) && !own_.contains(edge) && !taken.contains(edge)) open.emplace_back(edge, node);
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
