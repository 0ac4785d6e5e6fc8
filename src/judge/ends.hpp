// The two ends of a converter's range, and how far a reading may pass one before it is off scale.
#pragma once

#include <string_view>
#include <vector>

#include "judge/judge.hpp"

namespace judge {

// One end, with the gap that the envelope leaves to it.
struct EndGap {
  std::string_view name;   // "low" or "high"
  double gap = 0;          // fraction; negative past the end
  double nominal_gap = 0;  // the same without leakage, at the same point
  std::size_t point = 0;   // of the sweep
};

// Both ends of an input that has its figures; none of an input without.
[[nodiscard]] std::vector<EndGap> end_gaps(const model::AuditedInput& input);

// How far past an end a reading may lie, as a fraction: the largest of the declared limit of off-scale, half an LSB and
// the converter's declared offset.
struct Tolerated {
  double fraction = 0;
  std::string_view reason;  // "half an LSB"
};
[[nodiscard]] Tolerated tolerated_excess(const model::Input& input);

// Whether off-scale has a finding at this end.
[[nodiscard]] bool is_off_scale(const model::Input& input, const EndGap& end);

}  // namespace judge
