// [sensor.NAME]: what all kinds share stands here, the keys of each kind in the table of sensor/.
#include <algorithm>
#include <array>

#include "base/names.hpp"
#include "parse/sheet/tables.hpp"
#include "sensor/law.hpp"

namespace parse {
namespace {

constexpr std::array<std::string_view, 9> later_kinds{"potentiometer", "force",   "strain", "silicon", "power",
                                                      "table",         "formula", "steps",  "current"};

Unit unit_of(sensor::KeyUnit unit) {
  switch (unit) {
    case sensor::KeyUnit::ohms:
      return Unit::ohm;
    case sensor::KeyUnit::kelvin:
      return Unit::kelvin;
    case sensor::KeyUnit::degrees:
      return Unit::degc;
    case sensor::KeyUnit::volts:
      return Unit::volt;
    case sensor::KeyUnit::number:
    case sensor::KeyUnit::text:
      break;
  }
  return Unit::none;
}

Unit measurand_unit(const sensor::Kind& kind) {
  if (kind.unit == "degC") return Unit::degc;
  if (kind.unit == "V") return Unit::volt;
  if (kind.unit == "lx" || kind.unit == "lux") return Unit::lux;
  return Unit::none;
}

std::string known_kinds() {
  std::string text;
  for (const sensor::Kind& kind : sensor::kinds()) text += fmt::format("{}\"{}\"", text.empty() ? "" : ", ", kind.name);
  return text;
}

const sensor::Kind* read_kind(TableKeys& keys, model::SensorDeclaration& to) {
  const auto name = keys.name("kind", fmt::format("a kind of sensor ({})", known_kinds()));
  keys.missing("kind", fmt::format(": one of {}", known_kinds()));
  if (!name) return nullptr;
  to.kind = *name;
  const sensor::Kind* kind = sensor::find_kind(name->value);
  if (kind != nullptr) return kind;
  const bool later = std::find(later_kinds.begin(), later_kinds.end(), name->value) != later_kinds.end();
  const std::string shown = base::printable_short(name->value);
  keys.context().error(name->where, later
                                        ? fmt::format("kind \"{}\" is not supported by this version", shown)
                                        : fmt::format("unknown kind \"{}\"; expected one of {}", shown, known_kinds()));
  return nullptr;
}

void read_between(TableKeys& keys, const sensor::Kind& kind, model::SensorDeclaration& to) {
  if (kind.moves == sensor::Moves::rail) {
    keys.refuse("between",
                fmt::format("\"between\" does not go with kind \"{}\": the table's name is the rail's", kind.name));
    return;
  }
  if (kind.moves == sensor::Moves::parameter) {
    keys.refuse("between",
                fmt::format("\"between\" does not go with kind \"{}\": the part that the table names has its "
                            "ends in the netlist",
                            kind.name));
    return;
  }
  const TomlEntry* entry = keys.take("between");
  if (entry == nullptr) return;
  SheetContext& context = keys.context();
  const TomlArray* nets = entry->node.array();
  if (nets == nullptr || nets->items.size() != 2) {
    context.error(entry->node.where, mismatch("two nets such as [\"NET_A\", \"0\"]", entry->node, context));
    return;
  }
  auto first = name_of(nets->items[0], "the name of a net", context);
  auto second = name_of(nets->items[1], "the name of a net", context);
  if (!first || !second) return;
  if (base::same_name(*first, *second)) {
    context.error(entry->node.where, mismatch("two different nets", entry->node, context));
    return;
  }
  using Name = model::Declared<std::string>;
  to.between = std::pair{Name{*first, nets->items[0].where}, Name{*second, nets->items[1].where}};
}

// The needed accuracy is a difference of the measurand: of temperatures, a number of kelvin.
void read_accuracy(TableKeys& keys, const sensor::Kind& kind, model::SensorDeclaration& to) {
  const TomlEntry* entry = keys.take("accuracy");
  if (entry == nullptr) return;
  const auto* text = entry->node.text();
  if (entry->node.array() != nullptr || (text != nullptr && text->find('%') != std::string::npos)) {
    const std::string_view what = text != nullptr ? "an accuracy in percent of the reading" : "an accuracy in bands";
    keys.context().error(entry->node.where, fmt::format("{} is not supported by this version", what));
    return;
  }
  const Unit unit = measurand_unit(kind);
  to.accuracy = keys.quantity("accuracy", unit == Unit::degc ? Unit::kelvin : unit, Bound::above_zero);
}

void read_sweep(TableKeys& keys, const sensor::Kind& kind, model::SensorDeclaration& to) {
  const Unit unit = measurand_unit(kind);
  to.from = keys.quantity("from", unit, Bound::any);
  to.to = keys.quantity("to", unit, Bound::any);
  keys.missing("from");
  keys.missing("to");
  if (const auto spacing = keys.choice("spacing", {"linear", "log"})) {
    const auto value = spacing->value == 0 ? model::Spacing::linear : model::Spacing::logarithmic;
    to.spacing = model::Declared<model::Spacing>{value, spacing->where};
  }
  if (kind.moves == sensor::Moves::parameter) {
    to.sweep = keys.name("sweep", "the name of a parameter");
    keys.missing("sweep", ": the parameter that it sweeps");
  } else {
    keys.refuse("sweep", fmt::format("\"sweep\" goes with kind \"parameter\" only, not with \"{}\"", kind.name));
  }
}

void check_sweep(const model::SensorDeclaration& sensor, SheetContext& context) {
  if (!sensor.from || !sensor.to) return;
  const double from = sensor.from->value;
  const double to = sensor.to->value;
  if (from >= to) {
    context.error(sensor.to->where, fmt::format("\"to\" must be above \"from\", found {} and {}",
                                                base::number_text(to, 7), base::number_text(from, 7)));
  } else if (sensor::spacing_of(sensor) == model::Spacing::logarithmic && from <= 0) {
    context.error(sensor.from->where, fmt::format("a sweep with spacing \"log\" must begin above zero, found {}",
                                                  base::number_text(from, 7)));
  }
}

void read_settings(TableKeys& keys, const sensor::Kind& kind, model::SensorDeclaration& to) {
  for (const sensor::Key& key : kind.keys) {
    if (key.unit == sensor::KeyUnit::text) {
      if (auto text = keys.name(key.name, "a text")) {
        to.settings.push_back({std::string(key.name), std::move(text->value), text->where});
      }
    } else if (const auto number = keys.quantity(key.name, unit_of(key.unit), Bound::any)) {
      to.settings.push_back({std::string(key.name), number->value, number->where});
    }
  }
}

// Keys that are right for another kind: the kind may be what is wrong.
void refuse_other_kinds(TableKeys& keys, const sensor::Kind& kind) {
  const auto has = [](const sensor::Kind& of, std::string_view name) {
    return std::any_of(of.keys.begin(), of.keys.end(), [&](const sensor::Key& key) { return key.name == name; });
  };
  for (const sensor::Kind& other : sensor::kinds()) {
    for (const sensor::Key& key : other.keys) {
      if (has(kind, key.name)) continue;
      keys.refuse(key.name,
                  fmt::format("\"{}\" is a key of kind \"{}\", not of \"{}\"", key.name, other.name, kind.name));
    }
  }
}

// Where the key stands that a message of the law names first; else the table.
source::Span place_of(const std::string& message, const model::SensorDeclaration& sensor) {
  source::Span found = sensor.where;
  auto first = std::string::npos;
  const auto look = [&](std::string_view key, source::Span where) {
    const auto at = message.find(fmt::format("\"{}\"", key));
    if (at < first) first = at, found = where;
  };
  for (const model::SensorSetting& setting : sensor.settings) look(setting.key, setting.where);
  if (sensor.from) look("from", sensor.from->where);
  if (sensor.to) look("to", sensor.to->where);
  return found;
}

void check_law(const model::SensorDeclaration& sensor, TableKeys& keys) {
  const auto law = sensor::law_of(sensor);
  if (law) return;
  keys.context().error(place_of(law.error(), sensor), fmt::format("[{}]: {}", keys.title(), law.error()));
}

}  // namespace

void read_sensor(const std::string& name, TableKeys& keys, model::Sheet& sheet) {
  model::SensorDeclaration sensor;
  sensor.name = name;
  sensor.where = keys.where();
  const std::size_t before = keys.context().diagnostics.size();
  const sensor::Kind* kind = read_kind(keys, sensor);
  if (kind == nullptr) return;
  read_between(keys, *kind, sensor);
  read_sweep(keys, *kind, sensor);
  read_accuracy(keys, *kind, sensor);
  read_settings(keys, *kind, sensor);
  refuse_other_kinds(keys, *kind);
  keys.finish({"resolution",
               "tolerance",
               "beta_tolerance",
               "dissipation",
               "duty",
               "detect_fault",
               "needs_ac",
               "points",
               "class",
               "coefficients",
               "ohms",
               "taper",
               "end_ohms",
               "siemens_per_newton",
               "siemens_at_zero",
               "gauge_factor",
               "temperature_coefficient",
               "a1",
               "a2",
               "ohms_at_one",
               "exponent",
               "file",
               "interpolate",
               "state",
               "into"});
  check_sweep(sensor, keys.context());
  const bool clean = keys.context().complete && keys.context().diagnostics.size() == before;
  if (clean && kind->moves == sensor::Moves::ohms) check_law(sensor, keys);
  sheet.sensors.push_back(std::move(sensor));
}

}  // namespace parse
