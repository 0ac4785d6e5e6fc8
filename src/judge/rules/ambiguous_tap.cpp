#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/parts.hpp"
#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

using model::TapCandidate;

std::string branches_text(const TapCandidate& candidate) {
  std::vector<std::string> names;
  for (const model::PartName& part : candidate.branches) names.push_back(part.name);
  return names.empty() ? std::string{"what"} : list_text(names);
}

std::string weight_text(const BoardView& board, const TapCandidate& candidate) {
  return fmt::format("{} at {} by {}", branches_text(candidate), net_name(board, candidate.net),
                     base::si_text(candidate.weight_volts, "V", 3));
}

constexpr double heavy_load = 0.05;  // of the swing: a load that firmware would hardly leave out on purpose

// Below the share that makes an arm, and yet no small part of the reading.
bool is_near_miss(const TapCandidate& candidate) {
  return !candidate.arm && !candidate.declared && candidate.of_swing > heavy_load;
}

std::string first_key(const TapCandidate& arm) {
  return arm.branches.empty() ? "NAME" : toml_key(arm.branches.front().name);
}

// Below the limit, and an arm because a divider needs a second rail.
std::string only_way_text(const BoardView& board, const TapCandidate& arm, const TapCandidate& heaviest, double limit) {
  return fmt::format(
      "without its branches the pin moves: {}, {}; the first is below the {} of the heaviest that makes an arm, and "
      "counts as one because nothing else leads to a second rail; where that is right, say [part.{}] role = \"arm\"",
      weight_text(board, arm), weight_text(board, heaviest), percent_text(limit), first_key(arm));
}

std::string near_miss_text(const BoardView& board, const std::vector<const TapCandidate*>& loads) {
  std::string list;
  for (const TapCandidate* load : loads)
    list += fmt::format("{}{} ({} of its swing)", list.empty() ? "" : ", ", weight_text(board, *load),
                        percent_text(load->of_swing));
  return fmt::format(
      "taken for load, though without its branches the pin moves: {}; where firmware reckons with one, say "
      "[part.{}] role = \"arm\"",
      list, first_key(*loads.front()));
}

// The heaviest candidate is an arm beyond doubt; another one is in doubt unless its role is declared. A weight of
// exactly the limit makes an arm.
std::vector<const TapCandidate*> doubtful_arms(const std::vector<TapCandidate>& candidates, double limit) {
  std::vector<const TapCandidate*> arms;
  for (const TapCandidate& candidate : candidates)
    if (candidate.arm) arms.push_back(&candidate);
  std::stable_sort(arms.begin(), arms.end(),
                   [](const TapCandidate* a, const TapCandidate* b) { return a->share > b->share; });
  const auto clear = [&](const TapCandidate* arm) {
    return arm != arms.front() && (arm->declared || (!arm->only_way && arm->share < limit));
  };
  arms.erase(std::remove_if(arms.begin(), arms.end(), clear), arms.end());
  if (arms.size() < 2) arms.clear();
  return arms;
}

std::string arms_text(const BoardView& board, const std::vector<const TapCandidate*>& arms, double limit) {
  if (arms.back()->only_way) return only_way_text(board, *arms.back(), *arms.front(), limit);
  std::string list;
  for (const TapCandidate* arm : arms) list += fmt::format("{}{}", list.empty() ? "" : ", ", weight_text(board, *arm));
  return fmt::format(
      "more than one node counts as an arm ({} of the heaviest, each at its own node, is enough): without its branches "
      "the pin moves: {}; "
      "where firmware does not reckon with one, say [part.{}] role = \"load\"",
      percent_text(limit), list, first_key(*arms[1]));
}

void run(const InputContext& context, Findings& out) {
  const auto& candidates = context.input.divider.candidates;
  const double limit = limit_of(context.input.divider.input, model::RuleId::ambiguous_tap);
  const auto arms = doubtful_arms(candidates, limit);
  std::vector<const TapCandidate*> near_misses;
  for (const TapCandidate& candidate : candidates)
    if (is_near_miss(candidate)) near_misses.push_back(&candidate);
  if (arms.empty() && near_misses.empty()) return;

  model::Finding finding = out.blank();
  finding.value = arms.empty() ? near_misses.front()->share : arms[1]->share;
  finding.limit = limit;
  finding.unit = "fraction";
  if (!arms.empty()) finding.message = arms_text(context.board, arms, limit);
  if (!near_misses.empty()) finding.message += (arms.empty() ? "" : "; ") + near_miss_text(context.board, near_misses);
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule ambiguous_tap{model::RuleId::ambiguous_tap, Stage::finding, {}, run, nullptr};

}  // namespace judge::rules
