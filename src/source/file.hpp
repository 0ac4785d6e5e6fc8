// Reading files, and only those below the root: an include or a table of a netlist may name nothing else.
#pragma once

#include <filesystem>
#include <string>

#include "base/result.hpp"
#include "source/bytes.hpp"
#include "source/limits.hpp"

namespace source {

// The bytes of a regular file that the user named. Errors: not there, not a regular file, unreadable, larger than the
// limit.
[[nodiscard]] base::Result<Bytes> read_file(const std::filesystem::path& path, const Limits& limits);

// Where `wanted`, written in a file of folder `from`, leads: an existing regular file below `root` once links are
// resolved. Backslashes count as slashes; an empty folder is the current one. Errors: nothing there; outside the root;
// not a regular file.
[[nodiscard]] base::Result<std::filesystem::path> resolve_below(const std::filesystem::path& root,
                                                                const std::filesystem::path& from,
                                                                const std::string& wanted);

}  // namespace source
