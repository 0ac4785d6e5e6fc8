#include "source/diagnostic.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <string_view>

#include "base/text.hpp"

namespace source {
namespace {

constexpr std::size_t columns_before = 50;  // of a long line, shown before the place
constexpr std::size_t columns_shown = 92;   // of a line in all
constexpr std::string_view margin = "    ";
constexpr std::string_view cut = "...";

bool continues_utf8(char c) {
  return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U;
}

// Bytes as they are drawn. Two texts of which the second starts a character are drawn side by side as their sum is.
std::string shown(std::string_view bytes) {
  std::string text(bytes);
  std::replace(text.begin(), text.end(), '\t', ' ');
  return base::printable(text);
}

std::size_t columns(std::string_view drawn) {
  const auto hidden = static_cast<std::size_t>(std::count_if(drawn.begin(), drawn.end(), continues_utf8));
  return drawn.size() - hidden;
}

// Where the character that holds byte `at` starts, and where the next one does. No character has more than three
// bytes after its first (RFC 3629 section 3): a longer run is junk, of which each byte stands alone.
std::size_t character_start(std::string_view line, std::size_t at) {
  for (int back = 0; back < 3 && at > 0 && at < line.size() && continues_utf8(line[at]); ++back) --at;
  return at;
}
std::size_t character_end(std::string_view line, std::size_t at) {
  ++at;
  for (int ahead = 0; ahead < 3 && at < line.size() && continues_utf8(line[at]); ++ahead) ++at;
  return at;
}

// The first byte to show so that at most `room` columns stand before `at`.
std::size_t window_start(std::string_view line, std::size_t at, std::size_t room) {
  std::size_t used = 0;
  while (at > 0) {
    const std::size_t previous = character_start(line, at - 1);
    used += columns(shown(line.substr(previous, at - previous)));
    if (used > room) break;
    at = previous;
  }
  return at;
}

// The end of what `room` columns from `at` on can show.
std::size_t window_end(std::string_view line, std::size_t at, std::size_t room) {
  std::size_t used = 0;
  while (at < line.size()) {
    const std::size_t next = character_end(line, at);
    used += columns(shown(line.substr(at, next - at)));
    if (used > room) break;
    at = next;
  }
  return at;
}

// The line around byte `at`, and a mark under `length` bytes from there on.
std::string excerpt(std::string_view line, std::size_t at, std::size_t length) {
  at = character_start(line, std::min(at, line.size()));
  const bool whole = line.size() <= columns_shown && columns(shown(line)) <= columns_shown;
  const std::size_t from = whole ? 0 : window_start(line, at, columns_before);
  const std::string before = std::string(from > 0 ? cut : "") + shown(line.substr(from, at - from));
  const std::size_t to = whole ? line.size() : window_end(line, at, columns_shown - columns(before));
  const std::size_t last = std::min(at + length, to);
  const std::size_t marked_to =
      length == 0 || last <= at ? at : std::min(to, character_end(line, character_start(line, last - 1)));
  const std::size_t width = columns(shown(line.substr(at, marked_to - at)));

  std::string out =
      fmt::format("{}{}{}{}\n", margin, before, shown(line.substr(at, to - at)), to < line.size() ? cut : "");
  out += fmt::format("{}{:{}}^{:~<{}}\n", margin, "", columns(before), "", width > 1 ? width - 1 : 0);
  return out;
}

std::string place_text(const Sources& sources, Place place) {
  const Position position = sources.position(place);
  return fmt::format("{}:{}:{}", base::printable(sources[place.source].name), position.line, position.column);
}

// Byte offset of a place in its own line.
std::size_t offset_in_line(const Sources& sources, Place place, std::string_view line) {
  const std::string_view bytes = sources[place.source].bytes;
  const auto start = static_cast<std::size_t>(line.data() - bytes.data());
  const std::size_t at = std::min<std::size_t>(place.offset, bytes.size());
  return std::min(at - start, line.size());
}

}  // namespace

std::size_t count(const Diagnostics& diagnostics, base::Level level) {
  return static_cast<std::size_t>(
      std::count_if(diagnostics.begin(), diagnostics.end(), [level](const Diagnostic& d) { return d.level == level; }));
}

std::string headline(const Sources& sources, const Diagnostic& diagnostic) {
  const std::string message =
      fmt::format("{}: {}", base::level_text(diagnostic.level), base::printable(diagnostic.message));
  if (!diagnostic.where.valid()) return message;
  return fmt::format("{}: {}", place_text(sources, diagnostic.where.begin), message);
}

std::string draw(const Sources& sources, const Diagnostic& diagnostic) {
  std::string out = headline(sources, diagnostic) + '\n';
  if (!diagnostic.where.valid()) return out;
  const Place place = diagnostic.where.begin;
  const std::string_view line = sources.line(place);
  // Under an empty line a mark says nothing.
  if (!line.empty()) out += excerpt(line, offset_in_line(sources, place, line), diagnostic.where.length);
  std::optional<Place> includer = sources[place.source].included_at;
  while (includer) {
    out += fmt::format("  included from {}\n", place_text(sources, *includer));
    includer = sources[includer->source].included_at;
  }
  return out;
}

}  // namespace source
