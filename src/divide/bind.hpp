// Sensors and parts of the sheet bound to the circuit: every declared name an id.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "divide/names.hpp"
#include "model/circuit.hpp"
#include "model/divider.hpp"
#include "model/sheet.hpp"
#include "sensor/law.hpp"
#include "source/diagnostic.hpp"

namespace divide {

struct BoundSensor {
  std::size_t declaration = 0;  // in Sheet::sensors
  const sensor::Kind* kind = nullptr;
  std::string name;          // as the netlist spells it, or the label
  model::ElementId element;  // at most one of element and instance is valid
  model::InstanceId instance;
  model::NetId plus;  // its two ends; none for a rail and for an instance with other than two pins
  model::NetId minus;
  std::optional<std::uint32_t> variable;  // kind "parameter": of its Op::variable nodes
};

// A branch that the netlist has not: a sensor off the board or in place of an instance, a stand-in.
struct Extra {
  model::Part part;
  model::NetId plus;
  model::NetId minus;
  model::BranchOrigin origin = model::BranchOrigin::sensor;
  std::optional<std::size_t> sensor;  // in Board::sensors
  model::ElementId element;           // stand-in of this element
  std::string name;
};

struct Board {
  std::vector<BoundSensor> sensors;
  std::vector<Extra> extras;
  std::vector<char> removed;                          // one an element: replaced by a sensor or a stand-in
  std::vector<std::optional<model::Role>> roles;      // one an element
  std::vector<std::optional<std::size_t>> sensor_of;  // one an element: the sensor that replaces it or that it is
  std::vector<model::ElementId> converters;           // elements that are declared converters
  std::vector<model::NetId> assumed_grounds;          // nets taken for ground by their name
};

// Names that match nothing, and declarations that cannot hold for what they name, are error diagnostics at their place.
[[nodiscard]] Board bind_parts(const model::Circuit& circuit, const model::Sheet& sheet, const NameIndex& index,
                               source::Diagnostics& diagnostics);

}  // namespace divide
