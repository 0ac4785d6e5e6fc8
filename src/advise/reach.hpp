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
  double ohms = 0;  // 0: as a link; infinite: left out
  double span_use = 0;
};

struct Offers {
  // Of the resistors that are not directly across the sensor, the one that reaches most at a value of its own. Only
  // where none has such a value, the one that is best as a link or left out. Where something else reaches more than
  // twice as much, that: a linearising resistor as large as the sensor's middle costs less than half of the span.
  std::optional<Reach> best;
  // What else reaches more by a thousandth or more, but in a way that is as often a choice as a fault: a part as a link
  // or left out, or a resistor across the sensor, whose purpose is to bend the curve at the cost of span.
  std::optional<Reach> other;
};

// The most that a bare divider between these ends could use, over its source resistance, with the readings for an open
// and a shorted sensor held; the reading clipped to 0..1. `ohms` are the sensor's over the sweep; empty: 0. Formula:
// span is largest at Rs = sqrt(Rmin Rmax) where no end clips (derivative of the one-port form set to zero); else where
// an end begins to clip. Where an end of the range moves with the sensor, the readings and Rs are those of the quotient
// (network::quotient_form).
[[nodiscard]] double span_ceiling(double open_reading, double short_reading, std::span<const double> ohms);

// The most that a divider from a rail to ground could use of a range from `bottom` to `top` volts, while the rail goes
// from `least` to `most` volts: over its ratio a in 0..1, of clip((a most - bottom)/(top - bottom)) less the same with
// `least`. It rises with a until the top clips, then falls: a = top/most, or 1 where the rail does not reach the top.
// Nothing where most is not above zero or top not above bottom.
[[nodiscard]] std::optional<double> rail_ceiling(double bottom, double top, double least, double most);

// The fixed resistors of the arms, each on its own from a thousandth to a thousand times its value: the largest span of
// the pin's nominal reading that keeps both gaps at `gap_limit` or more, leakage of either sign included. Where many
// values reach the same, the nearest to the present one. Where more than ten times the value does no better than
// leaving the part out (to a thousandth), that is what is offered; likewise below a tenth a link. A part that reaches
// less than a millionth is not offered. `swept` are the values of each swept branch of divider.whole.network, as a plan
// holds them: one swept branch is followed at its extremes, where a linear network's reading has its own; several are
// followed at up to eleven points of the sweep, the ends included. Nothing where no value of any resistor keeps the
// gaps, nothing is swept, or a value is put into an expression (is_variable). Nonlinear branches count as open.
[[nodiscard]] Offers resistor_offers(const model::Divider& divider, std::span<const model::SweptValues> swept,
                                     double gap_limit);

}  // namespace advise
