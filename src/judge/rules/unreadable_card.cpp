#include <fmt/format.h>

#include "judge/parts.hpp"
#include "judge/rule.hpp"

namespace judge::rules {
namespace {

// A file that is no netlist at all has as many unreadable cards as lines; beyond these they are counted only.
constexpr std::size_t most_told = 20;

void run(const BoardContext& context, Findings& out) {
  const auto& cards = context.facts.unreadable;
  for (std::size_t i = 0; i < cards.size() && i < most_told; ++i) {
    const std::string text = quoted(context.report.sources, cards[i]);
    model::Finding finding = out.blank();
    if (cards[i].valid()) finding.where = cards[i];
    finding.message = fmt::format("this card could not be read and is left out{}{}", text.empty() ? "" : ": ", text);
    out.add(std::move(finding));
  }
  if (cards.size() <= most_told) return;
  model::Finding finding = out.blank();
  if (cards[most_told].valid()) finding.where = cards[most_told];
  finding.message = fmt::format("from here on {} more could not be read and {} left out", cards.size() - most_told,
                                cards.size() - most_told == 1 ? "is" : "are");
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule unreadable_card{model::RuleId::unreadable_card, Stage::finding, {}, nullptr, run};

}  // namespace judge::rules
