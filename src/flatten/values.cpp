#include "flatten/values.hpp"

#include <cmath>
#include <limits>
#include <optional>

#include "base/overloaded.hpp"
#include "expression/evaluate.hpp"

namespace flatten {
namespace {

using expression::Literals;
using model::BareM;

constexpr double none = std::numeric_limits<double>::quiet_NaN();

Quantity plain(double value) {
  return {{value, {}}, none, false, {}, {}};
}

}  // namespace

Reading Values::read(const Frame& frame, const model::Value& value, model::CardId card, Letter letter) {
  return std::visit(
      base::overloaded{
          [](std::monostate) -> Reading { return NoValue{}; },
          [&](double number) -> Reading {
            if (std::isfinite(number)) return plain(number);
            work_.fail(ProblemKind::value, card, work_.netlist.span(card), frame.instance,
                       "the value is not a finite number");
            return Failed{};
          },
          [&](model::OddLiteralId id) -> Reading { return choose(work_.netlist.odd_literals[id.index()], letter); },
          [&](model::ExpressionId tree) -> Reading { return fold(frame, tree, card, letter); },
          [](base::NameId word) -> Reading { return NoValue{word}; },
      },
      value);
}

Reading Values::read(const Frame& frame, const model::Assignment& assignment, model::CardId card, Letter letter) {
  const auto* word = std::get_if<base::NameId>(&assignment.value);
  if (word == nullptr) return read(frame, assignment.value, card, letter);
  if (parameters_.find(&frame, *word).frame == nullptr) return NoValue{*word};
  const source::Span where = work_.place(card, assignment.key);
  const auto value = [&](Literals literals, bool quiet) {
    return parameters_.value(frame, *word, card, where, literals, quiet);
  };
  return choose_folded(value, letter, where, nullptr);
}

// Mega or milli: as declared, or on a resistor by size, where milli would be less than an ohm.
Quantity Values::choose(const model::OddLiteral& literal, Letter letter) const {
  double value = literal.builder;
  if (literal.bare_mega) {
    const BareM bare_m = letter == Letter::resistor ? work_.options.bare_m : BareM::milli;
    const bool mega = bare_m == BareM::mega || (bare_m == BareM::by_size && std::fabs(literal.spice) < 1);
    if (!mega) value = literal.spice;
  }
  return {
      {value, {}}, literal.tolerance, !(value == literal.spice), {literal.where, value, literal.spice}, literal.where};
}

Reading Values::fold(const Frame& frame, model::ExpressionId tree, model::CardId card, Letter letter) {
  const Wants wants = parameters_.wants(tree);
  if (wants.circuit) return Behaving{};
  const auto value = [&](Literals literals, bool quiet) {
    return parameters_.fold(frame, tree, card, literals, quiet);
  };
  const std::uint32_t offset = wants.odd != nullptr ? wants.odd->offset : work_.netlist.expressions[tree].offset;
  return choose_folded(value, letter, work_.place(card, offset), wants.odd);
}

// The builder's reading, and SPICE's beside it where some literal behind the value is odd. A value that is swept has no
// number to compare: there the literal itself is what SPICE reads differently.
template <class Fold>
Reading Values::choose_folded(const Fold& fold, Letter letter, source::Span where, const model::ExpressionNode* odd) {
  const BareM bare_m = letter == Letter::resistor ? work_.options.bare_m : BareM::milli;
  const auto first = fold(bare_m == BareM::mega ? Literals::builder : Literals::milli, false);
  if (!first) return Failed{};
  if (!first->number.fixed() && expression::is_behavioural(work_.circuit.expressions, first->number.residual))
    return Behaving{};
  Quantity quantity{first->number, none, false, {}, where};
  if (!first->number.fixed()) {
    quantity.odd = odd != nullptr && (bare_m == BareM::mega || !expression::is_bare_mega(*odd));
    if (quantity.odd) quantity.readings = {where, odd->number, odd->spice};
    return quantity;
  }
  if (!first->odd) return quantity;
  if (bare_m == BareM::by_size && std::fabs(first->number.value) < 1) {
    const auto mega = fold(Literals::builder, true);
    if (mega && mega->number.fixed()) quantity.number = mega->number;
  }
  const auto spice = fold(Literals::spice, true);
  const double spice_value = spice && spice->number.fixed() ? spice->number.value : none;
  quantity.readings = {where, quantity.number.value, spice_value};
  quantity.odd = !(quantity.number.value == spice_value);
  return quantity;
}

std::variant<Tree, NoValue, Failed> Values::tree(const Frame& frame, const model::Value& value, model::CardId card) {
  model::ExpressionPool& pool = work_.circuit.expressions;
  if (const auto* written = std::get_if<model::ExpressionId>(&value)) {
    const auto folded = parameters_.fold(frame, *written, card, Literals::milli);
    if (!folded) return Failed{};
    const model::ExpressionNode* odd = parameters_.wants(*written).odd;
    Tree tree{folded->number.residual, odd != nullptr && !expression::is_bare_mega(*odd), {}};
    if (tree.odd) tree.readings = {work_.place(card, odd->offset), odd->number, odd->spice};
    if (folded->number.fixed())
      tree.root = expression::add_number(pool, folded->number.value, work_.netlist.expressions[*written].offset);
    return tree;
  }
  const Reading reading = read(frame, value, card, Letter::other);
  if (const auto* quantity = std::get_if<Quantity>(&reading))
    return Tree{expression::add_number(pool, quantity->number.value), quantity->odd, quantity->readings};
  if (const auto* word = std::get_if<NoValue>(&reading)) return *word;
  return Failed{};
}

}  // namespace flatten
