// The search over one resistance for the largest span that keeps its distance from the ends.
#pragma once

#include <functional>
#include <optional>

namespace advise {

struct Trial {
  double span = 0;
  double room = 0;  // of the smaller gap above its limit; below zero: the value will not do
};

struct Found {
  double ohms = 0;
  double span = 0;
};

// The ohms of largest span among those with room, from a thousandth to a thousand times `present`; of values that reach
// the same, the nearest to it. Nothing where none has room.
[[nodiscard]] std::optional<Found> largest_span(double present, const std::function<Trial(double ohms)>& trial);

}  // namespace advise
