#include "parse/sheet/keys.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>

#include "base/names.hpp"
#include "base/text.hpp"

namespace parse {
namespace {

// "a", "b" or "c".
std::string listed(std::span<const std::string_view> names) {
  std::string text;
  for (std::size_t i = 0; i < names.size(); ++i) {
    text += fmt::format("{}\"{}\"", i == 0 ? "" : i + 1 == names.size() ? " or " : ", ", names[i]);
  }
  return text;
}

std::optional<double> number_of(const TomlNode& node) {
  if (const auto* number = std::get_if<double>(&node.value)) return *number;
  if (const auto* number = std::get_if<std::int64_t>(&node.value)) return static_cast<double>(*number);
  return std::nullopt;
}

}  // namespace

std::string mismatch(std::string_view expected, const TomlNode& node, const SheetContext& context) {
  return fmt::format("expected {}, found {}", expected, described(node, context.sources));
}

std::optional<double> quantity_of(const TomlNode& node, Unit unit, SheetContext& context) {
  if (const auto* text = node.text()) {
    const auto value = read_quantity(*text, unit);
    if (value) return *value;
    context.error(node.where, value.error());
    return std::nullopt;
  }
  const auto number = number_of(node);
  if (number && std::isfinite(*number)) return number;
  context.error(node.where, mismatch(expected_of(unit), node, context));
  return std::nullopt;
}

bool within(double number, Bound bound, const TomlNode& node, SheetContext& context) {
  if (bound == Bound::any || number > 0 || (bound == Bound::not_negative && number == 0)) return true;
  const std::string_view rule = bound == Bound::above_zero ? "must be above zero" : "must not be negative";
  context.error(node.where, fmt::format("this {}, found {}", rule, described(node, context.sources)));
  return false;
}

std::optional<std::string> name_of(const TomlNode& node, std::string_view expected, SheetContext& context) {
  const auto* text = node.text();
  if (text != nullptr && !text->empty()) return *text;
  context.error(node.where, mismatch(expected, node, context));
  return std::nullopt;
}

std::optional<std::size_t> choice_of(const TomlNode& node, std::span<const std::string_view> choices,
                                     SheetContext& context) {
  if (const auto* text = node.text()) {
    const auto at = std::find(choices.begin(), choices.end(), *text);
    if (at != choices.end()) return static_cast<std::size_t>(at - choices.begin());
  }
  context.error(node.where, mismatch(listed(choices), node, context));
  return std::nullopt;
}

const TomlEntry* TableKeys::take(std::string_view key) {
  asked_.push_back(key);
  return table_.find(key);
}

model::Maybe<double> TableKeys::quantity(std::string_view key, Unit unit, Bound bound) {
  const TomlEntry* entry = take(key);
  if (entry == nullptr) return std::nullopt;
  const auto value = quantity_of(entry->node, unit, context_);
  if (!value || !within(*value, bound, entry->node, context_)) return std::nullopt;
  return model::Declared<double>{*value, entry->node.where};
}

model::Maybe<int> TableKeys::whole(std::string_view key, int least, int most) {
  const TomlEntry* entry = take(key);
  if (entry == nullptr) return std::nullopt;
  const auto* number = std::get_if<std::int64_t>(&entry->node.value);
  if (number != nullptr && *number >= least && *number <= most) {
    return model::Declared<int>{static_cast<int>(*number), entry->node.where};
  }
  const std::string range = most == std::numeric_limits<int>::max()
                                ? fmt::format("a whole number of at least {}", least)
                                : fmt::format("a whole number from {} to {}", least, most);
  context_.error(entry->node.where, mismatch(range, entry->node, context_));
  return std::nullopt;
}

model::Maybe<std::string> TableKeys::name(std::string_view key, std::string_view expected) {
  const TomlEntry* entry = take(key);
  if (entry == nullptr) return std::nullopt;
  auto name = name_of(entry->node, expected, context_);
  if (!name) return std::nullopt;
  return model::Declared<std::string>{std::move(*name), entry->node.where};
}

model::Maybe<std::size_t> TableKeys::choice(std::string_view key, std::initializer_list<std::string_view> choices) {
  const TomlEntry* entry = take(key);
  if (entry == nullptr) return std::nullopt;
  const auto index = choice_of(entry->node, {choices.begin(), choices.size()}, context_);
  if (!index) return std::nullopt;
  return model::Declared<std::size_t>{*index, entry->node.where};
}

void TableKeys::refuse(std::string_view key, const std::string& message) {
  if (const TomlEntry* entry = take(key)) context_.error(entry->key_where, message);
}

model::UnusedKey TableKeys::unused(std::string_view key, std::string_view unchecked) const {
  const TomlEntry* entry = table_.find(key);
  return {fmt::format("{}.{}", title_, key), entry == nullptr ? where_ : entry->key_where, std::string(unchecked)};
}

void TableKeys::missing(std::string_view key, std::string_view why) {
  if (!context_.complete || table_.find(key) != nullptr) return;
  context_.error(where_, fmt::format("[{}] needs \"{}\"{}", title_, key, why));
}

void TableKeys::finish(std::initializer_list<std::string_view> not_supported) {
  std::vector<std::string_view> known = asked_;
  known.insert(known.end(), not_supported.begin(), not_supported.end());
  for (const TomlEntry& entry : table_.entries) {
    if (std::find(asked_.begin(), asked_.end(), entry.key) != asked_.end()) continue;
    if (std::find(not_supported.begin(), not_supported.end(), entry.key) != not_supported.end()) {
      context_.error(entry.key_where,
                     fmt::format("\"{}\" in [{}] is not supported by this version", entry.key, title_));
      continue;
    }
    context_.error(entry.key_where, unknown("key", entry.key, fmt::format(" in [{}]", title_), known));
  }
}

std::string unknown(std::string_view what, std::string_view name, std::string_view in,
                    const std::vector<std::string_view>& known) {
  const std::string_view nearest = base::nearest_name(name, known);
  const std::string offer = nearest.empty() ? "" : fmt::format("; did you mean \"{}\"?", nearest);
  return fmt::format("unknown {} \"{}\"{}{}", what, base::printable_short(name), in, offer);
}

}  // namespace parse
