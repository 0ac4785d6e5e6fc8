#include "report/bar.hpp"

#include <algorithm>
#include <cmath>

namespace report {
namespace {

constexpr auto cells = static_cast<double>(bar_cells);

// Puts `mark` on the cells that a stretch of readings touches; a stretch off the bar touches none.
void paint(std::string& row, double low, double high, char mark) {
  if (high < 0 || low > 1) return;
  const double first = std::floor(std::clamp(low, 0.0, 1.0) * cells);
  const double last = std::max(first + 1, std::ceil(std::clamp(high, 0.0, 1.0) * cells));
  const auto from = std::min(static_cast<std::size_t>(first), bar_cells - 1);
  const auto to = std::min(static_cast<std::size_t>(last), bar_cells);
  std::fill(row.begin() + static_cast<std::ptrdiff_t>(from), row.begin() + static_cast<std::ptrdiff_t>(to), mark);
}

}  // namespace

std::string bar(const Reach& reach) {
  const double clear = std::clamp(reach.kept_clear, 0.0, 0.5);
  std::string row(bar_cells, ' ');
  if (clear > 0) {
    paint(row, 0, clear, ':');
    paint(row, 1 - clear, 1, ':');
  }
  paint(row, reach.envelope_low, reach.envelope_high, '-');
  paint(row, reach.swing_low, reach.swing_high, '=');
  if (clear > 0) {
    if (reach.envelope_low < clear) paint(row, reach.envelope_low, std::min(reach.envelope_high, clear), '!');
    if (reach.envelope_high > 1 - clear) paint(row, std::max(reach.envelope_low, 1 - clear), reach.envelope_high, '!');
  }
  return (reach.envelope_low < 0 ? '<' : '|') + row + (reach.envelope_high > 1 ? '>' : '|');
}

std::string bar_scale() {
  std::string row(bar_cells + 2, ' ');
  const auto put = [&row](std::size_t at, const std::string& text) { row.replace(at, text.size(), text); };
  put(0, "0 %");
  put(bar_cells / 4, "25 %");
  put(bar_cells / 2, "50 %");
  put(bar_cells * 3 / 4, "75 %");
  put(bar_cells - 3, "100 %");
  return row;
}

}  // namespace report
