// Swept parameters: which parameter of which instance, or of the top level, a request means.
#pragma once

#include <string>
#include <unordered_map>
#include <vector>

#include "flatten/parameters.hpp"

namespace flatten {

class Sweeps {
 public:
  Sweeps(Work& work, Parameters& parameters) : work_(work), parameters_(parameters) {}

  // Notes every request in Circuit::swept, adds its variable's node (so that node i of the pool is variable i), and
  // frees the parameters of the top level that are meant.
  void begin(Frame& top);

  // Frees the parameters of a new instance that are meant.
  void bind(Frame& frame);

 private:
  // The subcircuit of the instance with this path, as the cards of a scope have it; none where there is none.
  [[nodiscard]] model::ScopeId subcircuit_at(model::ScopeId scope, std::string_view path);
  const std::vector<const model::ElementCard*>& instances_of(model::ScopeId scope);
  void free(Frame& frame, std::size_t request, std::size_t slot);
  [[nodiscard]] double nominal(const Frame& frame, base::NameId parameter);

  Work& work_;
  Parameters& parameters_;
  std::unordered_map<std::string, std::vector<std::size_t>> by_path_;  // folded; requests that mean an instance
  std::unordered_map<std::uint32_t, std::vector<const model::ElementCard*>> instances_;  // by scope
};

}  // namespace flatten
