// What divide finds for one input: the divider with its arms, sense path and load, and the networks to solve.
#pragma once

#include <optional>
#include <string>
#include <variant>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/network.hpp"
#include "model/sheet.hpp"

namespace model {

// A part as reports name it.
struct PartName {
  std::string name;   // spelled as the netlist spells it, or the label of a declaration
  ElementId element;  // none for an instance or a label
};

// One end of a converter's range, bound.
using BoundEnd = std::variant<double, NetId>;

// A converter input with all its keys bound and defaults filled in.
struct Input {
  NetId net;
  std::string name;  // the net as the netlist first spells it
  std::string converter;
  source::Span declared_at;
  int bits = 0;
  BoundEnd low = 0.0;
  BoundEnd high = 0.0;
  double nominal_low = 0;   // volts; NaN: the end is a net whose volts are not known before its network is solved
  double nominal_high = 0;  // likewise
  double gain = 1;
  double leakage = 0;  // A, either sign
  std::optional<double> input_resistance;
  ConverterError offset_error;
  std::vector<LimitSetting> limits;  // the board's, then the input's: a later one wins
  std::vector<LevelSetting> levels;

  [[nodiscard]] double lsb_volts() const {
    return (nominal_high - nominal_low) / static_cast<double>(1ULL << bits) / gain;
  }
  // Volts at the pin of a reading, and back, at the nominal range.
  [[nodiscard]] double volts_of(double reading) const {
    return nominal_low + reading * (nominal_high - nominal_low) / gain;
  }
  [[nodiscard]] double reading_of(double volts) const {
    return gain * (volts - nominal_low) / (nominal_high - nominal_low);
  }
};

enum class Arm : std::uint8_t { upper, lower };

// A node of the walk from sensor to pin that has a resistive way to a rail off the walk.
struct TapCandidate {
  NetId net;
  double weight_volts = 0;  // how far the pin moves, at most over the sweep, when its off-walk branches go
  bool arm = false;
  bool declared = false;  // a declared role settled it
  std::vector<PartName> branches;
  bool only_way = false;  // an arm though its weight is below the limit: no other leads to a second rail
  double of_swing = 0;    // weight_volts, of the pin's swing over the sweep; 0 where the swing is not known
  double share = 1;       // how far its own node moves then, of the candidate whose node moves farthest
};

// What the plan overrides at each point of the sweep.
enum class SweptQuantity : std::uint8_t {
  ohms,   // of a Resistor branch, by the sensor's law
  volts,  // of a rail's VoltageSource branch: the measurand itself
  value,  // of any branch whose Number has a residual, or a Behavioural: an expression of the swept parameter
};
struct SweptBranch {
  BranchId branch;
  SweptQuantity quantity = SweptQuantity::ohms;
  std::string part;  // as reports name it; empty for a rail
};

// A network with the nodes that are watched in it.
struct ProbedNetwork {
  Network network;
  NodeId probe;  // the pin, or the tap of the bare divider
  NodeId low;    // of the converter's range, where it is a net; else none
  NodeId high;
  std::vector<SweptBranch> swept;
  std::vector<BranchId>
      leakages;  // CurrentSource branches from ground into an input's node (a positive one pushes it up); nominally 0
  std::vector<double> leakage_amperes;  // of each, the declared magnitude
  NodeId sensor_plus;                   // the sensor's ends (of the element, instance or pair of nets); none for a rail
  NodeId sensor_minus;
  BranchId sensor;  // the sensor's Resistor branch, where it is one
};

struct UnmodelledTouch {
  ElementId element;
  NetId net;
  bool taken_as_open = false;  // connectors, test points, capacitors, diodes: a note; else the input is not audited
};

struct Divider {
  Input input;
  std::optional<std::size_t> sensor;  // in Sheet::sensors
  std::string sensor_name;            // as the netlist spells it
  NetId tap;
  std::vector<PartName> upper, lower, sense, load;
  std::string upper_rail, lower_rail;
  std::optional<Arm> sensor_arm;
  std::vector<TapCandidate> candidates;
  ProbedNetwork whole;               // everything: the pin
  ProbedNetwork bare;                // the arms alone: the tap
  std::optional<OnePort> bare_form;  // absent where the arms are not linear or the sensor sees no finite resistance
  std::optional<OnePort>
      sensor_form;          // the same where only the sensor itself is not linear: tells what resistance it amounts to
  std::vector<NetId> nets;  // of the whole network, rails left out
  // "RT2 at 25 degC": where other sensors on the network stand while this one is swept; the reading is the same
  // wherever they do.
  std::vector<std::string> held;
  // "VDD at 2 V": where other sensors on the network make a leakage count more than where they are held; empty where
  // none does. leakage_amperes are the declared ones times that.
  std::string leakage_where;

  std::vector<UnmodelledTouch> unmodelled;
  std::vector<SuspectValue> suspects;    // in the network
  std::vector<ElementId> at_time_zero;   // sources in it or at its rails, as in Circuit::at_time_zero
  std::string no_divider;                // why there is none; empty where there is one
  bool no_sensor = false;                // nothing in the divider varies
  std::vector<std::string> not_audited;  // why no result can be had, in sentences
};

// Something that was taken from a name or a text.
struct Assumption {
  std::string text;
};

// All that divide has to say of a board.
struct Division {
  std::vector<Divider> dividers;  // in the order of declaration, then of the netlist's nets
  std::vector<Assumption> assumptions;
};

}  // namespace model
