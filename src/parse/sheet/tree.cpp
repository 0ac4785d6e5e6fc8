#include "parse/sheet/tree.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <utility>

#include "base/names.hpp"
#include "base/overloaded.hpp"
#include "base/text.hpp"

namespace parse {
namespace {

constexpr std::size_t most_shown_bytes = 40;

// The first line of what the declaration says there.
std::string shown(const TomlNode& node, const source::Sources& sources) {
  const std::string_view text = sources.text(node.where);
  const auto line_end = text.find_first_of("\r\n");
  if (line_end == std::string_view::npos) return base::printable_short(text, most_shown_bytes);
  return base::printable_short(text.substr(0, line_end), most_shown_bytes) + " ...";
}

enum class Names : unsigned char { keys, nets };

void merge_tables(TomlTable& earlier, TomlTable later, int depth) {
  // Top level and keys are TOML's, between them stand names of nets and parts.
  const Names names = depth == 1 ? Names::nets : Names::keys;
  for (TomlEntry& entry : later.entries) {
    const auto same = [&](const TomlEntry& other) {
      return names == Names::nets ? base::same_name(other.key, entry.key) : other.key == entry.key;
    };
    const auto at = std::find_if(earlier.entries.begin(), earlier.entries.end(), same);
    if (at == earlier.entries.end()) {
      earlier.entries.push_back(std::move(entry));
      continue;
    }
    auto* below = std::get_if<TomlTable>(&at->node.value);
    auto* above = std::get_if<TomlTable>(&entry.node.value);
    if (below != nullptr && above != nullptr) {
      merge_tables(*below, std::move(*above), depth + 1);
    } else {
      *at = std::move(entry);
    }
  }
}

}  // namespace

const TomlEntry* TomlTable::find(std::string_view key) const {
  const auto at =
      std::find_if(entries.begin(), entries.end(), [&](const TomlEntry& entry) { return entry.key == key; });
  return at == entries.end() ? nullptr : &*at;
}

std::string described(const TomlNode& node, const source::Sources& sources) {
  return std::visit(
      base::overloaded{
          [](const std::string& text) { return fmt::format("the text \"{}\"", base::printable_short(text)); },
          [&](double) { return fmt::format("the number {}", shown(node, sources)); },
          [](std::int64_t number) { return fmt::format("the number {}", number); },
          [](bool flag) { return fmt::format("the truth value {}", flag); },
          [&](const TomlDate&) { return fmt::format("the date or time {}", shown(node, sources)); },
          [&](const TomlArray&) { return fmt::format("the array {}", shown(node, sources)); },
          [](const TomlTable&) { return std::string("a table"); },
      },
      node.value);
}

void merge(TomlTable& earlier, TomlTable later) {
  merge_tables(earlier, std::move(later), 0);
}

void refuse_double_names(const TomlTable& table, source::Diagnostics& diagnostics) {
  for (const TomlEntry& group : table.entries) {
    const TomlTable* named = group.node.table();
    if (named == nullptr) continue;
    for (auto entry = named->entries.begin(); entry != named->entries.end(); ++entry) {
      const auto same = [&](const TomlEntry& other) { return base::same_name(other.key, entry->key); };
      const auto first = std::find_if(named->entries.begin(), entry, same);
      if (first == entry) continue;
      diagnostics.push_back(
          {base::Level::error, entry->key_where,
           fmt::format("[{}.{}] is declared twice: \"{}\" is the same name, whatever its case", group.key,
                       base::printable_short(entry->key), base::printable_short(first->key))});
    }
  }
}

}  // namespace parse
