// The command line.
#pragma once

#include <string>
#include <vector>

#include "app/command.hpp"

namespace app {

// What the words after the program's name ask for. Bad usage, and what this version does not support, is a Message with
// ExitStatus::incomplete and one line of text.
[[nodiscard]] Command parse_arguments(const std::vector<std::string>& words);

}  // namespace app
