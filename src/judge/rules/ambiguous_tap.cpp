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

double share(const TapCandidate& candidate, const TapCandidate& heaviest) {
  return heaviest.weight_volts > 0 ? candidate.weight_volts / heaviest.weight_volts : 1;
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

// The heaviest candidate is an arm beyond doubt; another one is in doubt unless its role is declared. A weight of
// exactly the limit makes an arm.
void run(const InputContext& context, Findings& out) {
  const auto& candidates = context.input.divider.candidates;
  std::vector<const TapCandidate*> arms;
  for (const TapCandidate& candidate : candidates)
    if (candidate.arm) arms.push_back(&candidate);
  std::stable_sort(arms.begin(), arms.end(),
                   [](const TapCandidate* a, const TapCandidate* b) { return a->weight_volts > b->weight_volts; });
  const double limit = limit_of(context.input.divider.input, model::RuleId::ambiguous_tap);
  const auto clear = [&](const TapCandidate* arm) {
    return arm != arms.front() && (arm->declared || (!arm->only_way && share(*arm, *arms.front()) < limit));
  };
  arms.erase(std::remove_if(arms.begin(), arms.end(), clear), arms.end());
  if (arms.size() < 2) return;

  std::string list;
  for (const TapCandidate* arm : arms)
    list += fmt::format("{}{}", list.empty() ? "" : ", ", weight_text(context.board, *arm));
  model::Finding finding = out.blank();
  finding.value = share(*arms[1], *arms.front());
  finding.limit = limit;
  finding.unit = "fraction";
  if (arms.back()->only_way)
    finding.message = only_way_text(context.board, *arms.back(), *arms.front(), limit);
  else
    finding.message = fmt::format(
        "more than one node counts as an arm ({} of the heaviest is enough): without its branches the pin moves: {}; "
        "where firmware does not reckon with one, say [part.{}] role = \"load\"",
        percent_text(limit), list, first_key(*arms[1]));
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule ambiguous_tap{model::RuleId::ambiguous_tap, Stage::finding, {}, run, nullptr};

}  // namespace judge::rules
