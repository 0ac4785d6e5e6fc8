#include "advise/search.hpp"

#include <algorithm>
#include <array>
#include <cmath>

namespace advise {
namespace {

constexpr double rounding = 1e-12;                          // of a gap
constexpr double as_good = 1e-14;                           // of a span
constexpr int half = 60;                                    // grid points on either side of the present value
constexpr double grid_step = 3 * 2.302585092994046 / half;  // three decades, in natural logarithms

// All places are logarithms of ohms over the present ohms.
class Search {
 public:
  Search(double present, const std::function<Trial(double)>& trial) : present_(present), trial_(trial) {}

  std::optional<Found> run() {
    for (int i = -half; i <= half; ++i) grid_[index(i)] = at(i * grid_step);
    const auto start = best_start();
    if (!start) return std::nullopt;
    const double peak = climb(*start);
    const double place = nearest_as_good(peak);
    return Found{place == 0 ? present_ : present_ * std::exp(place), at(place).span};
  }

 private:
  static std::size_t index(int i) { return static_cast<std::size_t>(i + half); }
  static bool fits(const Trial& trial) { return trial.room >= -rounding; }
  [[nodiscard]] Trial at(double place) const { return trial_(place == 0 ? present_ : present_ * std::exp(place)); }
  [[nodiscard]] double span_if_fit(double place) const {
    const Trial trial = at(place);
    return fits(trial) ? trial.span : -1;
  }

  // The place of the largest value on [low, high] of a function with one hill.
  template <class Height>
  static double hilltop(double low, double high, double width, Height height) {
    constexpr double golden = 0.6180339887498949;
    double left = high - golden * (high - low);
    double right = low + golden * (high - low);
    double left_height = height(left);
    double right_height = height(right);
    while (high - low > width) {
      if (left_height < right_height) {
        low = left;
        left = right;
        left_height = right_height;
        right_height = height(right = low + golden * (high - low));
      } else {
        high = right;
        right = left;
        right_height = left_height;
        left_height = height(left = high - golden * (high - low));
      }
    }
    return (low + high) / 2;
  }

  // The last place on the way from `good` to `bad` at which `holds`.
  template <class Holds>
  static double edge(double good, double bad, Holds holds) {
    for (int i = 0; i < 45; ++i) {
      const double middle = (good + bad) / 2;
      (holds(middle) ? good : bad) = middle;
    }
    return good;
  }

  // The best grid point that has room; where none has, the place of most room near the one that lacks least.
  [[nodiscard]] std::optional<double> best_start() const {
    int best = -half;
    const auto better = [&](const Trial& a, const Trial& b) {
      if (fits(a) != fits(b)) return fits(a);
      return fits(a) ? a.span > b.span : a.room > b.room;
    };
    for (int i = -half; i <= half; ++i)
      if (better(grid_[index(i)], grid_[index(best)])) best = i;
    if (fits(grid_[index(best)])) return best * grid_step;
    const double place =
        hilltop((best - 1) * grid_step, (best + 1) * grid_step, 1e-12, [&](double p) { return at(p).room; });
    return fits(at(place)) ? std::optional<double>(place) : std::nullopt;
  }

  // From a place with room to the largest span within a grid step that still has room.
  [[nodiscard]] double climb(double start) const {
    const auto has_room = [&](double place) { return fits(at(place)); };
    const auto end = [&](double place) { return has_room(place) ? place : edge(start, place, has_room); };
    const double low = end(std::max(start - grid_step, -half * grid_step));
    const double high = end(std::min(start + grid_step, half * grid_step));
    double best = start;
    for (const double place : {low, high, hilltop(low, high, 1e-9, [&](double p) { return at(p).span; })})
      if (span_if_fit(place) > span_if_fit(best)) best = place;
    return best;
  }

  // Where the span is level (an end clips), any value does: then the least change.
  [[nodiscard]] double nearest_as_good(double peak) const {
    const double enough = at(peak).span - as_good;
    double nearest = peak;
    for (int i = -half; i <= half; ++i) {
      const Trial& trial = grid_[index(i)];
      if (fits(trial) && trial.span >= enough && std::abs(i * grid_step) < std::abs(nearest)) nearest = i * grid_step;
    }
    if (nearest == 0) return 0;
    const double inward = nearest > 0 ? std::max(0.0, nearest - grid_step) : std::min(0.0, nearest + grid_step);
    return edge(nearest, inward, [&](double place) { return span_if_fit(place) >= enough; });
  }

  double present_;
  const std::function<Trial(double)>& trial_;
  std::array<Trial, 2 * half + 1> grid_{};
};

}  // namespace

std::optional<Found> largest_span(double present, const std::function<Trial(double ohms)>& trial) {
  return Search(present, trial).run();
}

}  // namespace advise
