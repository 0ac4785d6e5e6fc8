// A rule as a value: what it needs solved, and how it judges. Each is defined in rules/<identifier>.cpp, in namespace
// judge::rules, under the identifier of its line in model/rules.def.
#pragma once

#include <initializer_list>
#include <optional>
#include <span>

#include "base/level.hpp"
#include "judge/judge.hpp"
#include "model/finding.hpp"
#include "model/plan.hpp"

namespace judge {

// A set of conditions.
class Needs {
 public:
  constexpr Needs(std::initializer_list<model::ConditionKind> kinds) {
    for (const model::ConditionKind kind : kinds) bits_ |= bit(kind);
  }
  [[nodiscard]] constexpr bool has(model::ConditionKind kind) const { return (bits_ & bit(kind)) != 0; }

 private:
  static constexpr unsigned bit(model::ConditionKind kind) { return 1U << static_cast<unsigned>(kind); }
  unsigned bits_ = 0;
};

// Takes the findings of one rule and settles their level: a declared one, else the finding's own, which begins as the
// table's. A rule that is declared "off" has no findings.
class Findings {
 public:
  Findings(model::RuleId rule, std::span<const model::LevelSetting> levels, source::Span where,
           model::FindingList& list)
      : rule_(rule), levels_(levels), where_(where), list_(list) {}

  // A finding of this rule at its usual level and place, to be filled in.
  [[nodiscard]] model::Finding blank() const;
  void add(model::Finding finding);

 private:
  model::RuleId rule_;
  std::span<const model::LevelSetting> levels_;
  source::Span where_;
  model::FindingList& list_;
};

struct BoardContext {
  const model::BoardReport& report;
  const BoardFacts& facts;
};

// When a rule of inputs runs.
enum class Stage : unsigned char {
  finding,  // always: it judges what was found on the board
  sweep,    // only where the input has a sweep and its figures
};

struct Rule {
  model::RuleId id;
  Stage stage = Stage::finding;
  Needs needs{};  // nominal is implied
  void (*run_input)(const InputContext& context, Findings& out) = nullptr;
  void (*run_board)(const BoardContext& context, Findings& out) = nullptr;
};

// Whether a declaration turns the rule off.
[[nodiscard]] bool is_off(std::span<const model::LevelSetting> levels, model::RuleId rule);

// The limit that is declared for the rule, if any: the last one counts.
[[nodiscard]] std::optional<double> declared_limit(const model::Input& input, model::RuleId rule);

}  // namespace judge
