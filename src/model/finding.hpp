// A finding: a value with a rule, a place and a sentence. Reports only render it.
#pragma once

#include <array>
#include <limits>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "base/level.hpp"
#include "source/text.hpp"

namespace model {

enum class RuleId : unsigned char {
#define RULE(identifier, name, level, limit, unit, sentence) identifier,
#include "model/rules.def"
#undef RULE
};

inline constexpr double no_limit = std::numeric_limits<double>::quiet_NaN();

struct RuleText {
  RuleId id;
  std::string_view name;  // kebab-case, published
  base::Level level;      // where neither a declaration nor the rule itself says otherwise
  double limit;           // NaN: none, or worked out from other declarations
  std::string_view unit;
  std::string_view sentence;  // what a finding of this rule means
};

inline constexpr std::array rules{
#define NO_LIMIT no_limit
#define RULE(identifier, name, level, limit, unit, sentence) \
  RuleText{RuleId::identifier, name, base::Level::level, limit, unit, sentence},
#include "model/rules.def"
#undef RULE
#undef NO_LIMIT
};

[[nodiscard]] constexpr const RuleText& rule_text(RuleId id) {
  return rules[static_cast<std::size_t>(id)];
}

struct Finding {
  RuleId rule = RuleId::not_audited;
  base::Level level = base::Level::error;
  std::optional<double> value;
  std::optional<double> limit;
  std::string unit;
  std::optional<double> at;  // measurand
  std::string message;  // what is wrong, the figure, the limit, where, and what would help; no full stop at the end
  bool waived = false;
  source::Span where;
};

using FindingList = std::vector<Finding>;

}  // namespace model
