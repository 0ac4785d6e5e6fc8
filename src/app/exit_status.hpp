// The exit status of the program: 2 wins over 1.
#pragma once

#include "model/report.hpp"

namespace app {

enum class ExitStatus : int {
  passed = 0,      // all audited, nothing at or above the gate
  gated = 1,       // a finding at or above the gate
  incomplete = 2,  // the job could not be done, in whole or in part
};

// The least level of a finding that fails a run.
enum class Gate : unsigned char { error, warning, note, never };

// Incomplete: a board that was not done in whole, an input without a result, no board, or a board without any input.
// With `chosen` (inputs were picked by name) boards may have none as long as one of them has one.
[[nodiscard]] ExitStatus audit_status(const model::RunReport& report, Gate gate, bool chosen);

// Incomplete: no board, or one of which a card or an include could not be read.
[[nodiscard]] ExitStatus trace_status(const model::RunReport& report);

}  // namespace app
