// The report for a person: one block an input, then a summary line.
#pragma once

#include <string>

#include "model/report.hpp"

namespace report {

struct TextOptions {
  bool colour = false;
  bool quiet = false;  // one line a board
  bool trace = false;  // what was found and how, no figures
};

[[nodiscard]] std::string text(const model::RunReport& report, const TextOptions& options);

}  // namespace report
