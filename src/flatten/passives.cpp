#include <array>
#include <cmath>
#include <fmt/format.h>
#include <limits>

#include "base/text.hpp"
#include "flatten/elements.hpp"

namespace flatten {
namespace {

using model::Number;
using model::Unmodelled;
using Why = model::Unmodelled::Why;

constexpr double none = std::numeric_limits<double>::quiet_NaN();

struct PassiveKind {
  char letter;
  std::string_view full;        // the long name of its own key
  std::string_view long_model;  // the type of its models beside the letter itself
};
constexpr std::array kinds{PassiveKind{'r', "resistance", "res"}, PassiveKind{'c', "capacitance", "cap"},
                           PassiveKind{'l', "inductance", "ind"}};

const PassiveKind& kind_of(char letter) {
  return letter == 'r' ? kinds[0] : letter == 'c' ? kinds[1] : kinds[2];
}

// Words by which people mark a part that is not fitted: common practice, no source.
bool means_not_fitted(std::string_view word) {
  constexpr std::array<std::string_view, 9> words{
      "dnp", "dni", "dnf", "dnm", "nofit", "nopop", "nf", "do-not-populate", "not-fitted"};
  return std::any_of(words.begin(), words.end(), [&](std::string_view known) { return base::same_name(known, word); });
}

bool begins_like_number(std::string_view text) {
  if (!text.empty() && (text.front() == '+' || text.front() == '-')) text.remove_prefix(1);
  if (!text.empty() && text.front() == '.') text.remove_prefix(1);
  return !text.empty() && text.front() >= '0' && text.front() <= '9';
}

Number scaled(model::ExpressionPool& pool, model::Op op, const Number& number, double factor) {
  if (!number.fixed()) return {0, expression::add_binary(pool, op, number, Number{factor, {}})};
  return {op == model::Op::multiply ? number.value * factor : number.value / factor, {}};
}

}  // namespace

// What stands in place of a value. A text that was surely meant as one is told: who reads only the card may miss it.
Unmodelled Elements::without_value(const Frame& frame, const model::ElementCard& card, base::NameId word) {
  const base::NameId wanted = word.valid() ? word : card.reference.name;
  if (!wanted.valid()) return {Why::no_value, {}};
  const std::string_view text = work_.names.text(wanted);
  if (means_not_fitted(text)) return {Why::not_fitted, wanted};
  const bool parameter = parameters_.find(&frame, wanted).frame != nullptr;
  if (!parameter && !begins_like_number(text)) return {Why::no_value, wanted};
  const bool placed = card.reference.name == wanted;
  const source::Span where = placed ? work_.place(card.card, card.reference) : work_.netlist.span(card.card);
  const std::string_view what = parameter ? "is a parameter, and stands without braces" : "is no number";
  // A capacitor's part text often begins with its value, and at DC nothing comes of it.
  if (card.letter != 'c')
    work_.problems.say(ProblemKind::value, base::Level::warning, where, frame.instance,
                       fmt::format("{} has no value: \"{}\" {}", work_.shown(card.name), work_.shown(wanted), what));
  return {parameter ? Why::parameter_name : Why::bad_value, wanted};
}

// The value on the card, or that of its model.
Reading Elements::passive_value(const Frame& frame, const model::ElementCard& card, const FoundModel& model) {
  const PassiveKind& kind = kind_of(card.letter);
  const Letter letter = card.letter == 'r' ? Letter::resistor : Letter::other;
  const std::string_view key(&kind.letter, 1);
  if (model.card != nullptr && model.card->broken) {
    work_.blame(card.card, work_.place(card.card, card.reference),
                fmt::format("model {} cannot be used", work_.shown(model.card->name)), model.card->card);
    return Failed{};
  }
  Reading reading = values_.read(frame, card.value, card.card, letter);
  const model::Assignment* own = parameter(card, key);
  if (own == nullptr) own = parameter(card, kind.full);
  if (std::holds_alternative<NoValue>(reading) && own != nullptr)
    reading = values_.read(frame, *own, card.card, letter);
  if (model.card == nullptr) return reading;
  const model::Assignment* entry = models_.entry(*model.card, key);
  if (entry == nullptr) entry = models_.entry(*model.card, kind.full);
  if (entry == nullptr) return reading;
  const Frame& owner = Models::owner(frame, model.scope);
  if (std::holds_alternative<NoValue>(reading)) return values_.read(owner, *entry, model.card->card, letter);
  // Of a model of the long type, as capture tools write it, the entry multiplies the card's value.
  auto* const quantity = std::get_if<Quantity>(&reading);
  if (quantity == nullptr || !base::same_name(work_.names.text(model.card->type), kind.long_model)) return reading;
  const Reading factor = values_.read(owner, *entry, model.card->card, Letter::other);
  const auto* const times = std::get_if<Quantity>(&factor);
  if (times == nullptr || !times->number.fixed() || times->number.value == 1) return reading;
  quantity->number = scaled(work_.circuit.expressions, model::Op::multiply, quantity->number, times->number.value);
  return reading;
}

FoundModel Elements::passive_model(const Frame& frame, const model::ElementCard& card) const {
  const auto* const word = std::get_if<base::NameId>(&card.value);
  const base::NameId name = card.reference.name.valid() ? card.reference.name
                            : word != nullptr           ? *word
                                                        : base::NameId{};
  if (!name.valid()) return {};
  const FoundModel found = work_.library.model(frame.scope, name);
  if (found.card == nullptr) return {};
  if (found.card->broken) return found;
  const PassiveKind& kind = kind_of(card.letter);
  const std::string_view type = work_.names.text(found.card->type);
  const bool fits = base::same_name(type, std::string_view(&kind.letter, 1)) || base::same_name(type, kind.long_model);
  return fits ? found : FoundModel{};
}

Elements::Outcome Elements::resistor(const Frame& frame, const model::ElementCard& card) {
  if (card.nodes.count != 2) return Unmodelled{Why::unsupported, card.reference.name};
  const auto* const plain = std::get_if<double>(&card.value);
  if (plain != nullptr && *plain >= 0 && std::isfinite(*plain) && card.parameters.count == 0 &&
      !card.reference.name.valid())
    return model::Resistor{{*plain, {}}};
  const FoundModel model = passive_model(frame, card);
  const Reading reading = passive_value(frame, card, model);
  if (std::holds_alternative<Failed>(reading)) return std::nullopt;
  if (std::holds_alternative<Behaving>(reading)) return Unmodelled{Why::unsupported, {}};
  if (const auto* word = std::get_if<NoValue>(&reading)) return without_value(frame, card, word->word);
  Quantity quantity = std::get<Quantity>(reading);
  if (quantity.number.fixed() && quantity.number.value < 0) {
    const source::Span where = quantity.where.valid() ? quantity.where : work_.netlist.span(card.card);
    work_.fail(ProblemKind::value, card.card, where, frame.instance,
               fmt::format("a resistance cannot be negative, and {} is {}", work_.shown(card.name),
                           base::si_text(quantity.number.value, "ohm")));
    return std::nullopt;
  }
  const std::optional<double> count = fixed_parameter(frame, card, "m");
  if (!count && parameter(card, "m") != nullptr) return Unmodelled{Why::unsupported, {}};
  if (count && *count > 0)
    quantity.number = scaled(work_.circuit.expressions, model::Op::divide, quantity.number, *count);
  detail(frame, card, quantity, model);
  note_unused(card, model);
  suspect(quantity);
  return model::Resistor{quantity.number};
}

Elements::Outcome Elements::reactance(const Frame& frame, const model::ElementCard& card) {
  if (card.nodes.count != 2) return Unmodelled{Why::unsupported, card.reference.name};
  const FoundModel model = passive_model(frame, card);
  const Reading reading = passive_value(frame, card, model);
  if (std::holds_alternative<Failed>(reading)) return std::nullopt;
  if (std::holds_alternative<Behaving>(reading)) return Unmodelled{Why::unsupported, {}};
  if (const auto* word = std::get_if<NoValue>(&reading)) return without_value(frame, card, word->word);
  const auto& quantity = std::get<Quantity>(reading);
  note_unused(card, model);
  suspect(quantity);
  // At DC an inductor is its series resistance and a capacitor what lies across it, where the card gives one. The
  // latter is no part of a divider as firmware knows it, and must not pass for an arm.
  const bool capacitor = card.letter == 'c';
  const KeyOhms own = key_ohms(frame, card, capacitor ? "rpar" : "rser");
  if (own.failed) return std::nullopt;
  if (capacitor && own.ohms) {
    work_.fail(ProblemKind::value, card.card, work_.place(card.card, parameter(card, "rpar")->key), frame.instance,
               fmt::format("the resistance across a capacitor ({}) is not followed by this version: write it as a "
                           "resistor",
                           work_.shown(card.name)));
    return std::nullopt;
  }
  if (own.ohms) return model::Resistor{*own.ohms};
  if (capacitor) return model::Capacitor{quantity.number};
  return model::Inductor{quantity.number};
}

void Elements::note_unused(const model::ElementCard& card, const FoundModel& model) {
  if (model.card != nullptr || !card.reference.name.valid()) return;
  if (unused_count_++ == 0) unused_ = &card;
}

void Elements::tell_unused() {
  if (unused_ == nullptr) return;
  std::string text = fmt::format("\"{}\" behind the value of {} is no model and is not used",
                                 work_.shown(unused_->reference.name), work_.shown(unused_->name));
  if (unused_count_ > 1) text += fmt::format("; so it is with {} more", unused_count_ - 1);
  work_.problems.say(ProblemKind::value, base::Level::note, work_.place(unused_->card, unused_->reference), {},
                     std::move(text));
}

Elements::KeyOhms Elements::key_ohms(const Frame& frame, const model::ElementCard& card, std::string_view key) {
  const model::Assignment* const assignment = parameter(card, key);
  if (assignment == nullptr) return {};
  const Reading reading = values_.read(frame, *assignment, card.card, Letter::resistor);
  if (std::holds_alternative<Failed>(reading)) return {std::nullopt, true};
  const auto* const quantity = std::get_if<Quantity>(&reading);
  if (quantity == nullptr || (quantity->number.fixed() && quantity->number.value < 0)) {
    work_.fail(ProblemKind::value, card.card, work_.place(card.card, assignment->key), frame.instance,
               fmt::format("{} of {} is no resistance", work_.shown(assignment->key.name), work_.shown(card.name)));
    return {std::nullopt, true};
  }
  if (quantity->number.fixed() && quantity->number.value == 0) return {};
  suspect(*quantity);
  return {quantity->number, false};
}

void Elements::add_series_resistance(const Frame& frame, const model::ElementCard& card) {
  model::Circuit& circuit = work_.circuit;
  const KeyOhms series = key_ohms(frame, card, "rser");
  if (series.failed) circuit.elements.back().part = Unmodelled{Why::broken_card, {}};
  if (!series.ohms) return;
  const model::Element source = circuit.elements.back();
  const std::string path = std::string(work_.names.text(source.name)) + ".";
  model::NetId& plus = circuit.pins[source.first_pin];
  const model::NetId outer = plus;
  plus = work_.wiring.make(work_.names.intern(path + std::string(work_.names.text(circuit.nets[outer.index()].name))));
  const model::NetId inner = plus;
  model::Element resistor = source;
  resistor.name = work_.names.intern(path + "Rser");
  resistor.first_pin = static_cast<std::uint32_t>(circuit.pins.size());
  resistor.letter = 'r';
  resistor.part = model::Resistor{*series.ohms};
  circuit.pins.push_back(outer);
  circuit.pins.push_back(inner);
  circuit.elements.push_back(resistor);
}

Elements::Outcome Elements::independent(const Frame& frame, const model::ElementCard& card) {
  if (card.nodes.count != 2) return Unmodelled{Why::unsupported, card.reference.name};
  Reading reading = values_.read(frame, card.value, card.card, Letter::other);
  if (const model::Assignment* dc = parameter(card, "dc"); dc != nullptr && std::holds_alternative<NoValue>(reading))
    reading = values_.read(frame, *dc, card.card, Letter::other);
  if (std::holds_alternative<Failed>(reading)) return std::nullopt;
  if (std::holds_alternative<Behaving>(reading)) return Unmodelled{Why::unsupported, {}};
  if (const auto* word = std::get_if<NoValue>(&reading)) return without_value(frame, card, word->word);
  const auto& quantity = std::get<Quantity>(reading);
  suspect(quantity);
  if (card.at_time_zero) work_.circuit.at_time_zero.push_back(current_);
  if (card.letter == 'v') return model::VoltageSource{quantity.number};
  return model::CurrentSource{quantity.number};
}

// A parameter of the card that is a number, or nothing. Errors in it have been said.
std::optional<double> Elements::fixed_parameter(const Frame& frame, const model::ElementCard& card,
                                                std::string_view key) {
  const model::Assignment* const assignment = parameter(card, key);
  if (assignment == nullptr) return std::nullopt;
  return fixed(frame, *assignment, card.card);
}

std::optional<double> Elements::fixed(const Frame& frame, const model::Assignment& assignment, model::CardId card) {
  const Reading reading = values_.read(frame, assignment, card, Letter::other);
  const auto* const quantity = std::get_if<Quantity>(&reading);
  if (quantity == nullptr || !quantity->number.fixed()) return std::nullopt;
  return quantity->number.value;
}

// A tolerance on a card: 5% is a fraction already, a plain number is in percent (one simulator's schematic editor
// writes tol=1).
std::optional<double> Elements::tolerance(const Frame& frame, const model::ElementCard& card) {
  const model::Assignment* assignment = parameter(card, "tol");
  if (assignment == nullptr) assignment = parameter(card, "tolerance");
  if (assignment == nullptr) return std::nullopt;
  if (const auto* id = std::get_if<model::OddLiteralId>(&assignment->value)) {
    const model::OddLiteral& literal = work_.netlist.odd_literals[id->index()];
    return literal.builder < literal.spice ? literal.builder : literal.builder / 100;
  }
  const std::optional<double> percent = fixed(frame, *assignment, card.card);
  return percent ? std::optional(*percent / 100) : std::nullopt;
}

void Elements::detail(const Frame& frame, const model::ElementCard& card, const Quantity& quantity,
                      const FoundModel& model) {
  const auto coefficient = [&](std::string_view key) {
    if (const auto own = fixed_parameter(frame, card, key)) return *own;
    if (model.card == nullptr) return 0.0;
    const model::Assignment* const entry = models_.entry(*model.card, key);
    if (entry == nullptr) return 0.0;
    return fixed(Models::owner(frame, model.scope), *entry, model.card->card).value_or(0);
  };
  model::Detail detail{current_, quantity.tolerance, coefficient("tc1"), coefficient("tc2")};
  if (const auto written = tolerance(frame, card)) detail.tolerance = *written;
  if (model.card != nullptr && std::isnan(detail.tolerance)) detail.tolerance = spread_of(*model.card);
  if (std::isnan(detail.tolerance) && detail.tc1 == 0 && detail.tc2 == 0) return;
  work_.circuit.details.push_back(detail);
}

// DEV=5% of a model: the spread of each part. Without a percent sign it is in ohms, which says nothing here.
double Elements::spread_of(const model::ModelCard& card) const {
  const model::Assignment* const entry = models_.entry(card, "dev");
  const auto* const id = entry == nullptr ? nullptr : std::get_if<model::OddLiteralId>(&entry->value);
  if (id == nullptr) return none;
  const model::OddLiteral& literal = work_.netlist.odd_literals[id->index()];
  return literal.builder < literal.spice ? literal.builder : none;
}

}  // namespace flatten
