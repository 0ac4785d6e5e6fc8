#include "app/values.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <chrono>
#include <cmath>
#include <ctime>
#include <filesystem>
#include <fmt/format.h>
#include <limits>
#include <system_error>
#include <vector>

#include "base/names.hpp"
#include "base/text.hpp"

namespace app {
namespace {

std::string quoted(std::string_view text) {
  return fmt::format("\"{}\"", base::printable_short(text));
}

struct NamedLimit {
  std::string_view name;
  std::uint64_t source::Limits::*member;
};

constexpr std::array named_limits{
    NamedLimit{"file_bytes", &source::Limits::file_bytes},
    NamedLimit{"line_bytes", &source::Limits::line_bytes},
    NamedLimit{"include_depth", &source::Limits::include_depth},
    NamedLimit{"includes", &source::Limits::includes},
    NamedLimit{"nesting", &source::Limits::nesting},
    NamedLimit{"expression_depth", &source::Limits::expression_depth},
    NamedLimit{"elements", &source::Limits::elements},
    NamedLimit{"points", &source::Limits::points},
};
static_assert(named_limits.size() * sizeof(std::uint64_t) == sizeof(source::Limits), "every limit has its name here");

std::string names_of_limits() {
  std::string out;
  for (const NamedLimit& limit : named_limits) out.append(out.empty() ? "" : ", ").append(limit.name);
  return out;
}

// All of `text` as a number.
template <class Number>
bool read_all(std::string_view text, Number& number) {
  const char* const end = text.data() + text.size();
  const auto [stop, error] = std::from_chars(text.data(), end, number);
  return error == std::errc{} && stop == end;
}

bool digits_at(std::string_view text, std::initializer_list<std::size_t> places) {
  return std::all_of(places.begin(), places.end(),
                     [text](std::size_t at) { return text[at] >= '0' && text[at] <= '9'; });
}

}  // namespace

base::Result<std::uint64_t> whole_number(std::string_view text, std::uint64_t least, std::uint64_t most) {
  std::uint64_t number = 0;
  if (read_all(text, number) && number >= least && number <= most) return number;
  return base::Error{fmt::format("expected a whole number from {} to {}, got {}", least, most, quoted(text))};
}

base::Result<double> seconds(std::string_view text) {
  constexpr double day = 86400;
  double number = 0;
  if (read_all(text, number) && std::isfinite(number) && number > 0 && number <= day) return number;
  return base::Error{fmt::format("expected seconds above 0, at most {}, got {}", day, quoted(text))};
}

base::Result<Gate> gate_of(std::string_view text) {
  if (text == "error") return Gate::error;
  if (text == "warning") return Gate::warning;
  if (text == "note") return Gate::note;
  if (text == "never") return Gate::never;
  return base::Error{fmt::format("expected error, warning, note or never, got {}", quoted(text))};
}

base::Result<std::string> date_of(std::string_view text) {
  const base::Error error{fmt::format("expected a date as YYYY-MM-DD, got {}", quoted(text))};
  if (text.size() != 10 || text[4] != '-' || text[7] != '-' || !digits_at(text, {0, 1, 2, 3, 5, 6, 8, 9})) return error;
  int year = 0;
  unsigned month = 0;
  unsigned day = 0;
  if (!read_all(text.substr(0, 4), year) || !read_all(text.substr(5, 2), month) || !read_all(text.substr(8, 2), day))
    return error;
  const std::chrono::year_month_day date{std::chrono::year{year}, std::chrono::month{month}, std::chrono::day{day}};
  if (!date.ok()) return base::Error{fmt::format("{} is no day of the calendar", quoted(text))};
  return std::string(text);
}

base::Result<base::Done> set_limit(std::string_view text, source::Limits& limits) {
  const std::size_t equals = text.find('=');
  if (equals == std::string_view::npos) return base::Error{fmt::format("expected NAME=N, got {}", quoted(text))};
  const std::string_view name = text.substr(0, equals);
  const auto* const found = std::find_if(named_limits.begin(), named_limits.end(),
                                         [name](const NamedLimit& limit) { return limit.name == name; });
  if (found == named_limits.end())
    return base::Error{fmt::format("no limit is named {}; there are {}", quoted(name), names_of_limits())};
  const auto number = whole_number(text.substr(equals + 1), 1, std::numeric_limits<std::uint64_t>::max());
  if (!number) return base::Error{number.error()};
  limits.*(found->member) = *number;
  return base::Done{};
}

base::Result<std::string> folder(const std::string& text) {
  std::error_code ignored;
  if (std::filesystem::is_directory(text, ignored)) return text;
  return base::Error{fmt::format("expected a folder, got {}", quoted(std::string_view(text)))};
}

std::string today() {
  const std::time_t now = std::time(nullptr);
  std::tm local{};
  ::localtime_r(&now, &local);
  return fmt::format("{:04}-{:02}-{:02}", local.tm_year + 1900, local.tm_mon + 1, local.tm_mday);
}

}  // namespace app
