#include "audit/reading_form.hpp"

#include <algorithm>
#include <cmath>

#include "network/linear.hpp"

namespace audit {
namespace {

// The form of one end of the range in the bare network: a net's own, or a constant.
std::optional<model::OnePort> end_form(const model::ProbedNetwork& bare, model::NodeId end,
                                       std::span<const double> nominal, double source_ohms) {
  if (end.valid()) {
    if (!bare.sensor.valid()) return std::nullopt;
    const auto form = network::one_port(bare.network, bare.sensor, end);
    return form.ok() ? std::optional(*form) : std::nullopt;
  }
  const auto volts = still_volts(nominal);
  return volts ? std::optional(model::OnePort{*volts, *volts, source_ohms}) : std::nullopt;
}

}  // namespace

std::optional<double> still_volts(std::span<const double> volts) {
  if (volts.empty()) return std::nullopt;
  const auto [least, most] = std::minmax_element(volts.begin(), volts.end());
  const bool still = *most - *least <= 1e-12 * std::max(std::fabs(*least), std::fabs(*most));
  return still ? std::optional(volts.front()) : std::nullopt;
}

std::optional<model::OnePort> reading_form(const model::Divider& divider, const judge::Solved& solved) {
  if (!divider.bare_form) return std::nullopt;
  const model::OnePort& tap = *divider.bare_form;
  const auto low = end_form(divider.bare, divider.bare.low, solved.nominal.low, tap.source_ohms);
  const auto high = end_form(divider.bare, divider.bare.high, solved.nominal.high, tap.source_ohms);
  if (!low || !high) return std::nullopt;
  const double gain = divider.input.gain;
  const auto form = network::quotient_form(
      {gain * (tap.open_volts - low->open_volts), gain * (tap.short_volts - low->short_volts), tap.source_ohms},
      {high->open_volts - low->open_volts, high->short_volts - low->short_volts, tap.source_ohms});
  return form.ok() ? std::optional(*form) : std::nullopt;
}

void settle_form(model::Divider& divider, const judge::Solved& solved) {
  if (!divider.bare_form || (!divider.whole.low.valid() && !divider.whole.high.valid())) return;
  auto form = reading_form(divider, solved);
  if (form) {
    form->open_volts = divider.input.volts_of(form->open_volts);
    form->short_volts = divider.input.volts_of(form->short_volts);
  }
  divider.bare_form = form;
}

}  // namespace audit
