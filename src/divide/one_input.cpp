#include "divide/one_input.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <fmt/ranges.h>
#include <set>
#include <unordered_set>

#include "base/text.hpp"
#include "divide/arms.hpp"
#include "divide/networks.hpp"
#include "divide/sensors.hpp"
#include "divide/walk.hpp"
#include "model/finding.hpp"

namespace divide {
namespace {

using base::printable_short;

class OneInput {
 public:
  OneInput(const InputRequest& request, const model::Input& input)
      : request_(request), graph_(request.graph), pin_(graph_.nodes().of(input.net)) {
    found_.input = input;
    found_.tap = input.net;
  }

  model::Divider run() {
    if (const Rail* rail = graph_.rails().ideal_at(pin_)) {
      found_.no_divider = fmt::format("it is tied to rail {}", printable_short(rail->name));
      return std::move(found_);
    }
    around_ = collect(graph_, starts());
    for (const Node node : around_.nodes)
      for (const model::NetId net : graph_.nodes().nets(node)) found_.nets.push_back(net);
    note_obstacles();
    const bool has_rail = reaches_rail();
    if (!has_rail) found_.no_divider = "no resistive way leads from it to a rail";
    if (has_rail && choose_sensor()) split();
    build_networks();
    return std::move(found_);
  }

 private:
  [[nodiscard]] std::vector<Node> starts() const {
    std::vector<Node> nodes{pin_};
    for (const model::BoundEnd* end : {&found_.input.low, &found_.input.high})
      if (const auto* net = std::get_if<model::NetId>(end)) nodes.push_back(graph_.nodes().of(*net));
    return nodes;
  }

  [[nodiscard]] bool reaches_rail() const {
    const auto reached = resistive_reach(graph_, pin_);
    return std::any_of(reached.begin(), reached.end(),
                       [this](Node node) { return graph_.rails().at(node) != nullptr; });
  }

  void refuse(std::string why) { found_.not_audited.push_back(std::move(why)); }

  void note_obstacles() {
    found_.unmodelled = find_touches(graph_, around_);
    for (std::string& why :
         obstacles(graph_, around_, found_.unmodelled, request_.broken, request_.netlist, request_.sources))
      refuse(std::move(why));
    if (around_.measures_rail_current)
      refuse("a source in its network follows the current of a source that makes a rail");
    for (const Node node : around_.rails)
      if (const Rail* rail = graph_.rails().at(node); !rail->conflict.empty()) refuse(rail->conflict);
    std::unordered_set<std::uint32_t> here;
    for (const Edge edge : around_.edges) here.insert(graph_.element(edge).value);
    for (const auto& suspect : graph_.circuit().suspects)
      if (here.contains(suspect.element.value)) found_.suspects.push_back(suspect);
  }

  // Whether there is one sensor and a walk from it to the pin.
  bool choose_sensor() {
    const auto sensors = sensors_in(graph_, around_, pin_);
    std::vector<std::size_t> walked;
    for (const std::size_t sensor : sensors) {
      auto edge = sensor_edge(graph_, around_, sensor);
      if (!edge || (!edge->is_rail && edge->plus == edge->minus)) continue;  // a shorted one moves nothing
      auto walk = find_walk(graph_, *edge, pin_);
      if (!walk) continue;
      walked.push_back(sensor);
      edge_ = std::move(edge);
      walk_ = std::move(walk);
    }
    prefer_resistance(walked);
    if (walked.size() > 1) {
      std::vector<std::string> names;
      for (const std::size_t sensor : walked) names.push_back(printable_short(graph_.board().sensors[sensor].name));
      refuse(fmt::format("{} sensors move it ({}); this version sweeps one", walked.size(), fmt::join(names, ", ")));
      return false;
    }
    found_.no_sensor = walked.empty();
    if (walked.empty()) return false;
    const BoundSensor& bound = graph_.board().sensors[walked.front()];
    found_.sensor = bound.declaration;
    found_.sensor_name = bound.name;
    return true;
  }

  // A swept rail behind a divider's load, or one with a voltage at rest above the sensor's arm, gives way to a
  // resistance.
  void prefer_resistance(std::vector<std::size_t>& walked) {
    const auto is_rail = [this](std::size_t sensor) {
      return graph_.board().sensors[sensor].kind->moves == sensor::Moves::rail;
    };
    if (walked.size() < 2 ||
        std::count_if(walked.begin(), walked.end(), is_rail) + 1 != static_cast<std::ptrdiff_t>(walked.size()))
      return;
    const auto resistance = std::find_if_not(walked.begin(), walked.end(), is_rail);
    edge_ = sensor_edge(graph_, around_, *resistance);
    walk_ = find_walk(graph_, *edge_, pin_);
    const Arms arms = arms_of_walk();
    const Sides sides = sort_sides(graph_, *edge_, *walk_, arms);
    for (const Rail* rail : {sides.upper_rail, sides.lower_rail})
      if (rail != nullptr && rail->sensor && !rail->has_volts) return;
    walked = {*resistance};
  }

  [[nodiscard]] const model::SensorDeclaration& declaration() const {
    return request_.sheet.sensors[graph_.board().sensors[edge_->sensor].declaration];
  }

  [[nodiscard]] double ambiguous_share() const {
    double share = model::rule_text(model::RuleId::ambiguous_tap).limit;
    for (const auto& limit : found_.input.limits)
      if (limit.rule == model::rule_text(model::RuleId::ambiguous_tap).name) share = limit.limit.value;
    return share;
  }

  [[nodiscard]] Subject subject() const {
    return {graph_, request_.inputs, found_.input, around_, edge_ ? &*edge_ : nullptr};
  }

  [[nodiscard]] Arms arms_of_walk() const {
    // Weighing takes solves: only where there is a choice.
    std::size_t candidates = 0;
    for (const auto& off : walk_->off)
      candidates +=
          std::any_of(off.begin(), off.end(), [](const OffWalk& branch) { return branch.reaches_rail; }) ? 1U : 0U;
    const Weigh weigh = candidates > 1 ? weigher(subject(), declaration()) : [](std::span<const Edge>) { return 0.0; };
    return choose_arms(graph_, *walk_, ambiguous_share(), weigh);
  }

  void split() {
    arms_ = arms_of_walk();
    const Sides sides = sort_sides(graph_, *edge_, *walk_, *arms_);
    const bool fed_by_current = std::any_of(arms_->edges.begin(), arms_->edges.end(), [this](Edge edge) {
      return std::holds_alternative<model::CurrentSource>(graph_.part(edge));
    });
    if (!edge_->is_rail && !fed_by_current && sides.upper_rail == sides.lower_rail) {
      found_.no_divider = sides.upper_rail == nullptr ? std::string("its arms lead to no rail")
                                                      : fmt::format("both its arms lead to one rail, {}",
                                                                    printable_short(sides.upper_rail->name));
      found_.sensor.reset();
      return;
    }
    name_parts(sides);
    found_.candidates = arms_->candidates;
    found_.tap = tap_net();
  }

  [[nodiscard]] model::NetId tap_net() const {
    const Node tap = walk_->nodes[arms_->tap];
    for (const auto& candidate : arms_->candidates)
      if (graph_.nodes().of(candidate.net) == tap) return candidate.net;
    return tap == pin_ ? found_.input.net : graph_.nodes().nets(tap).front();
  }

  void name_parts(const Sides& sides) {
    found_.sensor_arm = sides.sensor_arm;
    if (sides.upper_rail != nullptr && (sides.upper_rail != sides.lower_rail || sides.upper_rail->highest_volts > 0))
      found_.upper_rail = sides.upper_rail->name;
    if (sides.lower_rail != nullptr && (sides.upper_rail != sides.lower_rail || found_.upper_rail.empty()))
      found_.lower_rail = sides.lower_rail->name;
    found_.upper = list(sides.upper, sides.sensor_arm == model::Arm::upper);
    found_.lower = list(sides.lower, sides.sensor_arm == model::Arm::lower);
    found_.sense = list(with_shorts(arms_->sense), false);
    std::set<Edge> placed(arms_->edges.begin(), arms_->edges.end());
    placed.insert(arms_->sense.begin(), arms_->sense.end());
    placed.insert(edge_->edges.begin(), edge_->edges.end());
    std::vector<Edge> load;
    for (const Edge edge : around_.edges)
      if (!placed.contains(edge)) load.push_back(edge);
    for (const Edge edge : around_.idle)
      if (std::holds_alternative<model::Capacitor>(graph_.part(edge))) load.push_back(edge);
    found_.load = list(load, false);
  }

  // Ferrites and zero-ohm links between tap and pin join nets of one node: the walk does not see them, a reader must.
  [[nodiscard]] std::vector<Edge> with_shorts(std::vector<Edge> sense) const {
    for (std::size_t i = arms_->tap; i < walk_->nodes.size(); ++i) {
      const auto shorts = graph_.shorts_in(walk_->nodes[i]);
      sense.insert(sense.end(), shorts.begin(), shorts.end());
    }
    return sense;
  }

  [[nodiscard]] std::vector<model::PartName> list(std::vector<Edge> edges, bool with_sensor) const {
    struct Entry {
      std::uint32_t order;
      model::PartName part;
    };
    std::vector<Entry> entries;
    for (const Edge edge : edges) entries.push_back({graph_.order(edge), {graph_.name(edge), graph_.element(edge)}});
    if (with_sensor && !edge_->is_rail) entries.push_back(sensor_entry<Entry>());
    std::stable_sort(entries.begin(), entries.end(), [](const Entry& a, const Entry& b) { return a.order < b.order; });
    std::vector<model::PartName> parts;
    for (auto& entry : entries) parts.push_back(std::move(entry.part));
    return parts;
  }

  template <class Entry>
  [[nodiscard]] Entry sensor_entry() const {
    const BoundSensor& bound = graph_.board().sensors[edge_->sensor];
    const std::uint32_t order = edge_->edges.empty() ? 0 : graph_.order(edge_->edges.front());
    return {order, {bound.name, bound.element}};
  }

  void build_networks() {
    const Subject whole = subject();
    const bool solved = found_.sensor && found_.no_divider.empty();
    if (!solved) return;
    found_.whole = whole_network(whole);
    if (!check_rails()) return;
    const Node tap = walk_->nodes[arms_->tap];
    found_.bare = bare_network(whole, arms_->edges, tap);
    found_.sensor_form = sensor_form(whole, arms_->edges, tap);
    if (found_.bare.network.linear) found_.bare_form = found_.sensor_form;
  }

  // Rails that another sensor sweeps stand at their voltage at rest; where nobody says which, nothing can be solved.
  bool check_rails() {
    for (const Node node : around_.rails) {
      const Rail* rail = graph_.rails().at(node);
      const bool moved = edge_->is_rail && node == edge_->plus;
      if (rail->has_volts || moved) continue;
      refuse(fmt::format("rail {} has no voltage: declare [rail.\"{}\"] volts", printable_short(rail->name),
                         printable_short(rail->name)));
      return false;
    }
    for (const auto& branch : found_.whole.network.branches) {
      const model::ExpressionId tree = expression_of(branch.part);
      const auto& bound = graph_.board().sensors[edge_->sensor];
      for (const auto& swept : graph_.circuit().swept)
        if (swept.found && bound.variable != swept.variable && depends_on(graph_, tree, swept.variable)) {
          refuse(fmt::format("it also depends on the parameter of sensor {}; this version sweeps one",
                             printable_short(swept.sensor)));
          return false;
        }
    }
    return true;
  }

  const InputRequest& request_;
  const Graph& graph_;
  Node pin_;
  model::Divider found_;
  Surroundings around_;
  std::optional<SensorEdge> edge_;
  std::optional<Walk> walk_;
  std::optional<Arms> arms_;
};

}  // namespace

model::Divider divide_input(const InputRequest& request, const model::Input& input) {
  return OneInput(request, input).run();
}

}  // namespace divide
