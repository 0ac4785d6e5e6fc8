// The device models that a deck may hold: their types, and which of their parameters count at DC.
#pragma once

#include <optional>
#include <string_view>

#include "model/circuit.hpp"

namespace flatten {

// A type of .model with a whitelist. Words are folded and stand between blanks.
struct ModelType {
  std::string_view name;
  model::DeviceType type;
  char letter;              // of the elements that use it
  int level;                // MOS transistors have one row a level
  std::string_view kept;    // known to the simulator and of account at DC
  std::string_view silent;  // of no account at DC: charges, noise, ratings, who made it
};

// The row of a type and level, or nothing: such devices are not modelled.
[[nodiscard]] const ModelType* model_type(std::string_view type, int level);

// Whether a row has the type at all.
[[nodiscard]] bool is_model_type(std::string_view type);

// Whether `word`, in any case, is one of the words of a list.
[[nodiscard]] bool lists(std::string_view list, std::string_view word);

}  // namespace flatten
