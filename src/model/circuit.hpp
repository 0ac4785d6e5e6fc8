// The flat circuit: every instance expanded, every value a number or an expression of swept quantities and node
// voltages.
#pragma once

#include <cstdint>
#include <limits>
#include <string>
#include <variant>
#include <vector>

#include "base/id.hpp"
#include "base/names.hpp"
#include "model/expression.hpp"
#include "model/netlist.hpp"
#include "source/text.hpp"

namespace model {

using NetId = base::Id<struct NetTag>;
using ElementId = base::Id<struct ElementTag>;
using InstanceId = base::Id<struct InstanceTag>;
using DeviceModelId = base::Id<struct DeviceModelTag>;
using DetailId = base::Id<struct DetailTag>;

inline constexpr NetId ground{0};  // reported as "0" however the netlist spells it

// A number, or (residual valid) an expression in swept variables that has no number yet.
struct Number {
  double value = 0;
  ExpressionId residual;

  [[nodiscard]] bool fixed() const { return !residual.valid(); }
};

struct Resistor {
  Number ohms;
};  // 0 is a short
struct Capacitor {
  Number farads;
};  // open at DC
struct Inductor {
  Number henries;
};  // a short at DC
struct VoltageSource {
  Number volts;
};  // pins: plus, minus; the DC value
struct CurrentSource {
  Number amperes;
};  // from the first pin through the source into the second
struct VoltageControlled {
  Number gain;
  bool drives_current = false;
};  // E, G; pins: out+, out-, in+, in-
struct CurrentControlled {
  Number gain;
  ElementId through;
  bool drives_current = false;
};  // F, H
struct Behavioural {
  ExpressionId expression;
  bool drives_current = false;
};  // B, E/G with VALUE
struct Device {
  DeviceModelId model;
  Range parameters;
  bool starts_off = false;
};  // D Q J M S; in Circuit::device_parameters

// Kept, but without a model: nothing is known of what it does at its pins.
struct Unmodelled {
  enum class Why : std::uint8_t {
    unknown_letter,
    no_model,
    missing_subcircuit,
    unsupported,
    no_value,        // nothing stands in its place, or a word that is neither value nor model
    parameter_name,  // a parameter's name stands there without braces
    bad_value,       // what begins like a number and is none
    not_fitted,
    broken_card,  // its card, or one that it rests on, could not be read: Netlist::faults says why
  };
  Why why = Why::no_model;
  base::NameId wanted;  // the model, subcircuit or part text that the card names, if any
};

using Part = std::variant<Resistor, Capacitor, Inductor, VoltageSource, CurrentSource, VoltageControlled,
                          CurrentControlled, Behavioural, Device, Unmodelled>;

struct Element {
  base::NameId name;  // with its instance path: X1.R3
  CardId card;
  InstanceId instance;          // the innermost instance that it belongs to; none at the top level
  std::uint32_t first_pin = 0;  // in Circuit::pins
  std::uint16_t pin_count = 0;
  char letter = '?';  // of its own name, folded: the designator's first letter
  Part part;
};

// What most elements have not; Circuit::details says which have.
struct Detail {
  ElementId element;
  double tolerance = 0;  // a fraction written on the card; NaN: none
  double tc1 = 0;        // 1/K
  double tc2 = 0;        // 1/K^2
};

// An expanded subcircuit instance.
struct Instance {
  base::NameId name;  // full path: X1.XRT2
  base::NameId subcircuit;
  CardId card;
  InstanceId parent;
  std::uint32_t first_pin = 0;  // the outer nets, in Circuit::pins
  std::uint16_t pin_count = 0;
  std::uint32_t first_element = 0;  // its elements, inner instances' included, are one run in Circuit::elements
  std::uint32_t element_count = 0;
};

enum class DeviceType : std::uint8_t { diode, npn, pnp, njf, pjf, nmos, pmos, voltage_switch };

struct DeviceParameter {
  base::NameId name;
  double value = 0;
};

// A device model with plain numbers. Only parameters that the deck writer knows are in it; what was left out has been
// said.
struct DeviceModel {
  base::NameId name;
  DeviceType type = DeviceType::diode;
  std::vector<DeviceParameter> parameters;
};

// A value in the circuit that SPICE reads differently from the board's builder.
struct SuspectValue {
  ElementId element;
  source::Span where;
  double builder = 0;
  double spice = 0;  // NaN: SPICE sees no number
};

struct Net {
  base::NameId name;  // as first spelled; inner nets with their instance path
};

// A parameter that the declarations sweep: Op::variable nodes with this index stand for it.
struct SweptParameter {
  std::string sensor;  // the declared sensor
  base::NameId parameter;
  InstanceId instance;  // whose parameter it is; none: a .param of the top level
  bool found = false;   // whether any such parameter exists
  std::uint32_t variable =
      0;  // the index of its Op::variable nodes: its own, or that of the first request for the same parameter
  double nominal = std::numeric_limits<double>::quiet_NaN();  // its value in the netlist; NaN: it has none, or one that
                                                              // is itself swept
};

struct Circuit {
  base::LargeVector<Net> nets;          // [0] is ground
  base::LargeVector<Element> elements;  // in the netlist's order, instances expanded where they stand
  base::LargeVector<NetId> pins;
  std::vector<Instance> instances;
  std::vector<DeviceModel> models;
  std::vector<DeviceParameter> device_parameters;
  std::vector<Detail> details;  // ordered by element
  std::vector<SuspectValue> suspects;
  std::vector<ElementId> at_time_zero;  // sources without a DC value, taken at the value of their function at time zero
  std::vector<SweptParameter> swept;
  ExpressionPool expressions;  // residuals and behavioural expressions; leaves are net_volts, amperes, variable
  double temperature = 27;     // degC, of expressions that ask for it
  std::string cut;             // the limit at which elements were left out, in a sentence; empty: none was

  [[nodiscard]] NetId pin(const Element& element, std::size_t i) const { return pins[element.first_pin + i]; }
  [[nodiscard]] NetId pin(const Instance& instance, std::size_t i) const { return pins[instance.first_pin + i]; }
};

}  // namespace model
