#include "divide/rails.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <unordered_set>

#include "base/text.hpp"
#include "divide/leaves.hpp"
#include "expression/evaluate.hpp"

namespace divide {
namespace {

using base::printable_short;

class Finder {
 public:
  Finder(const model::Circuit& circuit, const model::Sheet& sheet, const Board& board, const Nodes& nodes,
         const NameIndex& index, source::Diagnostics& diagnostics)
      : circuit_(circuit), sheet_(sheet), board_(board), nodes_(nodes), index_(index), diagnostics_(diagnostics) {
    found_.of.resize(nodes.size());
    found_.spent.resize(circuit.elements.size());
    add(nodes.of(model::ground), "0");
  }

  Rails run() {
    for (const auto& declared : sheet_.rails) declare(declared);
    declared_ = found_.rails.size();
    for (std::size_t i = 0; i < board_.sensors.size(); ++i)
      if (board_.sensors[i].kind->moves == sensor::Moves::rail) sweep(i);
    declared_ = found_.rails.size();
    follow_sources();
    for (Rail& rail : found_.rails)
      if (!rail.sensor) rail.highest_volts = rail.volts.fixed() ? rail.volts.value : highest(rail.volts.residual);
    return std::move(found_);
  }

 private:
  Rail& add(Node node, std::string name) {
    found_.of[node] = found_.rails.size();
    Rail& rail = found_.rails.emplace_back();
    rail.node = node;
    rail.name = std::move(name);
    return rail;
  }

  void error(source::Span where, std::string message) {
    diagnostics_.push_back({base::Level::error, where, std::move(message)});
  }

  // The node of a declared rail, or nothing after an error.
  std::optional<Node> node_of(const std::string& name, source::Span where) {
    const model::NetId net = index_.net(name);
    if (net.valid()) return nodes_.of(net);
    error(where,
          fmt::format("rail \"{}\" is no net of the netlist{}", printable_short(name), index_.suggest_net(name)));
    return std::nullopt;
  }

  void declare(const model::RailDeclaration& declared) {
    const auto node = node_of(declared.net, declared.where);
    if (!node) return;
    if (const Rail* other = found_.at(*node)) {
      if (declared.volts && other->has_volts && declared.volts->value == other->volts.value &&
          declared.ohms == std::nullopt)
        return;
      return error(declared.where, fmt::format("rail \"{}\" is joined to rail \"{}\" by shorts: declare one of them",
                                               printable_short(declared.net), printable_short(other->name)));
    }
    Rail& rail = add(*node, std::string(index_.text(index_.net(declared.net))));
    rail.has_volts = declared.volts.has_value();
    if (declared.volts) rail.volts.value = declared.volts->value;
    if (declared.ohms) rail.ohms = declared.ohms->value;
  }

  // A sensor of kind "voltage" names the rail that it sweeps; the rail need not be declared besides.
  void sweep(std::size_t sensor) {
    const auto& declared = sheet_.sensors[board_.sensors[sensor].declaration];
    const auto node = node_of(declared.name, declared.where);
    if (!node) return;
    if (*node == nodes_.of(model::ground)) return error(declared.where, "ground cannot be swept");
    const bool known = found_.of[*node].has_value();
    Rail& rail =
        known ? found_.rails[*found_.of[*node]] : add(*node, std::string(index_.text(index_.net(declared.name))));
    if (!known) rail.has_volts = false;
    rail.sensor = sensor;
    const double from = declared.from ? declared.from->value : 0;
    const double to = declared.to ? declared.to->value : 0;
    rail.highest_volts = std::fabs(from) > std::fabs(to) ? from : to;
  }

  // Of an expression at both ends of its parameters' sweeps, the volts that are farther from 0.
  [[nodiscard]] double highest(model::ExpressionId tree) const {
    double most = 0;
    for (const bool at_end : {false, true}) {
      expression::Leaves leaves;
      leaves.variable = [&](std::uint32_t variable) {
        for (const BoundSensor& bound : board_.sensors) {
          const auto& declared = sheet_.sensors[bound.declaration];
          const auto& end = at_end ? declared.to : declared.from;
          if (bound.variable == variable && end) return end->value;
        }
        return 0.0;
      };
      const auto value = expression::evaluate(circuit_.expressions, tree, leaves);
      if (const double* volts = std::get_if<double>(&value); volts != nullptr && std::fabs(*volts) > std::fabs(most))
        most = *volts;
    }
    return most;
  }

  // The sources whose current something follows.
  [[nodiscard]] std::unordered_set<std::uint32_t> measured() const {
    std::unordered_set<std::uint32_t> found;
    for (std::size_t i = 0; i < circuit_.elements.size(); ++i) {
      if (board_.removed[i]) continue;
      const model::Part& part = circuit_.elements[i].part;
      if (const auto* controlled = std::get_if<model::CurrentControlled>(&part))
        found.insert(controlled->through.value);
      if (const auto* behavioural = std::get_if<model::Behavioural>(&part))
        for_each_leaf(
            circuit_.expressions, behavioural->expression, [](model::NetId) {},
            [&](model::ElementId source) { found.insert(source.value); });
    }
    return found;
  }

  // Sources from a rail to a node make that node a rail, until nothing changes. An ammeter (0 V, its current followed)
  // stays a branch: only there can its current be told.
  void follow_sources() {
    const auto followed = measured();
    std::vector<std::size_t> open;
    for (std::size_t i = 0; i < circuit_.elements.size(); ++i) {
      if (board_.removed[i]) continue;
      const auto* source = std::get_if<model::VoltageSource>(&circuit_.elements[i].part);
      if (source == nullptr) continue;
      const bool ammeter = source->volts.fixed() && source->volts.value == 0 && followed.contains(id_of(i).value);
      if (!ammeter || joins_rails(i)) open.push_back(i);
    }
    for (bool changed = true; changed;) {
      changed = false;
      const auto done = std::remove_if(open.begin(), open.end(), [&](std::size_t i) { return follow(i, changed); });
      open.erase(done, open.end());
    }
  }

  // A declared rail on either side stays one, ammeter or not.
  [[nodiscard]] bool joins_rails(std::size_t i) const {
    const auto& element = circuit_.elements[i];
    return found_.of[nodes_.of(circuit_.pin(element, 0))] && found_.of[nodes_.of(circuit_.pin(element, 1))];
  }

  // Whether the source is used up.
  bool follow(std::size_t i, bool& changed) {
    const auto& element = circuit_.elements[i];
    const model::Number volts = std::get<model::VoltageSource>(element.part).volts;
    const Node plus = nodes_.of(circuit_.pin(element, 0));
    const Node minus = nodes_.of(circuit_.pin(element, 1));
    const bool plus_known = found_.of[plus].has_value();
    const bool minus_known = found_.of[minus].has_value();
    if (plus_known == minus_known) {
      if (plus_known) meet(i, volts, plus, minus);
      return plus_known;
    }
    const Node other = plus_known ? plus : minus;
    const Node next = plus_known ? minus : plus;
    const Rail base = found_.rails[*found_.of[other]];
    // A sum of a swept and another voltage stays a branch: only plain sums make rails.
    if (!base.has_volts || base.sensor || base.ohms != 0 || !base.volts.fixed()) return false;
    if (!volts.fixed() && (base.volts.value != 0 || plus_known)) return false;
    Rail& rail = add(next, std::string(index_.text(first_net(next))));
    rail.volts =
        volts.fixed() ? model::Number{base.volts.value + (plus_known ? -volts.value : volts.value), {}} : volts;
    rail.sources = base.sources;
    rail.sources.push_back(id_of(i));
    found_.spent[i] = 1;
    changed = true;
    return true;
  }

  static model::ElementId id_of(std::size_t i) { return model::ElementId{static_cast<std::uint32_t>(i)}; }

  [[nodiscard]] model::NetId first_net(Node node) const { return nodes_.nets(node).front(); }

  // Volts that are sums of the netlist's numbers agree but for the last bits.
  static bool agree(double a, double b) { return std::fabs(a - b) <= 1e-9 * std::max(std::fabs(a), std::fabs(b)); }

  // A source between two rails: a declaration overrides it; two sources that disagree are a conflict.
  void meet(std::size_t i, const model::Number& volts, Node plus, Node minus) {
    found_.spent[i] = 1;
    Rail& upper = found_.rails[*found_.of[plus]];
    Rail& lower = found_.rails[*found_.of[minus]];
    Rail& silent = upper.has_volts ? lower : upper;
    if (!silent.has_volts && volts.fixed()) {  // swept, and the netlist says where it stands at rest
      silent.has_volts = true;
      silent.volts.value = &silent == &upper ? lower.volts.value + volts.value : upper.volts.value - volts.value;
      silent.sources.push_back(id_of(i));
      return;
    }
    const bool from_declaration = *found_.of[plus] < declared_ && *found_.of[minus] < declared_;
    const bool one_declared = (*found_.of[plus] != 0 && *found_.of[plus] < declared_) ||
                              (*found_.of[minus] != 0 && *found_.of[minus] < declared_);
    if (from_declaration && one_declared) return;
    if (volts.fixed() && upper.volts.fixed() && lower.volts.fixed() &&
        agree(upper.volts.value, lower.volts.value + volts.value))
      return;
    Rail& blamed = plus == 0 ? lower : upper;
    blamed.conflict = fmt::format("{} and another source hold {} at different voltages",
                                  printable_short(index_.text(id_of(i))), printable_short(blamed.name));
  }

  const model::Circuit& circuit_;
  const model::Sheet& sheet_;
  const Board& board_;
  const Nodes& nodes_;
  const NameIndex& index_;
  source::Diagnostics& diagnostics_;
  Rails found_;
  std::size_t declared_ = 0;  // rails before this index were declared
};

}  // namespace

const Rail* Rails::ideal_at(Node node) const {
  const Rail* rail = at(node);
  return rail != nullptr && rail->ohms == 0 ? rail : nullptr;
}

Rails find_rails(const model::Circuit& circuit, const model::Sheet& sheet, const Board& board, const Nodes& nodes,
                 const NameIndex& index, source::Diagnostics& diagnostics) {
  return Finder(circuit, sheet, board, nodes, index, diagnostics).run();
}

}  // namespace divide
