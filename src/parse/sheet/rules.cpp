// [limit] and [level], for the board and for one input. Keys are the names of model/rules.def with _ for -.
#include <algorithm>
#include <array>
#include <cmath>

#include "base/names.hpp"
#include "model/finding.hpp"
#include "parse/sheet/tables.hpp"

namespace parse {
namespace {

// Rules of a wider version.
constexpr std::array<std::string_view, 18> later_rules{
    "missing_tolerance", "settling",         "resolution", "accuracy",     "supply_tracking", "self_heating",
    "part_power",        "part_voltage",     "fault_band", "pin_stress",   "common_mode",     "one_to_one",
    "state_gap",         "corner_frequency", "noise",      "dc_on_sensor", "touch_voltage",   "stale_waiver"};

std::string key_of(const model::RuleText& rule) {
  std::string key(rule.name);
  std::replace(key.begin(), key.end(), '-', '_');
  return key;
}

// Load error compares with a limit that is worked out where none is declared.
bool compares(const model::RuleText& rule) {
  return !std::isnan(rule.limit) || rule.id == model::RuleId::load_error;
}

const model::RuleText* rule_of(std::string_view key) {
  const auto at =
      std::find_if(model::rules.begin(), model::rules.end(), [&](const auto& rule) { return key_of(rule) == key; });
  return at == model::rules.end() ? nullptr : &*at;
}

void refuse_unknown_rule(const TomlEntry& entry, const std::string& title, SheetContext& context) {
  if (std::find(later_rules.begin(), later_rules.end(), entry.key) != later_rules.end()) {
    context.error(entry.key_where, fmt::format("\"{}\" in [{}] is not supported by this version", entry.key, title));
    return;
  }
  std::vector<std::string> keys;
  for (const model::RuleText& rule : model::rules) keys.push_back(key_of(rule));
  const std::vector<std::string_view> known(keys.begin(), keys.end());
  context.error(entry.key_where, unknown("rule", entry.key, fmt::format(" in [{}]", title), known));
}

// In the rule's unit: a fraction, also in percent, or a number of LSB, also with that unit behind it.
std::optional<double> limit_of(const TomlNode& node, const model::RuleText& rule, SheetContext& context) {
  if (rule.unit == "fraction") {
    const auto limit = quantity_of(node, Unit::fraction, context);
    if (!limit || (*limit >= 0 && *limit <= 1)) return limit;
    context.error(node.where, mismatch("a fraction from 0 to 1", node, context));
    return std::nullopt;
  }
  TomlNode number = node;
  if (auto* text = std::get_if<std::string>(&number.value)) {
    if (text->size() >= 3 && base::same_name(std::string_view(*text).substr(text->size() - 3), "LSB")) {
      text->resize(text->size() - 3);
    }
  }
  const auto limit = quantity_of(number, Unit::none, context);
  return limit && within(*limit, Bound::not_negative, node, context) ? limit : std::nullopt;
}

}  // namespace

std::vector<model::LimitSetting> read_limits(const TomlEntry& entry, const std::string& title, SheetContext& context) {
  std::vector<model::LimitSetting> limits;
  const TomlTable* table = table_of(entry, title, context);
  if (table == nullptr) return limits;
  for (const TomlEntry& setting : table->entries) {
    const model::RuleText* rule = rule_of(setting.key);
    if (rule == nullptr) {
      refuse_unknown_rule(setting, title, context);
    } else if (!compares(*rule)) {
      context.error(setting.key_where, fmt::format("\"{}\" compares nothing, so it has no limit", setting.key));
    } else if (const auto limit = limit_of(setting.node, *rule, context)) {
      limits.push_back({std::string(rule->name), {*limit, setting.node.where}});
    }
  }
  return limits;
}

std::vector<model::LevelSetting> read_levels(const TomlEntry& entry, const std::string& title, SheetContext& context) {
  constexpr std::array<std::string_view, 4> texts{"error", "warning", "note", "off"};
  constexpr std::array<std::optional<base::Level>, 4> values{base::Level::error, base::Level::warning,
                                                             base::Level::note, std::nullopt};
  std::vector<model::LevelSetting> levels;
  const TomlTable* table = table_of(entry, title, context);
  if (table == nullptr) return levels;
  for (const TomlEntry& setting : table->entries) {
    const model::RuleText* rule = rule_of(setting.key);
    if (rule == nullptr) {
      refuse_unknown_rule(setting, title, context);
    } else if (const auto level = choice_of(setting.node, texts, context)) {
      levels.push_back({std::string(rule->name), {values[*level], setting.node.where}});
    }
  }
  return levels;
}

}  // namespace parse
