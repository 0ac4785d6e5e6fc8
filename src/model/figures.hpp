// The figures of one input. A figure that does not apply is absent, never zero.
#pragma once

#include <optional>
#include <string>

namespace model {

struct Figures {
#define FIGURE(name, unit, sentence) std::optional<double> name;
#include "model/figures.def"
#undef FIGURE
  std::string best_part;            // the resistor that span_reachable speaks of
  std::optional<double> best_ohms;  // and its value there

  // Where on the sweep (index of the point) the worst of each is.
  std::size_t gap_low_point = 0;
  std::size_t gap_high_point = 0;
  std::size_t load_error_point = 0;
  std::size_t load_error_measurand_point = 0;
  std::size_t engine_gap_point = 0;
  std::string largest_load;  // the contributor that moves the pin most
};

}  // namespace model
