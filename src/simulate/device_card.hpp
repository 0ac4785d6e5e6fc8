// Device models and devices as cards of a deck. Only parameter names that stand in the tables here ever reach a deck.
#pragma once

#include <string>

#include "base/names.hpp"
#include "base/result.hpp"
#include "model/circuit.hpp"

namespace simulate {

// Appends `.model dmINDEX TYPE(...)`. Error: a parameter that the deck writer does not know, or a number that is not
// finite.
[[nodiscard]] base::Result<base::Done> append_model(std::string& out, std::size_t index,
                                                    const model::DeviceModel& model, const base::NameTable& names);

// Appends the device's own parameters (area, w, l ...), each with a blank before it. Errors as above.
[[nodiscard]] base::Result<base::Done> append_parameters(std::string& out, const model::Device& device,
                                                         const model::Circuit& circuit, const base::NameTable& names);

// The letter that begins the name of such a device, and how many pins it may have.
struct DeviceShape {
  char letter = 'd';
  std::size_t least_pins = 2;
  std::size_t most_pins = 2;
};
[[nodiscard]] DeviceShape shape_of(model::DeviceType type);

}  // namespace simulate
