#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/rule.hpp"

namespace judge::rules {
namespace {

void run(const BoardContext& context, Findings& out) {
  for (const BoardFacts::Missing& missing : context.facts.missing_includes) {
    model::Finding finding = out.blank();
    if (missing.where.valid()) finding.where = missing.where;
    finding.message = fmt::format("{}; what stands there, models and parts of the board alike, is missing here",
                                  base::printable(missing.what));
    out.add(std::move(finding));
  }
}

}  // namespace

extern constinit const Rule missing_include{model::RuleId::missing_include, Stage::finding, {}, nullptr, run};

}  // namespace judge::rules
