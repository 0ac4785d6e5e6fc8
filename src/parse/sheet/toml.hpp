// Bytes -> tree: the only place that knows the TOML library.
#pragma once

#include <optional>

#include "parse/sheet.hpp"
#include "parse/sheet/tree.hpp"

namespace parse {

// The TOML of a file, or of the *| lines of a netlist, with places in that text. Nothing after a syntax error, which is
// told in `diagnostics`; the library stops at the first.
[[nodiscard]] std::optional<TomlTable> read_toml(const SheetSource& place, const source::Sources& sources,
                                                 source::Diagnostics& diagnostics);

}  // namespace parse
