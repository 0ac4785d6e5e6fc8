// Hand-built results to render: invented inputs of an invented board.
#pragma once

#include "model/report.hpp"

namespace sample {

// An NTC well placed below 10 kohm; loaded a little by leakage.
model::AuditedInput good();
// Uses a fifth of the range: span-use warning with a place, and a waived note.
model::AuditedInput poor_span();
// A supply monitor whose reading passes the upper end; no sensor_ohms in its sweep; nonlinear.
model::AuditedInput swept_rail_off_scale();
// Nothing leads from the net to a rail.
model::AuditedInput no_divider();
// A part without a model stands in the way.
model::AuditedInput not_audited();
// Names full of control characters, quotes, bytes that are not UTF-8, and very long ones.
model::AuditedInput hostile();

// A board of these inputs with its own findings; names of nets and a source text are put in.
model::BoardReport board(std::vector<model::AuditedInput> inputs);
model::RunReport run(std::vector<model::BoardReport> boards);

// One board with all of the above.
model::RunReport everything();
// What `trace` has of the good input, of the one without a divider, and of the one that cannot be audited.
model::RunReport traced();

}  // namespace sample
