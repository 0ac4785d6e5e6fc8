// The figures of an input as rows of the text report, and the bar above them.
#pragma once

#include "model/report.hpp"
#include "report/page.hpp"

namespace report {

// Needs has_bar(input).
void bar_rows(Page& page, const model::AuditedInput& input);

void figure_rows(Page& page, const model::AuditedInput& input);

}  // namespace report
