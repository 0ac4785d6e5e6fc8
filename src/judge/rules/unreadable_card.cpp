#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/rule.hpp"

namespace judge::rules {
namespace {

// A file that is no netlist at all has as many unreadable cards as lines; beyond these they are counted only.
constexpr std::size_t most_told = 20;

// The card in one line, all of its lines joined.
std::string card_text(const source::Sources& sources, source::Span span) {
  if (!span.valid() || span.begin.source.index() >= sources.size()) return {};
  std::string text;
  for (const char c : sources.text(span)) {
    const bool blank = c == '\r' || c == '\n' || c == ' ' || c == '\t';
    if (!blank) text += c;
    if (blank && !text.empty() && text.back() != ' ') text += ' ';
  }
  if (!text.empty() && text.back() == ' ') text.pop_back();
  return base::printable_short(text);
}

std::string message_of(const source::Sources& sources, const BoardFacts::Unreadable& card) {
  std::string message = "this card could not be read and is left out";
  if (const std::string text = card_text(sources, card.card); !text.empty()) message += fmt::format(": \"{}\"", text);
  if (!card.reason.empty()) message += fmt::format("; {}", base::printable(card.reason));
  if (card.taken == 1) message += "; so is the card behind it";
  if (card.taken > 1) message += fmt::format("; so are the {} cards behind it", card.taken);
  return message;
}

void run(const BoardContext& context, Findings& out) {
  const auto& cards = context.facts.unreadable;
  for (std::size_t i = 0; i < cards.size() && i < most_told; ++i) {
    model::Finding finding = out.blank();
    if (cards[i].where.valid()) finding.where = cards[i].where;
    finding.message = message_of(context.report.sources, cards[i]);
    out.add(std::move(finding));
  }
  if (cards.size() <= most_told) return;
  std::size_t more = 0;
  for (std::size_t i = most_told; i < cards.size(); ++i) more += 1 + cards[i].taken;
  model::Finding finding = out.blank();
  if (cards[most_told].where.valid()) finding.where = cards[most_told].where;
  finding.message =
      fmt::format("from here on {} more could not be read and {} left out", more, more == 1 ? "is" : "are");
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule unreadable_card{model::RuleId::unreadable_card, Stage::finding, {}, nullptr, run};

}  // namespace judge::rules
