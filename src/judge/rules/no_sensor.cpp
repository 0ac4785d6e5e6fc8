#include <fmt/format.h>

#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

std::string arms_text(const model::Divider& divider) {
  std::vector<std::string> names;
  for (const auto* arm : {&divider.upper, &divider.lower})
    for (const model::PartName& part : *arm) names.push_back(part.name);
  return names.empty() ? std::string{"what was found"} : list_text(names);
}

void run(const InputContext& context, Findings& out) {
  const model::Divider& divider = context.input.divider;
  if (!context.input.audited || !divider.no_sensor || !divider.no_divider.empty()) return;
  model::Finding finding = out.blank();
  finding.message = fmt::format(
      "nothing in this divider varies ({}), so there is no span to judge; declare the part that does as "
      "[sensor.NAME] with its kind and range, a rail that is watched as kind = \"voltage\"",
      arms_text(divider));
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule no_sensor{model::RuleId::no_sensor, Stage::finding, {}, run, nullptr};

}  // namespace judge::rules
