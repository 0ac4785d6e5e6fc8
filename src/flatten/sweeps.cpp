#include "flatten/sweeps.hpp"

#include <limits>

namespace flatten {

void Sweeps::begin(Frame& top) {
  model::Circuit& circuit = work_.circuit;
  const std::vector<SweepRequest>& requests = work_.options.sweeps;
  for (std::size_t i = 0; i < requests.size(); ++i) {
    const base::NameId parameter = work_.names.intern(requests[i].parameter);
    model::SweptParameter swept;
    swept.sensor = requests[i].sensor;
    swept.parameter = parameter;
    swept.variable = static_cast<std::uint32_t>(i);
    circuit.swept.push_back(std::move(swept));
    model::ExpressionNode node;
    node.op = model::Op::variable;
    node.index = static_cast<std::uint32_t>(i);
    circuit.expressions.nodes.push_back(node);
  }
  std::vector<std::pair<std::size_t, std::size_t>> meant;  // of the top level: request, slot
  for (std::size_t i = 0; i < requests.size(); ++i) {
    const base::NameId parameter = circuit.swept[i].parameter;
    const model::ScopeId inside = subcircuit_at(top.scope, requests[i].sensor);
    if (inside.valid() && work_.library.parameter(inside, parameter)) {
      by_path_[base::folded(requests[i].sensor)].push_back(i);
    } else if (const auto slot = work_.library.parameter(top.scope, parameter)) {
      circuit.swept[i].nominal = nominal(top, parameter);
      meant.emplace_back(i, *slot);
    }
  }
  for (const auto& [request, slot] : meant) free(top, request, slot);
  top.parameters = {};  // what was worked out for the nominal values knows nothing of the sweep
}

void Sweeps::bind(Frame& frame) {
  if (by_path_.empty()) return;
  const std::string_view path(frame.path.data(), frame.path.size() - 1);
  const auto at = by_path_.find(base::folded(path));
  if (at == by_path_.end()) return;
  for (const std::size_t request : at->second) {
    model::SweptParameter& swept = work_.circuit.swept[request];
    const auto slot = work_.library.parameter(frame.scope, swept.parameter);
    if (!slot || swept.found) continue;
    swept.instance = frame.instance;
    swept.nominal = nominal(frame, swept.parameter);
    free(frame, request, *slot);
  }
  frame.parameters = {};
}

// Two requests for one parameter share the variable of the first.
void Sweeps::free(Frame& frame, std::size_t request, std::size_t slot) {
  model::SweptParameter& swept = work_.circuit.swept[request];
  swept.found = true;
  for (const auto& [taken, variable] : frame.swept) {
    if (taken == slot) swept.variable = variable;
  }
  if (swept.variable == request) frame.swept.emplace_back(slot, swept.variable);
}

double Sweeps::nominal(const Frame& frame, base::NameId parameter) {
  const auto value = parameters_.value(frame, parameter, {}, {}, expression::Literals::milli, true);
  const bool known = value && value->number.fixed();
  return known ? value->number.value : std::numeric_limits<double>::quiet_NaN();
}

const std::vector<const model::ElementCard*>& Sweeps::instances_of(model::ScopeId scope) {
  const auto [at, is_new] = instances_.try_emplace(scope.value);
  if (is_new) {
    for (const model::ElementCard& card : work_.netlist.scopes[scope.index()].elements) {
      if (card.letter == 'x') at->second.push_back(&card);
    }
  }
  return at->second;
}

// Names may hold dots themselves, so that each instance whose name the path begins with is followed.
model::ScopeId Sweeps::subcircuit_at(model::ScopeId scope, std::string_view path) {
  for (const model::ElementCard* const card : instances_of(scope)) {
    const std::string_view name = work_.names.text(card->name);
    if (path.size() < name.size() || !base::same_name(path.substr(0, name.size()), name)) continue;
    const model::ScopeId inner = work_.library.subcircuit(scope, card->reference.name);
    if (!inner.valid()) continue;
    if (path.size() == name.size()) return inner;
    if (name.empty() || path[name.size()] != '.') continue;
    if (const model::ScopeId found = subcircuit_at(inner, path.substr(name.size() + 1)); found.valid()) return found;
  }
  return {};
}

}  // namespace flatten
