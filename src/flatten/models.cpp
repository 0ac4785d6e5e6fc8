#include "flatten/models.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <fmt/format.h>

#include "base/text.hpp"
#include "flatten/model_types.hpp"

namespace flatten {

const UsableModel& Models::use(const Frame& frame, const FoundModel& found) {
  // The outermost frame keeps the models that rest on no parameter.
  const Frame& keeper = owner(frame, only_literals(*found.card) ? model::ScopeId{0} : found.scope);
  const auto at = keeper.models.find(found.card);
  if (at != keeper.models.end()) return at->second;
  return keeper.models.emplace(found.card, make(keeper, *found.card)).first->second;
}

const Frame& Models::owner(const Frame& frame, model::ScopeId scope) {
  const Frame* at = &frame;
  while (at->caller != nullptr && at->scope != scope) at = at->caller;
  return *at;
}

bool Models::is_known(const model::ModelCard& card) const {
  if (card.broken) return true;  // an error is its fate already
  constexpr std::array<std::string_view, 6> passive{"r", "res", "c", "cap", "l", "ind"};
  const std::string_view type = work_.names.text(card.type);
  return is_model_type(type) || std::any_of(passive.begin(), passive.end(),
                                            [&](std::string_view name) { return base::same_name(name, type); });
}

const model::Assignment* Models::entry(const model::ModelCard& card, std::string_view name) const {
  for (std::uint32_t i = card.parameters.first; i < card.parameters.first + card.parameters.count; ++i) {
    const model::Assignment& entry = work_.netlist.assignments[i];
    if (base::same_name(work_.names.text(entry.key.name), name)) return &entry;
  }
  return nullptr;
}

bool Models::only_literals(const model::ModelCard& card) const {
  for (std::uint32_t i = card.parameters.first; i < card.parameters.first + card.parameters.count; ++i) {
    const model::Value& value = work_.netlist.assignments[i].value;
    if (std::holds_alternative<model::ExpressionId>(value) || std::holds_alternative<base::NameId>(value)) return false;
  }
  return true;
}

// The level that a card gives, 1 where it gives none, 0 where it is no whole number.
int Models::level_of(const Frame& frame, const model::ModelCard& card) {
  const model::Assignment* const entry = this->entry(card, "level");
  if (entry == nullptr) return 1;
  const Reading reading = values_.read(frame, *entry, card.card, Letter::other);
  const auto* quantity = std::get_if<Quantity>(&reading);
  if (quantity == nullptr || !quantity->number.fixed()) return 0;
  const double level = quantity->number.value;
  return level >= 1 && level <= 100 && level == std::floor(level) ? static_cast<int>(level) : 0;
}

UsableModel Models::make(const Frame& frame, const model::ModelCard& card) {
  UsableModel model;
  if (card.broken) {
    model.why = UsableModel::Why::failed;
    return model;
  }
  const ModelType* const type = model_type(work_.names.text(card.type), level_of(frame, card));
  if (type == nullptr) {
    work_.settle(card.card, model::CardFate::unmodelled);
    return model;
  }
  model::DeviceModel made{card.name, type->type, {}};
  std::vector<base::NameId> left_out;
  model.why = UsableModel::Why::usable;
  for (std::uint32_t i = card.parameters.first; i < card.parameters.first + card.parameters.count; ++i) {
    const model::Assignment& entry = work_.netlist.assignments[i];
    const std::string_view key = work_.names.text(entry.key.name);
    if (lists(type->silent, key)) continue;
    if (!lists(type->kept, key) || !add(frame, card, entry, model, made)) left_out.push_back(entry.key.name);
  }
  say_left_out(frame, card, left_out);
  model.id = model::DeviceModelId{static_cast<std::uint32_t>(work_.circuit.models.size())};
  if (model.why == UsableModel::Why::usable) work_.circuit.models.push_back(std::move(made));
  return model;
}

// Adds one parameter; false where it has no value that could be added.
bool Models::add(const Frame& frame, const model::ModelCard& card, const model::Assignment& entry, UsableModel& model,
                 model::DeviceModel& made) {
  const Reading reading = values_.read(frame, entry, card.card, Letter::other);
  if (std::holds_alternative<Failed>(reading)) {
    work_.settle(card.card, model::CardFate::error);
    model.why = UsableModel::Why::failed;
    return true;
  }
  const auto* quantity = std::get_if<Quantity>(&reading);
  if (quantity == nullptr) return false;
  if (!quantity->number.fixed() && model.why == UsableModel::Why::usable) model.why = UsableModel::Why::unsupported;
  if (quantity->odd) model.odd.push_back(quantity->readings);
  made.parameters.push_back({entry.key.name, quantity->number.value});
  return true;
}

void Models::say_left_out(const Frame& frame, const model::ModelCard& card, const std::vector<base::NameId>& names) {
  constexpr std::size_t most = 8;
  if (names.empty()) return;
  std::string list;
  for (std::size_t i = 0; i < std::min(names.size(), most); ++i)
    list += (list.empty() ? "" : ", ") + work_.shown(names[i]);
  if (names.size() > most) list += fmt::format(" and {} more", names.size() - most);
  work_.problems.say(ProblemKind::model, base::Level::note, work_.netlist.span(card.card), frame.instance,
                     fmt::format("model {} is used without {}: not known for its type, or without a number",
                                 work_.shown(card.name), list));
}

}  // namespace flatten
