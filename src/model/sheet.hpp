// The sheet: what the declarations say, as written. Names are texts here; divide binds them to nets and elements.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <utility>
#include <variant>
#include <vector>

#include "base/level.hpp"
#include "source/text.hpp"

namespace model {

// A value and where it was declared.
template <class T>
struct Declared {
  T value{};
  source::Span where;
};

template <class T>
using Maybe = std::optional<Declared<T>>;

// An end of a converter's range: volts, or a net whose voltage at that very point counts.
using RangeEnd = std::variant<double, std::string>;

// An error of a converter: in LSB, or in volts at the pin.
struct ConverterError {
  double value = 0;
  bool in_lsb = true;
};

struct RailDeclaration {
  std::string net;
  source::Span where;
  Maybe<double> volts;
  Maybe<double> ohms;  // between the ideal source and the net
};

// Keys of [converter.NAME]; any of them may stand in [input.NAME] for one input.
struct ConverterKeys {
  Maybe<int> bits;
  Maybe<RangeEnd> low;
  Maybe<RangeEnd> high;
  Maybe<std::string> supply;
  Maybe<double> gain;
  Maybe<double> leakage;             // A, either sign
  Maybe<double> input_resistance;    // ohm, to ground
  Maybe<double> sample_capacitance;  // F
  Maybe<double> switch_resistance;   // ohm
  Maybe<double> acquisition_time;    // s
  Maybe<double> sample_rate;         // 1/s
  Maybe<double> pin_beyond;          // V
  Maybe<double> pin_current;         // A
  Maybe<double> injection_total;     // A
  Maybe<ConverterError> offset_error;
  Maybe<double> gain_error;  // a fraction
  Maybe<ConverterError> inl;
  Maybe<double> reference_tolerance;  // a fraction
  Maybe<ConverterError> noise;
  Maybe<double> average;
};

struct ConverterDeclaration {
  std::string name;
  source::Span where;
  ConverterKeys keys;
  std::vector<Declared<std::string>> inputs;  // nets or globs
  Maybe<int> expect_inputs;
};

// A limit, by the rule's name (kebab-case as in rules.def).
struct LimitSetting {
  std::string rule;
  Declared<double> limit;
};

// A rule's level, or nothing for "off".
struct LevelSetting {
  std::string rule;
  Declared<std::optional<base::Level>> level;
};

struct InputDeclaration {
  std::string name;  // a net or a glob
  source::Span where;
  ConverterKeys keys;
  std::vector<LimitSetting> limits;
  std::vector<LevelSetting> levels;
};

// A law key: a number in SI units (temperatures in degC), or a text. Which keys a kind takes stands in sensor's table.
struct SensorSetting {
  std::string key;
  std::variant<double, std::string> value;
  source::Span where;
};

enum class Spacing : std::uint8_t { linear, logarithmic };

struct SensorDeclaration {
  std::string name;  // an element or instance, a rail (kind "voltage"), or a label with `between`
  source::Span where;
  Declared<std::string> kind;
  std::optional<std::pair<Declared<std::string>, Declared<std::string>>> between;
  Maybe<double> from;
  Maybe<double> to;
  Maybe<double> accuracy;  // needed, in the measurand's unit
  Maybe<Spacing> spacing;
  Maybe<std::string> sweep;  // kind "parameter"
  std::vector<SensorSetting> settings;
};

enum class StandIn : std::uint8_t { open, resistor };
enum class Role : std::uint8_t { arm, load };

struct PartDeclaration {
  std::string name;  // an element, an instance, or a glob
  source::Span where;
  Maybe<StandIn> model;
  Maybe<double> ohms;  // of StandIn::resistor
  Maybe<Role> role;
};

// What a bare M means on a resistor of the netlist ([reading] m).
enum class BareM : std::uint8_t { by_size, milli, mega };

// A key that is read and checked but that no rule of this version uses: said in every report as not checked.
struct UnusedKey {
  std::string key;  // in full: converter.U1.acquisition_time
  source::Span where;
  std::string missing;  // what is therefore not checked: "settling"
};

struct Sheet {
  std::vector<RailDeclaration> rails;
  std::vector<ConverterDeclaration> converters;
  std::vector<InputDeclaration> inputs;
  std::vector<SensorDeclaration> sensors;
  std::vector<PartDeclaration> parts;
  std::vector<LimitSetting> limits;
  std::vector<LevelSetting> levels;
  Declared<BareM> bare_m{BareM::by_size, {}};
  std::vector<UnusedKey> unused;
};

}  // namespace model
