#include "report/figure_rows.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>

#include "base/text.hpp"
#include "report/bar.hpp"
#include "report/block.hpp"
#include "report/summary.hpp"

namespace report {
namespace {

constexpr std::size_t value_columns = 12;

std::string percent(double fraction) {
  return base::number_text(100 * fraction) + " %";
}

bool all_finite(const std::vector<double>& values) {
  return std::all_of(values.begin(), values.end(), [](double value) { return std::isfinite(value); });
}

// A value of the measurand; a parameter of a model has no unit.
std::string measurand_text(const model::AuditedInput& input, double value, int digits = 4) {
  std::string out = base::number_text(value, digits);
  if (input.sweep && !input.sweep->unit.empty()) out += ' ' + base::printable(input.sweep->unit);
  return out;
}

// "at -40 degC", of the sweep's point; empty where there is none.
std::string at_text(const model::AuditedInput& input, std::size_t point) {
  if (!input.sweep || point >= input.sweep->at.size()) return {};
  return "at " + measurand_text(input, input.sweep->at[point]);
}

// The limit of rail-gap that holds for this input; 0 where the rule is off.
double kept_clear(const model::Input& input) {
  const model::RuleText& rule = model::rule_text(model::RuleId::rail_gap);
  double limit = rule.limit;
  for (const model::LimitSetting& setting : input.limits)
    if (setting.rule == rule.name) limit = setting.limit.value;
  bool on = true;
  for (const model::LevelSetting& setting : input.levels)
    if (setting.rule == rule.name) on = setting.level.value.has_value();
  return on ? limit : 0.0;
}

// A figure that is no number is none.
bool known(const std::optional<double>& figure) {
  return figure && std::isfinite(*figure);
}

// Less than a millionth of an LSB is what rounding leaves.
bool is_rounding(const std::optional<double>& lsb) {
  return lsb && std::fabs(*lsb) < 1e-6;
}

std::string lsb_text(double lsb, int digits = 4) {
  return base::number_text(is_rounding(lsb) ? 0.0 : lsb, digits) + " LSB";
}

void figure_row(Page& page, std::string_view label, const std::string& value, const std::string& remark) {
  const std::size_t width = columns(value);
  const std::size_t pad = width < value_columns ? value_columns - width : 1;
  page.figure(label, remark.empty() ? value : value + std::string(pad, ' '), remark);
}

// Where on the sweep the nominal reading is lowest and highest.
std::string swing_text(const model::AuditedInput& input) {
  if (!has_bar(input)) return {};
  const std::vector<double>& volts = input.sweep->pin_volts;
  const auto [low, high] = std::minmax_element(volts.begin(), volts.end());
  const model::Input& keys = input.divider.input;
  return fmt::format("from {} {} to {} {}", percent(keys.reading_of(*low)),
                     at_text(input, static_cast<std::size_t>(low - volts.begin())), percent(keys.reading_of(*high)),
                     at_text(input, static_cast<std::size_t>(high - volts.begin())));
}

// "with R1 at 11.5 kohm"
std::string best_text(const model::Figures& figures) {
  if (!figures.best_ohms) return {};
  const std::string part = base::printable_short(figures.best_part, 40);
  if (*figures.best_ohms == 0) return fmt::format("with {} as a link", part);
  if (std::isinf(*figures.best_ohms)) return fmt::format("without {}", part);
  return fmt::format("with {} at {}", part, base::si_text(*figures.best_ohms, "ohm"));
}

void span_rows(Page& page, const model::AuditedInput& input) {
  const model::Figures& figures = input.figures;
  const bool rail_swept = input.sweep && input.sweep->sensor_ohms.empty();
  if (known(figures.span_use)) figure_row(page, "span used", percent(*figures.span_use), swing_text(input));
  // One resistor may reach beyond what the held open and shorted volts allow: then those are no ceiling.
  if (known(figures.span_best) && !(figures.span_reachable.value_or(0) > (1 + 1e-6) * *figures.span_best))
    figure_row(page, "span ceiling", percent(*figures.span_best),
               rail_swept ? "over this range of the rail" : "with the tap's open and shorted volts held");
  if (known(figures.span_reachable))
    figure_row(page, "within reach", percent(*figures.span_reachable), best_text(figures));
}

void gap_rows(Page& page, const model::AuditedInput& input) {
  const model::Figures& figures = input.figures;
  if (known(figures.gap_low))
    figure_row(page, "low gap", percent(*figures.gap_low), at_text(input, figures.gap_low_point));
  if (known(figures.gap_high))
    figure_row(page, "high gap", percent(*figures.gap_high), at_text(input, figures.gap_high_point));
}

void error_rows(Page& page, const model::AuditedInput& input) {
  const model::Figures& figures = input.figures;
  const bool rounding = is_rounding(figures.load_error_lsb);  // which is worst nowhere
  if (known(figures.load_error_lsb)) {
    std::string remark = rounding ? "" : at_text(input, figures.load_error_point);
    if (!figures.largest_load.name.empty())
      remark += fmt::format("{}most of it by {}", remark.empty() ? "" : ", ",
                            base::printable_short(figures.largest_load.name, 60));
    figure_row(page, "load error", lsb_text(*figures.load_error_lsb), remark);
  }
  if (known(figures.load_error_measurand) && !rounding)
    figure_row(page, known(figures.load_error_lsb) ? "" : "load error",
               measurand_text(input, *figures.load_error_measurand, 3),
               at_text(input, figures.load_error_measurand_point));
  if (known(figures.pin_source_ohms))
    figure_row(page, "pin behind", base::si_text(*figures.pin_source_ohms, "ohm"), "at most");
  if (known(figures.engine_gap_lsb))
    figure_row(page, "engine gap", lsb_text(*figures.engine_gap_lsb, 2), "between simulator and closed form");
}

}  // namespace

bool has_bar(const model::AuditedInput& input) {
  if (!input.audited || !input.sweep) return false;
  const model::Sweep& sweep = *input.sweep;
  const std::size_t points = sweep.at.size();
  const model::Input& keys = input.divider.input;
  return points > 0 && sweep.pin_volts.size() == points && sweep.pin_low.size() == points &&
         sweep.pin_high.size() == points && all_finite(sweep.pin_volts) && all_finite(sweep.pin_low) &&
         all_finite(sweep.pin_high) && keys.nominal_high > keys.nominal_low;
}

void bar_rows(Page& page, const model::AuditedInput& input) {
  const model::Input& keys = input.divider.input;
  const model::Sweep& sweep = *input.sweep;
  const auto [low, high] = std::minmax_element(sweep.pin_volts.begin(), sweep.pin_volts.end());
  Reach reach;
  reach.swing_low = keys.reading_of(*low);
  reach.swing_high = keys.reading_of(*high);
  reach.envelope_low =
      std::min(reach.swing_low, keys.reading_of(*std::min_element(sweep.pin_low.begin(), sweep.pin_low.end())));
  reach.envelope_high =
      std::max(reach.swing_high, keys.reading_of(*std::max_element(sweep.pin_high.begin(), sweep.pin_high.end())));
  reach.kept_clear = kept_clear(keys);
  page.blank_line();
  page.figure("reading", bar(reach), "");
  page.figure("", bar_scale(), "");
  page.blank_line();
}

void figure_rows(Page& page, const model::AuditedInput& input) {
  span_rows(page, input);
  gap_rows(page, input);
  error_rows(page, input);
  if (input.sweep && input.sweep->rung != model::Rung::linear)
    page.row("simulated", fmt::format("nonlinear, on the {} rung of tolerances{}", rung_text(input.sweep->rung),
                                      input.sweep->stepped ? ", stepped to its operating point" : ""));
}

}  // namespace report
