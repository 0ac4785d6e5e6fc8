#include "worker/text_rules.hpp"

#include <algorithm>
#include <array>

namespace worker {
namespace {

constexpr std::array<std::string_view, 2> load_beginnings{"Note: No compatibility mode selected!", "Circuit: "};

constexpr std::array<std::string_view, 4> analysis_beginnings{
    "Doing analysis at TEMP = ", "No. of Data Rows : ", " Reference value :", "Using transient initial conditions"};

// A way of stepping that failed is followed by the next way, and by "DC solution failed" when none is left.
constexpr std::array<std::string_view, 14> stepping_beginnings{"Note: Starting dynamic gmin stepping",
                                                               "Note: Starting true gmin stepping",
                                                               "Note: Starting spice3 gmin stepping",
                                                               "Note: Starting source stepping",
                                                               "Trying gmin = ",
                                                               "Note: One successful gmin step",
                                                               "Note: One successful source step",
                                                               "Supplies reduced to ",
                                                               "Warning: Last gmin step failed",
                                                               "Warning: Further gmin increment",
                                                               "Warning: Dynamic gmin stepping failed",
                                                               "Warning: dynamic gmin stepping failed",
                                                               "Warning: True gmin stepping failed",
                                                               "Warning: true gmin stepping failed"};

constexpr std::array<std::string_view, 4> completed_beginnings{
    "Note: Dynamic gmin stepping completed", "Note: True gmin stepping completed",
    "Note: spice3 gmin stepping completed", "Note: Source stepping completed"};

template <std::size_t N>
bool begins_with_any(std::string_view line, const std::array<std::string_view, N>& beginnings) {
  return std::any_of(beginnings.begin(), beginnings.end(),
                     [line](std::string_view beginning) { return line.starts_with(beginning); });
}

}  // namespace

std::string_view without_stream(std::string_view line) {
  for (const std::string_view stream : {"stdout", "stderr"}) {
    if (!line.starts_with(stream)) continue;
    line.remove_prefix(stream.size());
    if (line.starts_with(' ')) line.remove_prefix(1);
    break;
  }
  return line;
}

Meaning meaning_of(std::string_view line, Phase phase) {
  line = without_stream(line);
  if (phase == Phase::idle || line.find_first_not_of(" \t\r\n") == std::string_view::npos) return Meaning::harmless;
  if (phase == Phase::load) return begins_with_any(line, load_beginnings) ? Meaning::harmless : Meaning::unexpected;
  if (begins_with_any(line, analysis_beginnings)) return Meaning::harmless;
  if (begins_with_any(line, completed_beginnings)) return Meaning::completed;
  return begins_with_any(line, stepping_beginnings) ? Meaning::stepping : Meaning::unexpected;
}

}  // namespace worker
