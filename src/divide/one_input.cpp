#include "divide/one_input.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <fmt/ranges.h>
#include <set>
#include <unordered_set>

#include "base/text.hpp"
#include "divide/arms.hpp"
#include "divide/networks.hpp"
#include "divide/no_divider.hpp"
#include "divide/ratiometric.hpp"
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
  }

  model::Divider run() {
    if (const Rail* rail = graph_.rails().ideal_at(pin_)) {
      found_.no_divider = fmt::format("it is tied to rail {}", printable_short(rail->name));
      return std::move(found_);
    }
    around_ = collect(graph_, starts());
    drawing_ = drawing_from(graph_, around_, pin_);
    for (const Node node : around_.nodes)
      for (const model::NetId net : graph_.nodes().nets(node)) found_.nets.push_back(net);
    note_obstacles();
    const bool has_rail = reaches_rail();
    if (!has_rail)
      found_.no_divider = "no resistive way leads from it to a rail" + missing_rail(graph_, drawing_, pin_);
    else if (!is_driven(graph_, drawing_))
      found_.no_divider = "its network reaches no rail but 0" + missing_rail(graph_, drawing_, pin_);
    else if (choose_sensor())
      split();
    else if (found_.no_sensor)
      name_fixed_arms();
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
    for (const MeasuredRail& measured : around_.measured_rails)
      refuse(fmt::format(
          "{} follows the current of {}, which feeds a whole rail: let it follow a source of 0 V in the "
          "branch that it means",
          printable_short(graph_.name(measured.by)), printable_short(graph_.names().text(measured.source))));
    std::unordered_set<std::uint32_t> here;
    for (const Edge edge : around_.edges) here.insert(graph_.element(edge).value);
    for (const Rail* rail : rails_of(graph_, around_)) {
      if (!rail->conflict.empty()) refuse(rail->conflict);
      for (const model::ElementId source : rail->sources) here.insert(source.value);
    }
    for (const auto& suspect : graph_.circuit().suspects)
      if (here.contains(suspect.element.value)) found_.suspects.push_back(suspect);
    for (const model::ElementId source : graph_.circuit().at_time_zero)
      if (here.contains(source.value)) found_.at_time_zero.push_back(source);
  }

  // Whether there is one sensor and a walk from it to the pin.
  bool choose_sensor() {
    auto movers = movers_of(graph_, around_, pin_);
    drop_cancelling(movers);
    found_.no_sensor = movers.empty();
    if (movers.empty()) return false;
    if (movers.size() > 1) return refuse_several(movers), false;
    Mover& only = movers.front();
    if (!only.walk) return refuse_unwalked(only), false;
    edge_ = std::move(only.edge);
    walk_ = std::move(only.walk);
    const BoundSensor& bound = graph_.board().sensors[only.sensor];
    found_.sensor = bound.declaration;
    found_.sensor_name = bound.name;
    return true;
  }

  [[nodiscard]] const Rail* rail_swept_by(const Mover& mover) const {
    const auto& rails = graph_.rails().rails;
    const auto at =
        std::find_if(rails.begin(), rails.end(), [&](const Rail& rail) { return rail.sensor == mover.sensor; });
    return at == rails.end() ? nullptr : &*at;
  }

  // A resistance on a rail that a monitor sweeps and that is the range too reads the same wherever the rail stands.
  void drop_cancelling(std::vector<Mover>& movers) {
    if (movers.size() != 2) return;
    for (std::size_t i : {std::size_t{0}, std::size_t{1}}) {
      const Rail* rail = rail_swept_by(movers[i]);
      if (rail == nullptr) continue;
      const auto& sweep = request_.sheet.sensors[graph_.board().sensors[movers[i].sensor].declaration];
      const auto share = leakage_share(graph_, around_, found_.input, *rail, sweep);
      if (!share) continue;
      leakage_share_ = *share;
      movers.erase(movers.begin() + static_cast<std::ptrdiff_t>(i));
      return;
    }
  }

  void refuse_several(const std::vector<Mover>& movers) {
    std::vector<std::string> names;
    for (const Mover& mover : movers)
      names.push_back(printable_short(graph_.board().sensors[mover.sensor].name) +
                      (mover.walk ? std::string{} : way_in(graph_, around_, pin_, mover.sensor)));
    refuse(
        fmt::format("{} sensors move it ({}); this version sweeps one: leave out the [sensor.NAME] of those that may "
                    "stand still at the netlist's values",
                    movers.size(), fmt::join(names, ", ")));
  }

  void refuse_unwalked(const Mover& mover) {
    refuse(fmt::format("sensor {} moves it{}; this version follows a sensor along resistances to the pin only",
                       printable_short(graph_.board().sensors[mover.sensor].name),
                       way_in(graph_, around_, pin_, mover.sensor)));
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
          std::any_of(off.begin(), off.end(), [](const OffWalk& branch) { return branch.whole.reaches_rail(); }) ? 1U
                                                                                                                 : 0U;
    const Weigh weigh = candidates > 1
                            ? weigher(subject(), found_.no_sensor ? model::SensorDeclaration{} : declaration())
                            : [](std::span<const Edge>) { return 0.0; };
    return choose_arms(graph_, *edge_, *walk_, ambiguous_share(), weigh);
  }

  // What nothing moves is a divider between rails all the same: seen from the highest rail in reach.
  void name_fixed_arms() {
    const Rail* top = nullptr;
    for (const Node node : resistive_reach(graph_, pin_))
      if (const Rail* rail = graph_.rails().at(node);
          rail != nullptr && (top == nullptr || rail->highest_volts > top->highest_volts))
        top = rail;
    if (top == nullptr) return;
    edge_ = SensorEdge{0, true, top->node, top->node, {}};
    walk_ = find_walk(graph_, *edge_, pin_);
    if (!walk_) return;
    arms_ = arms_of_walk();
    name_parts(sort_sides(graph_, *edge_, *walk_, *arms_));
    found_.sensor_arm.reset();
    found_.tap = tap_net();
  }

  void split() {
    if (std::string why = dead_end(graph_, around_, *edge_, *walk_); !why.empty()) return leave(std::move(why));
    arms_ = arms_of_walk();
    const Sides sides = sort_sides(graph_, *edge_, *walk_, *arms_);
    const bool fed_by_current = std::any_of(arms_->edges.begin(), arms_->edges.end(), [this](Edge edge) {
      return std::holds_alternative<model::CurrentSource>(graph_.part(edge));
    });
    if (!edge_->is_rail && !fed_by_current && sides.upper_rail == sides.lower_rail) {
      if (std::string why = blocked_arm(graph_, around_, *walk_); !why.empty()) return leave(std::move(why));
      found_.no_divider = sides.upper_rail == nullptr ? std::string("its arms lead to no rail")
                                                      : fmt::format("both its arms lead to one rail, {}",
                                                                    printable_short(sides.upper_rail->name));
      found_.no_divider += missing_rail(graph_, drawing_, pin_);
      found_.sensor.reset();
      return;
    }
    name_parts(sides);
    found_.candidates = arms_->candidates;
    found_.tap = tap_net();
  }

  void leave(std::string why) {
    refuse(std::move(why));
    found_.sensor.reset();
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
    for (const Edge edge : drawing_) {
      const bool idle = graph_.pin_use(edge, 0) == PinUse::nothing;
      if (!placed.contains(edge) && (!idle || std::holds_alternative<model::Capacitor>(graph_.part(edge))))
        load.push_back(edge);
    }
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
    if (!check_rails()) return;
    found_.whole = whole_network(whole);
    for (double& amperes : found_.whole.leakage_amperes) amperes *= leakage_share_;
    const Node tap = walk_->nodes[arms_->tap];
    found_.bare = bare_network(whole, arms_->edges, tap);
    found_.sensor_form = sensor_form(whole, arms_->edges, tap);
    if (found_.bare.network.linear) found_.bare_form = found_.sensor_form;
  }

  // A rail of which nobody says at what it stands leaves nothing to solve.
  bool check_rails() {
    for (const Rail* rail : rails_of(graph_, around_)) {
      if (rail->has_volts || (edge_->is_rail && rail->node == edge_->plus)) continue;
      refuse(fmt::format("rail {} has no voltage: declare [rail.\"{}\"] volts", printable_short(rail->name),
                         printable_short(rail->name)));
      return false;
    }
    return true;
  }

  const InputRequest& request_;
  const Graph& graph_;
  Node pin_;
  model::Divider found_;
  Surroundings around_;
  std::vector<Edge> drawing_;  // the pin's own part of them
  std::optional<SensorEdge> edge_;
  std::optional<Walk> walk_;
  std::optional<Arms> arms_;
  double leakage_share_ = 1;  // as in ratiometric.hpp
};

}  // namespace

model::Divider divide_input(const InputRequest& request, const model::Input& input) {
  return OneInput(request, input).run();
}

}  // namespace divide
