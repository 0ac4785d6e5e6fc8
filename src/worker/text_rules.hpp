// What the library says while it works is the only sign of most of its failures. These are the lines that mean no harm;
// any other line is a failure. Measured with ngspice 39.3. Lines come with the stream's name in front: "stdout Circuit:
// t".
#pragma once

#include <cstdint>
#include <string_view>

namespace worker {

enum class Phase : std::uint8_t { idle, load, analysis };

enum class Meaning : std::uint8_t {
  harmless,
  stepping,   // gmin or source stepping goes on, or one of its ways has failed
  completed,  // a stepping came to its end
  unexpected,
};

// What a line says in a phase; outside of the phases nothing matters.
[[nodiscard]] Meaning meaning_of(std::string_view line, Phase phase);

// The line without the stream's name.
[[nodiscard]] std::string_view without_stream(std::string_view line);

}  // namespace worker
