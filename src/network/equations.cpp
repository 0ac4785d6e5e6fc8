#include "network/equations.hpp"

#include <algorithm>
#include <cmath>
#include <variant>

#include "base/disjoint_sets.hpp"

namespace network {
namespace {

constexpr const char* floats = "a node has no conducting way to ground";
constexpr const char* fight = "a voltage source is shorted or works against another one";

template <class Part>
const Part* as(const model::Branch& branch) {
  return std::get_if<Part>(&branch.part);
}

// Makes the equations of one network; each step needs what the one before has found.
class Maker {
 public:
  Maker(const model::Network& network, const Values& values)
      : network_(network), values_(values), shorts_(network.node_count), reach_(network.node_count) {}

  base::Result<Equations> make() {
    join_shorts();
    if (const char* trouble = number_nodes()) return base::Error{trouble};
    number_currents();
    made_.terms.reserve(network_.branches.size());
    for (std::uint32_t i = 0; i < network_.branches.size(); ++i)
      if (const char* trouble = add_term(model::BranchId{i})) return base::Error{trouble};
    return std::move(made_);
  }

 private:
  static bool conducts_volts(const model::Branch& branch) {
    if (const auto* e = as<model::VoltageControlled>(branch)) return !e->drives_current;
    if (const auto* h = as<model::CurrentControlled>(branch)) return !h->drives_current;
    return as<model::VoltageSource>(branch) != nullptr;
  }

  static std::uint32_t node(const model::Branch& branch, std::size_t pin) { return branch.nodes[pin].value; }

  void join_shorts() {
    for (std::size_t i = 0; i < network_.branches.size(); ++i) {
      const auto& branch = network_.branches[i];
      const bool zero = as<model::Resistor>(branch) != nullptr && values_[i] == 0;
      if (!zero && as<model::Inductor>(branch) == nullptr) continue;
      shorts_.join(node(branch, 0), node(branch, 1));
      reach_.join(node(branch, 0), node(branch, 1));
    }
  }

  // Which nodes some branch that matters touches, and which hang together. A controlled current source may act as a
  // conductance, so it counts as a way; where it is none the factors are singular and that is found there.
  void follow_branches(std::vector<bool>& touched) {
    for (std::size_t i = 0; i < network_.branches.size(); ++i) {
      const auto& branch = network_.branches[i];
      const bool resistor = as<model::Resistor>(branch) != nullptr && std::isfinite(values_[i]) && values_[i] != 0;
      const bool current = as<model::CurrentSource>(branch) != nullptr;
      const bool controlled =
          as<model::VoltageControlled>(branch) != nullptr || as<model::CurrentControlled>(branch) != nullptr;
      if (!resistor && !current && !controlled && as<model::VoltageSource>(branch) == nullptr) continue;
      if (!current) reach_.join(node(branch, 0), node(branch, 1));
      const std::size_t pins = as<model::VoltageControlled>(branch) != nullptr ? 4 : 2;
      for (std::size_t pin = 0; pin < pins; ++pin) touched[shorts_.find(node(branch, pin))] = true;
    }
  }

  const char* number_nodes() {
    std::vector<bool> touched(network_.node_count, false);
    follow_branches(touched);
    made_.slot_of_node.assign(network_.node_count, 0);
    made_.reached.assign(network_.node_count, true);
    for (std::uint32_t n = 1; n < network_.node_count; ++n) {
      const std::uint32_t first = shorts_.find(n);
      if (first != 0) made_.reached[n] = touched[first];
      if (first == 0 || !touched[first]) continue;
      if (reach_.find(n) != 0) return floats;
      made_.slot_of_node[n] = first == n ? made_.slots++ : made_.slot_of_node[first];
    }
    made_.node_slots = made_.slots;
    return nullptr;
  }

  void number_currents() {
    current_of_.assign(network_.branches.size(), 0);
    for (std::size_t i = 0; i < network_.branches.size(); ++i)
      if (conducts_volts(network_.branches[i])) current_of_[i] = made_.slots++;
  }

  const char* add_term(model::BranchId id) {
    const auto& branch = network_.branches[id.index()];
    Term term;
    term.branch = id;
    term.plus = made_.slot_of_node[node(branch, 0)];
    term.minus = made_.slot_of_node[node(branch, 1)];
    term.value = values_[id.index()];
    term.current = current_of_[id.index()];
    if (as<model::Resistor>(branch) != nullptr) return add_resistor(term);
    if (as<model::CurrentSource>(branch) != nullptr) return add(Relation::amperes, term);
    if (as<model::VoltageSource>(branch) != nullptr) return add_volts(branch, term);
    if (const auto* e = as<model::VoltageControlled>(branch)) {
      term.control_plus = made_.slot_of_node[node(branch, 2)];
      term.control_minus = made_.slot_of_node[node(branch, 3)];
      made_.passive = false;
      return add(e->drives_current ? Relation::transconductance : Relation::volts_gain, term);
    }
    if (const auto* f = as<model::CurrentControlled>(branch)) {
      if (!branch.through.valid() || as<model::VoltageSource>(network_.branches[branch.through.index()]) == nullptr)
        return "a current-controlled source has no voltage source that controls it";
      term.control_current = current_of_[branch.through.index()];
      made_.passive = false;
      return add(f->drives_current ? Relation::current_gain : Relation::transresistance, term);
    }
    return nullptr;
  }

  const char* add_resistor(Term& term) {
    if (term.value == 0 || std::isinf(term.value)) return nullptr;
    const double ohms = term.value;
    if (ohms > 0) made_.smallest_ohms = made_.smallest_ohms > 0 ? std::min(made_.smallest_ohms, ohms) : ohms;
    if (ohms < 0) made_.passive = false;
    term.value = 1 / ohms;
    return add(Relation::conductance, term);
  }

  const char* add_volts(const model::Branch& branch, const Term& term) {
    if (!shorts_.join(node(branch, 0), node(branch, 1))) return fight;
    return add(Relation::volts, term);
  }

  const char* add(Relation relation, Term term) {
    if (std::isnan(term.value)) return "a branch of the network has no number";
    if (std::isinf(term.value)) return "a branch of the network has an infinite value";
    term.relation = relation;
    made_.terms.push_back(term);
    return nullptr;
  }

  const model::Network& network_;
  const Values& values_;
  base::DisjointSets shorts_;  // once nodes are numbered, joined further by the voltage sources seen so far
  base::DisjointSets reach_;
  std::vector<Slot> current_of_;
  Equations made_;
};

}  // namespace

base::Result<Equations> equations_of(const model::Network& network, const Values& values) {
  return Maker(network, values).make();
}

std::vector<double> source_side(const Equations& equations, const Values& values) {
  std::vector<double> side(equations.slots, 0.0);
  for (const Term& term : equations.terms) {
    const double value = values[term.branch.index()];
    if (term.relation == Relation::volts) side[term.current] = value;
    if (term.relation != Relation::amperes) continue;
    side[term.plus] -= value;
    side[term.minus] += value;
  }
  side[0] = 0;
  return side;
}

std::vector<double> ampere_side(const Equations& equations, model::NodeId into, model::NodeId out_of) {
  std::vector<double> side(equations.slots, 0.0);
  side[equations.slot_of_node[into.index()]] += 1;
  side[equations.slot_of_node[out_of.index()]] -= 1;
  side[0] = 0;
  return side;
}

std::vector<double> residual(const Equations& equations, const std::vector<double>& side,
                             const std::vector<double>& solution) {
  std::vector<double> left = side;
  const auto& x = solution;
  for (const Term& term : equations.terms) {
    double amperes = 0;
    switch (term.relation) {
      case Relation::amperes:
        continue;
      case Relation::conductance:
        amperes = term.value * (x[term.plus] - x[term.minus]);
        break;
      case Relation::transconductance:
        amperes = term.value * (x[term.control_plus] - x[term.control_minus]);
        break;
      case Relation::current_gain:
        amperes = term.value * x[term.control_current];
        break;
      case Relation::volts:
        amperes = x[term.current];
        left[term.current] -= x[term.plus] - x[term.minus];
        break;
      case Relation::volts_gain:
        amperes = x[term.current];
        left[term.current] -=
            x[term.plus] - x[term.minus] - term.value * (x[term.control_plus] - x[term.control_minus]);
        break;
      case Relation::transresistance:
        amperes = x[term.current];
        left[term.current] -= x[term.plus] - x[term.minus] - term.value * x[term.control_current];
        break;
    }
    left[term.plus] -= amperes;
    left[term.minus] += amperes;
  }
  left[0] = 0;
  return left;
}

}  // namespace network
