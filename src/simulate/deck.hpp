// The deck writer: copies of a plan's network, one an operating point, unrolled into one deck with literal values.
#pragma once

#include <cstdint>
#include <limits>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "base/names.hpp"
#include "base/result.hpp"
#include "model/circuit.hpp"
#include "model/plan.hpp"
#include "simulate/protocol.hpp"

namespace simulate {

// Tolerances for the solution of nonlinear decks (ngspice's reltol, vntol, abstol; itl1 is 500 in both).
enum class Tolerances : std::uint8_t {
  none,    // linear decks do not depend on them
  tight,   // 1e-9, 1e-12 V, 1e-15 A
  medium,  // 1e-6, 1e-9 V, 1e-15 A
};

struct Deck {
  Request request;
  // Where each wanted quantity stands in the answer: for every copy the watched nodes, then the watched currents.
  std::vector<std::uint32_t> places;
  static constexpr std::uint32_t zero = std::numeric_limits<std::uint32_t>::max();  // no place: ground, 0 V
};

// Copy k of a plan is point k % points under condition k / points. A value that a condition holds wins over a swept
// one.
class DeckWriter {
 public:
  // Checks the plan and settles what is common to all copies. Error: a value that is missing, not finite or a negative
  // resistance; a node that no direct current reaches; voltage sources in a loop; a device that is not known. `plan`,
  // `circuit` and `names` must outlive the writer.
  [[nodiscard]] static base::Result<DeckWriter> prepare(const model::Plan& plan, const model::Circuit& circuit,
                                                        const base::NameTable& names);

  // The deck of `count` copies from `first` on. Error: a copy that cannot be written (a zero resistance joins two
  // sources; an expression without a value), or a deck above the protocol's size.
  [[nodiscard]] base::Result<Deck> write(std::size_t first, std::size_t count, Tolerances tolerances) const;

  // Whether no copy has a device or an expression.
  [[nodiscard]] bool linear() const { return linear_; }

  // Branches that a copy writes, roughly.
  [[nodiscard]] std::size_t branches() const { return plan_->network.branches.size(); }

 private:
  friend class CopyWriter;

  DeckWriter(const model::Plan& plan, const model::Circuit& circuit, const base::NameTable& names)
      : plan_(&plan), circuit_(&circuit), names_(&names) {}

  [[nodiscard]] std::optional<std::string> check_plan() const;
  [[nodiscard]] std::optional<std::string> check_network() const;
  [[nodiscard]] std::optional<std::string> check_overrides() const;
  [[nodiscard]] std::optional<std::string> check_watched() const;
  [[nodiscard]] bool exists(model::BranchId branch) const;
  [[nodiscard]] bool is_voltage_source(model::BranchId branch) const;
  [[nodiscard]] std::optional<std::string> check_values() const;
  [[nodiscard]] std::optional<std::string> check_value(std::size_t branch, std::size_t condition) const;
  [[nodiscard]] std::optional<std::string> check_paths() const;
  [[nodiscard]] std::optional<std::string> settle_devices();
  void settle_overrides();
  void settle_shorts();
  void settle_currents();
  void settle_shared();

  [[nodiscard]] double own_value(std::size_t branch) const;
  [[nodiscard]] double value(std::size_t branch, std::size_t copy) const;
  // The nodes of a copy in which a zero resistance joins some more; empty where none does.
  [[nodiscard]] std::vector<std::uint32_t> roots_of(std::size_t copy) const;

  const model::Plan* plan_;
  const model::Circuit* circuit_;
  const base::NameTable* names_;

  std::vector<const std::vector<double>*> swept_;  // a branch; null: not swept
  std::vector<double> held_;                       // [condition * branches + branch]; NaN: not held
  std::vector<bool> overridden_;                   // a branch: swept, or held in some condition
  std::vector<std::uint32_t> roots_;               // a node -> the node that stands for it, in every copy
  std::vector<std::size_t> perhaps_zero_;          // resistors that some copy may make a short
  std::vector<bool> current_wanted_;               // a branch: a voltage source whose current is asked for
  std::vector<bool> shared_source_;                // a branch: one source for all copies of a deck
  std::vector<bool> shared_node_;                  // a node that such a source holds
  std::vector<std::string> device_text_;           // a branch: " dm0 area=2 off"
  std::string models_;
  bool linear_ = true;
};

}  // namespace simulate
