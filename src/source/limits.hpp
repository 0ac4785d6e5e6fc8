// How much input is taken before a clear error says no. A name=number on the command line raises a limit.
#pragma once

#include <cstdint>

namespace source {

struct Limits {
  std::uint64_t file_bytes = std::uint64_t{1} << 30;  // one file
  std::uint64_t line_bytes = std::uint64_t{1} << 20;  // one line of a netlist
  std::uint64_t include_depth = 16;
  std::uint64_t includes = 1000;         // files of one board
  std::uint64_t nesting = 64;            // subcircuit definitions or instances inside one another
  std::uint64_t expression_depth = 200;  // brackets and operators inside one another
  std::uint64_t elements = 20'000'000;   // of the flat circuit
  std::uint64_t points = 100'000;        // of one sweep
};

}  // namespace source
