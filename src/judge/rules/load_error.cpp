#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <optional>

#include "base/text.hpp"
#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

// What the error is held against, and in which unit.
struct Ruler {
  double value = 0;
  double limit = 0;
  std::size_t point = 0;
  std::string unit;
  std::string reason;  // in brackets behind the limit; empty for a declared limit
  model::Contributor largest;
};

// A declared limit is in LSB. Else a quarter of the declared accuracy, in the measurand; else the larger of 1 LSB and
// 1/4096 of the range, because one LSB alone is no ruler for 16 to 24 bits.
std::optional<Ruler> ruler_of(const InputContext& context) {
  const model::Figures& figures = context.input.figures;
  const model::Input& input = context.input.divider.input;
  const auto declared = declared_limit(input, model::RuleId::load_error);
  const bool accuracy = context.sensor != nullptr && context.sensor->accuracy;
  if (!declared && accuracy && figures.load_error_measurand)
    return Ruler{*figures.load_error_measurand,           context.sensor->accuracy->value / 4,
                 figures.load_error_measurand_point,      context.unit,
                 " (a quarter of the declared accuracy)", figures.largest_load_measurand};
  if (!figures.load_error_lsb) return std::nullopt;
  const double default_limit = std::max(1.0, std::ldexp(1.0, input.bits) / 4096);
  return Ruler{*figures.load_error_lsb,
               declared.value_or(default_limit),
               figures.load_error_point,
               "LSB",
               default_limit > 1 && !declared ? " (1/4096 of the range)" : "",
               figures.largest_load};
}

// What lessens an error of this kind.
std::string remedy(model::LoadKind kind, const model::Figures& figures) {
  switch (kind) {
    case model::LoadKind::leakage:
      return "less resistance between the arms and the pin, or less leakage, lessens it" +
             (figures.pin_source_ohms
                  ? fmt::format(" (the pin sees up to {})", base::si_text(*figures.pin_source_ohms, "ohm", 3))
                  : "");
    case model::LoadKind::input_resistance:
      return "less resistance in the arms and before the pin, or a buffer, lessens it";
    case model::LoadKind::rail_resistance:
      return "a stiffer rail or less current out of it lessens it, and on one rail a divider and its range sag alike";
    case model::LoadKind::devices:
      return "less resistance in the arms and before the pin, or parts that conduct less within the range, lessens it";
    case model::LoadKind::part:
    case model::LoadKind::none:
      break;
  }
  return "a lighter load, less resistance in the arms or a buffer lessens it (or role = \"arm\", where firmware "
         "reckons "
         "with the part)";
}

std::string help_text(const model::Divider& divider, const model::Figures& figures, const model::Contributor& largest) {
  const std::string name = base::printable_short(largest.name);
  const bool elsewhere = largest.kind == model::LoadKind::leakage && !divider.leakage_where.empty();
  const std::string where = elsewhere ? fmt::format(" (with {})", divider.leakage_where) : "";
  return (name.empty() ? "" : fmt::format("; {} contributes most{}", name, where)) + "; " +
         remedy(largest.kind, figures);
}

void run(const InputContext& context, Findings& out) {
  const auto ruler = ruler_of(context);
  if (!ruler || ruler->value <= ruler->limit) return;
  const Compared texts = compared(ruler->value, ruler->limit, base::number_text);
  const std::string unit = ruler->unit.empty() ? "" : " " + base::printable(ruler->unit);
  model::Finding finding = out.blank();
  finding.value = ruler->value;
  finding.limit = ruler->limit;
  finding.unit = ruler->unit;
  finding.at = context.input.sweep->at[ruler->point];
  finding.message =
      fmt::format("what loads the divider bends the reading by up to {}{}, at {}, where {}{} is the most accepted{}{}",
                  texts.value, unit, measurand_text(*finding.at, context.unit), texts.limit, unit, ruler->reason,
                  help_text(context.input.divider, context.input.figures, ruler->largest));
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule load_error{
    model::RuleId::load_error,
    Stage::sweep,
    {model::ConditionKind::leakage_high, model::ConditionKind::leakage_low, model::ConditionKind::bare},
    run,
    nullptr};

}  // namespace judge::rules
