#include <algorithm>
#include <unordered_map>
#include <unordered_set>
#include <vector>

#include "divide/arms.hpp"

namespace divide {
namespace {

// Sorts edges into the upper and the lower arm. Taken apart at the tap and at the rails, the arms fall into pieces; a
// piece that leads to one rail is on that rail's side.
class Sorter {
 public:
  Sorter(const Graph& graph, const SensorEdge& sensor, const Walk& walk, const Arms& arms)
      : graph_(graph), sensor_(sensor), walk_(walk), arms_(arms), tap_(walk.nodes[arms.tap]) {}

  Sides run() {
    for (const Edge edge : arms_.edges) note_edge(graph_.pin(edge, 0), graph_.pin(edge, 1), is_source(edge));
    if (sensor_.is_rail)
      note_rail(sensor_.plus);
    else
      note_edge(sensor_.plus, sensor_.minus, false);
    choose_rails();
    if (!sensor_.is_rail)
      sides_.sensor_arm = side_of(sensor_.plus, sensor_.minus, side_beyond());
    else
      sides_.sensor_arm = side_of_rail(sensor_.plus);
    note_branches();
    for (const Edge edge : arms_.edges) {
      const auto branch = of_branch_.find(edge);
      const model::Arm arm = is_source(edge) ? side_of_source(edge)
                             : branch != of_branch_.end()
                                 ? branch->second
                                 : side_of(graph_.pin(edge, 0), graph_.pin(edge, 1), *sides_.sensor_arm);
      (arm == model::Arm::upper ? sides_.upper : sides_.lower).push_back(edge);
    }
    return std::move(sides_);
  }

 private:
  [[nodiscard]] bool is_source(Edge edge) const {
    return std::holds_alternative<model::CurrentSource>(graph_.part(edge));
  }
  [[nodiscard]] bool bounds(Node node) const { return node == tap_ || graph_.rails().at(node) != nullptr; }

  Node find(Node node) {
    while (true) {
      const auto at = parent_.find(node);
      if (at == parent_.end() || at->second == node) return node;
      node = at->second;
    }
  }

  void note_rail(Node node) {
    if (const Rail* rail = graph_.rails().at(node)) rails_.insert(rail);
  }

  void note_edge(Node a, Node b, bool source) {
    note_rail(a);
    note_rail(b);
    if (source) return;
    if (!bounds(a) && !bounds(b)) {
      const Node root = find(a);
      const Node other = find(b);
      parent_[other] = root;
      touched_[root].insert(touched_[other].begin(), touched_[other].end());
    }
    if (const Rail* rail = graph_.rails().at(a); rail != nullptr && !bounds(b)) touched_[find(b)].insert(rail);
    if (const Rail* rail = graph_.rails().at(b); rail != nullptr && !bounds(a)) touched_[find(a)].insert(rail);
  }

  void choose_rails() {
    for (const Rail* rail : rails_) {
      if (sides_.upper_rail == nullptr || higher(rail, sides_.upper_rail)) sides_.upper_rail = rail;
      if (sides_.lower_rail == nullptr || higher(sides_.lower_rail, rail)) sides_.lower_rail = rail;
    }
  }

  // A branch off the walk that leads to one rail is on that rail's side, whatever its node's piece touches.
  void note_branches() {
    for (std::size_t i = 0; i <= arms_.tap; ++i)
      for (const OffWalk& off : walk_.off[i]) {
        const auto& rails = off.kept.rails;
        if (rails.empty()) continue;
        const bool one = std::all_of(rails.begin(), rails.end(), [&](Node rail) { return rail == rails.front(); });
        for (const Edge edge : off.kept.edges)
          of_branch_.emplace(edge, one ? side_of_rail(rails.front()) : side_in(off.kept, edge));
      }
  }

  // In a branch that leads to several rails: a part that alone joins one of them to the tap is on that rail's side; the
  // stem that they share feeds the tap from the side where the sensor is not.
  model::Arm side_in(const Region& branch, Edge edge) {
    for (std::size_t i = 0; i < 2; ++i)
      if (const Rail* rail = graph_.rails().at(graph_.pin(edge, i))) return side_of_rail(rail);
    constexpr std::size_t most_searched = 200;  // edges: each is looked at from each
    for (std::size_t i = 0; i < 2 && branch.edges.size() <= most_searched; ++i)
      if (const auto rails = rails_behind(branch, graph_.pin(edge, i), edge); rails.size() == 1)
        return side_of_rail(*rails.begin());
    return *sides_.sensor_arm == model::Arm::upper ? model::Arm::lower : model::Arm::upper;
  }

  // The rails to which a node of a branch leads without one of its edges; none where it then leads to the walk as well.
  [[nodiscard]] std::unordered_set<const Rail*> rails_behind(const Region& branch, Node from, Edge without) const {
    std::unordered_set<const Rail*> rails;
    std::unordered_set<Node> seen(walk_.nodes.begin(), walk_.nodes.end());
    if (!seen.insert(from).second) return rails;
    std::vector<Node> open{from};
    while (!open.empty()) {
      const Node node = open.back();
      open.pop_back();
      for (const Edge edge : branch.edges) {
        const Node a = graph_.pin(edge, 0);
        const Node b = graph_.pin(edge, 1);
        if (edge == without || (a != node && b != node)) continue;
        const Node next = a == node ? b : a;
        if (std::find(walk_.nodes.begin(), walk_.nodes.end(), next) != walk_.nodes.end()) return {};
        if (const Rail* rail = graph_.rails().at(next))
          rails.insert(rail);
        else if (seen.insert(next).second)
          open.push_back(next);
      }
    }
    return rails;
  }

  // Ties are settled by the order of nodes, so that a report does not depend on addresses.
  static bool higher(const Rail* a, const Rail* b) {
    return a->highest_volts != b->highest_volts ? a->highest_volts > b->highest_volts : a->node > b->node;
  }

  [[nodiscard]] model::Arm side_of_rail(Node node) const { return side_of_rail(graph_.rails().at(node)); }
  [[nodiscard]] model::Arm side_of_rail(const Rail* rail) const {
    if (sides_.upper_rail == nullptr || sides_.lower_rail == nullptr || rail == nullptr) return model::Arm::lower;
    if (sides_.upper_rail == sides_.lower_rail) return rail->highest_volts > 0 ? model::Arm::upper : model::Arm::lower;
    const double middle = (sides_.upper_rail->highest_volts + sides_.lower_rail->highest_volts) / 2;
    return rail->highest_volts > middle ? model::Arm::upper : model::Arm::lower;
  }

  model::Arm side_of(Node a, Node b, model::Arm otherwise) {
    for (const Node node : {a, b})
      if (const Rail* rail = graph_.rails().at(node)) return side_of_rail(rail);
    const Node inner = a == tap_ ? b : a;
    const auto& touched = touched_[find(inner)];
    return touched.size() == 1 ? side_of_rail(*touched.begin()) : otherwise;
  }

  // A current into the arms pushes the tap up: the source stands above it.
  [[nodiscard]] model::Arm side_of_source(Edge edge) const {
    const auto& source = std::get<model::CurrentSource>(graph_.part(edge));
    const bool into_second = !(source.amperes.value < 0);
    const bool second_is_rail = graph_.rails().at(graph_.pin(edge, 1)) != nullptr;
    return into_second != second_is_rail ? model::Arm::upper : model::Arm::lower;
  }

  // Where a sensor between two inner nodes leads at its far end.
  model::Arm side_beyond() {
    return walk_.behind_sensor.reaches_rail() ? side_of_rail(walk_.behind_sensor.rails.front()) : model::Arm::lower;
  }

  const Graph& graph_;
  const SensorEdge& sensor_;
  const Walk& walk_;
  const Arms& arms_;
  Node tap_;
  Sides sides_;
  std::unordered_map<Edge, model::Arm> of_branch_;
  std::unordered_map<Node, Node> parent_;
  std::unordered_map<Node, std::unordered_set<const Rail*>> touched_;  // by piece
  std::unordered_set<const Rail*> rails_;
};

}  // namespace

Sides sort_sides(const Graph& graph, const SensorEdge& sensor, const Walk& walk, const Arms& arms) {
  return Sorter(graph, sensor, walk, arms).run();
}

}  // namespace divide
