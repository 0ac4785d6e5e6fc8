// One reader for each group of tables. Each appends what it read to the sheet, and tells its errors.
#pragma once

#include <fmt/format.h>

#include "base/text.hpp"
#include "model/sheet.hpp"
#include "parse/sheet/keys.hpp"

namespace parse {

void read_rail(const std::string& name, TableKeys& keys, model::Sheet& sheet);
void read_converter(const std::string& name, TableKeys& keys, model::Sheet& sheet);
void read_input(const std::string& name, TableKeys& keys, model::Sheet& sheet);
void read_sensor(const std::string& name, TableKeys& keys, model::Sheet& sheet);
void read_part(const std::string& name, TableKeys& keys, model::Sheet& sheet);

// Limits and levels of the table [limit] or [level], or those of one input. `title` is how messages call the table.
[[nodiscard]] std::vector<model::LimitSetting> read_limits(const TomlEntry& entry, const std::string& title,
                                                           SheetContext& context);
[[nodiscard]] std::vector<model::LevelSetting> read_levels(const TomlEntry& entry, const std::string& title,
                                                           SheetContext& context);

// A table of an entry, or an error that says that one was expected.
[[nodiscard]] const TomlTable* table_of(const TomlEntry& entry, const std::string& title, SheetContext& context);

}  // namespace parse
