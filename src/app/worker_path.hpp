// Where the simulator's program is.
#pragma once

#include <filesystem>

#include "base/result.hpp"

namespace app {

// The worker that belongs to the program in this folder: beside it, or where it is installed. Error: neither is there.
[[nodiscard]] base::Result<std::filesystem::path> worker_for(const std::filesystem::path& folder);

// The folder of the running program.
[[nodiscard]] std::filesystem::path program_folder();

}  // namespace app
