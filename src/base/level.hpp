// How serious a message is. The three words are those of SARIF 2.1.0 section 3.27.10.
#pragma once

#include <string_view>

namespace base {

enum class Level : unsigned char { note, warning, error };

[[nodiscard]] constexpr std::string_view level_text(Level level) {
  switch (level) {
    case Level::note:
      return "note";
    case Level::warning:
      return "warning";
    case Level::error:
      return "error";
  }
  return "error";
}

}  // namespace base
