#include "divide/networks.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

#include "divide/sensors.hpp"
#include "divide/sweep_values.hpp"
#include "network/linear.hpp"

namespace divide {
namespace {

using model::BranchId;

BranchId push(model::Network& network, model::Branch branch) {
  network.branches.push_back(std::move(branch));
  return BranchId{static_cast<std::uint32_t>(network.branches.size() - 1)};
}

// Which branches a sensor moves.
std::vector<model::SweptBranch> swept_branches(const Graph& graph, const Built& built, std::size_t sensor) {
  std::vector<model::SweptBranch> swept;
  const BoundSensor& bound = graph.board().sensors[sensor];
  for (const auto& [edge, branch] : built.edges) {
    if (graph.is_extra(edge) && graph.extra(edge).sensor == sensor)
      swept.push_back({branch, model::SweptQuantity::ohms, graph.name(edge)});
    else if (bound.variable &&
             depends_on(graph.circuit().expressions, expression_of(graph.part(edge)), *bound.variable))
      swept.push_back({branch, model::SweptQuantity::value, graph.name(edge)});
  }
  for (const auto& [index, branch] : built.rails) {
    const Rail& rail = graph.rails().rails[index];
    if (rail.sensor == sensor)
      swept.push_back({branch, model::SweptQuantity::volts, {}});
    else if (bound.variable && depends_on(graph.circuit().expressions, rail.volts.residual, *bound.variable))
      swept.push_back({branch, model::SweptQuantity::value, {}});
  }
  return swept;
}

// As build(), with the sensors that stand still at their values.
Built build_held(const Subject& subject, std::span<const Edge> edges, std::span<const Node> nodes, bool ideal_rails) {
  Built built = build(subject.graph, edges, nodes, ideal_rails);
  for (const Held& held : subject.held) {
    model::ProbedNetwork probed;
    probed.swept = swept_branches(subject.graph, built, held.sensor);
    probed.network = std::move(built.network);
    // What has no value there stays without one, and no solve accepts that.
    (void)hold(probed, subject.graph.circuit(), *held.declaration, held.at);
    built.network = std::move(probed.network);
  }
  return built;
}

// Whether an end of the converter's range moves with the network: then it is probed like the pin.
bool must_probe(const Graph& graph, const model::BoundEnd& end) {
  const auto* net = std::get_if<model::NetId>(&end);
  if (net == nullptr) return false;
  const Rail* rail = graph.rails().at(graph.nodes().of(*net));
  return rail == nullptr || rail->ohms != 0 || rail->sensor || !rail->volts.fixed();
}

void probe_ends(const Subject& subject, const Built& built, model::ProbedNetwork& out) {
  const auto node_of = [&](const model::BoundEnd& end) {
    return must_probe(subject.graph, end) ? built.node(subject.graph.nodes().of(std::get<model::NetId>(end)))
                                          : model::NodeId{};
  };
  out.low = node_of(subject.input.low);
  out.high = node_of(subject.input.high);
}

void note_sensor(const Subject& subject, const Built& built, model::ProbedNetwork& out) {
  if (subject.sensor == nullptr || subject.sensor->is_rail) return;
  out.sensor_plus = built.node(subject.sensor->plus);
  out.sensor_minus = built.node(subject.sensor->minus);
  if (subject.sensor->edges.size() != 1) return;
  const BranchId branch = built.branch(subject.sensor->edges.front());
  if (branch.valid() && std::holds_alternative<model::Resistor>(built.network.branches[branch.index()].part))
    out.sensor = branch;
}

// Each converter input on the network draws its leakage and has its input resistance.
void add_inputs(const Subject& subject, const Built& built, model::ProbedNetwork& out) {
  for (const model::Input& input : subject.inputs) {
    const Node node = subject.graph.nodes().of(input.net);
    const model::NodeId at = built.node(node);
    if (!at.valid() || subject.graph.rails().ideal_at(node) != nullptr) continue;
    if (input.input_resistance)
      push(out.network, {model::Resistor{{*input.input_resistance, {}}},
                         {at, model::ground_node},
                         2,
                         model::BranchOrigin::input_resistance,
                         {},
                         {}});
    if (input.leakage == 0) continue;
    out.leakages.push_back(
        push(out.network, {model::CurrentSource{}, {model::ground_node, at}, 2, model::BranchOrigin::leakage, {}, {}}));
    out.leakage_amperes.push_back(input.leakage);
  }
}

std::vector<Node> wanted_nodes(const Subject& subject) {
  std::vector<Node> nodes{subject.graph.nodes().of(subject.input.net)};
  for (const model::BoundEnd* end : {&subject.input.low, &subject.input.high})
    if (const auto* net = std::get_if<model::NetId>(end)) nodes.push_back(subject.graph.nodes().of(*net));
  return nodes;
}

// Takes the network out of `built`.
model::ProbedNetwork finish(const Subject& subject, Built& built, Node probe) {
  model::ProbedNetwork out;
  out.probe = built.node(probe);
  probe_ends(subject, built, out);
  note_sensor(subject, built, out);
  if (subject.sensor != nullptr) out.swept = swept_branches(subject.graph, built, subject.sensor->sensor);
  out.network = std::move(built.network);
  return out;
}

std::vector<Edge> with_sensor(const Subject& subject, std::span<const Edge> arms) {
  std::vector<Edge> edges(arms.begin(), arms.end());
  if (subject.sensor != nullptr) edges.insert(edges.end(), subject.sensor->edges.begin(), subject.sensor->edges.end());
  std::sort(edges.begin(), edges.end());
  edges.erase(std::unique(edges.begin(), edges.end()), edges.end());
  return edges;
}

// A network in which the sensor is a single resistance, whatever it is made of.
struct Plain {
  model::Network network;
  BranchId sensor;
  model::NodeId probe;
  model::NodeId other;
};

Plain plain_network(const Subject& subject, std::span<const Edge> edges, Node probe, bool ideal_rails, Node other) {
  std::vector<Edge> others;
  const auto& own = subject.sensor->edges;
  std::copy_if(edges.begin(), edges.end(), std::back_inserter(others),
               [&](Edge edge) { return std::find(own.begin(), own.end(), edge) == own.end(); });
  const std::vector<Node> nodes{probe, subject.sensor->plus, subject.sensor->minus, other};
  Built built = build_held(subject, others, nodes, ideal_rails);
  Plain plain{std::move(built.network), {}, built.node(probe), built.node(other)};
  const model::NodeId plus = built.node(subject.sensor->plus);
  const model::NodeId minus = built.node(subject.sensor->minus);
  plain.sensor =
      push(plain.network, {model::Resistor{{1e4, {}}}, {plus, minus}, 2, model::BranchOrigin::sensor, {}, {}});
  return plain;
}

// What the sensor is at a few points: its ohms, or where only the simulator could tell them, five decades of ohms.
std::vector<double> sample_ohms(const Subject& subject, const model::SensorDeclaration& declaration) {
  constexpr std::size_t samples = 7;
  const std::vector<double> decades{1e2, 1e3, 1e4, 1e5, 1e6};
  if (subject.sensor->edges.size() != 1) return decades;
  Built built = build(subject.graph, subject.sensor->edges, {}, true);
  const model::ProbedNetwork probed = finish(subject, built, subject.sensor->plus);
  const auto at = measurands(declaration, samples);
  if (!at.ok() || probed.swept.size() != 1 || !probed.sensor.valid()) return decades;
  const auto values = swept_values(probed, subject.graph.circuit(), declaration, *at);
  return values.ok() ? values->front().values : decades;
}

// Volts of two nodes at each sample; empty where some have no solution.
struct Volts {
  std::vector<double> pin;
  std::vector<double> node;
};

// With a resistance for a sensor.
Volts sensor_volts(const Subject& subject, std::span<const Edge> edges, Node node, std::span<const double> ohms,
                   double at) {
  Plain plain = plain_network(subject, edges, subject.graph.nodes().of(subject.input.net), false, node);
  Volts volts;
  if (!freeze(plain.network, subject.graph.circuit(), at)) return volts;
  for (const double value : ohms) {
    const model::Override held{plain.sensor, value};
    const auto solved = network::node_volts(plain.network, {&held, 1});
    if (!solved.ok()) return {};
    volts.pin.push_back((*solved)[plain.probe.index()]);
    volts.node.push_back((*solved)[plain.other.index()]);
  }
  return volts;
}

// Of a monitor: the swept rail moves the nodes in proportion, so its highest volts tell the weights.
Volts monitor_volts(const Subject& subject, std::span<const Edge> edges, Node node, double at) {
  std::vector<Node> nodes = wanted_nodes(subject);
  nodes.push_back(node);
  Built built = build_held(subject, edges, nodes, false);
  if (!freeze(built.network, subject.graph.circuit(), at)) return {};
  std::vector<model::Override> held;
  for (const auto& [index, branch] : built.rails) {
    const Rail& rail = subject.graph.rails().rails[index];
    if (rail.sensor || !rail.has_volts) held.push_back({branch, rail.highest_volts});
  }
  const auto solved = network::node_volts(built.network, held);
  if (!solved.ok()) return {};
  const auto volts = [&](Node at_node) { return (*solved)[built.node(at_node).index()]; };
  return {{volts(subject.graph.nodes().of(subject.input.net))}, {volts(node)}};
}

std::vector<Edge> without(std::span<const Edge> edges, std::span<const Edge> removed) {
  std::vector<Edge> left;
  std::copy_if(edges.begin(), edges.end(), std::back_inserter(left),
               [&](Edge edge) { return std::find(removed.begin(), removed.end(), edge) == removed.end(); });
  return left;
}

double swing(const std::vector<double>& volts) {
  if (volts.empty()) return 0;
  const auto [lowest, highest] = std::minmax_element(volts.begin(), volts.end());
  return *highest - *lowest;
}

double farthest(const std::vector<double>& from, const std::vector<double>& to) {
  if (from.size() != to.size()) return std::numeric_limits<double>::infinity();
  double most = 0;
  for (std::size_t i = 0; i < from.size(); ++i) most = std::max(most, std::fabs(to[i] - from[i]));
  return most;
}

// Whether something tells a node's voltage where only these edges are left: one that nothing touches would float.
bool is_held(const Graph& graph, std::span<const Edge> edges, Node node) {
  const auto touches = [&](Edge edge) {
    for (std::size_t i = 0; i < graph.pin_count(edge); ++i)
      if (graph.pin(edge, i) == node) return true;
    return false;
  };
  return graph.rails().at(node) != nullptr || std::any_of(edges.begin(), edges.end(), touches);
}

// Whether the sensor's inside is joined to a rail that is none of its two ends: then no one resistance stands for it.
bool has_third_end(const Subject& subject) {
  for (const Edge edge : subject.sensor->edges)
    for (std::size_t i = 0; i < subject.graph.pin_count(edge); ++i) {
      const Node node = subject.graph.pin(edge, i);
      if (node != subject.sensor->plus && node != subject.sensor->minus && subject.graph.rails().at(node) != nullptr)
        return true;
    }
  return false;
}

}  // namespace

model::ProbedNetwork whole_network(const Subject& subject) {
  std::vector<Node> nodes = wanted_nodes(subject);
  if (subject.sensor != nullptr) nodes.push_back(subject.sensor->plus), nodes.push_back(subject.sensor->minus);
  Built built = build_held(subject, subject.around.edges, nodes, false);
  model::ProbedNetwork out = finish(subject, built, subject.graph.nodes().of(subject.input.net));
  add_inputs(subject, built, out);
  return out;
}

model::ProbedNetwork bare_network(const Subject& subject, std::span<const Edge> arms, Node tap) {
  std::vector<Node> nodes{tap};
  if (subject.sensor != nullptr) nodes.push_back(subject.sensor->plus), nodes.push_back(subject.sensor->minus);
  const std::vector<Edge> edges = with_sensor(subject, arms);
  for (const model::BoundEnd* end : {&subject.input.low, &subject.input.high})
    if (must_probe(subject.graph, *end) &&
        is_held(subject.graph, edges, subject.graph.nodes().of(std::get<model::NetId>(*end))))
      nodes.push_back(subject.graph.nodes().of(std::get<model::NetId>(*end)));
  Built built = build_held(subject, edges, nodes, true);
  return finish(subject, built, tap);
}

std::optional<model::OnePort> sensor_form(const Subject& subject, std::span<const Edge> arms, Node tap) {
  if (subject.sensor == nullptr || subject.sensor->is_rail || has_third_end(subject)) return std::nullopt;
  const Plain plain = plain_network(subject, arms, tap, true, tap);
  const bool fixed = std::none_of(plain.network.branches.begin(), plain.network.branches.end(),
                                  [](const model::Branch& branch) { return expression_of(branch.part).valid(); });
  if (!plain.network.linear || !fixed) return std::nullopt;
  const auto form = network::one_port(plain.network, plain.sensor, plain.probe);
  return form.ok() ? std::optional(*form) : std::nullopt;
}

Weigh weigher(const Subject& subject, const model::SensorDeclaration& declaration) {
  const bool monitor = subject.sensor->is_rail;
  const std::vector<double> ohms = monitor ? std::vector<double>{} : sample_ohms(subject, declaration);
  const double end = declaration.to ? declaration.to->value : 0;
  const auto solve = [subject, monitor, ohms, end](std::span<const Edge> edges, Node node) {
    return monitor ? monitor_volts(subject, edges, node, end) : sensor_volts(subject, edges, node, ohms, end);
  };
  return [subject, solve](std::span<const Edge> removed, Node node) {
    const Volts all = solve(subject.around.edges, node);
    const Volts left = solve(without(subject.around.edges, removed), node);
    Weight weight;
    weight.swing_volts = swing(all.pin);
    weight.pin_volts = farthest(all.pin, left.pin);
    weight.node_volts = farthest(all.node, left.node);
    return weight;
  };
}

}  // namespace divide
