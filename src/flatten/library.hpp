// What a netlist defines, found by name: subcircuits, models and parameters of its scopes.
#pragma once

#include <cstdint>
#include <optional>
#include <unordered_map>
#include <vector>

#include "model/circuit.hpp"
#include "model/netlist.hpp"

namespace flatten {

struct FoundModel {
  const model::ModelCard* card = nullptr;  // none: no such model
  model::ScopeId scope;                    // that defines it
};

struct ParameterSlot {
  const model::ParameterCard* card = nullptr;
  bool is_default = false;  // of the .subckt card: an instance may give another value
};

class Library {
 public:
  explicit Library(const model::Netlist& netlist);

  // The subcircuit of this name that is seen from a scope: the innermost one around it. None where there is none.
  [[nodiscard]] model::ScopeId subcircuit(model::ScopeId from, base::NameId name) const;

  // Likewise the model.
  [[nodiscard]] FoundModel model(model::ScopeId from, base::NameId name) const;

  // The parameters that a scope itself defines; of two .param cards of one name the later counts, as in ngspice 39
  // (measured).
  [[nodiscard]] const std::vector<ParameterSlot>& parameters(model::ScopeId scope) const {
    return slots_[scope.index()];
  }
  [[nodiscard]] std::optional<std::size_t> parameter(model::ScopeId scope, base::NameId name) const;

  // Elements and instances that one instance of a scope expands to, itself included. A scope that contains itself
  // counts once there; what lies deeper than `depth` instances is not counted.
  [[nodiscard]] std::uint64_t size_of(model::ScopeId scope, std::size_t depth);

 private:
  void add_parameters(model::ScopeId scope);

  const model::Netlist& netlist_;
  std::unordered_map<std::uint64_t, model::ScopeId> subcircuits_;
  std::unordered_map<std::uint64_t, FoundModel> models_;
  std::unordered_map<std::uint64_t, std::size_t> parameters_;
  std::vector<std::vector<ParameterSlot>> slots_;
  std::vector<std::uint64_t> sizes_;  // 0: not known yet
};

}  // namespace flatten
