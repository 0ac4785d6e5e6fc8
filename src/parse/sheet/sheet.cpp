#include "parse/sheet.hpp"

#include <algorithm>
#include <array>
#include <utility>

#include "base/names.hpp"
#include "parse/sheet/tables.hpp"
#include "parse/sheet/toml.hpp"

namespace parse {
namespace {

using ReadTable = void (*)(const std::string& name, TableKeys& keys, model::Sheet& sheet);

struct Group {
  std::string_view name;
  ReadTable read;
};

constexpr std::array groups{Group{"rail", read_rail}, Group{"converter", read_converter}, Group{"input", read_input},
                            Group{"sensor", read_sensor}, Group{"part", read_part}};
constexpr std::array<std::string_view, 3> single_tables{"limit", "level", "reading"};
constexpr std::array<std::string_view, 6> later_tables{"source", "extra", "mode", "tolerance", "board", "waiver"};

void read_group(const TomlEntry& group, ReadTable read, SheetContext& context, model::Sheet& sheet) {
  const std::string expected = fmt::format("a table [{}.NAME]", group.key);
  const TomlTable* tables = group.node.table();
  if (tables == nullptr) {
    context.error(group.key_where, mismatch(expected, group.node, context));
    return;
  }
  for (const TomlEntry& entry : tables->entries) {
    const TomlTable* table = entry.node.table();
    if (entry.key.empty()) {
      context.error(entry.key_where, fmt::format("[{}.NAME] needs a name that is not empty", group.key));
    } else if (table == nullptr) {
      context.error(entry.key_where, mismatch(expected, entry.node, context));
    } else {
      TableKeys keys(*table, entry.key_where, fmt::format("{}.{}", group.key, base::printable_short(entry.key)),
                     context);
      read(entry.key, keys, sheet);
    }
  }
}

void read_reading(const TomlEntry& entry, SheetContext& context, model::Sheet& sheet) {
  const TomlTable* table = table_of(entry, "reading", context);
  if (table == nullptr) return;
  TableKeys keys(*table, entry.key_where, "reading", context);
  if (const auto m = keys.choice("m", {"milli", "mega"})) {
    sheet.bare_m = {m->value == 0 ? model::BareM::milli : model::BareM::mega, m->where};
  }
  keys.finish();
}

void refuse_top_level(const TomlEntry& entry, SheetContext& context) {
  const std::string shown = base::printable_short(entry.key);
  if (std::find(later_tables.begin(), later_tables.end(), entry.key) != later_tables.end()) {
    context.error(entry.key_where, fmt::format("[{}] is not supported by this version", shown));
    return;
  }
  std::vector<std::string_view> known(single_tables.begin(), single_tables.end());
  for (const Group& group : groups) known.push_back(group.name);
  known.insert(known.end(), later_tables.begin(), later_tables.end());
  context.error(entry.key_where, unknown(entry.node.table() != nullptr ? "table" : "key", entry.key, "", known));
}

// A rail whose volts a sensor sweeps needs none of its own.
void check_rails(const model::Sheet& sheet, const TomlTable& tree, SheetContext& context) {
  const TomlEntry* sensors = tree.find("sensor");
  const TomlTable* swept = sensors == nullptr ? nullptr : sensors->node.table();
  const auto sweeps = [&](const model::RailDeclaration& rail) {
    return swept != nullptr && std::any_of(swept->entries.begin(), swept->entries.end(), [&](const TomlEntry& entry) {
             const TomlEntry* kind = entry.node.table() == nullptr ? nullptr : entry.node.table()->find("kind");
             const std::string* text = kind == nullptr ? nullptr : kind->node.text();
             return text != nullptr && *text == "voltage" && base::same_name(entry.key, rail.net);
           });
  };
  const TomlTable& rails = *tree.find("rail")->node.table();
  for (const model::RailDeclaration& rail : sheet.rails) {
    if (!context.complete || rails.find(rail.net)->node.table()->find("volts") != nullptr || sweeps(rail)) continue;
    context.error(rail.where, fmt::format("[rail.{}] needs \"volts\", or a sensor of kind \"voltage\" with its name",
                                          base::printable_short(rail.net)));
  }
}

model::Sheet read_tree(const TomlTable& tree, SheetContext& context) {
  model::Sheet sheet;
  if (const TomlEntry* rails = tree.find("rail"); rails != nullptr && rails->node.table() != nullptr) {
    for (const TomlEntry& rail : rails->node.table()->entries) context.rails.push_back(rail.key);
  }
  for (const TomlEntry& entry : tree.entries) {
    const auto group = std::find_if(groups.begin(), groups.end(), [&](const Group& g) { return g.name == entry.key; });
    if (group != groups.end()) {
      read_group(entry, group->read, context, sheet);
    } else if (entry.key == "limit") {
      sheet.limits = read_limits(entry, "limit", context);
    } else if (entry.key == "level") {
      sheet.levels = read_levels(entry, "level", context);
    } else if (entry.key == "reading") {
      read_reading(entry, context, sheet);
    } else {
      refuse_top_level(entry, context);
    }
  }
  if (!sheet.rails.empty()) check_rails(sheet, tree, context);
  return sheet;
}

}  // namespace

const TomlTable* table_of(const TomlEntry& entry, const std::string& title, SheetContext& context) {
  const TomlTable* table = entry.node.table();
  if (table == nullptr)
    context.error(entry.node.where, mismatch(fmt::format("a table [{}]", title), entry.node, context));
  return table;
}

void read_rail(const std::string& name, TableKeys& keys, model::Sheet& sheet) {
  model::RailDeclaration rail;
  rail.net = name;
  rail.where = keys.where();
  rail.volts = keys.quantity("volts", Unit::volt, Bound::any);
  rail.ohms = keys.quantity("ohms", Unit::ohm, Bound::not_negative);
  keys.finish({"tolerance", "follows"});
  sheet.rails.push_back(std::move(rail));
}

void read_part(const std::string& name, TableKeys& keys, model::Sheet& sheet) {
  model::PartDeclaration part;
  part.name = name;
  part.where = keys.where();
  const TomlEntry* model = keys.take("model");
  const std::string* text = model == nullptr ? nullptr : model->node.text();
  const auto later = {"follower", "amplifier", "switch", "mux"};
  if (text != nullptr && std::find(later.begin(), later.end(), *text) != later.end()) {
    keys.context().error(model->node.where, fmt::format("model \"{}\" is not supported by this version", *text));
  } else if (const auto stand_in = keys.choice("model", {"open", "resistor"})) {
    const auto value = stand_in->value == 0 ? model::StandIn::open : model::StandIn::resistor;
    part.model = model::Declared<model::StandIn>{value, stand_in->where};
  }
  if (const auto role = keys.choice("role", {"arm", "load"})) {
    part.role = model::Declared<model::Role>{role->value == 0 ? model::Role::arm : model::Role::load, role->where};
  }
  if (part.model && part.model->value == model::StandIn::resistor) {
    part.ohms = keys.quantity("ohms", Unit::ohm, Bound::not_negative);
    keys.missing("ohms", ": the resistance of its stand-in");
  } else if (part.model || model == nullptr) {
    keys.refuse("ohms", "\"ohms\" goes with model \"resistor\" only");
  } else {
    static_cast<void>(keys.take("ohms"));  // of a model that was refused
  }
  keys.finish({"in", "out", "swing", "offset", "bias", "common", "channels", "pairs", "leakage", "tolerance", "tc",
               "watts", "volts", "insulation"});
  if (keys.empty()) keys.context().error(part.where, fmt::format("[{}] needs \"model\" or \"role\"", keys.title()));
  sheet.parts.push_back(std::move(part));
}

model::Sheet read_sheet(std::span<const SheetSource> places, const source::Sources& sources,
                        source::Diagnostics& diagnostics) {
  SheetContext context{sources, diagnostics};
  TomlTable tree;
  for (const SheetSource& place : places) {
    auto table = read_toml(place, sources, diagnostics);
    if (!table) {
      context.complete = false;
      continue;
    }
    refuse_double_names(*table, diagnostics);
    merge(tree, std::move(*table));
  }
  return read_tree(tree, context);
}

}  // namespace parse
