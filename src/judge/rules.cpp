#include <array>

#include "judge/rule.hpp"

namespace judge {
namespace rules {

#define RULE(identifier, name, level, limit, unit, sentence) extern const Rule identifier;
#include "model/rules.def"
#undef RULE

namespace {

constexpr std::array table{
#define RULE(identifier, name, level, limit, unit, sentence) &identifier,
#include "model/rules.def"
#undef RULE
};

}  // namespace
}  // namespace rules

std::span<const Rule* const> all_rules() {
  return rules::table;
}

std::vector<model::ConditionKind> needs_of(std::span<const Rule* const> rules) {
  using model::ConditionKind;
  std::vector<ConditionKind> kinds{ConditionKind::nominal};
  for (const auto kind : {ConditionKind::leakage_high, ConditionKind::leakage_low, ConditionKind::bare})
    for (const Rule* rule : rules)
      if (rule->needs.has(kind)) {
        kinds.push_back(kind);
        break;
      }
  return kinds;
}

}  // namespace judge
