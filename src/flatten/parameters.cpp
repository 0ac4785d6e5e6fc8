#include "flatten/parameters.hpp"

#include <algorithm>
#include <fmt/format.h>

#include "base/overloaded.hpp"
#include "base/text.hpp"

namespace flatten {
namespace {

using model::ExpressionId;
using model::ExpressionNode;
using model::Op;
using Status = ParameterState::Status;

bool differs(double builder, double spice) {
  return !(builder == spice);
}

double reading_of(const model::OddLiteral& literal, expression::Literals literals) {
  const bool spice =
      literals == expression::Literals::spice || (literals == expression::Literals::milli && literal.bare_mega);
  return spice ? literal.spice : literal.builder;
}

}  // namespace

Parameters::Parameters(Work& work) : work_(work) {}

FoundParameter Parameters::find(const Frame* frame, base::NameId name) const {
  for (; frame != nullptr; frame = frame->caller) {
    if (const auto slot = work_.library.parameter(frame->scope, name)) return {frame, *slot};
  }
  return {};
}

Wants Parameters::wants(ExpressionId tree) const {
  Wants wants;
  const model::ExpressionPool& pool = work_.netlist.expressions;
  std::vector<ExpressionId> open{tree};
  while (!open.empty()) {
    const ExpressionNode& node = pool[open.back()];
    open.pop_back();
    if (node.op == Op::parameter) wants.parameters.push_back(node.name);
    if (node.op == Op::net_volts || node.op == Op::amperes) wants.circuit = true;
    if (node.op == Op::number && differs(node.number, node.spice) && wants.odd == nullptr) wants.odd = &node;
    for (std::size_t i = node.argument_count; i > 0; --i) open.push_back(pool.argument(node, i - 1));
  }
  return wants;
}

std::optional<Folded> Parameters::fold(const Frame& frame, ExpressionId tree, model::CardId card,
                                       expression::Literals literals, bool quiet) {
  literals_ = literals;
  quiet_ = quiet;
  const Definition asking{nullptr, &frame, card, {}, {}};
  const Wants wanted = wants(tree);
  for (const base::NameId name : wanted.parameters) settle(find(&frame, name));
  odd_ = wanted.odd != nullptr;
  const auto outcome = expression::reduce(work_.netlist.expressions, tree, meaning(asking), work_.circuit.expressions,
                                          work_.limits.expression_depth);
  if (const auto* number = std::get_if<model::Number>(&outcome)) return Folded{*number, odd_};
  const auto& trouble = std::get<expression::Trouble>(outcome);
  if (!quiet) blame(frame, card, work_.place(card, trouble.offset), trouble.message);
  return std::nullopt;
}

std::optional<Folded> Parameters::value(const Frame& frame, base::NameId name, model::CardId card, source::Span where,
                                        expression::Literals literals, bool quiet) {
  literals_ = literals;
  quiet_ = quiet;
  odd_ = false;
  const Definition asking{nullptr, &frame, card, where, {}};
  settle(find(&frame, name));
  const auto found = lookup(asking, name);
  if (const auto* number = std::get_if<model::Number>(&found)) return Folded{*number, odd_};
  if (!quiet) blame(frame, card, where, std::get<std::string>(found));
  return std::nullopt;
}

// A card whose value cannot be had. Without a message a parameter is at fault, and has been told at its own card.
void Parameters::blame(const Frame& frame, model::CardId card, source::Span where, std::string message) {
  if (!message.empty()) return work_.fail(ProblemKind::value, card, where, frame.instance, std::move(message));
  work_.blame(card, where, fmt::format("it needs parameter {}, which could not be read", work_.shown(failed_)),
              failed_card_);
}

void Parameters::check_all(const Frame& frame) {
  literals_ = expression::Literals::milli;
  quiet_ = false;
  for (std::size_t slot = 0; slot < work_.library.parameters(frame.scope).size(); ++slot) {
    settle({&frame, slot});
    tell(state({&frame, slot}));
  }
}

model::ElementId Parameters::source(const Frame& frame, base::NameId name) const {
  const base::LargeVector<model::Element>& elements = work_.circuit.elements;
  if (!frame.sources_known) {
    frame.sources_known = true;
    for (std::size_t i = frame.first_element; i < elements.size(); ++i) {
      if (std::holds_alternative<model::VoltageSource>(elements[i].part))
        frame.sources.try_emplace(elements[i].name, model::ElementId{static_cast<std::uint32_t>(i)});
    }
  }
  const auto full = work_.names.find(frame.path + std::string(work_.names.text(name)));
  if (!full) return {};
  const auto at = frame.sources.find(*full);
  return at == frame.sources.end() ? model::ElementId{} : at->second;
}

Parameters::Definition Parameters::definition(const Frame& frame, std::size_t slot) const {
  const ParameterSlot& own = work_.library.parameters(frame.scope)[slot];
  if (own.is_default && frame.call != nullptr) {
    const model::Range range = frame.call->parameters;
    for (std::uint32_t i = range.first + range.count; i > range.first; --i) {
      const model::Assignment& given = work_.netlist.assignments[i - 1];
      if (given.key.name == own.card->name.name)
        return {&given.value, frame.caller, frame.call->card, work_.place(frame.call->card, given.key), {}};
    }
  }
  const base::NameId outer = own.is_default ? own.card->name.name : base::NameId{};
  return {&own.card->value, &frame, own.card->card, work_.place(own.card->card, own.card->name), outer,
          own.card->broken};
}

FoundParameter Parameters::seen(const Definition& definition, base::NameId name) const {
  const bool outer = definition.outer.valid() && definition.outer == name;
  return find(outer ? definition.frame->caller : definition.frame, name);
}

base::NameId Parameters::name_of(const Asked& asked) const {
  return work_.library.parameters(asked.frame->scope)[asked.slot].card->name.name;
}

ParameterState& Parameters::state(const Asked& asked) const {
  std::vector<ParameterState>& states = asked.frame->parameters[static_cast<std::size_t>(literals_)];
  if (states.empty()) states.resize(work_.library.parameters(asked.frame->scope).size());
  return states[asked.slot];
}

// Depth first with a stack of its own: a chain of definitions may be as long as the netlist.
void Parameters::settle(const FoundParameter& found) {
  if (found.frame == nullptr) return;
  std::vector<Asked> open{{found.frame, found.slot}};
  while (!open.empty()) {
    const Asked top = open.back();
    ParameterState& now = state(top);
    if (now.status == Status::done || now.status == Status::failed) {
      open.pop_back();
      continue;
    }
    now.status = Status::open;
    if (!ready(top, open)) continue;
    work_out(top);
    open.pop_back();
  }
}

// Whether all that a parameter rests on has been worked out; what has not is put on the stack.
bool Parameters::ready(const Asked& asked, std::vector<Asked>& open) {
  const Definition own = definition(*asked.frame, asked.slot);
  std::vector<base::NameId> needed;
  if (const auto* tree = std::get_if<ExpressionId>(own.value)) needed = wants(*tree).parameters;
  if (const auto* word = std::get_if<base::NameId>(own.value)) needed.push_back(*word);
  bool all = true;
  for (const base::NameId name : needed) {
    const FoundParameter found = seen(own, name);
    if (found.frame == nullptr) continue;
    const Asked inner{found.frame, found.slot};
    const Status status = state(inner).status;
    if (status == Status::open) fail_cycle(inner, open);
    if (status != Status::fresh) continue;
    open.push_back(inner);
    all = false;
  }
  return all;
}

void Parameters::fail_cycle(const Asked& again, const std::vector<Asked>& open) {
  constexpr std::size_t longest = 8;
  std::string chain;
  std::size_t names = 0;
  bool inside = false;
  for (const Asked& asked : open) {
    inside = inside || (asked.frame == again.frame && asked.slot == again.slot);
    if (!inside || state(asked).status != Status::open) continue;
    if (names < longest) chain += work_.shown(name_of(asked)) + " -> ";
    if (names == longest) chain += "... -> ";
    ++names;
  }
  const std::string name = work_.shown(name_of(again));
  const Definition own = definition(*again.frame, again.slot);
  fail(state(again), own, fmt::format("parameter {} needs itself: {}{}", name, chain, name), own.where);
}

void Parameters::work_out(const Asked& asked) {
  ParameterState& now = state(asked);
  if (now.status == Status::failed) return;
  for (const auto& [slot, variable] : asked.frame->swept) {
    if (slot != asked.slot) continue;
    now.number.residual = ExpressionId{variable};
    now.status = Status::done;
    return;
  }
  const Definition own = definition(*asked.frame, asked.slot);
  if (own.broken) return fail(now, own, {}, own.where);
  std::visit(base::overloaded{
                 [&](std::monostate) {
                   fail(now, own, fmt::format("parameter {} has no value", work_.shown(name_of(asked))), own.where);
                   now.told = asked.frame->call != nullptr;  // at the card of the instance
                 },
                 [&](double value) { now.number.value = value; },
                 [&](model::OddLiteralId id) {
                   const model::OddLiteral& literal = work_.netlist.odd_literals[id.index()];
                   now.number.value = reading_of(literal, literals_);
                   now.odd = differs(literal.builder, literal.spice);
                 },
                 [&](ExpressionId tree) { work_out_expression(now, own, tree); },
                 [&](base::NameId word) { work_out_word(now, own, word); },
             },
             *own.value);
  if (now.status == Status::open) now.status = Status::done;
}

void Parameters::work_out_expression(ParameterState& now, const Definition& own, ExpressionId tree) {
  odd_ = wants(tree).odd != nullptr;
  const auto outcome = expression::reduce(work_.netlist.expressions, tree, meaning(own), work_.circuit.expressions,
                                          work_.limits.expression_depth);
  now.odd = odd_;
  if (const auto* number = std::get_if<model::Number>(&outcome)) {
    now.number = *number;
    return;
  }
  const auto& trouble = std::get<expression::Trouble>(outcome);
  fail(now, own, trouble.message, work_.place(own.card, trouble.offset));
}

void Parameters::work_out_word(ParameterState& now, const Definition& own, base::NameId word) {
  odd_ = false;
  const auto found = lookup(own, word);
  now.odd = odd_;
  if (const auto* number = std::get_if<model::Number>(&found))
    now.number = *number;
  else
    fail(now, own, std::get<std::string>(found), own.where);
}

void Parameters::fail(ParameterState& now, const Definition& own, std::string message, source::Span where) {
  now.status = Status::failed;
  now.told = message.empty();
  if (message.empty() && !own.broken && !quiet_) blame(*own.frame, own.card, where, {});
  now.failure = std::move(message);
  now.where = where;
  now.card = own.card;
  now.instance = own.frame->instance;
}

// A failure of a parameter is told at its own card, and only when something needs it.
void Parameters::tell(ParameterState& now) {
  if (now.status != Status::failed || quiet_) return;
  if (!now.told) work_.fail(ProblemKind::parameter, now.card, now.where, now.instance, now.failure);
  work_.blame(now.card, now.where, "it needs a parameter that could not be read");
  now.told = true;
}

std::variant<model::Number, std::string> Parameters::lookup(const Definition& asking, base::NameId name) {
  const FoundParameter found = seen(asking, name);
  if (found.frame == nullptr) return unknown(*asking.frame, name);
  ParameterState& now = state({found.frame, found.slot});
  odd_ = odd_ || now.odd;
  if (now.status == Status::done) return now.number;
  tell(now);
  failed_ = name;
  failed_card_ = now.card;
  return std::string();
}

std::string Parameters::unknown(const Frame& frame, base::NameId name) const {
  std::vector<std::string_view> candidates;
  for (const Frame* at = &frame; at != nullptr; at = at->caller) {
    for (const ParameterSlot& slot : work_.library.parameters(at->scope))
      candidates.push_back(work_.names.text(slot.card->name.name));
  }
  const std::string_view near = base::nearest_name(work_.names.text(name), candidates);
  const std::string text = fmt::format("parameter {} is not defined", work_.shown(name));
  return near.empty() ? text : fmt::format("{}; did you mean {}", text, base::printable_short(near));
}

expression::Meaning Parameters::meaning(const Definition& asking) {
  expression::Meaning meaning;
  meaning.literals = literals_;
  meaning.temperature = work_.circuit.temperature;
  meaning.parameter = [this, &asking](base::NameId name) { return lookup(asking, name); };
  meaning.net = [this, &asking](base::NameId name) -> std::variant<model::NetId, std::string> {
    if (const auto net = work_.wiring.named(asking.frame->scope, name, asking.frame->nets)) return *net;
    return fmt::format("no element has a net {}", work_.shown(name));
  };
  meaning.unknown_function = [this](base::NameId name) {
    return fmt::format("the function {} is not known", work_.shown(name));
  };
  meaning.source = [this, &asking](base::NameId name) -> std::variant<model::ElementId, std::string> {
    if (const model::ElementId found = source(*asking.frame, name); found.valid()) return found;
    return fmt::format("there is no voltage source {} here", work_.shown(name));
  };
  return meaning;
}

}  // namespace flatten
