// TOML as a tree of our own: every key and value with its place, tables in the order of their text. It is what the
// places of declarations are merged as, and what a sheet is read from.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

#include "source/diagnostic.hpp"
#include "source/text.hpp"

namespace parse {

struct TomlEntry;
struct TomlNode;

struct TomlTable {
  std::vector<TomlEntry> entries;

  // The entry of that key, or null.
  [[nodiscard]] const TomlEntry* find(std::string_view key) const;
};

struct TomlArray {
  std::vector<TomlNode> items;
};

struct TomlDate {};  // dates and times: no key takes one

struct TomlNode {
  std::variant<std::string, double, std::int64_t, bool, TomlDate, TomlArray, TomlTable> value;
  source::Span where;

  [[nodiscard]] const TomlTable* table() const { return std::get_if<TomlTable>(&value); }
  [[nodiscard]] const TomlArray* array() const { return std::get_if<TomlArray>(&value); }
  [[nodiscard]] const std::string* text() const { return std::get_if<std::string>(&value); }
};

struct TomlEntry {
  std::string key;
  source::Span key_where;
  TomlNode node;
};

// What stands there, for a message: the text "10k", the number 5, the array [1, 2], a table.
[[nodiscard]] std::string described(const TomlNode& node, const source::Sources& sources);

// Puts the later place over the earlier one: tables key by key, anything else replaced. The names of tables below the
// top level are nets and parts, so one table whatever the case of their letters.
void merge(TomlTable& earlier, TomlTable later);

// The declarations of one table that is named twice in one place by names that differ in case only are an error each.
void refuse_double_names(const TomlTable& table, source::Diagnostics& diagnostics);

}  // namespace parse
