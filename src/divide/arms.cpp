#include "divide/arms.hpp"

#include <algorithm>
#include <unordered_set>

namespace divide {
namespace {

std::optional<model::Role> role_of(const Graph& graph, Edge edge) {
  const model::ElementId element = graph.element(edge);
  return element.valid() ? graph.board().roles[element.index()] : std::nullopt;
}

// The net of a node that names it: the one where most parts of the walk and its branches meet, the pin's own last.
model::NetId naming_net(const Graph& graph, Node node, const std::vector<Edge>& edges) {
  model::NetId best;
  std::ptrdiff_t most = -1;
  for (const model::NetId net : graph.nodes().nets(node)) {
    const auto touches = [&](Edge edge) {
      if (graph.is_extra(edge)) return graph.extra(edge).plus == net || graph.extra(edge).minus == net;
      const auto& element = graph.circuit().elements[edge];
      return graph.circuit().pin(element, 0) == net || graph.circuit().pin(element, 1) == net;
    };
    const auto count = std::count_if(edges.begin(), edges.end(), touches);
    if (count > most) best = net, most = count;
  }
  return best;
}

class Chooser {
 public:
  Chooser(const Graph& graph, const Walk& walk, double share, const Weigh& weigh)
      : graph_(graph), walk_(walk), share_(share), weigh_(weigh) {}

  Arms run() {
    list_candidates();
    decide();
    for (std::size_t i = 0; i < places_.size(); ++i)
      if (arms_.candidates[i].arm) arms_.tap = places_[i];
    if (places_.empty()) arms_.tap = walk_.nodes.size() - 1;
    gather();
    return std::move(arms_);
  }

 private:
  // A node is a candidate when something off the walk leads from it to a rail.
  void list_candidates() {
    for (std::size_t i = 0; i < walk_.nodes.size(); ++i) {
      std::vector<Edge> to_rail;
      for (const OffWalk& off : walk_.off[i])
        if (off.reaches_rail) to_rail.push_back(off.edge);
      if (to_rail.empty()) continue;
      model::TapCandidate candidate;
      candidate.net = naming_net(graph_, walk_.nodes[i], edges_around(i));
      for (const Edge edge : to_rail) candidate.branches.push_back({graph_.name(edge), graph_.element(edge)});
      places_.push_back(i);
      branches_.push_back(std::move(to_rail));
      arms_.candidates.push_back(std::move(candidate));
    }
  }

  [[nodiscard]] std::vector<Edge> edges_around(std::size_t i) const {
    std::vector<Edge> around;
    for (const OffWalk& off : walk_.off[i]) around.push_back(off.edge);
    if (i > 0) around.insert(around.end(), walk_.steps[i - 1].begin(), walk_.steps[i - 1].end());
    if (i < walk_.steps.size()) around.insert(around.end(), walk_.steps[i].begin(), walk_.steps[i].end());
    return around;
  }

  void decide() {
    auto& candidates = arms_.candidates;
    if (candidates.size() == 1) candidates.front().arm = true;
    if (candidates.size() > 1) {
      double heaviest = 0;
      for (std::size_t i = 0; i < candidates.size(); ++i) {
        candidates[i].weight_volts = weigh_(branches_[i]);
        heaviest = std::max(heaviest, candidates[i].weight_volts);
      }
      for (auto& candidate : candidates) candidate.arm = candidate.weight_volts >= share_ * heaviest;
    }
    for (std::size_t i = 0; i < candidates.size(); ++i) apply_roles(candidates[i], branches_[i]);
  }

  void apply_roles(model::TapCandidate& candidate, const std::vector<Edge>& branches) {
    const auto has = [this](model::Role role) {
      return [this, role](Edge edge) { return role_of(graph_, edge) == role; };
    };
    if (std::any_of(branches.begin(), branches.end(), has(model::Role::arm))) {
      candidate.arm = candidate.declared = true;
    } else if (std::all_of(branches.begin(), branches.end(), has(model::Role::load))) {
      candidate.arm = false;
      candidate.declared = true;
    }
  }

  void gather() {
    std::vector<Edge> all = walk_.behind_sensor;
    for (std::size_t i = 0; i < arms_.tap; ++i) all.insert(all.end(), walk_.steps[i].begin(), walk_.steps[i].end());
    for (std::size_t i = 0; i <= arms_.tap && i < walk_.off.size(); ++i)
      for (const OffWalk& off : walk_.off[i])
        if (belongs(off, i)) all.insert(all.end(), off.region.begin(), off.region.end());
    std::sort(all.begin(), all.end());
    all.erase(std::unique(all.begin(), all.end()), all.end());
    std::copy_if(all.begin(), all.end(), std::back_inserter(arms_.edges),
                 [this](Edge edge) { return role_of(graph_, edge) != model::Role::load; });
    for (std::size_t i = arms_.tap; i < walk_.steps.size(); ++i)
      arms_.sense.insert(arms_.sense.end(), walk_.steps[i].begin(), walk_.steps[i].end());
  }

  // Off the walk on the sensor's side of the tap: an arm's branch, parallel to the sensor, or parallel to a part of the
  // walk.
  [[nodiscard]] bool belongs(const OffWalk& off, std::size_t i) const {
    if (off.reaches_rail) {
      const auto at = std::find(places_.begin(), places_.end(), i);
      return arms_.candidates[static_cast<std::size_t>(at - places_.begin())].arm;
    }
    if (off.reaches_sensor_far_end) return true;
    return !off.returns.empty() && std::all_of(off.returns.begin(), off.returns.end(), [this](Node node) {
      const auto at = std::find(walk_.nodes.begin(), walk_.nodes.end(), node);
      return static_cast<std::size_t>(at - walk_.nodes.begin()) <= arms_.tap;
    });
  }

  const Graph& graph_;
  const Walk& walk_;
  double share_;
  const Weigh& weigh_;
  Arms arms_;
  std::vector<std::size_t> places_;          // of each candidate, in Walk::nodes
  std::vector<std::vector<Edge>> branches_;  // of each candidate, its edges towards rails
};

}  // namespace

Arms choose_arms(const Graph& graph, const Walk& walk, double share, const Weigh& weigh) {
  return Chooser(graph, walk, share, weigh).run();
}

}  // namespace divide
