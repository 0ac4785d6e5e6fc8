#include "report/summary.hpp"

#include <fmt/format.h>

namespace report {
namespace {

Summary& operator+=(Summary& sum, const Summary& part) {
  sum.boards += part.boards;
  sum.inputs += part.inputs;
  sum.audited += part.audited;
  sum.error += part.error;
  sum.warning += part.warning;
  sum.note += part.note;
  sum.waived += part.waived;
  return sum;
}

}  // namespace

void Summary::add(const model::FindingList& findings) {
  for (const model::Finding& finding : findings) {
    if (finding.waived) {
      ++waived;
      continue;
    }
    switch (finding.level) {
      case base::Level::error:
        ++error;
        break;
      case base::Level::warning:
        ++warning;
        break;
      case base::Level::note:
        ++note;
        break;
    }
  }
}

Summary summary_of(const model::AuditedInput& input) {
  Summary out;
  out.inputs = 1;
  out.audited = input.audited ? 1 : 0;
  out.add(input.findings);
  return out;
}

Summary summary_of(const model::BoardReport& board) {
  Summary out;
  out.boards = 1;
  for (const model::AuditedInput& input : board.inputs) out += summary_of(input);
  out.add(board.findings);
  return out;
}

Summary summary_of(const model::RunReport& report) {
  Summary out;
  for (const model::BoardReport& board : report.boards) out += summary_of(board);
  return out;
}

std::string counted(std::size_t count, std::string_view noun) {
  return fmt::format("{} {}{}", count, noun, count == 1 ? "" : "s");
}

std::string counts_text(const Summary& summary) {
  std::string out;
  const auto add = [&out](std::size_t count, std::string text) {
    if (count > 0) out += (out.empty() ? "" : ", ") + std::move(text);
  };
  add(summary.error, counted(summary.error, "error"));
  add(summary.warning, counted(summary.warning, "warning"));
  add(summary.note, counted(summary.note, "note"));
  add(summary.waived, fmt::format("{} waived", summary.waived));
  return out;
}

std::string net_name(const model::BoardReport& board, model::NetId net) {
  const auto at = board.net_names.find(net);
  return at == board.net_names.end() ? std::string{} : at->second;
}

std::string_view rung_text(model::Rung rung) {
  switch (rung) {
    case model::Rung::linear:
      return "linear";
    case model::Rung::tight:
      return "tight";
    case model::Rung::medium:
      return "medium";
    case model::Rung::single:
      return "single";
  }
  return "single";
}

}  // namespace report
