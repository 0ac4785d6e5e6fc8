// What a stage has to say about a text: a value with a place. Drawing it, with the line and a mark, is done here too.
#pragma once

#include <string>
#include <vector>

#include "base/level.hpp"
#include "source/text.hpp"

namespace source {

struct Diagnostic {
  base::Level level = base::Level::error;
  Span where;           // may be invalid: then the message stands alone
  std::string message;  // one clear sentence without a full stop: what was expected, what stands there
};

using Diagnostics = std::vector<Diagnostic>;

[[nodiscard]] std::size_t count(const Diagnostics& diagnostics, base::Level level);

// "file:line:column: level: message", then the line with a mark under the place, then the chain of includes. Control
// characters of the text are shown as '?'-free escapes, tabs as one blank, and a long line only around the place, so
// that the mark always stands under what it means. Ends with a line feed.
[[nodiscard]] std::string draw(const Sources& sources, const Diagnostic& diagnostic);

// The first line of draw() alone, without the line feed.
[[nodiscard]] std::string headline(const Sources& sources, const Diagnostic& diagnostic);

}  // namespace source
