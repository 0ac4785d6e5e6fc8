#include "divide/inputs.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <limits>
#include <set>
#include <utility>

#include "base/overloaded.hpp"
#include "base/text.hpp"

namespace divide {
namespace {

using base::printable_short;

// Keys of an input over those of its converter.
void overlay(model::ConverterKeys& keys, const model::ConverterKeys& nearer) {
  const auto take = [](auto& key, const auto& other) {
    if (other) key = other;
  };
  take(keys.bits, nearer.bits);
  take(keys.low, nearer.low);
  take(keys.high, nearer.high);
  take(keys.supply, nearer.supply);
  take(keys.gain, nearer.gain);
  take(keys.leakage, nearer.leakage);
  take(keys.input_resistance, nearer.input_resistance);
  take(keys.offset_error, nearer.offset_error);
}

class Inputs {
 public:
  Inputs(const model::Sheet& sheet, const Nodes& nodes, const Rails& rails, const NameIndex& index,
         source::Diagnostics& diagnostics)
      : sheet_(sheet), nodes_(nodes), rails_(rails), index_(index), diagnostics_(diagnostics) {}

  std::vector<model::Input> run() {
    for (const auto& converter : sheet_.converters) take_converter(converter);
    for (const auto& declared : sheet_.inputs) check_used(declared);
    for (std::size_t i = 0; i < inputs_.size(); ++i) finish(inputs_[i], keys_[i]);
    return std::move(inputs_);
  }

 private:
  void error(source::Span where, std::string message) {
    diagnostics_.push_back({base::Level::error, where, std::move(message)});
  }

  void take_converter(const model::ConverterDeclaration& converter) {
    const std::size_t before = inputs_.size();
    for (const auto& wanted : converter.inputs) {
      const auto nets = index_.nets(wanted.value);
      if (nets.empty())
        error(wanted.where, fmt::format("converter \"{}\": no net of the netlist is or fits \"{}\"{}",
                                        printable_short(converter.name), printable_short(wanted.value),
                                        index_.suggest_net(wanted.value)));
      for (const model::NetId net : nets) take_input(converter, wanted, net);
    }
    const std::size_t count = inputs_.size() - before;
    if (converter.expect_inputs && static_cast<std::size_t>(converter.expect_inputs->value) != count)
      error(converter.expect_inputs->where,
            fmt::format("converter \"{}\" has {} {} here, {} {} expected", printable_short(converter.name), count,
                        count == 1 ? "input" : "inputs", converter.expect_inputs->value,
                        converter.expect_inputs->value == 1 ? "is" : "are"));
  }

  void take_input(const model::ConverterDeclaration& converter, const model::Declared<std::string>& wanted,
                  model::NetId net) {
    const auto known =
        std::find_if(inputs_.begin(), inputs_.end(), [&](const model::Input& input) { return input.net == net; });
    if (known != inputs_.end()) {
      if (known->converter != converter.name)
        error(wanted.where, fmt::format("net \"{}\" is an input of converter \"{}\" already",
                                        printable_short(index_.text(net)), printable_short(known->converter)));
      return;
    }
    model::Input& input = inputs_.emplace_back();
    input.net = net;
    input.name = index_.text(net);
    input.converter = converter.name;
    input.declared_at = wanted.where;
    input.limits = sheet_.limits;
    input.levels = sheet_.levels;
    keys_.push_back(converter.keys);
    overlay_declarations(input, keys_.back());
  }

  void overlay_declarations(model::Input& input, model::ConverterKeys& keys) {
    const auto apply = [&](const model::InputDeclaration& declared) {
      overlay(keys, declared.keys);
      input.limits.insert(input.limits.end(), declared.limits.begin(), declared.limits.end());
      input.levels.insert(input.levels.end(), declared.levels.begin(), declared.levels.end());
    };
    for (const auto& declared : sheet_.inputs)  // globs first: an exact name wins over them
      if (!index_.net(declared.name).valid() && base::glob_match(declared.name, input.name)) apply(declared);
    for (const auto& declared : sheet_.inputs)
      if (index_.net(declared.name) == input.net) apply(declared);
  }

  void check_used(const model::InputDeclaration& declared) {
    const model::NetId exact = index_.net(declared.name);
    const bool used = std::any_of(inputs_.begin(), inputs_.end(), [&](const model::Input& input) {
      return exact.valid() ? input.net == exact : base::glob_match(declared.name, input.name);
    });
    if (used) return;
    std::vector<std::string_view> candidates;
    for (const model::Input& input : inputs_) candidates.push_back(input.name);
    const std::string_view nearest = exact.valid() ? std::string_view{} : base::nearest_name(declared.name, candidates);
    error(
        declared.where,
        fmt::format("\"{}\" is no input of any converter{}", printable_short(declared.name),
                    nearest.empty() ? std::string{} : fmt::format("; did you mean \"{}\"?", printable_short(nearest))));
  }

  void finish(model::Input& input, const model::ConverterKeys& keys) {
    if (keys.bits) input.bits = keys.bits->value;
    if (keys.gain) input.gain = keys.gain->value;
    if (keys.leakage) input.leakage = keys.leakage->value;
    if (keys.input_resistance) input.input_resistance = keys.input_resistance->value;
    if (keys.offset_error) input.offset_error = keys.offset_error->value;
    if (keys.low) bind_end(*keys.low, input.low, input.nominal_low);
    if (keys.high) bind_end(*keys.high, input.high, input.nominal_high);
    if (keys.supply) find_net(keys.supply->value, keys.supply->where);
  }

  // None, and an error once a place, where there is no such net: inputs share the keys of their converter.
  model::NetId find_net(const std::string& name, source::Span where) {
    const model::NetId net = index_.net(name);
    if (net.valid()) return net;
    const auto& begin = where.begin;
    if (told_.emplace(begin.source.value, begin.offset).second)
      error(where, fmt::format("no net \"{}\" in the netlist{}", printable_short(name), index_.suggest_net(name)));
    return net;
  }

  // An end that is a rail has its nominal volts now; one inside a network, or a rail that a parameter moves, gets them
  // when that is solved.
  void bind_end(const model::Declared<model::RangeEnd>& end, model::BoundEnd& bound, double& nominal) {
    std::visit(base::overloaded{[&](double volts) { bound = nominal = volts; },
                                [&](const std::string& net) {
                                  const model::NetId id = find_net(net, end.where);
                                  if (!id.valid()) return;
                                  bound = id;
                                  nominal = std::numeric_limits<double>::quiet_NaN();
                                  const Rail* rail = rails_.at(nodes_.of(id));
                                  if (rail != nullptr && rail->volts.fixed())
                                    nominal = rail->has_volts ? rail->volts.value : rail->highest_volts;
                                }},
               end.value);
  }

  const model::Sheet& sheet_;
  const Nodes& nodes_;
  const Rails& rails_;
  const NameIndex& index_;
  source::Diagnostics& diagnostics_;
  std::vector<model::Input> inputs_;
  std::vector<model::ConverterKeys> keys_;
  std::set<std::pair<std::uint32_t, std::uint32_t>> told_;  // places of names that are no net
};

}  // namespace

std::vector<model::Input> bind_inputs(const model::Sheet& sheet, const Nodes& nodes, const Rails& rails,
                                      const NameIndex& index, source::Diagnostics& diagnostics) {
  return Inputs(sheet, nodes, rails, index, diagnostics).run();
}

}  // namespace divide
