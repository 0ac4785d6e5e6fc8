// What several report formats say in the same way: counts, names of nets, the simulator's rung in a word.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>

#include "model/report.hpp"

namespace report {

// Inputs and findings in numbers. A waived finding counts as waived and at no level.
struct Summary {
  std::size_t boards = 0;
  std::size_t inputs = 0;
  std::size_t audited = 0;
  std::size_t error = 0;
  std::size_t warning = 0;
  std::size_t note = 0;
  std::size_t waived = 0;

  void add(const model::FindingList& findings);
};

[[nodiscard]] Summary summary_of(const model::AuditedInput& input);
[[nodiscard]] Summary summary_of(const model::BoardReport& board);
[[nodiscard]] Summary summary_of(const model::RunReport& report);

// "2 errors, 1 warning": the levels that occur, most serious first, waived ones last; empty when nothing was found.
[[nodiscard]] std::string counts_text(const Summary& summary);

// "1 input", "2 inputs".
[[nodiscard]] std::string counted(std::size_t count, std::string_view noun);

// The net's spelling, or empty where the board has no name for it.
[[nodiscard]] std::string net_name(const model::BoardReport& board, model::NetId net);

// The rung of the simulator's ladder of options in one word: linear, tight, medium, single.
[[nodiscard]] std::string_view rung_text(model::Rung rung);

}  // namespace report
