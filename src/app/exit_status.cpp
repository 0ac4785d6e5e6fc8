#include "app/exit_status.hpp"

#include <algorithm>

namespace app {
namespace {

bool reaches(base::Level level, Gate gate) {
  switch (gate) {
    case Gate::error:
      return level >= base::Level::error;
    case Gate::warning:
      return level >= base::Level::warning;
    case Gate::note:
      return level >= base::Level::note;
    case Gate::never:
      return false;
  }
  return true;
}

bool any_reaches(const model::FindingList& findings, Gate gate) {
  return std::any_of(findings.begin(), findings.end(),
                     [gate](const model::Finding& finding) { return !finding.waived && reaches(finding.level, gate); });
}

bool board_reaches(const model::BoardReport& board, Gate gate) {
  return any_reaches(board.findings, gate) ||
         std::any_of(board.inputs.begin(), board.inputs.end(),
                     [gate](const model::AuditedInput& input) { return any_reaches(input.findings, gate); });
}

bool in_whole(const model::RunReport& report) {
  return !report.boards.empty() && std::all_of(report.boards.begin(), report.boards.end(),
                                               [](const model::BoardReport& board) { return board.done_in_whole; });
}

bool all_audited(const model::BoardReport& board) {
  return std::all_of(board.inputs.begin(), board.inputs.end(),
                     [](const model::AuditedInput& input) { return input.audited; });
}

}  // namespace

ExitStatus audit_status(const model::RunReport& report, Gate gate, bool chosen) {
  const auto& boards = report.boards;
  const auto has_inputs = [](const model::BoardReport& board) { return !board.inputs.empty(); };
  const bool inputs_there = chosen ? std::any_of(boards.begin(), boards.end(), has_inputs)
                                   : std::all_of(boards.begin(), boards.end(), has_inputs);
  if (!in_whole(report) || !inputs_there || !std::all_of(boards.begin(), boards.end(), all_audited))
    return ExitStatus::incomplete;
  const bool gated =
      std::any_of(boards.begin(), boards.end(), [gate](const auto& board) { return board_reaches(board, gate); });
  return gated ? ExitStatus::gated : ExitStatus::passed;
}

ExitStatus trace_status(const model::RunReport& report) {
  const bool all_read = std::all_of(report.boards.begin(), report.boards.end(), [](const model::BoardReport& board) {
    return board.reading.error == 0 && !board.include_missing;
  });
  return in_whole(report) && all_read ? ExitStatus::passed : ExitStatus::incomplete;
}

}  // namespace app
