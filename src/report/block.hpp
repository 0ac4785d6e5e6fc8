// The blocks of the text report: one an input.
#pragma once

#include "model/report.hpp"
#include "report/page.hpp"
#include "report/summary.hpp"

namespace report {

// Title, what was found, the bar, figures, findings.
void audited_block(Page& page, const model::AuditedInput& input, const model::BoardReport& board);

// Title, what was found and how: nets, candidates with their weights, the one-port form; findings.
void traced_block(Page& page, const model::AuditedInput& input, const model::BoardReport& board);

// One row a finding, with rule and place.
void finding_rows(Page& page, const model::FindingList& findings, const source::Sources& sources);

// How serious the worst of these counts is, as a tone.
[[nodiscard]] Tone tone_of(const Summary& summary);

// Whether a bar can be drawn for the input.
[[nodiscard]] bool has_bar(const model::AuditedInput& input);

}  // namespace report
