// Subcircuit expansion: every X card becomes the elements of its subcircuit, where it stands.
#pragma once

#include <cstdint>
#include <vector>

#include "flatten/elements.hpp"
#include "flatten/sweeps.hpp"

namespace flatten {

class Instances {
 public:
  Instances(Work& work, Elements& elements, Sweeps& sweeps);

  // Adds all that a frame's scope holds: its elements, and those of its instances.
  void expand(Frame& frame);

  // Whether some frame had this scope.
  [[nodiscard]] bool expanded(model::ScopeId scope) const { return expanded_[scope.index()]; }

 private:
  void instantiate(const Frame& caller, const model::ElementCard& card);
  [[nodiscard]] bool may_expand(const Frame& caller, const model::ElementCard& card, model::ScopeId scope);
  void refuse(const Frame& caller, const model::ElementCard& card, ProblemKind kind, std::string message);
  void check_arguments(const Frame& frame);
  void find_duplicates(model::ScopeId scope);
  [[nodiscard]] bool fits(std::uint64_t more) const;

  Work& work_;
  Elements& elements_;
  Sweeps& sweeps_;
  std::size_t deepest_;
  std::vector<bool> expanded_;  // by scope
  std::vector<bool> seen_;      // by NameId: names of the scope that is being looked through
  std::vector<bool>
      duplicate_;  // by card: an element whose name stands before it in its scope; empty where there is none
};

}  // namespace flatten
