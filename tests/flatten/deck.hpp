// Netlists by hand, as the reader would make them. Each card begins 100 bytes behind the one before; key n of a card
// stands 10 * n bytes behind its begin, so that every place in a test is a different one.
#pragma once

#include <limits>
#include <sstream>
#include <stdexcept>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "expression/evaluate.hpp"
#include "flatten/flatten.hpp"
#include "tests/expression/trees.hpp"

namespace decks {

using Keys = std::vector<std::pair<std::string, model::Value>>;

struct Deck {
  base::NameTable names;
  trees::Builder tree{names, {}};
  model::Netlist netlist;
  std::vector<model::ScopeId> open{model::ScopeId{0}};
  flatten::Options options;
  source::Limits limits;
  source::Diagnostics diagnostics;
  model::Circuit circuit;

  Deck() {
    netlist.root = source::SourceId{0};
    netlist.scopes.emplace_back();
  }

  model::Scope& scope() { return netlist.scopes[open.back().index()]; }

  model::CardId card() {
    const auto begin = static_cast<std::uint32_t>(100 * netlist.cards.size());
    netlist.cards.push_back({source::SourceId{0}, begin, begin + 80, model::CardFate::modelled});
    return model::CardId{static_cast<std::uint32_t>(netlist.cards.size() - 1)};
  }

  std::uint32_t begin(model::CardId id) const { return netlist.cards[id.index()].begin; }

  model::Range words(const std::string& list, model::CardId id) {
    model::Range range{static_cast<std::uint32_t>(netlist.words.size()), 0};
    std::istringstream stream(list);
    for (std::string word; stream >> word; ++range.count) netlist.words.push_back({names.intern(word), begin(id)});
    return range;
  }

  model::Range keys(const Keys& list, model::CardId id) {
    const auto first = static_cast<std::uint32_t>(netlist.assignments.size());
    for (std::uint32_t i = 0; i < list.size(); ++i)
      netlist.assignments.push_back({{names.intern(list[i].first), begin(id) + 10 * (i + 1)}, list[i].second});
    return {first, static_cast<std::uint32_t>(list.size())};
  }

  // An element; a name of a model or the like behind its nodes is its reference. The card stays where it is until the
  // next is added.
  model::ElementCard& element(const std::string& name, const std::string& nodes, model::Value value,
                              const std::string& reference = {}, const Keys& parameters = {}) {
    model::ElementCard made;
    made.card = card();
    made.name = names.intern(name);
    made.letter = base::folded(name).front();
    made.nodes = words(nodes, made.card);
    made.value = value;
    if (!reference.empty()) made.reference = {names.intern(reference), begin(made.card) + 5};
    made.parameters = keys(parameters, made.card);
    scope().elements.push_back(made);
    return scope().elements.back();
  }

  model::ElementCard& part(const std::string& name, const std::string& nodes, const std::string& reference,
                           const Keys& parameters = {}) {
    return element(name, nodes, {}, reference, parameters);
  }

  void parameter(const std::string& name, model::Value value) {
    const model::CardId id = card();
    scope().parameters.push_back({{names.intern(name), begin(id) + 7}, value, id});
  }

  void model(const std::string& name, const std::string& type, const Keys& entries = {}) {
    const model::CardId id = card();
    scope().models.push_back({names.intern(name), names.intern(type), id, keys(entries, id)});
  }

  void subcircuit(const std::string& name, const std::string& ports, const Keys& defaults = {}) {
    model::Scope made;
    made.name = names.intern(name);
    made.card = card();
    made.parent = open.back();
    made.ports = words(ports, made.card);
    for (const auto& [key, value] : defaults)
      made.defaults.push_back({{names.intern(key), begin(made.card) + 7}, value, made.card});
    const model::ScopeId id{static_cast<std::uint32_t>(netlist.scopes.size())};
    scope().scopes.push_back(id);
    netlist.scopes.push_back(std::move(made));
    open.push_back(id);
  }

  void ends() {
    card();
    open.pop_back();
  }

  void global(const std::string& net) { netlist.globals.push_back({names.intern(net), begin(card())}); }

  model::Value odd(double builder, double spice, double tolerance = std::numeric_limits<double>::quiet_NaN(),
                   bool bare_mega = false) {
    const source::Span where{{source::SourceId{0}, static_cast<std::uint32_t>(100 * netlist.cards.size() + 33)}, 3};
    netlist.odd_literals.push_back({builder, spice, tolerance, bare_mega, where});
    return model::OddLiteralId{static_cast<std::uint32_t>(netlist.odd_literals.size() - 1)};
  }
  model::Value bare_m(double milli) { return odd(milli * 1e9, milli, std::numeric_limits<double>::quiet_NaN(), true); }
  model::Value word(const std::string& text) { return names.intern(text); }
  model::Value name(const std::string& parameter_name) { return tree.parameter(parameter_name); }

  void flatten() {
    netlist.expressions = tree.pool;
    circuit = flatten::flatten(netlist, names, options, limits, diagnostics);
  }

  std::string text(base::NameId id) const { return id.valid() ? std::string(names.text(id)) : std::string("-"); }

  // The element of this full name; a test that asks for one that is not there fails.
  const model::Element& at(std::string_view full) const {
    for (const model::Element& element : circuit.elements) {
      if (names.text(element.name) == full) return element;
    }
    throw std::runtime_error("no element " + std::string(full));
  }

  // Its pins' nets by name, between blanks; ground is 0.
  std::string pins(std::string_view full) const {
    const model::Element& element = at(full);
    std::string list;
    for (std::size_t i = 0; i < element.pin_count; ++i)
      list += (list.empty() ? "" : " ") + text(circuit.nets[circuit.pin(element, i).index()].name);
    return list;
  }

  double ohms(std::string_view full) const {
    const model::Number& number = std::get<model::Resistor>(at(full).part).ohms;
    if (!number.fixed()) throw std::runtime_error("swept");
    return number.value;
  }

  model::Unmodelled unmodelled(std::string_view full) const { return std::get<model::Unmodelled>(at(full).part); }

  // The value of a residual where its variable is `value`.
  double at_variable(const model::Number& number, double value, std::uint32_t variable = 0) const {
    expression::Leaves leaves;
    leaves.variable = [&](std::uint32_t index) { return index == variable ? value : 1e300; };
    return std::get<double>(expression::evaluate(circuit.expressions, number.residual, leaves));
  }

  // "error at 300: message", a line a diagnostic.
  std::string said() const {
    std::string all;
    for (const source::Diagnostic& one : diagnostics)
      all += std::string(base::level_text(one.level)) + " at " + std::to_string(one.where.begin.offset) + ": " +
             one.message + "\n";
    return all;
  }

  model::CardFate fate(const model::ElementCard& card) const { return netlist.cards[card.card.index()].fate; }
};

}  // namespace decks
