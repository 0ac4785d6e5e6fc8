#include <fmt/format.h>

#include "flatten/elements.hpp"
#include "flatten/model_types.hpp"

namespace flatten {
namespace {

using model::Unmodelled;
using Why = model::Unmodelled::Why;

struct DeviceShape {
  char letter;
  std::uint32_t fewest;  // nodes
  std::uint32_t most;
  std::string_view kept;    // parameters of the element that count at DC
  std::string_view silent;  // those that do not
};
constexpr std::array shapes{
    DeviceShape{'d', 2, 2, "area pj m", "ic temp dtemp w l lm lp wm wp thermal"},
    DeviceShape{'q', 3, 4, "area areab areac m", "ic icvbe icvce temp dtemp"},
    DeviceShape{'j', 3, 3, "area m", "ic temp dtemp"},
    DeviceShape{'m', 4, 4, "m l w ad as pd ps nrd nrs", "ic icvds icvgs icvbs temp dtemp"},
    DeviceShape{'s', 4, 4, "", ""},
};

const DeviceShape& shape_of(char letter) {
  for (const DeviceShape& shape : shapes) {
    if (shape.letter == letter) return shape;
  }
  return shapes.front();
}

bool is_of(char letter, model::DeviceType type) {
  using model::DeviceType;
  switch (type) {
    case DeviceType::diode:
      return letter == 'd';
    case DeviceType::npn:
    case DeviceType::pnp:
      return letter == 'q';
    case DeviceType::njf:
    case DeviceType::pjf:
      return letter == 'j';
    case DeviceType::nmos:
    case DeviceType::pmos:
      return letter == 'm';
    case DeviceType::voltage_switch:
      return letter == 's';
  }
  return false;
}

}  // namespace

Elements::Outcome Elements::device(const Frame& frame, const model::ElementCard& card) {
  const base::NameId wanted = card.reference.name;
  const FoundModel found = wanted.valid() ? work_.library.model(frame.scope, wanted) : FoundModel{};
  if (found.card == nullptr) return Unmodelled{Why::no_model, wanted};
  const UsableModel& usable = models_.use(frame, found);
  if (usable.why == UsableModel::Why::failed) {
    work_.blame(card.card, work_.place(card.card, card.reference),
                fmt::format("model {} cannot be used", work_.shown(wanted)), found.card->card);
    return std::nullopt;
  }
  if (usable.why == UsableModel::Why::unsupported) return Unmodelled{Why::unsupported, wanted};
  if (!is_of(card.letter, work_.circuit.models[usable.id.index()].type)) return Unmodelled{Why::no_model, wanted};
  const DeviceShape& shape = shape_of(card.letter);
  if (card.nodes.count < shape.fewest || card.nodes.count > shape.most) return Unmodelled{Why::unsupported, wanted};
  model::Device device{usable.id, {}, card.switched_off};
  switch (device_parameters(frame, card, device)) {
    case Given::failed:
      return std::nullopt;
    case Given::swept:
      return Unmodelled{Why::unsupported, wanted};
    case Given::numbers:
      break;
  }
  for (const OddValue& value : usable.odd) suspect(value);
  return device;
}

Elements::Given Elements::device_parameters(const Frame& frame, const model::ElementCard& card, model::Device& device) {
  const DeviceShape& shape = shape_of(card.letter);
  std::vector<model::DeviceParameter>& all = work_.circuit.device_parameters;
  device.parameters.first = static_cast<std::uint32_t>(all.size());
  for (std::uint32_t i = card.parameters.first; i < card.parameters.first + card.parameters.count; ++i) {
    const model::Assignment& assignment = work_.netlist.assignments[i];
    const std::string_view key = work_.names.text(assignment.key.name);
    if (lists(shape.silent, key)) continue;
    const Reading reading = values_.read(frame, assignment, card.card, Letter::other);
    const auto* const quantity = std::get_if<Quantity>(&reading);
    if (!lists(shape.kept, key) || std::holds_alternative<NoValue>(reading)) {
      say_left_out(frame, card, assignment.key, "not known for its kind, or without a number");
      continue;
    }
    if (std::holds_alternative<Failed>(reading)) return Given::failed;
    if (quantity == nullptr || !quantity->number.fixed()) return Given::swept;
    suspect(*quantity);
    all.push_back({assignment.key.name, quantity->number.value});
  }
  device.parameters.count = static_cast<std::uint32_t>(all.size()) - device.parameters.first;
  return Given::numbers;
}

void Elements::say_left_out(const Frame& frame, const model::ElementCard& card, const model::Word& key,
                            std::string_view why) {
  work_.problems.say(ProblemKind::device, base::Level::note, work_.place(card.card, key), frame.instance,
                     fmt::format("{} is used without {}: {}", work_.shown(card.name), work_.shown(key.name), why));
}

}  // namespace flatten
