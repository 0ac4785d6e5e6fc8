// The plans of an input, and what their solutions mean for the judge.
#pragma once

#include <optional>
#include <span>
#include <vector>

#include "base/result.hpp"
#include "judge/judge.hpp"
#include "model/divider.hpp"
#include "model/plan.hpp"
#include "model/sheet.hpp"
#include "model/sweep.hpp"

namespace audit {

// One input made ready for the simulator.
struct Prepared {
  std::vector<double> at;           // measurand
  std::vector<double> sensor_ohms;  // by law or expression; empty where only a solution tells, or for a swept rail
  std::vector<model::SweptValues> swept;  // of the whole network
  std::vector<model::SweptValues> bare_swept;
  std::vector<double> bare_slope;   // of bare_slopes(); empty where only the sweep's own points tell
  model::Plan whole;                // may be moved out once prepared
  std::optional<model::Plan> bare;  // only where the arms are not linear: else the closed form is the bare divider
};

// Error: the sweep has no values (the sentence says why).
[[nodiscard]] base::Result<Prepared> prepare(const model::Divider& divider, const model::Circuit& circuit,
                                             const model::SensorDeclaration& sensor,
                                             std::span<const model::ConditionKind> needs, std::size_t points);

// Solutions of `plan` (Prepared::whole) and of the bare plan, with the closed forms, as the judge takes them. Error:
// the bare divider has no solution.
[[nodiscard]] base::Result<judge::Solved> solved_of(const model::Divider& divider, const Prepared& prepared,
                                                    const model::Plan& plan, const model::Solution& whole,
                                                    const model::Solution* bare);

// Why the readings of a sweep are none, as a sentence: the converter's range turns over within it, in any condition
// that was solved. Empty where it does not.
[[nodiscard]] std::string turning_range(const judge::Solved& solved);

// Ends of the range that are nets inside a network are nominally what they are in the middle of the sweep; those on a
// rail have its volts already.
void settle_range(model::Divider& divider, const judge::Solved& solved);

}  // namespace audit
