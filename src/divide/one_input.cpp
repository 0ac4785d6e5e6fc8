#include "divide/one_input.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <fmt/ranges.h>
#include <numeric>
#include <set>
#include <unordered_set>

#include "base/text.hpp"
#include "divide/arms.hpp"
#include "divide/influence.hpp"
#include "divide/networks.hpp"
#include "divide/no_divider.hpp"
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
    if (const Rail* rail = graph_.rails().at(pin_)) {
      found_.no_divider = fmt::format("it is tied to rail {}", printable_short(rail->name));
      return std::move(found_);
    }
    around_ = collect(graph_, starts());
    drawing_ = drawing_from(graph_, around_, pin_);
    for (const Node node : around_.nodes)
      for (const model::NetId net : graph_.nodes().nets(node)) found_.nets.push_back(net);
    note_obstacles();
    const bool has_rail = reaches_rail();
    if (!has_rail && !is_followed(graph_, drawing_))
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
    drop_still(movers);
    if (movers.empty() && !reaches_rail()) {
      found_.no_divider = "no resistive way leads from it to a rail, and nothing declared moves what drives it";
      return false;
    }
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

  // Sensors that change the network and leave the reading alone stand still while the one that moves it is swept.
  void drop_still(std::vector<Mover>& movers) {
    constexpr std::size_t most_tried_alone = 16;
    if (movers.empty() || (movers.size() == 1 && movers.front().walk)) return;
    const auto influence = Influence::make(subject(), request_.sheet, movers);
    if (!influence) return;
    for (std::size_t own = 0; own < movers.size(); ++own)
      if (movers[own].walk && hold_all_but(own, *influence, movers)) return;
    std::vector<std::size_t> all(movers.size());
    std::iota(all.begin(), all.end(), std::size_t{0});
    const bool walked = std::any_of(movers.begin(), movers.end(), [](const Mover& mover) { return mover.walk; });
    if (!walked && influence->stand_still(all)) return movers.clear();
    if (movers.size() > most_tried_alone) return;
    std::vector<Mover> moving;  // for the sentence that names them
    for (std::size_t i = 0; i < movers.size(); ++i)
      if (!influence->stand_still({&i, 1})) moving.push_back(movers[i]);
    if (moving.size() > 1 || (moving.size() == 1 && !moving.front().walk)) movers = std::move(moving);
  }

  // Whether all the others leave the reading alone; then they stand still, and `own` is the only mover.
  bool hold_all_but(std::size_t own, const Influence& influence, std::vector<Mover>& movers) {
    std::vector<std::size_t> others;
    for (std::size_t i = 0; i < movers.size(); ++i)
      if (i != own) others.push_back(i);
    if (!influence.stand_still(others)) return false;
    auto share = influence.leakage_share(own, others);
    if (!share) return false;
    leakage_share_ = std::move(*share);
    found_.leakage_where = leakage_share_.where;
    for (const std::size_t other : others) {
      found_.held.push_back(influence.held_text(other));
      if (const auto held = influence.held(other)) held_.push_back(*held);
    }
    movers = {Mover(movers[own])};
    return true;
  }

  // Sensors by the way in which they move the input, "" for those with a way of their own.
  [[nodiscard]] std::vector<std::pair<std::string, std::vector<std::string>>> by_way(
      const std::vector<Mover>& movers) const {
    std::vector<std::pair<std::string, std::vector<std::string>>> ways;
    for (const Mover& mover : movers) {
      const std::string way = way_of(mover);
      auto at = std::find_if(ways.begin(), ways.end(), [&](const auto& entry) { return entry.first == way; });
      if (at == ways.end()) at = ways.insert(ways.end(), {way, {}});
      at->second.push_back(printable_short(graph_.board().sensors[mover.sensor].name));
    }
    return ways;
  }

  [[nodiscard]] std::string way_of(const Mover& mover) const {
    if (!mover.walk) return way_in(graph_, around_, pin_, mover.sensor);
    const bool by_parameter = mover.edge->is_rail && graph_.board().sensors[mover.sensor].variable;
    return by_parameter ? fmt::format(" through rail {}", printable_short(graph_.rails().at(mover.edge->plus)->name))
                        : std::string{};
  }

  void refuse_several(const std::vector<Mover>& movers) {
    constexpr std::size_t most = 5;  // named of each way
    std::vector<std::string> texts;
    for (auto& [way, names] : by_way(movers)) {
      const std::size_t more = names.size() > most ? names.size() - most : 0;
      names.resize(names.size() - more);
      texts.push_back(fmt::format("{}{}{}", fmt::join(names, ", "),
                                  more > 0 ? fmt::format(" and {} more", more) : std::string{}, way));
    }
    refuse(
        fmt::format("{} sensors move it ({}); this version sweeps one: leave out the [sensor.NAME] of those that "
                    "may stand still at the netlist's values, or declare them for a run of their own (--with)",
                    movers.size(), fmt::join(texts, "; ")));
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
    return {graph_, request_.inputs, found_.input, around_, edge_ ? &*edge_ : nullptr, held_};
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
                            : [](std::span<const Edge>, Node) { return Weight{}; };
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
    if (std::string why = end_on_the_way(); !why.empty()) return leave(std::move(why));
    name_parts(sides);
    found_.candidates = arms_->candidates;
    found_.tap = tap_net();
  }

  // The bare divider has no sense path, and so no such node.
  [[nodiscard]] std::string end_on_the_way() const {
    for (const model::BoundEnd* end : {&found_.input.low, &found_.input.high}) {
      const auto* net = std::get_if<model::NetId>(end);
      if (net == nullptr) continue;
      const auto& nodes = walk_->nodes;
      const auto after_tap = nodes.begin() + static_cast<std::ptrdiff_t>(arms_->tap) + 1;
      if (std::find(after_tap, nodes.end(), graph_.nodes().of(*net)) != nodes.end())
        return fmt::format(
            "net {}, an end of its range, lies between tap and pin: what the divider reads cannot be "
            "told there",
            printable_short(graph_.names().text(*net)));
    }
    return {};
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
    for (std::size_t k = 0; k < leakage_share_.of_each.size(); ++k)
      found_.whole.leakage_amperes[k] *= leakage_share_.of_each[k];
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
  std::vector<Held> held_;
  LeakageShare leakage_share_;
};

}  // namespace

model::Divider divide_input(const InputRequest& request, const model::Input& input) {
  return OneInput(request, input).run();
}

}  // namespace divide
