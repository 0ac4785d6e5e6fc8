// The search for a better resistor: how much of the range one changed value could reach.
#pragma once

#include <optional>
#include <span>
#include <string>

#include "model/divider.hpp"
#include "model/plan.hpp"

namespace advise {

struct Reach {
  std::string part;
  double ohms = 0;
  double span_use = 0;
};

// The most that a bare divider between these ends could use, over its source resistance, with open_volts and
// short_volts held; the reading clipped to 0..1. `ohms` are the sensor's over the sweep; empty: 0. Formula: span is
// largest at Rs = sqrt(Rmin Rmax) where no end clips (derivative of the one-port form set to zero); else where an end
// begins to clip.
[[nodiscard]] double span_ceiling(const model::Input& input, const model::OnePort& form, std::span<const double> ohms);

// Over the value of one fixed resistor of the arms (the one that reaches most), from a thousandth to a thousand times
// its value: the largest span of the pin's nominal reading that keeps both gaps at `gap_limit` or more, leakage of
// either sign included. Where many values reach the same, the nearest to the present one. `swept` are the values of
// each swept branch of divider.whole.network, as a plan holds them: one swept branch is followed at its extremes, where
// a linear network's reading has its own; several are followed at up to eleven points of the sweep, the ends included.
// Nothing where no value of any fixed resistor keeps the gaps, nothing is swept, or a value is put into an expression
// (is_variable). Nonlinear branches count as open.
[[nodiscard]] std::optional<Reach> best_resistor(const model::Divider& divider,
                                                 std::span<const model::SweptValues> swept, double gap_limit);

}  // namespace advise
