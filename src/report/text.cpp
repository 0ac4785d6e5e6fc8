#include "report/text.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <string_view>

#include "base/text.hpp"
#include "report/block.hpp"
#include "report/page.hpp"
#include "report/summary.hpp"

namespace report {
namespace {

std::string board_name(const model::BoardReport& board) {
  return base::printable_short(board.netlist, 200);
}

std::string cards_text(const model::ReadingCount& reading) {
  return fmt::format("{} read: {} modelled, {} unmodelled, {} skipped, {} in error", reading.cards, reading.modelled,
                     reading.unmodelled, reading.skipped, reading.error);
}

// "2 inputs, 1 audited: 1 error, 1 warning"; a trace audits nothing and does not speak of it.
std::string result_text(const Summary& summary, const TextOptions& options) {
  std::string out = counted(summary.inputs, "input");
  if (!options.trace) out += fmt::format(", {} audited", summary.audited);
  const std::string counts = counts_text(summary);
  if (!counts.empty()) return out + ": " + counts;
  const bool clean = summary.inputs > 0 && summary.audited == summary.inputs;
  return clean ? out + ": nothing found" : out;
}

Tone board_tone(const model::BoardReport& board, const Summary& summary) {
  return board.done_in_whole ? tone_of(summary) : Tone::bad;
}

// What holds for the board as a whole, after its inputs.
void board_block(Page& page, const model::BoardReport& board) {
  Summary own;
  own.add(board.findings);
  std::string verdict = counts_text(own);
  if (!board.done_in_whole) verdict = verdict.empty() ? "not done in whole" : "not done in whole, " + verdict;
  page.title("board " + board_name(board), '-', verdict, board_tone(board, own));
  page.row("cards", cards_text(board.reading));
  if (board.inputs.empty()) page.row("inputs", "none");
  finding_rows(page, board.findings, board.sources);
  std::string missing;
  for (const std::string& text : board.not_checked) missing += (missing.empty() ? "" : "; ") + base::printable(text);
  if (!missing.empty()) page.row("not checked", "Declared, but not checked by this version: " + missing);
}

void board_text(Page& page, const model::BoardReport& board, const TextOptions& options) {
  for (const model::AuditedInput& input : board.inputs) {
    if (options.trace)
      traced_block(page, input, board);
    else
      audited_block(page, input, board);
    page.blank_line();
  }
  board_block(page, board);
  page.blank_line();
}

void quiet_line(Page& page, const model::BoardReport& board, const TextOptions& options) {
  const Summary summary = summary_of(board);
  page.line(fmt::format("{}: {}{}", board_name(board), board.done_in_whole ? "" : "not done in whole; ",
                        result_text(summary, options)),
            summary.inputs == 0 || options.trace ? Tone::plain : board_tone(board, summary));
}

bool any_bar(const model::RunReport& report) {
  return std::any_of(report.boards.begin(), report.boards.end(), [](const model::BoardReport& board) {
    return std::any_of(board.inputs.begin(), board.inputs.end(), has_bar);
  });
}

void closing(Page& page, const model::RunReport& report, const TextOptions& options) {
  if (!options.trace && any_bar(report))
    page.paragraph(
        "bars: = swing of the nominal reading, - what leakage adds to it, : to be kept clear (rail-gap), "
        "! where it is not, < > past an end of the range",
        6, Tone::faint);
  const std::string by = report.simulator.empty() ? "" : ", " + base::printable(report.simulator);
  page.paragraph(fmt::format("{}, {} (tapspan {}{}, as of {})", counted(report.boards.size(), "board"),
                             result_text(summary_of(report), options), base::printable(report.version), by,
                             base::printable(report.as_of)),
                 2, Tone::strong);
}

}  // namespace

std::string text(const model::RunReport& report, const TextOptions& options) {
  Page page(options.colour);
  for (const model::BoardReport& board : report.boards) {
    if (options.quiet)
      quiet_line(page, board, options);
    else
      board_text(page, board, options);
  }
  if (!options.quiet) closing(page, report, options);
  return page.take();
}

}  // namespace report
