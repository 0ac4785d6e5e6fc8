#include "flatten/frame.hpp"

#include "base/text.hpp"

namespace flatten {
namespace {

int badness(model::CardFate fate) {
  switch (fate) {
    case model::CardFate::modelled:
      return 0;
    case model::CardFate::skipped:
      return 1;
    case model::CardFate::unmodelled:
      return 2;
    case model::CardFate::error:
      return 3;
  }
  return 3;
}

}  // namespace

std::string Work::shown(base::NameId name) const {
  return base::printable_short(names.text(name));
}

void Work::settle(model::CardId card, model::CardFate fate) {
  model::CardRecord& record = netlist.cards[card.index()];
  if (badness(fate) > badness(record.fate)) record.fate = fate;
}

void Work::blame(model::CardId card, source::Span where, std::string reason, model::CardId cause) {
  settle(card, model::CardFate::error);
  netlist.faults.try_emplace(card, model::CardFault{where, std::move(reason), cause});
}

void Work::fail(ProblemKind kind, model::CardId card, source::Span where, model::InstanceId instance,
                std::string message) {
  blame(card, where, message);
  problems.say(kind, base::Level::error, where, instance, std::move(message));
}

}  // namespace flatten
