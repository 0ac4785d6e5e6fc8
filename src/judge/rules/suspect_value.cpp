#include <cmath>
#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/parts.hpp"
#include "judge/rule.hpp"

namespace judge::rules {
namespace {

std::string_view unit_of(const model::Element* element) {
  switch (element == nullptr ? '?' : element->letter) {
    case 'r':
    case 'R':
      return "ohm";
    case 'c':
    case 'C':
      return "F";
    case 'l':
    case 'L':
      return "H";
    case 'v':
    case 'V':
      return "V";
    case 'i':
    case 'I':
      return "A";
    default:
      return "";
  }
}

// A unit as a word, to stand behind a prefix that is one.
std::string_view word_of(std::string_view unit) {
  if (unit == "F") return "farad";
  if (unit == "H") return "henry";
  if (unit == "V") return "volt";
  if (unit == "A") return "ampere";
  return unit;
}

// M and m are what such values are often about: here they are spelled out.
std::string value_text(double value, std::string_view unit) {
  if (unit.empty()) return base::number_text(value);
  std::string text = base::si_text(value, unit);
  const auto prefix = text.find(' ') + 1;
  const bool prefixed = text.size() == prefix + 1 + unit.size();
  if (!prefixed || (text[prefix] != 'M' && text[prefix] != 'm')) return text;
  return text.replace(prefix, 1, text[prefix] == 'M' ? unit == "ohm" ? "meg" : "mega" : "milli")
      .replace(text.size() - unit.size(), unit.size(), word_of(unit));
}

void run_input(const InputContext& context, Findings& out) {
  for (const model::SuspectValue& suspect : context.input.divider.suspects) {
    const std::string_view unit = unit_of(element_of(context.board, suspect.element));
    const std::string text = context.board.sources == nullptr ? "" : quoted(*context.board.sources, suspect.where);
    const std::string spice = std::isnan(suspect.spice) ? "no number" : value_text(suspect.spice, unit);
    model::Finding finding = out.blank();
    if (suspect.where.valid()) finding.where = suspect.where;
    finding.message =
        fmt::format("{} of {} is {} to the builder of the board, but SPICE reads {}", text.empty() ? "the value" : text,
                    part_name(context.board, suspect.element), value_text(suspect.builder, unit), spice);
    out.add(std::move(finding));
  }
}

// Outside audited networks one count a file.
void run_board(const BoardContext& context, Findings& out) {
  for (const BoardFacts::Elsewhere& file : context.facts.suspects) {
    if (file.count == 0) continue;
    model::Finding finding = out.blank();
    if (file.where.valid()) finding.where = file.where;
    finding.message =
        file.count == 1
            ? std::string{"SPICE reads a value outside the audited networks differently than the builder of the board"}
            : fmt::format(
                  "SPICE reads {} values of this file outside the audited networks differently than the builder "
                  "of the board; this is the first of them",
                  file.count);
    out.add(std::move(finding));
  }
}

}  // namespace

extern constinit const Rule suspect_value{model::RuleId::suspect_value, Stage::finding, {}, run_input, run_board};

}  // namespace judge::rules
