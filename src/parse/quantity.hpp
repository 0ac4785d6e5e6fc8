// Quantities as people write them: in declarations (SI units, M is mega) and in netlists (both readings kept).
#pragma once

#include <optional>
#include <string>
#include <string_view>

#include "base/result.hpp"

namespace parse {

// What a declared quantity is measured in.
enum class Unit : unsigned char {
  none,
  ohm,
  volt,
  ampere,
  farad,
  henry,
  second,
  hertz,
  watt,
  fraction,
  degc,
  kelvin,
  lux
};

// A quantity of a declaration: "10k", "4k7", "2.2 uF", "100nA", "1%", "50 ppm", "1e3", "-40". M is mega, m is milli, u
// and the two micro signs are micro; a blank may stand before prefix and unit; % and ppm only for fractions. Error:
// what was expected and what stands there; a unit that is not `unit`'s.
[[nodiscard]] base::Result<double> read_quantity(std::string_view text, Unit unit);

// What a key of that unit expects, for messages: "a resistance such as "10k"".
[[nodiscard]] std::string_view expected_of(Unit unit);

// A literal of a netlist, read as the board's builder means it and as SPICE takes it.
struct Literal {
  double builder = 0;
  double spice = 0;        // NaN: SPICE sees no number there
  double tolerance = 0;    // a fraction; NaN: none written
  bool bare_mega = false;  // the suffix is a bare M, which SPICE takes as milli; `builder` holds the mega reading

  // Whether it is anything but a plain number.
  [[nodiscard]] bool odd() const;
};

// Reads "10k", "4.7kohm", "1meg", "4k7", "2M2", "R47", "10k 1%", "10k/1%", "470R", "2.2uF", "1e3". Error: no number
// there. SPICE's suffixes: f p n u m k meg g t mil, in any case, letters after them ignored (ngspice manual, chapter on
// circuit elements); marking codes: IEC 60062 clause 4.
[[nodiscard]] base::Result<Literal> read_literal(std::string_view text);

// Why a text that has the form of a literal is none all the same: it can be read in two ways, its tolerance cannot be,
// or no number holds it. Nothing where it is no literal at all, or a good one.
[[nodiscard]] std::optional<std::string> literal_refusal(std::string_view text);

}  // namespace parse
