// One linear network at many values of a few of its branches.
#pragma once

#include <span>
#include <utility>
#include <vector>

#include "base/result.hpp"
#include "model/network.hpp"
#include "model/plan.hpp"
#include "network/linear.hpp"

namespace network {

// Volts of watched node w at point p, at [p * watched.size() + w], with `held` in place of the branches' own values and
// each swept branch at its value of that point (swept wins). Where one branch alone is swept and its values are
// resistances above zero, volts or amperes, two solves give all points (a linear network's volts are a ratio of linear
// functions of each of these); else each point is solved. Values that are put into expressions (is_variable) belong to
// branches that are open here, and are ignored. Errors: as node_volts, with the point where it happened; a swept branch
// has fewer values than there are points.
[[nodiscard]] base::Result<std::vector<double>> sweep_volts(const model::Network& network,
                                                            std::span<const model::SweptValues> swept,
                                                            std::size_t points, Overrides held,
                                                            std::span<const model::NodeId> watched);

// The volts of watched nodes over one branch of a linear network, between and beyond two values of it, under several
// conditions that differ in their sources only. A Resistor, VoltageSource or CurrentSource may be free. From the volts
// at the two values and the Thevenin resistance Rt at the branch with it at R2:
//   V(R) = V1 + (V2 - V1) (R - R1)/(R2 - R1) * R2^2 / (Rt R2 + R (R2 - Rt))
// which is the one-port form drawn through two of its points; it also holds where no one-port form exists (a resistor
// fed by a current source, or joined to rails at both ends). For a source the last factor is 1.
class FreeBranch {
 public:
  // `first` and `second` are two values of the branch, second > first (ohms: first > 0). `held` applies to all
  // conditions, and each condition's own overrides, of independent sources alone, after it. Errors: as node_volts at
  // either value.
  [[nodiscard]] static base::Result<FreeBranch> make(const model::Network& network, model::BranchId branch,
                                                     double first, double second, Overrides held,
                                                     std::span<const Overrides> conditions,
                                                     std::span<const model::NodeId> watched);

  // Volts of the w-th watched node under the c-th condition with the branch at `value` (ohms from zero, a link, to
  // infinity, an open circuit; not a number where the network has no solution with it so).
  [[nodiscard]] double volts(std::size_t c, std::size_t w, double value) const { return mixed(c, w, share(value)); }

  // The same in two steps: what depends on the value alone, and what depends on the node and condition.
  [[nodiscard]] double share(double value) const;
  [[nodiscard]] double mixed(std::size_t c, std::size_t w, double share) const {
    const auto& ends = volts_[c * watched_ + w];
    return ends.first + (ends.second - ends.first) * share;
  }

 private:
  double first_ = 0;
  double second_ = 0;
  double thevenin_ohms_ = 0;  // with the branch at `second_`
  bool is_resistor_ = false;
  std::size_t watched_ = 0;
  std::vector<std::pair<double, double>> volts_;  // at first_ and second_
};

}  // namespace network
