#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/rule.hpp"

namespace judge::rules {
namespace {

void run(const InputContext& context, Findings& out) {
  const std::string& reason = context.input.divider.no_divider;
  if (reason.empty() || !context.input.audited) return;
  model::Finding finding = out.blank();
  finding.message = fmt::format("there is no divider at this input: {}", base::printable(reason));
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule no_divider{model::RuleId::no_divider, Stage::finding, {}, run, nullptr};

}  // namespace judge::rules
