// What a reviewer wants beside the figures of the curve: ceilings, a better resistor, the source resistance at the pin,
// the largest load.
#pragma once

#include "audit/plans.hpp"
#include "model/divider.hpp"
#include "model/figures.hpp"

namespace audit {

// Fills span_best, span_reachable with best_part and best_ohms, pin_source_ohms and largest_load. Each stays absent
// where it does not apply.
void add_advice(const model::Divider& divider, const Prepared& prepared, const judge::Solved& solved,
                model::Figures& figures);

}  // namespace audit
