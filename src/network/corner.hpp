// The corner of a box of sources in which a quotient of two voltages is largest or smallest.
#pragma once

#include <span>

namespace network {

// Two voltages of a linear network whose quotient is wanted, or what one source alone adds to them.
struct Quotient {
  double over = 0;
  double under = 0;
};

enum class Wanted : unsigned char { largest, smallest };

// The largest or smallest of
//   (base.over + sum of s_i moves[i].over) / (base.under + sum of s_i moves[i].under),   each s_i = +1 or -1,
// and its signs in `signs` (as many as there are moves). NaN where the divisor may be zero within the box. A move
// without effect on the quotient has the sign +1 in the largest and -1 in the smallest. Method: linear-fractional
// programming by Dinkelbach's iteration (Management Science 13, 1967): with the quotient q at hand, each sign is that
// of over - q under; it ends when no sign changes.
double extreme(Quotient base, std::span<const Quotient> moves, Wanted wanted, std::span<signed char> signs);

}  // namespace network
