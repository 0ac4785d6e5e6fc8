// A command carried out in the real world: files, standard streams, simulator.
#pragma once

#include "app/command.hpp"

namespace app {

// Opens the simulator's session first, so that it wakes up while the netlist is read. Without one no input is audited,
// and every report says why.
[[nodiscard]] ExitStatus start(const AuditCommand& command);
[[nodiscard]] ExitStatus start(const TraceCommand& command);
[[nodiscard]] ExitStatus start(const Message& message);

}  // namespace app
