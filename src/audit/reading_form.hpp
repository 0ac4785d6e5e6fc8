// The one-port form of a reading, where the ends of the range may move with the sensor.
#pragma once

#include <optional>
#include <span>

#include "judge/judge.hpp"
#include "model/divider.hpp"

namespace audit {

// The volts that all points share, to a relative 1e-12; nothing where they move.
[[nodiscard]] std::optional<double> still_volts(std::span<const double> volts);

// The bare divider's reading u over the sensor's resistance, as a one-port form whose "volts" are readings. Between
// ends that stand still it is bare_form with its volts read; between ends that are nets of the bare network it is the
// quotient's own (network::quotient_form), whose source_ohms differ from what the sensor itself sees. Nothing where
// there is no such form: no bare_form, ends that move but not in the bare network, a sensor that is not one branch.
[[nodiscard]] std::optional<model::OnePort> reading_form(const model::Divider& divider, const judge::Solved& solved);

// Puts bare_form in nominal volts, as every voltage of a report is (a reading times the nominal range, plus nominal
// low), so that it fits the sweep's bare_volts: Rx = Rs (Vshort - V)/(V - Vopen) holds with the reported numbers. Where
// the reading has no form, bare_form goes. To be called once the range is settled.
void settle_form(model::Divider& divider, const judge::Solved& solved);

}  // namespace audit
