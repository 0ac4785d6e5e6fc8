#include "judge/wording.hpp"

#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"

namespace judge {

std::string percent_text(double fraction, int digits) {
  return fmt::format("{} %", base::number_text(100 * fraction, digits));
}

std::string measurand_text(double value, std::string_view unit) {
  const std::string number = base::number_text(value, 5);
  return unit.empty() ? number : fmt::format("{} {}", number, base::printable(unit));
}

Compared compared(double value, double limit, const std::function<std::string(double value, int digits)>& text) {
  constexpr int most_digits = 17;  // enough for any two doubles
  for (int digits = 3;; ++digits) {
    Compared texts{text(value, digits), text(limit, digits)};
    if (texts.value != texts.limit || digits == most_digits) return texts;
  }
}

Compared compared_percent(double value, double limit) {
  return compared(value, limit, percent_text);
}

std::string list_text(const std::vector<std::string>& names) {
  constexpr std::size_t most = 5;
  const std::size_t shown = names.size() > most + 1 ? most : names.size();
  std::string text;
  for (std::size_t i = 0; i < shown; ++i) {
    const bool last = i + 1 == names.size();
    text += i == 0 ? "" : last ? " and " : ", ";
    text += base::printable_short(names[i]);
  }
  if (shown < names.size()) text += fmt::format(" and {} more", names.size() - shown);
  return text;
}

std::string reach_text(const model::Figures& figures) {
  if (!figures.span_reachable || !figures.best_ohms || figures.best_part.empty()) return {};
  return fmt::format("{} = {} reaches {}", base::printable_short(figures.best_part),
                     base::si_text(*figures.best_ohms, "ohm", 3), percent_text(*figures.span_reachable));
}

std::optional<double> ceiling_of(const model::Figures& figures) {
  if (!figures.span_best || !figures.span_reachable) return figures.span_best;
  return std::max(*figures.span_best, *figures.span_reachable);
}

}  // namespace judge
