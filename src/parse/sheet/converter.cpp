// [converter.NAME], and [input.NAME], which takes the same keys for one input.
#include <algorithm>
#include <array>
#include <cctype>

#include "base/names.hpp"
#include "parse/sheet/tables.hpp"

namespace parse {
namespace {

using model::ConverterKeys;

constexpr std::string_view net_expected = "the name of a net";

struct NumberKey {
  std::string_view name;
  model::Maybe<double> ConverterKeys::*field;
  Unit unit;
  Bound bound;
  std::string_view unchecked;  // what is not checked for want of a rule that uses the key
};

constexpr std::array number_keys{
    NumberKey{"gain", &ConverterKeys::gain, Unit::none, Bound::above_zero, ""},
    NumberKey{"leakage", &ConverterKeys::leakage, Unit::ampere, Bound::not_negative, ""},
    NumberKey{"input_resistance", &ConverterKeys::input_resistance, Unit::ohm, Bound::above_zero, ""},
    NumberKey{"sample_capacitance", &ConverterKeys::sample_capacitance, Unit::farad, Bound::above_zero, "settling"},
    NumberKey{"switch_resistance", &ConverterKeys::switch_resistance, Unit::ohm, Bound::not_negative, "settling"},
    NumberKey{"acquisition_time", &ConverterKeys::acquisition_time, Unit::second, Bound::above_zero, "settling"},
    NumberKey{"sample_rate", &ConverterKeys::sample_rate, Unit::hertz, Bound::above_zero, "settling"},
    NumberKey{"pin_beyond", &ConverterKeys::pin_beyond, Unit::volt, Bound::not_negative, "pin stress"},
    NumberKey{"pin_current", &ConverterKeys::pin_current, Unit::ampere, Bound::not_negative, "pin stress"},
    NumberKey{"injection_total", &ConverterKeys::injection_total, Unit::ampere, Bound::not_negative, "pin stress"},
    NumberKey{"gain_error", &ConverterKeys::gain_error, Unit::fraction, Bound::not_negative, "accuracy"},
    NumberKey{"reference_tolerance", &ConverterKeys::reference_tolerance, Unit::fraction, Bound::not_negative,
              "accuracy"},
};

struct ErrorKey {
  std::string_view name;
  model::Maybe<model::ConverterError> ConverterKeys::*field;
  std::string_view unchecked;
};

constexpr std::array error_keys{
    ErrorKey{"offset_error", &ConverterKeys::offset_error, ""},
    ErrorKey{"inl", &ConverterKeys::inl, "accuracy"},
    ErrorKey{"noise", &ConverterKeys::noise, "noise"},
};

// A text with a voltage; not +3V3, 3V3 and the like, which are names of nets far more often than voltages.
std::optional<double> plain_volts(const std::string& text) {
  const auto behind = text.find_first_not_of("0123456789.eE+- \t");
  const bool digits_behind =
      behind != std::string::npos && text.find_first_of("0123456789", behind) != std::string::npos;
  if (digits_behind || text.front() == '+') return std::nullopt;
  const auto volts = read_quantity(text, Unit::volt);
  return volts ? std::optional{*volts} : std::nullopt;
}

model::Maybe<model::RangeEnd> range_end(TableKeys& keys, std::string_view key) {
  const TomlEntry* entry = keys.take(key);
  if (entry == nullptr) return std::nullopt;
  SheetContext& context = keys.context();
  const source::Span where = entry->node.where;
  if (const auto* text = entry->node.text()) {
    const auto net = name_of(entry->node, "a voltage or the name of a net", context);
    if (!net) return std::nullopt;
    const auto is_rail = [&](std::string_view rail) { return base::same_name(rail, *text); };
    const bool rail = std::any_of(context.rails.begin(), context.rails.end(), is_rail);
    if (const auto volts = rail ? std::nullopt : plain_volts(*net))
      return model::Declared<model::RangeEnd>{*volts, where};
    return model::Declared<model::RangeEnd>{*net, where};
  }
  if (entry->node.table() != nullptr || entry->node.array() != nullptr) {
    context.error(where, mismatch("a voltage or the name of a net", entry->node, context));
    return std::nullopt;
  }
  const auto volts = quantity_of(entry->node, Unit::volt, context);
  return volts ? model::Maybe<model::RangeEnd>{{*volts, where}} : std::nullopt;
}

// "2 LSB" without its unit; nothing where the text ends otherwise.
std::optional<std::string_view> without_lsb(std::string_view text) {
  constexpr std::string_view unit = "LSB";
  if (text.size() < unit.size() || !base::same_name(text.substr(text.size() - unit.size()), unit)) return std::nullopt;
  return text.substr(0, text.size() - unit.size());
}

// In LSB or volts; a number without a unit could be either.
model::Maybe<model::ConverterError> converter_error(TableKeys& keys, std::string_view key) {
  const TomlEntry* entry = keys.take(key);
  if (entry == nullptr) return std::nullopt;
  SheetContext& context = keys.context();
  const auto* text = entry->node.text();
  const bool has_unit =
      text != nullptr && !text->empty() && std::isalpha(static_cast<unsigned char>(text->back())) != 0;
  if (has_unit) {
    const auto lsb = without_lsb(*text);
    const auto value = lsb ? read_quantity(*lsb, Unit::none) : read_quantity(*text, Unit::volt);
    if (value && !within(*value, Bound::not_negative, entry->node, context)) return std::nullopt;
    if (value) return model::Declared<model::ConverterError>{{*value, lsb.has_value()}, entry->node.where};
  }
  context.error(entry->node.where, mismatch("an error such as \"2 LSB\" or \"5 mV\"", entry->node, context));
  return std::nullopt;
}

void read_keys(TableKeys& keys, ConverterKeys& to, model::Sheet& sheet) {
  const auto note_unused = [&](std::string_view key, bool given, std::string_view unchecked) {
    if (given && !unchecked.empty()) sheet.unused.push_back(keys.unused(key, unchecked));
  };
  to.bits = keys.whole("bits", 1, 32);
  to.low = range_end(keys, "low");
  to.high = range_end(keys, "high");
  to.supply = keys.name("supply", net_expected);
  note_unused("supply", to.supply.has_value(), "pin stress");
  for (const NumberKey& key : number_keys) {
    to.*key.field = keys.quantity(key.name, key.unit, key.bound);
    note_unused(key.name, (to.*key.field).has_value(), key.unchecked);
  }
  for (const ErrorKey& key : error_keys) {
    to.*key.field = converter_error(keys, key.name);
    note_unused(key.name, (to.*key.field).has_value(), key.unchecked);
  }
  if (const auto average = keys.whole("average", 1, std::numeric_limits<int>::max())) {
    to.average = model::Declared<double>{static_cast<double>(average->value), average->where};
    note_unused("average", true, "noise");
  }
}

void check_range(const model::RangeEnd& low, const model::Maybe<model::RangeEnd>& high, SheetContext& context) {
  if (!high) return;
  const auto* low_volts = std::get_if<double>(&low);
  const auto* high_volts = std::get_if<double>(&high->value);
  if (low_volts != nullptr && high_volts != nullptr && *low_volts >= *high_volts) {
    context.error(high->where, fmt::format("\"high\" must be above \"low\", found {} V and {} V",
                                           base::number_text(*high_volts, 7), base::number_text(*low_volts, 7)));
  }
  const auto* low_net = std::get_if<std::string>(&low);
  const auto* high_net = std::get_if<std::string>(&high->value);
  if (low_net != nullptr && high_net != nullptr && base::same_name(*low_net, *high_net)) {
    context.error(high->where, "\"low\" and \"high\" are the same net");
  }
}

void read_inputs(TableKeys& keys, model::ConverterDeclaration& to) {
  const TomlEntry* entry = keys.take("inputs");
  if (entry == nullptr) return;
  SheetContext& context = keys.context();
  const TomlArray* array = entry->node.array();
  if (array == nullptr || array->items.empty()) {
    context.error(entry->node.where, mismatch("an array of nets such as [\"ADC_1\", \"ADC_2\"]", entry->node, context));
    return;
  }
  for (const TomlNode& item : array->items) {
    const TomlTable* pair = item.table();
    if (pair != nullptr && (pair->find("plus") != nullptr || pair->find("minus") != nullptr)) {
      context.error(item.where, "a differential pair is not supported by this version");
      continue;
    }
    auto net = name_of(item, net_expected, context);
    if (!net) continue;
    const auto same = [&](const auto& other) { return base::same_name(other.value, *net); };
    if (std::any_of(to.inputs.begin(), to.inputs.end(), same)) {
      context.error(item.where, fmt::format("\"{}\" is listed twice", base::printable_short(*net)));
      continue;
    }
    to.inputs.push_back({std::move(*net), item.where});
  }
}

}  // namespace

void read_converter(const std::string& name, TableKeys& keys, model::Sheet& sheet) {
  model::ConverterDeclaration converter;
  converter.name = name;
  converter.where = keys.where();
  read_keys(keys, converter.keys, sheet);
  read_inputs(keys, converter);
  converter.expect_inputs = keys.whole("expect_inputs", 1, std::numeric_limits<int>::max());
  for (const std::string_view key : {"bits", "high", "inputs"}) keys.missing(key);
  keys.finish({"common_mode"});
  check_range(converter.keys.low ? converter.keys.low->value : model::RangeEnd{0.0}, converter.keys.high,
              keys.context());
  sheet.converters.push_back(std::move(converter));
}

void read_input(const std::string& name, TableKeys& keys, model::Sheet& sheet) {
  model::InputDeclaration input;
  input.name = name;
  input.where = keys.where();
  read_keys(keys, input.keys, sheet);
  if (const TomlEntry* limits = keys.take("limit")) {
    input.limits = read_limits(*limits, keys.title() + ".limit", keys.context());
  }
  if (const TomlEntry* levels = keys.take("level")) {
    input.levels = read_levels(*levels, keys.title() + ".level", keys.context());
  }
  for (const std::string_view key : {"inputs", "expect_inputs"}) {
    keys.refuse(key, fmt::format("\"{}\" belongs in a table [converter.NAME], not in [{}]", key, keys.title()));
  }
  keys.finish({"skip", "driven", "common_mode"});
  if (input.keys.low) check_range(input.keys.low->value, input.keys.high, keys.context());
  sheet.inputs.push_back(std::move(input));
}

}  // namespace parse
