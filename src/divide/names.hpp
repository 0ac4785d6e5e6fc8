// Names of the sheet -> nets, elements and instances of the circuit.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"

namespace divide {

// Whether a net of that name (its last path component at the top level) is taken for ground without a declaration:
// AGND, DGND, VSS and the like. "0" and GND are ground already.
[[nodiscard]] bool is_ground_name(std::string_view name);

// Looks names up as SPICE does, case folded. Lives as long as the circuit and the table it was made from.
class NameIndex {
 public:
  NameIndex(const model::Circuit& circuit, const base::NameTable& names);

  [[nodiscard]] model::NetId net(std::string_view name) const;  // none where there is no such net
  [[nodiscard]] model::ElementId element(std::string_view name) const;
  [[nodiscard]] model::InstanceId instance(std::string_view name) const;

  // Nets, elements, instances whose name fits a glob, in the netlist's order; an exact name wins over the glob reading.
  // No glob means ground.
  [[nodiscard]] std::vector<model::NetId> nets(std::string_view glob) const;
  [[nodiscard]] std::vector<model::ElementId> elements(std::string_view glob) const;
  [[nodiscard]] std::vector<model::InstanceId> instances(std::string_view glob) const;

  [[nodiscard]] std::string_view text(model::NetId net) const;  // "0" for ground
  [[nodiscard]] std::string_view text(model::ElementId element) const;
  [[nodiscard]] std::string_view text(model::InstanceId instance) const;

  // "; did you mean "X"?" or nothing.
  [[nodiscard]] std::string suggest_net(std::string_view wanted) const;
  [[nodiscard]] std::string suggest_part(std::string_view wanted) const;

 private:
  const model::Circuit& circuit_;
  const base::NameTable& names_;
  std::vector<model::NetId> net_of_name_;
  std::vector<model::ElementId> element_of_name_;
  std::vector<model::InstanceId> instance_of_name_;
};

}  // namespace divide
