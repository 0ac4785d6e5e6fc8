#include "network/solver.hpp"

#include <algorithm>
#include <cmath>

namespace network {
namespace {

constexpr const char* no_single_solution = "the network has no single solution";

// Entries of the matrix, without ground's row and column.
class Stamps {
 public:
  explicit Stamps(const Equations& equations) {
    entries_.reserve(4 * equations.terms.size());
    for (const Term& term : equations.terms) stamp(term);
  }
  [[nodiscard]] const std::vector<Entry>& entries() const { return entries_; }

 private:
  void add(Slot row, Slot column, double value) {
    if (row != 0 && column != 0) entries_.push_back({row - 1, column - 1, value});
  }
  void add_difference(Slot row, Slot plus, Slot minus, double value) {
    add(row, plus, value);
    add(row, minus, -value);
  }
  void add_own_current(const Term& term) {
    add(term.plus, term.current, 1);
    add(term.minus, term.current, -1);
    add_difference(term.current, term.plus, term.minus, 1);
  }
  void stamp(const Term& term) {
    switch (term.relation) {
      case Relation::amperes:
        break;
      case Relation::conductance:
        add_difference(term.plus, term.plus, term.minus, term.value);
        add_difference(term.minus, term.plus, term.minus, -term.value);
        break;
      case Relation::transconductance:
        add_difference(term.plus, term.control_plus, term.control_minus, term.value);
        add_difference(term.minus, term.control_plus, term.control_minus, -term.value);
        break;
      case Relation::current_gain:
        add(term.plus, term.control_current, term.value);
        add(term.minus, term.control_current, -term.value);
        break;
      case Relation::volts:
        add_own_current(term);
        break;
      case Relation::volts_gain:
        add_own_current(term);
        add_difference(term.current, term.control_plus, term.control_minus, -term.value);
        break;
      case Relation::transresistance:
        add_own_current(term);
        add(term.current, term.control_current, -term.value);
        break;
    }
  }

  std::vector<Entry> entries_;
};

double largest(const std::vector<double>& solution, Slot from, Slot to) {
  double most = 0;
  for (Slot slot = from; slot < to; ++slot) {
    const double size = std::abs(solution[slot]);
    if (!(size <= most)) most = size;  // takes a NaN over
    if (std::isnan(most)) break;
  }
  return most;
}

}  // namespace

base::Result<Solver> Solver::make(const model::Network& network, const Values& values) {
  auto equations = equations_of(network, values);
  if (!equations) return base::Error{equations.error()};
  Solver solver(std::move(*equations));
  const Stamps stamps(solver.equations_);
  if (!solver.factors_.factor(solver.equations_.slots - 1, stamps.entries())) return base::Error{no_single_solution};
  if (!solver.equations_.passive && !solver.regular()) return base::Error{no_single_solution};
  return solver;
}

base::Result<std::vector<double>> Solver::with_sources(const Values& values) const {
  return solve(source_side(equations_, values));
}

base::Result<std::vector<double>> Solver::with_ampere(model::NodeId into, model::NodeId out_of) const {
  return solve(ampere_side(equations_, into, out_of));
}

// A matrix of conductances loses what is small beside what is large at one node. Correcting by the residual of the
// terms themselves wins it back, for resistances up to some 14 decades apart; a correction that does not shrink tells
// that the equations have no single solution.
base::Result<std::vector<double>> Solver::solve(const std::vector<double>& side) const {
  std::vector<double> solution = side;
  factors_.solve(std::span(solution).subspan(1));
  double last = largest(solution, 1, equations_.node_slots);
  for (int round = 0; round < 8; ++round) {
    auto correction = residual(equations_, side, solution);
    factors_.solve(std::span(correction).subspan(1));
    for (std::size_t i = 1; i < solution.size(); ++i) solution[i] += correction[i];
    const double step = largest(correction, 1, equations_.node_slots);
    const double size = largest(solution, 1, equations_.node_slots);
    if (!std::isfinite(step) || !std::isfinite(size)) break;
    if (step <= 1e-15 * size || (step > 0.5 * last && step <= 1e-12 * size)) return solution;
    last = step;
  }
  return base::Error{no_single_solution};
}

// Whether a vector of no special direction comes back from its own right-hand side. A singular matrix, whose last pivot
// is rounding noise, gives it back with an error as large as itself.
bool Solver::regular() const {
  std::vector<double> wanted(equations_.slots, 0.0);
  for (std::size_t i = 1; i < wanted.size(); ++i) wanted[i] = 1 + 0.5 * std::sin(static_cast<double>(i * i));
  const std::vector<double> nothing(equations_.slots, 0.0);
  auto found = residual(equations_, nothing, wanted);
  factors_.solve(std::span(found).subspan(1));
  for (std::size_t i = 1; i < found.size(); ++i) found[i] += wanted[i];
  return largest(found, 1, equations_.node_slots) < 1e-2;
}

}  // namespace network
