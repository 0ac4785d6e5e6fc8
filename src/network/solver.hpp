// A network with its equations in factors, to be solved for several settings of its sources.
#pragma once

#include <vector>

#include "base/result.hpp"
#include "model/network.hpp"
#include "network/equations.hpp"
#include "network/factors.hpp"
#include "network/values.hpp"

namespace network {

class Solver {
 public:
  // Errors: those of equations_of, and equations without a single solution.
  [[nodiscard]] static base::Result<Solver> make(const model::Network& network, const Values& values);

  // A solution by slot with the sources at `values`; all but independent sources stay as they were in make.
  [[nodiscard]] base::Result<std::vector<double>> with_sources(const Values& values) const;

  // Volts by slot for each ampere sent from `out_of` through the outside into `into`, the independent sources at rest.
  [[nodiscard]] base::Result<std::vector<double>> with_ampere(model::NodeId into, model::NodeId out_of) const;

  [[nodiscard]] double volts(const std::vector<double>& solution, model::NodeId node) const {
    return solution[equations_.slot_of_node[node.index()]];
  }
  // False for a node that stands at zero only because nothing that conducts touches it.
  [[nodiscard]] bool reached(model::NodeId node) const { return equations_.reached[node.index()]; }
  [[nodiscard]] const Equations& equations() const { return equations_; }

 private:
  explicit Solver(Equations equations) : equations_(std::move(equations)) {}
  [[nodiscard]] base::Result<std::vector<double>> solve(const std::vector<double>& side) const;
  [[nodiscard]] bool regular() const;

  Equations equations_;
  Factors factors_;
};

}  // namespace network
