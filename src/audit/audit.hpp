// One audit, composed of the stages: read, flatten, divide, plan, simulate, judge.
#pragma once

#include <filesystem>
#include <optional>
#include <string>
#include <vector>

#include "model/report.hpp"
#include "simulate/session.hpp"
#include "source/limits.hpp"

namespace audit {

struct Options {
  std::vector<std::filesystem::path> with;    // further declarations
  std::optional<std::filesystem::path> root;  // includes are read below it; default: the netlist's folder
  std::size_t points = 101;
  std::vector<std::string> only;  // globs of input names; empty: all
  source::Limits limits;
};

struct BoardRun {
  model::BoardReport report;
  std::string diagnostics;  // drawn, for standard error
};

// Audits one netlist. With no session nothing is simulated: that is `trace`.
[[nodiscard]] BoardRun audit_board(const std::string& netlist, const Options& options, simulate::Session* session);

}  // namespace audit
