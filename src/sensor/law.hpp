// Sensor laws: measurand -> ohms and back. Each kind has a file of its own and one line in the table of laws.cpp.
#pragma once

#include <functional>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "base/result.hpp"
#include "model/sheet.hpp"

namespace sensor {

// What a measurand moves on the board.
enum class Moves : unsigned char {
  ohms,       // the resistance of an element, an instance, or a pair of nets
  rail,       // the voltage of a rail: the measurand itself
  parameter,  // a parameter of the netlist's own model
};

// The unit in which a declaration gives a key's number.
enum class KeyUnit : unsigned char { ohms, kelvin, degrees, number, volts, text };

struct Key {
  std::string_view name;
  KeyUnit unit = KeyUnit::number;
};

// A law with its numbers put in: values in SI units, temperatures in degC, light in lux.
struct Law {
  std::function<double(double measurand)> ohms;
  std::function<std::optional<double>(double ohms)> measurand;  // the inverse; nothing outside the law's reach
  double valid_from = 0;                                        // where the law holds
  double valid_to = 0;
  std::string validity;  // in words, with its source: "IEC 60751 holds from -200 to 850 degC"
};

struct Kind {
  std::string_view name;       // as declared: "ntc"
  std::string_view measurand;  // "temperature"
  std::string_view unit;       // "degC"; from, to and accuracy are declared in it
  Moves moves = Moves::ohms;
  bool logarithmic = false;  // default spacing of the sweep
  std::span<const Key>
      keys;  // that [sensor.NAME] takes beside those of SensorDeclaration itself (`sweep` is one of these)
  // The law of these settings (all of them keys of this kind, with units checked). Error: a key is missing, a
  // combination makes no sense, a value is out of range. Null where moves is not ohms.
  base::Result<Law> (*make)(std::span<const model::SensorSetting> settings) = nullptr;
};

// All kinds of this version, in the order of the manual.
[[nodiscard]] std::span<const Kind> kinds();

// The kind of that name, or null.
[[nodiscard]] const Kind* find_kind(std::string_view name);

// The law of a declaration whose kind moves ohms. Errors: as Kind::make; the range from..to leaves the law's validity
// (the message says the validity).
[[nodiscard]] base::Result<Law> law_of(const model::SensorDeclaration& declaration);

// `points` values from `from` to `to`, both ends exact; logarithmic needs both above zero (else an Error). One point:
// `from`.
[[nodiscard]] base::Result<std::vector<double>> sweep_points(double from, double to, std::size_t points,
                                                             model::Spacing spacing);

// The spacing that a declaration asks for, or its kind's default.
[[nodiscard]] model::Spacing spacing_of(const model::SensorDeclaration& declaration);

}  // namespace sensor
