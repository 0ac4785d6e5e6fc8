#include "source/text.hpp"

#include <algorithm>
#include <utility>

namespace source {
namespace {

// LF, CR LF and a lone CR each end a line.
std::vector<std::uint32_t> index_lines(std::string_view bytes) {
  std::vector<std::uint32_t> starts{0};
  for (std::size_t at = 0; at < bytes.size(); ++at) {
    if (bytes[at] == '\r' && at + 1 < bytes.size() && bytes[at + 1] == '\n') continue;
    if (bytes[at] == '\n' || bytes[at] == '\r') starts.push_back(static_cast<std::uint32_t>(at + 1));
  }
  return starts;
}

bool continues_utf8(char c) {
  return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U;
}

}  // namespace

SourceId Sources::add(SourceText text) {
  const SourceId id{static_cast<std::uint32_t>(texts_.size())};
  texts_.push_back(std::move(text));
  line_starts_.emplace_back();
  return id;
}

std::string_view Sources::text(Span span) const {
  const std::string_view bytes = texts_[span.begin.source.index()].bytes;
  return span.begin.offset <= bytes.size() ? bytes.substr(span.begin.offset, span.length) : std::string_view{};
}

const std::vector<std::uint32_t>& Sources::line_starts(SourceId id) const {
  auto& starts = line_starts_[id.index()];
  if (starts.empty()) starts = index_lines(texts_[id.index()].bytes);
  return starts;
}

Position Sources::position(Place place) const {
  const auto& starts = line_starts(place.source);
  const auto after = std::upper_bound(starts.begin(), starts.end(), place.offset);
  const std::uint32_t start = *(after - 1);
  const std::string_view bytes = texts_[place.source.index()].bytes;
  const std::string_view before = bytes.substr(start, place.offset - start);
  const auto hidden = static_cast<std::size_t>(std::count_if(before.begin(), before.end(), continues_utf8));
  return {static_cast<std::size_t>(after - starts.begin()), before.size() - hidden + 1};
}

std::string_view Sources::line(Place place) const {
  const auto& starts = line_starts(place.source);
  const auto after = std::upper_bound(starts.begin(), starts.end(), place.offset);
  const std::string_view bytes = texts_[place.source.index()].bytes;
  const std::string_view rest = bytes.substr(*(after - 1));
  return rest.substr(0, rest.find_first_of("\r\n"));
}

}  // namespace source
