#include "judge/wording.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <variant>

#include "base/text.hpp"

namespace judge {

std::string percent_text(double fraction, int digits) {
  constexpr double rounding = 1e-12;
  return fmt::format("{} %", base::number_text(std::fabs(fraction) < rounding ? 0 : 100 * fraction, digits));
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

std::string offer_text(const model::Offer& offer) {
  const std::string part = base::printable_short(offer.part);
  const std::string reached = percent_text(offer.span_use);
  if (offer.ohms == 0) return fmt::format("{} as a link reaches {}", part, reached);
  if (std::isinf(offer.ohms)) return fmt::format("without {} it reaches {}", part, reached);
  return fmt::format("{} = {} reaches {}", part, base::si_text(offer.ohms, "ohm", 3), reached);
}

std::string reach_text(const model::Figures& figures) {
  if (!figures.span_reachable || !figures.best_ohms || figures.best_part.empty()) return {};
  return offer_text({figures.best_part, *figures.best_ohms, *figures.span_reachable});
}

std::optional<double> ceiling_of(const model::Figures& figures) {
  if (!figures.span_best) return std::nullopt;
  return std::max(
      {*figures.span_best, figures.span_reachable.value_or(0), figures.other ? figures.other->span_use : 0.0});
}

std::string unliftable_text(const model::AuditedInput& input, std::size_t point, std::string_view unit) {
  const model::Divider& divider = input.divider;
  const bool rail = input.sweep->sensor_ohms.empty();
  const bool to_ground = divider.upper_rail == "0" || divider.lower_rail == "0";
  const double volts = input.sweep->at[point];
  const bool stands = std::holds_alternative<double>(divider.input.low);
  if (!rail || !to_ground || !stands || volts < 0 || !(volts <= divider.input.nominal_low)) return {};
  return fmt::format(
      "no divider lifts {} off it; judge the rail over the range in which it is used, or begin the "
      "converter's range lower",
      measurand_text(volts, unit));
}

}  // namespace judge
