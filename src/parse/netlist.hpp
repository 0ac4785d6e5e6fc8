// Text -> cards: reads a netlist and the files it includes. Any byte sequence is taken; what cannot be read is said,
// with its place, and reading goes on with the next card.
#pragma once

#include <filesystem>
#include <functional>
#include <string>

#include "base/names.hpp"
#include "base/result.hpp"
#include "model/netlist.hpp"
#include "source/diagnostic.hpp"
#include "source/limits.hpp"
#include "source/text.hpp"

namespace parse {

// Fetches an included file: `wanted` as written, `asked` the card that asks. Gives the id of the new text in Sources,
// whose included_at is `asked`. Error: why not.
using Includer = std::function<base::Result<source::SourceId>(const std::string& wanted, source::Place asked)>;

// An Includer over the file system: files below `root` only, relative to the folder of the file that asks.
[[nodiscard]] Includer files_below(std::filesystem::path root, source::Sources& sources, const source::Limits& limits);

// Reads source `root` and all it includes. Diagnostics: errors (card not read, limit reached), warnings (missing
// include), notes (control block skipped, title looks like an element). The netlist is complete but for what the
// diagnostics name.
[[nodiscard]] model::Netlist read_netlist(source::SourceId root, source::Sources& sources, base::NameTable& names,
                                          const Includer& include, const source::Limits& limits,
                                          source::Diagnostics& diagnostics);

}  // namespace parse
