// What the leakages of a network do to a reading when all of them work together: each has its own sign.
#pragma once

#include <optional>
#include <span>
#include <vector>

#include "base/result.hpp"
#include "judge/judge.hpp"
#include "model/divider.hpp"
#include "model/plan.hpp"

namespace audit {

// The conditions that bring out what the leakages of `divider.whole` do to the reading, over `points` points of
// `swept`:
// - Where every leakage into the network raises the pin and neither end of the range moves (sources, positive
//   resistances and diodes: their conductance matrix has no negative element in its inverse), or there is one leakage
//   alone: all of them up, and all of them down.
// - Else on a linear network: every set of signs that the closed form finds extreme at some point (network/corner.hpp).
// - Else every set of signs of up to four leakages; of more, all up, all down, and each alone with either sign
//   (leakage_alone), for their effects to be added in magnitude.
// None where no leakage is declared. Error: the linear network has no closed solution.
[[nodiscard]] base::Result<std::vector<model::Condition>> leakage_conditions(const model::Divider& divider,
                                                                             std::span<const model::SweptValues> swept,
                                                                             std::size_t points);

// One such condition, solved.
struct LeakageCorner {
  model::ConditionKind kind = model::ConditionKind::leakage_high;
  judge::Solved::Volts volts;
  std::optional<judge::Solved::Volts> closed_form;
};

// Joins them with solved.nominal, which must be there, into leakage_high and leakage_low with their closed forms: at
// each point the corner that reads highest and the one that reads lowest. Where each leakage was solved alone, their
// effects on the reading are added in magnitude, if that reaches further than any corner; such a point has the nominal
// ends of the range and the pin that makes up the reading.
void join_leakage(const model::Input& input, std::span<const LeakageCorner> corners, judge::Solved& solved);

}  // namespace audit
