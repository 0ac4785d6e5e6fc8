// Simulates the inputs of a board and judges each as soon as its solutions are there.
#pragma once

#include "audit/reading.hpp"
#include "model/report.hpp"
#include "simulate/session.hpp"

namespace audit {

// Fills curve, figures and findings of every input of the report. An input that cannot be solved says so in its divider
// and stays not audited.
void solve_and_judge(const Reading& reading, std::size_t points, simulate::Session& session,
                     model::BoardReport& report);

}  // namespace audit
