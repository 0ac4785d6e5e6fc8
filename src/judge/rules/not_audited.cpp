#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/rule.hpp"

namespace judge::rules {
namespace {

void run(const InputContext& context, Findings& out) {
  if (context.input.audited) return;
  std::vector<std::string> reasons = context.input.divider.not_audited;
  if (reasons.empty()) reasons.emplace_back("no result came back, and no reason with it");
  for (const std::string& reason : reasons) {
    model::Finding finding = out.blank();
    finding.message = fmt::format("this input is not audited: {}", base::printable(reason));
    out.add(std::move(finding));
  }
}

}  // namespace

extern constinit const Rule not_audited{model::RuleId::not_audited, Stage::finding, {}, run, nullptr};

}  // namespace judge::rules
