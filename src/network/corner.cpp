#include "network/corner.hpp"

#include <cassert>
#include <cmath>
#include <limits>

namespace network {
namespace {

// Of the divisor: what moves the quotient by less is rounding.
constexpr double dust = 1e-12;

// Each iteration but the last changes a sign for a better quotient; a handful is usual.
constexpr int most_rounds = 32;

}  // namespace

double extreme(Quotient base, std::span<const Quotient> moves, Wanted wanted, std::span<signed char> signs) {
  assert(signs.size() == moves.size());
  const double direction = (wanted == Wanted::largest) == (base.under > 0) ? 1 : -1;
  const signed char idle = wanted == Wanted::largest ? 1 : -1;
  for (auto& sign : signs) sign = 0;
  double divisor_moves = 0;
  for (const Quotient& move : moves) divisor_moves += std::abs(move.under);
  if (!(divisor_moves < std::abs(base.under))) return std::numeric_limits<double>::quiet_NaN();
  double quotient = base.over / base.under;
  for (int round = 0; round < most_rounds; ++round) {
    bool changed = false;
    Quotient corner = base;
    for (std::size_t i = 0; i < moves.size(); ++i) {
      const double effect = direction * (moves[i].over - quotient * moves[i].under);
      signed char sign = effect > 0 ? 1 : -1;
      if (!(std::abs(effect) > dust * std::abs(base.under))) sign = idle;
      changed = changed || sign != signs[i];
      signs[i] = sign;
      corner.over += sign * moves[i].over;
      corner.under += sign * moves[i].under;
    }
    quotient = corner.over / corner.under;
    if (!changed) break;
  }
  return quotient;
}

}  // namespace network
