#include "judge/ends.hpp"

#include <cmath>

#include "judge/readings.hpp"
#include "judge/rule.hpp"

namespace judge {

std::vector<EndGap> end_gaps(const model::AuditedInput& input) {
  const model::Figures& figures = input.figures;
  const auto nominal = [&](std::size_t point) { return input.divider.input.reading_of(input.sweep->pin_volts[point]); };
  std::vector<EndGap> ends;
  if (!input.sweep) return ends;
  if (figures.gap_low) ends.push_back({"low", *figures.gap_low, nominal(figures.gap_low_point), figures.gap_low_point});
  if (figures.gap_high)
    ends.push_back({"high", *figures.gap_high, 1 - nominal(figures.gap_high_point), figures.gap_high_point});
  return ends;
}

Tolerated tolerated_excess(const model::Input& input) {
  const model::ConverterError& offset = input.offset_error;
  const double offset_reading = offset.in_lsb ? reading_of_lsb(input, offset.value)
                                              : input.gain * offset.value / (input.nominal_high - input.nominal_low);
  Tolerated most{reading_of_lsb(input, 0.5), "half an LSB"};
  // An offset that cannot be held against the range excuses nothing.
  if (std::isfinite(offset_reading) && std::fabs(offset_reading) > most.fraction)
    most = {std::fabs(offset_reading), "the converter's offset error"};
  const double limit = limit_of(input, model::RuleId::off_scale);
  if (limit > most.fraction) most = {limit, "the declared limit"};
  return most;
}

bool is_off_scale(const model::Input& input, const EndGap& end) {
  return -end.gap > tolerated_excess(input).fraction && !is_off(input.levels, model::RuleId::off_scale);
}

}  // namespace judge
