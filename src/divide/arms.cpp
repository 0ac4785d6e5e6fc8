#include "divide/arms.hpp"

#include <algorithm>
#include <unordered_set>

namespace divide {
namespace {

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

// A candidate's place on the walk and its branches: those that lead to a rail without what is declared load, or all
// where nothing else does.
struct Place {
  std::size_t node = 0;  // in Walk::nodes
  std::vector<const OffWalk*> branches;

  [[nodiscard]] std::vector<Edge> edges() const {
    std::vector<Edge> all;
    for (const OffWalk* branch : branches) all.push_back(branch->edge);
    return all;
  }
};

class Chooser {
 public:
  Chooser(const Graph& graph, const SensorEdge& sensor, const Walk& walk, double share, const Weigh& weigh)
      : graph_(graph), sensor_(sensor), walk_(walk), share_(share), weigh_(weigh) {}

  Arms run() {
    list_candidates();
    weigh_candidates();
    for (std::size_t i = 0; i < places_.size(); ++i) apply_roles(arms_.candidates[i], places_[i]);
    promote();
    for (std::size_t i = 0; i < places_.size(); ++i)
      if (arms_.candidates[i].arm) arms_.tap = places_[i].node;
    if (places_.empty()) arms_.tap = walk_.nodes.size() - 1;
    gather_arms();
    gather_sense();
    return std::move(arms_);
  }

 private:
  // A node is a candidate when something off the walk leads from it to a rail.
  void list_candidates() {
    for (std::size_t i = 0; i < walk_.nodes.size(); ++i) {
      Place place{i, {}};
      for (const bool kept : {true, false}) {
        if (!place.branches.empty()) break;
        for (const OffWalk& off : walk_.off[i])
          if ((kept ? off.kept : off.whole).reaches_rail()) place.branches.push_back(&off);
      }
      if (place.branches.empty()) continue;
      model::TapCandidate candidate;
      candidate.net = naming_net(graph_, walk_.nodes[i], edges_around(i));
      for (const Edge edge : place.edges()) candidate.branches.push_back({graph_.name(edge), graph_.element(edge)});
      places_.push_back(std::move(place));
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

  void weigh_candidates() {
    auto& candidates = arms_.candidates;
    if (candidates.size() == 1) candidates.front().arm = true;
    if (candidates.size() < 2) return;
    double heaviest = 0;
    std::vector<double> weights;
    for (std::size_t i = 0; i < candidates.size(); ++i) {
      const Weight weight = weigh_(places_[i].edges(), walk_.nodes[places_[i].node]);
      candidates[i].weight_volts = weight.pin_volts;
      candidates[i].of_swing = weight.swing_volts > 0 ? weight.pin_volts / weight.swing_volts : 0;
      weights.push_back(weight.node_volts);
      heaviest = std::max(heaviest, weight.node_volts);
    }
    for (std::size_t i = 0; i < candidates.size(); ++i) {
      candidates[i].arm = weights[i] >= share_ * heaviest;
      candidates[i].share = heaviest > 0 && weights[i] < heaviest ? weights[i] / heaviest : 1;
    }
  }

  // A role on any part of a branch is the branch's.
  void apply_roles(model::TapCandidate& candidate, const Place& place) {
    const auto is_arm = [this](const OffWalk* branch) {
      return std::any_of(branch->whole.edges.begin(), branch->whole.edges.end(),
                         [this](Edge edge) { return graph_.role(edge) == model::Role::arm; });
    };
    const auto is_load = [](const OffWalk* branch) { return !branch->kept.reaches_rail(); };
    if (std::any_of(place.branches.begin(), place.branches.end(), is_arm)) {
      candidate.arm = candidate.declared = true;
    } else if (std::all_of(place.branches.begin(), place.branches.end(), is_load)) {
      candidate.arm = false;
      candidate.declared = true;
    }
  }

  // A divider stands between two rails. Where a heavy attenuator leaves the sensor's own pull-up below the share, the
  // heaviest candidate that leads to another rail is an arm all the same.
  void promote() {
    std::unordered_set<Node> rails = own_rails();
    bool fed_by_current = has_source(walk_.behind_sensor.edges);
    for (std::size_t i = 0; i < places_.size(); ++i)
      if (arms_.candidates[i].arm)
        for (const OffWalk* branch : places_[i].branches) {
          rails.insert(branch->kept.rails.begin(), branch->kept.rails.end());
          fed_by_current = fed_by_current || has_source(branch->kept.edges);
        }
    if (fed_by_current || rails.size() > 1) return;
    model::TapCandidate* best = nullptr;
    for (std::size_t i = 0; i < places_.size(); ++i) {
      model::TapCandidate& candidate = arms_.candidates[i];
      if (candidate.arm || candidate.declared || !adds_rail(places_[i], rails)) continue;
      if (best == nullptr || candidate.share > best->share) best = &candidate;
    }
    if (best != nullptr) best->arm = best->only_way = true;
  }

  // Rails that the sensor leads to without any candidate.
  [[nodiscard]] std::unordered_set<Node> own_rails() const {
    std::unordered_set<Node> rails(walk_.behind_sensor.rails.begin(), walk_.behind_sensor.rails.end());
    for (const Node end : {sensor_.plus, sensor_.minus})
      if (graph_.rails().at(end) != nullptr) rails.insert(end);
    return rails;
  }

  [[nodiscard]] bool has_source(const std::vector<Edge>& edges) const {
    return std::any_of(edges.begin(), edges.end(),
                       [this](Edge edge) { return std::holds_alternative<model::CurrentSource>(graph_.part(edge)); });
  }

  [[nodiscard]] bool adds_rail(const Place& place, const std::unordered_set<Node>& rails) const {
    return std::any_of(place.branches.begin(), place.branches.end(), [&](const OffWalk* branch) {
      return std::any_of(branch->kept.rails.begin(), branch->kept.rails.end(),
                         [&](Node rail) { return !rails.contains(rail); }) ||
             has_source(branch->kept.edges);
    });
  }

  void gather_arms() {
    auto& all = arms_.edges;
    all = walk_.behind_sensor.edges;
    for (std::size_t i = 0; i < arms_.tap; ++i) all.insert(all.end(), walk_.steps[i].begin(), walk_.steps[i].end());
    for (std::size_t i = 0; i <= arms_.tap && i < walk_.off.size(); ++i)
      for (const OffWalk& off : walk_.off[i])
        if (belongs(off, i)) all.insert(all.end(), off.kept.edges.begin(), off.kept.edges.end());
    make_unique(all);
  }

  // The walk from tap to pin, and what is parallel to a part of that.
  void gather_sense() {
    auto& all = arms_.sense;
    for (std::size_t i = arms_.tap; i < walk_.steps.size(); ++i)
      all.insert(all.end(), walk_.steps[i].begin(), walk_.steps[i].end());
    for (std::size_t i = arms_.tap; i < walk_.off.size(); ++i)
      for (const OffWalk& off : walk_.off[i]) {
        if (off.kept.reaches_rail() || off.kept.reaches_sensor_far_end || off.kept.returns.empty()) continue;
        if (std::all_of(off.kept.returns.begin(), off.kept.returns.end(),
                        [this](Node node) { return place_on_walk(node) >= arms_.tap; }))
          all.insert(all.end(), off.kept.edges.begin(), off.kept.edges.end());
      }
    make_unique(all);
  }

  static void make_unique(std::vector<Edge>& edges) {
    std::sort(edges.begin(), edges.end());
    edges.erase(std::unique(edges.begin(), edges.end()), edges.end());
  }

  [[nodiscard]] std::size_t place_on_walk(Node node) const {
    const auto at = std::find(walk_.nodes.begin(), walk_.nodes.end(), node);
    return static_cast<std::size_t>(at - walk_.nodes.begin());
  }

  // Off the walk on the sensor's side of the tap: an arm's branch, parallel to the sensor, or parallel to a part of the
  // walk.
  [[nodiscard]] bool belongs(const OffWalk& off, std::size_t i) const {
    if (off.kept.reaches_rail()) {
      const auto at = std::find_if(places_.begin(), places_.end(), [i](const Place& place) { return place.node == i; });
      return at != places_.end() && arms_.candidates[static_cast<std::size_t>(at - places_.begin())].arm;
    }
    if (off.kept.reaches_sensor_far_end) return true;
    const auto& returns = off.kept.returns;
    return !returns.empty() &&
           std::all_of(returns.begin(), returns.end(), [this](Node node) { return place_on_walk(node) <= arms_.tap; });
  }

  const Graph& graph_;
  const SensorEdge& sensor_;
  const Walk& walk_;
  double share_;
  const Weigh& weigh_;
  Arms arms_;
  std::vector<Place> places_;  // of each candidate
};

}  // namespace

Arms choose_arms(const Graph& graph, const SensorEdge& sensor, const Walk& walk, double share, const Weigh& weigh) {
  return Chooser(graph, sensor, walk, share, weigh).run();
}

}  // namespace divide
