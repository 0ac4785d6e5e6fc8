// Reports on their way out. Errors are sentences that name the file.
#pragma once

#include <filesystem>
#include <string_view>

#include "base/result.hpp"

namespace app {

// The file then holds exactly these bytes, or what it held before: they go to a new file beside it, which takes its
// name. A link is followed; what is no regular file (a device, a pipe) is written to as it is.
[[nodiscard]] base::Result<base::Done> write_file(const std::filesystem::path& path, std::string_view bytes);

[[nodiscard]] base::Result<base::Done> write_standard_output(std::string_view bytes);

// Nothing can be said of an error here.
void write_standard_error(std::string_view bytes);

// Whether text on standard output may be coloured: it is a terminal that knows how, and NO_COLOR is unset or empty.
[[nodiscard]] bool colour_wanted();

}  // namespace app
