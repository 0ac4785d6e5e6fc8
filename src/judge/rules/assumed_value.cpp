#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/rule.hpp"

namespace judge::rules {
namespace {

// One a board, with the whole list: a reviewer signs all of it.
void run(const BoardContext& context, Findings& out) {
  const auto& assumptions = context.facts.assumptions;
  if (assumptions.empty()) return;
  std::string list;
  for (const std::string& assumption : assumptions)
    list += fmt::format("{}{}", list.empty() ? "" : "; ", base::printable(assumption));
  model::Finding finding = out.blank();
  finding.message = fmt::format("taken from names and texts, where a declaration would be surer: {}", list);
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule assumed_value{model::RuleId::assumed_value, Stage::finding, {}, nullptr, run};

}  // namespace judge::rules
