// TOML -> sheet. Three places, same keys, later wins: lines of the netlist that begin with *|, the file beside it,
// files given with --with. Keys that this version has no use for are refused, or listed as not checked; none is
// ignored.
#pragma once

#include <span>

#include "model/sheet.hpp"
#include "source/diagnostic.hpp"
#include "source/text.hpp"

namespace parse {

// One place of declarations: a TOML file, or a netlist whose *| lines hold TOML.
struct SheetSource {
  source::SourceId source;
  bool inside_netlist = false;
};

// Reads and merges the places in order, key by key. Every error (syntax, unknown key, wrong type or unit, missing key)
// is a diagnostic with its place; a sheet with errors must not be audited.
[[nodiscard]] model::Sheet read_sheet(std::span<const SheetSource> places, const source::Sources& sources,
                                      source::Diagnostics& diagnostics);

}  // namespace parse
