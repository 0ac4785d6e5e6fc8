#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/parts.hpp"
#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

using model::Unmodelled;

const Unmodelled* unmodelled(const BoardView& board, model::ElementId id) {
  const model::Element* element = element_of(board, id);
  return element == nullptr ? nullptr : std::get_if<Unmodelled>(&element->part);
}

// Whether its card may name a model in place of a value.
bool takes_model(const BoardView& board, model::ElementId id) {
  const model::Element* element = element_of(board, id);
  return element != nullptr && (element->letter == 'r' || element->letter == 'c' || element->letter == 'l');
}

// Why there is no model, as a clause after the part's name.
std::string reason_text(const BoardView& board, model::ElementId id) {
  const Unmodelled* part = unmodelled(board, id);
  if (part == nullptr) return "has no model";
  const bool named = part->wanted.valid() && board.names != nullptr;
  const std::string wanted =
      named ? fmt::format(" \"{}\"", base::printable_short(board.names->text(part->wanted))) : std::string{};
  switch (part->why) {
    case Unmodelled::Why::unknown_letter:
    case Unmodelled::Why::unsupported:
      return named ? fmt::format("has no model here (it is{})", wanted) : "has no model here";
    case Unmodelled::Why::no_model:
      return fmt::format("has no model{} in the netlist", wanted);
    case Unmodelled::Why::missing_subcircuit:
      return fmt::format("has no subcircuit{} in the netlist", wanted);
    case Unmodelled::Why::no_value:
      if (!named) return "has no value";
      return fmt::format("has no value:{} is {}no number", wanted, takes_model(board, id) ? "no model here and " : "");
    case Unmodelled::Why::parameter_name:
      return fmt::format("has no value: the parameter{} stands without braces", wanted);
    case Unmodelled::Why::bad_value:
      return fmt::format("has no value:{} is no number", wanted);
    case Unmodelled::Why::broken_card:
      return "could not be read";
    case Unmodelled::Why::not_fitted:
      return "is marked as not fitted";
  }
  return "has no model";
}

// One finding a part, however many nets of the input it touches.
void report(const InputContext& context, const std::vector<const model::UnmodelledTouch*>& touches, Findings& out) {
  const model::UnmodelledTouch& first = *touches.front();
  std::vector<std::string> nets;
  bool open = true;
  for (const model::UnmodelledTouch* touch : touches) {
    std::string net = net_name(context.board, touch->net);
    if (std::find(nets.begin(), nets.end(), net) == nets.end()) nets.push_back(std::move(net));
    open = open && touch->taken_as_open;
  }
  const std::string name = part_name(context.board, first.element);
  model::Finding finding = out.blank();
  finding.level = open ? base::Level::note : base::Level::error;
  const source::Span place = part_place(context.board, first.element);
  if (place.valid()) finding.where = place;
  finding.message =
      fmt::format("{} touches {} and {}: ", name, list_text(nets), reason_text(context.board, first.element));
  finding.message +=
      open ? std::string{"it is taken as open"}
           : fmt::format(
                 "what it draws is unknown, so the input is not audited until a stand-in is declared, such as "
                 "[part.{}] model = \"open\"",
                 toml_key(name));
  out.add(std::move(finding));
}

void run(const InputContext& context, Findings& out) {
  const auto& touches = context.input.divider.unmodelled;
  std::vector<bool> told(touches.size(), false);
  for (std::size_t i = 0; i < touches.size(); ++i) {
    if (told[i]) continue;
    // Its card's error is why the input is not audited, and is told there.
    const Unmodelled* part = unmodelled(context.board, touches[i].element);
    if (part != nullptr && part->why == Unmodelled::Why::broken_card) continue;
    std::vector<const model::UnmodelledTouch*> same;
    for (std::size_t j = i; j < touches.size(); ++j)
      if (j == i || (touches[j].element == touches[i].element && touches[i].element.valid())) {
        same.push_back(&touches[j]);
        told[j] = true;
      }
    report(context, same, out);
  }
}

}  // namespace

extern constinit const Rule unmodelled_part{model::RuleId::unmodelled_part, Stage::finding, {}, run, nullptr};

}  // namespace judge::rules
