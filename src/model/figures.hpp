// The figures of one input. A figure that does not apply is absent, never zero.
#pragma once

#include <cstdint>
#include <optional>
#include <string>

namespace model {

enum class LoadKind : std::uint8_t {
  none,
  part,              // resistors that are no arms
  devices,           // clamps and other parts that are not linear, all together
  input_resistance,  // of the converter
  rail_resistance,
  leakage,  // all of it
};

// What bends the reading away from that of the bare divider.
struct Contributor {
  LoadKind kind = LoadKind::none;
  std::string name;  // as reports name it; empty for none
};

// A change of one resistor, and the span_use that it reaches.
struct Offer {
  std::string part;
  double ohms = 0;  // 0: as a link; infinite: left out
  double span_use = 0;
};

struct Figures {
#define FIGURE(name, unit, sentence) std::optional<double> name;
#include "model/figures.def"
#undef FIGURE
  std::string best_part;            // the resistor that span_reachable speaks of
  std::optional<double> best_ohms;  // and its value there; 0: as a link; infinite: left out
  std::optional<Offer> other;       // what reaches more, but where that may well be the purpose (advise::Offers)

  // Where on the sweep (index of the point) the worst of each is.
  std::size_t gap_low_point = 0;
  std::size_t gap_high_point = 0;
  std::size_t load_error_point = 0;
  std::size_t load_error_measurand_point = 0;
  std::size_t engine_gap_point = 0;
  Contributor largest_load;            // what moves the reading most at load_error_point
  Contributor largest_load_measurand;  // and at load_error_measurand_point
};

}  // namespace model
