// A command carried out, against a world that tests can replace.
#pragma once

#include <functional>
#include <string>
#include <string_view>

#include "app/command.hpp"
#include "base/result.hpp"

namespace app {

struct World {
  std::function<audit::BoardRun(const std::string& netlist)> board;
  std::function<base::Result<base::Done>(std::string_view bytes)> out;
  std::function<void(std::string_view bytes)> err;
  std::string simulator;  // empty: nothing is simulated
  bool colour = false;
};

// Runs the boards in order, diagnostics to `err` as they come; then writes every report that was asked for, whatever
// was found. A report that cannot be written makes the status `incomplete`.
[[nodiscard]] ExitStatus run(const AuditCommand& command, const World& world);
[[nodiscard]] ExitStatus run(const TraceCommand& command, const World& world);

}  // namespace app
