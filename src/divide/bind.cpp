#include "divide/bind.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <limits>
#include <span>

#include "base/text.hpp"
#include "divide/leaves.hpp"

namespace divide {
namespace {

using base::printable_short;

class Binder {
 public:
  Binder(const model::Circuit& circuit, const model::Sheet& sheet, const NameIndex& index,
         source::Diagnostics& diagnostics)
      : circuit_(circuit), sheet_(sheet), index_(index), diagnostics_(diagnostics) {
    board_.removed.resize(circuit.elements.size());
    board_.roles.resize(circuit.elements.size());
    board_.sensor_of.resize(circuit.elements.size());
  }

  Board run() {
    assume_grounds();
    for (const auto& converter : sheet_.converters)
      for (const model::ElementId element : index_.elements(converter.name)) board_.converters.push_back(element);
    for (std::size_t i = 0; i < sheet_.sensors.size(); ++i) bind_sensor(i);
    // Globs first: an exact name wins over them.
    for (const bool exact : {false, true})
      for (const auto& part : sheet_.parts)
        if (is_exact(part) == exact) bind_part(part);
    return std::move(board_);
  }

 private:
  void error(source::Span where, std::string message) {
    diagnostics_.push_back({base::Level::error, where, std::move(message)});
  }

  [[nodiscard]] bool is_exact(const model::PartDeclaration& part) const {
    return index_.element(part.name).valid() || index_.instance(part.name).valid();
  }

  // A net that its name says to be ground, unless a declaration or a source holds it at something else.
  void assume_grounds() {
    std::vector<char> held(circuit_.nets.size());
    for (const auto& rail : sheet_.rails)
      if (const model::NetId net = index_.net(rail.net); net.valid()) held[net.index()] = 1;
    for (const auto& element : circuit_.elements)
      if (std::holds_alternative<model::VoltageSource>(element.part))
        held[circuit_.pin(element, 0).index()] = held[circuit_.pin(element, 1).index()] = 1;
    for (std::uint32_t i = 1; i < circuit_.nets.size(); ++i)
      if (!held[i] && is_ground_name(index_.text(model::NetId{i}))) board_.assumed_grounds.push_back(model::NetId{i});
  }

  void bind_sensor(std::size_t declaration) {
    const auto& declared = sheet_.sensors[declaration];
    BoundSensor bound;
    bound.declaration = declaration;
    bound.kind = sensor::find_kind(declared.kind.value);
    if (bound.kind == nullptr) return;  // the sheet's reader has said so
    bound.name = declared.name;
    if (bound.kind->moves == sensor::Moves::ohms && !law_holds(declared)) return;
    switch (bound.kind->moves) {
      case sensor::Moves::rail:
        break;  // rails are bound later
      case sensor::Moves::parameter:
        if (!bind_parameter(declared, bound)) return;
        break;
      case sensor::Moves::ohms:
        if (!bind_resistance(declared, bound)) return;
        break;
    }
    board_.sensors.push_back(std::move(bound));
  }

  bool law_holds(const model::SensorDeclaration& declared) {
    const auto law = sensor::law_of(declared);
    if (!law.ok()) error(declared.where, law.error());
    return law.ok();
  }

  bool find_named(const model::SensorDeclaration& declared, BoundSensor& bound) {
    bound.element = index_.element(declared.name);
    if (!bound.element.valid()) bound.instance = index_.instance(declared.name);
    if (bound.element.valid()) bound.name = index_.text(bound.element);
    if (bound.instance.valid()) bound.name = index_.text(bound.instance);
    if (bound.element.valid() || bound.instance.valid()) return true;
    error(declared.where, fmt::format("sensor \"{}\" is no element or instance of the netlist{}",
                                      printable_short(declared.name), index_.suggest_part(declared.name)));
    return false;
  }

  bool bind_parameter(const model::SensorDeclaration& declared, BoundSensor& bound) {
    if (!find_named(declared, bound)) return false;
    take_ends(bound);
    for (std::uint32_t i = 0; i < circuit_.swept.size(); ++i)
      if (circuit_.swept[i].sensor == declared.name && circuit_.swept[i].found)
        bound.variable = circuit_.swept[i].variable;
    if (bound.variable && !moves_own(bound)) {
      error(declared.sweep ? declared.sweep->where : declared.where,
            fmt::format("\"{}\" moves nothing of {}", printable_short(declared.sweep ? declared.sweep->value : ""),
                        printable_short(bound.name)));
      return false;
    }
    if (bound.variable) return true;
    error(declared.sweep ? declared.sweep->where : declared.where,
          fmt::format("\"{}\" is no parameter of {} and no .param of the netlist",
                      printable_short(declared.sweep ? declared.sweep->value : std::string{}),
                      printable_short(bound.name)));
    return false;
  }

  // Whether a value of the sensor's own part depends on its parameter.
  [[nodiscard]] bool moves_own(const BoundSensor& bound) const {
    std::size_t first = bound.element.index();
    std::size_t count = 1;
    if (bound.instance.valid()) {
      const auto& whole = circuit_.instances[bound.instance.index()];
      first = whole.first_element, count = whole.element_count;
    }
    const auto own = std::span(circuit_.elements).subspan(first, count);
    return std::any_of(own.begin(), own.end(), [&](const model::Element& element) {
      return depends_on(circuit_.expressions, expression_of(element.part), *bound.variable);
    });
  }

  void take_ends(BoundSensor& bound) {
    if (bound.element.valid()) {
      const auto& element = circuit_.elements[bound.element.index()];
      if (element.pin_count >= 2) bound.plus = circuit_.pin(element, 0), bound.minus = circuit_.pin(element, 1);
    } else {
      const auto& instance = circuit_.instances[bound.instance.index()];
      if (instance.pin_count == 2) bound.plus = circuit_.pin(instance, 0), bound.minus = circuit_.pin(instance, 1);
    }
  }

  bool bind_between(const model::SensorDeclaration& declared, BoundSensor& bound) {
    const auto end = [&](const model::Declared<std::string>& net) {
      const model::NetId found = index_.net(net.value);
      if (!found.valid())
        error(net.where, fmt::format("sensor \"{}\": no net \"{}\" in the netlist{}", printable_short(declared.name),
                                     printable_short(net.value), index_.suggest_net(net.value)));
      return found;
    };
    bound.plus = end(declared.between->first);
    bound.minus = end(declared.between->second);
    return bound.plus.valid() && bound.minus.valid();
  }

  // A part of the netlist has its ends already; beside it, a second resistance would hang between the two nets.
  bool is_free_label(const model::SensorDeclaration& declared) {
    const bool element = index_.element(declared.name).valid();
    if (!element && !index_.instance(declared.name).valid()) return true;
    error(declared.where,
          fmt::format("\"{}\" is an {} of the netlist: leave out \"between\", or give the sensor another name",
                      printable_short(declared.name), element ? "element" : "instance"));
    return false;
  }

  // A resistance: the declared law stands in for whatever the netlist has between the two ends.
  bool bind_resistance(const model::SensorDeclaration& declared, BoundSensor& bound) {
    if (declared.between) {
      if (!is_free_label(declared) || !bind_between(declared, bound)) return false;
    } else if (!find_named(declared, bound) || !has_two_pins(declared, bound)) {
      return false;
    }
    if (bound.plus == bound.minus) {
      error(declared.where, fmt::format("both ends of sensor \"{}\" are on one net", printable_short(bound.name)));
      return false;
    }
    const std::size_t sensor = board_.sensors.size();
    remove(bound.element, bound.instance, sensor);
    // Nothing can be solved before somebody gives it a value: at NaN none goes by unnoticed.
    const model::Resistor unset{{std::numeric_limits<double>::quiet_NaN(), {}}};
    board_.extras.push_back(
        {unset, bound.plus, bound.minus, model::BranchOrigin::sensor, sensor, bound.element, bound.name});
    return true;
  }

  bool has_two_pins(const model::SensorDeclaration& declared, BoundSensor& bound) {
    const std::size_t pins = bound.element.valid() ? circuit_.elements[bound.element.index()].pin_count
                                                   : circuit_.instances[bound.instance.index()].pin_count;
    take_ends(bound);
    if (pins == 2) return true;
    error(declared.where,
          fmt::format("sensor \"{}\" has {} {}; one of kind \"{}\" has two", printable_short(bound.name), pins,
                      pins == 1 ? "pin" : "pins", declared.kind.value));
    return false;
  }

  void remove(model::ElementId element, model::InstanceId instance, std::optional<std::size_t> sensor) {
    const auto drop = [&](std::size_t i) {
      board_.removed[i] = 1;
      board_.sensor_of[i] = sensor;
    };
    if (element.valid()) drop(element.index());
    if (!instance.valid()) return;
    const auto& whole = circuit_.instances[instance.index()];
    for (std::uint32_t i = 0; i < whole.element_count; ++i) drop(whole.first_element + i);
  }

  void bind_part(const model::PartDeclaration& part) {
    const auto elements = index_.elements(part.name);
    const auto instances = index_.instances(part.name);
    if (elements.empty() && instances.empty()) {
      error(part.where, fmt::format("part \"{}\" matches no element or instance of the netlist{}",
                                    printable_short(part.name), index_.suggest_part(part.name)));
      return;
    }
    for (const model::ElementId element : elements) {
      if (part.role) board_.roles[element.index()] = part.role->value;
      const auto& e = circuit_.elements[element.index()];
      stand_in(part, element, {}, e.pin_count, e.pin_count == 2 ? circuit_.pin(e, 0) : model::NetId{},
               e.pin_count == 2 ? circuit_.pin(e, 1) : model::NetId{});
    }
    for (const model::InstanceId instance : instances) {
      const auto& whole = circuit_.instances[instance.index()];
      if (part.role)
        for (std::uint32_t i = 0; i < whole.element_count; ++i)
          board_.roles[whole.first_element + i] = part.role->value;
      stand_in(part, {}, instance, whole.pin_count, whole.pin_count == 2 ? circuit_.pin(whole, 0) : model::NetId{},
               whole.pin_count == 2 ? circuit_.pin(whole, 1) : model::NetId{});
    }
  }

  void stand_in(const model::PartDeclaration& part, model::ElementId element, model::InstanceId instance,
                std::size_t pins, model::NetId plus, model::NetId minus) {
    if (!part.model) return;
    if (part.model->value == model::StandIn::open) return remove(element, instance, std::nullopt);
    if (pins != 2) {
      error(part.model->where,
            fmt::format("part \"{}\" has {} pins; a resistor has two", printable_short(part.name), pins));
      return;
    }
    remove(element, instance, std::nullopt);
    const std::string_view name = element.valid() ? index_.text(element) : index_.text(instance);
    board_.extras.push_back({model::Resistor{{part.ohms ? part.ohms->value : 0, {}}}, plus, minus,
                             model::BranchOrigin::stand_in, std::nullopt, element, std::string(name)});
  }

  const model::Circuit& circuit_;
  const model::Sheet& sheet_;
  const NameIndex& index_;
  source::Diagnostics& diagnostics_;
  Board board_;
};

}  // namespace

Board bind_parts(const model::Circuit& circuit, const model::Sheet& sheet, const NameIndex& index,
                 source::Diagnostics& diagnostics) {
  return Binder(circuit, sheet, index, diagnostics).run();
}

}  // namespace divide
