#include "simulate/plan_run.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <string_view>

#include "base/text.hpp"

namespace simulate {
namespace {

constexpr std::size_t linear_copies = 100;
constexpr std::size_t nonlinear_copies = 26;
constexpr std::size_t most_chunk_branches = 4000;

// Beyond this no board's node is; a division by nothing in an expression ends at 1e32 without a word.
constexpr double most_credible = 1e9;

Tolerances tolerances_of(bool linear, bool tight) {
  return linear ? Tolerances::none : tight ? Tolerances::tight : Tolerances::medium;
}

std::string_view meaning_of(Verdict verdict) {
  switch (verdict) {
    case Verdict::solved:
      break;
    case Verdict::load_text:
      return "ngspice did not accept the deck";
    case Verdict::analysis_text:
      return "ngspice found no clean operating point";
    case Verdict::wrong_plot:
      return "ngspice gave no operating point";
    case Verdict::bad_vector:
      return "ngspice gave no finite value for a node";
    case Verdict::controlled_exit:
      return "ngspice gave up";
  }
  return "ngspice needed stepping where none is allowed";
}

std::string sentence(const Answer& answer) {
  std::string text(meaning_of(answer.verdict));
  if (!answer.text.empty()) text += ": " + base::printable_short(answer.text, 120);
  return text;
}

bool credible(const Answer& answer) {
  return std::all_of(answer.values.begin(), answer.values.end(),
                     [](double value) { return std::fabs(value) <= most_credible; });
}

model::Rung rung_of(std::size_t stage) {
  constexpr model::Rung rungs[] = {model::Rung::linear, model::Rung::tight, model::Rung::medium, model::Rung::single,
                                   model::Rung::single};
  return rungs[stage];
}

}  // namespace

PlanRun::PlanRun(const model::Plan& plan, const model::Circuit& circuit, const base::NameTable& names) : plan_(&plan) {
  auto writer = DeckWriter::prepare(plan, circuit, names);
  if (!writer) {
    failure_ = writer.error();
    return;
  }
  writer_ = std::move(writer).value();
  const std::size_t copies = plan.points * plan.conditions.size();
  solution_.volts.resize(copies * plan.watched.size());
  solution_.amperes.resize(copies * plan.watched_currents.size());
  stages_.resize(copies);
  by_itself_.resize(copies);
  repeated_ = writer_->linear();
  split_into_chunks();
}

// Chunks of even size: a linear plan's are of about linear_copies, a nonlinear plan's of at most nonlinear_copies.
void PlanRun::split_into_chunks() {
  const std::size_t copies = stages_.size();
  const std::size_t by_size = most_chunk_branches / std::max<std::size_t>(1, writer_->branches());
  const std::size_t limit =
      std::max<std::size_t>(1, writer_->linear() ? linear_copies + linear_copies / 2 : nonlinear_copies);
  const std::size_t most = std::clamp<std::size_t>(by_size, 1, limit);
  std::size_t chunks = (copies + most - 1) / most;
  if (writer_->linear()) chunks = std::max(chunks, (copies + linear_copies / 2) / linear_copies);
  const Stage stage = writer_->linear() ? Stage::linear : Stage::tight;
  for (std::size_t i = chunks; i-- > 0;) {
    const std::size_t first = copies * i / chunks;
    open_.push_back({first, copies * (i + 1) / chunks - first, stage, false});
  }
}

const Deck* PlanRun::deck() {
  if (!failure_.empty()) return nullptr;
  if (deck_) return &*deck_;
  if (open_.empty() && !repeated_) add_alone_copies();
  if (open_.empty()) return nullptr;
  const Chunk& chunk = open_.back();
  const bool tight = chunk.stage == Stage::tight || chunk.stage == Stage::last_tight;
  auto deck = writer_->write(chunk.first, chunk.count, tolerances_of(writer_->linear(), tight));
  if (!deck) {
    failure_ = deck.error();
    return nullptr;
  }
  deck_ = std::move(deck).value();
  return &*deck_;
}

void PlanRun::take(const Answer& answer) {
  const Chunk chunk = open_.back();
  if (answer.verdict != Verdict::solved) return deck_failed(sentence(answer));
  const bool last = chunk.stage == Stage::last_tight || chunk.stage == Stage::last_medium;
  if (answer.stepped && !last) return deck_failed(sentence(answer));
  if (!credible(answer)) return deck_failed("ngspice gave a value beyond any that a board can have");
  if (chunk.alone) {
    compare(answer);
  } else {
    keep(answer);
  }
  solution_.rung = std::max(solution_.rung, rung_of(static_cast<std::size_t>(chunk.stage)));
  solution_.stepped = solution_.stepped || answer.stepped;
  open_.pop_back();
  deck_.reset();
}

// Up the ladder with the whole chunk, then into halves, then up to the last rung with single copies.
void PlanRun::deck_failed(const std::string& why) {
  const Chunk chunk = open_.back();
  open_.pop_back();
  deck_.reset();
  const auto again = [&](Stage stage) { open_.push_back({chunk.first, chunk.count, stage, chunk.alone}); };
  if (chunk.stage == Stage::tight) return again(Stage::medium);
  if (chunk.count > 1) {
    const std::size_t half = (chunk.count + 1) / 2;
    open_.push_back({chunk.first + half, chunk.count - half, chunk.stage, chunk.alone});
    open_.push_back({chunk.first, half, chunk.stage, chunk.alone});
    return;
  }
  if (chunk.stage == Stage::medium) return again(Stage::last_tight);
  if (chunk.stage == Stage::last_tight) return again(Stage::last_medium);
  failure_ = why;
}

void PlanRun::give_up(const std::string& why) {
  if (failure_.empty()) failure_ = why;
}

double PlanRun::number(const Answer& answer, std::size_t place) const {
  const std::uint32_t at = deck_->places[place];
  return at == Deck::zero ? 0.0 : answer.values[at] + 0.0;
}

void PlanRun::keep(const Answer& answer) {
  const Chunk& chunk = open_.back();
  const std::size_t watched = plan_->watched.size();
  const std::size_t currents = plan_->watched_currents.size();
  std::size_t place = 0;
  for (std::size_t copy = chunk.first; copy < chunk.first + chunk.count; ++copy) {
    for (std::size_t w = 0; w < watched; ++w) solution_.volts[copy * watched + w] = number(answer, place++);
    for (std::size_t w = 0; w < currents; ++w) solution_.amperes[copy * currents + w] = number(answer, place++);
    stages_[copy] = chunk.stage;
    by_itself_[copy] = chunk.count == 1;
  }
}

void PlanRun::compare(const Answer& answer) {
  const std::size_t watched = plan_->watched.size();
  const std::size_t copy = open_.back().first;
  for (std::size_t w = 0; w < watched; ++w) {
    const double difference = std::fabs(number(answer, w) - solution_.volts[copy * watched + w]);
    solution_.alone_difference = std::max(solution_.alone_difference, difference);
  }
}

// First, last and extreme points of the first watched node in the nominal condition.
std::vector<std::size_t> PlanRun::copies_to_repeat() const {
  const std::size_t watched = plan_->watched.size();
  if (stages_.empty() || watched == 0) return {};
  std::size_t nominal = 0;
  while (nominal < plan_->conditions.size() && plan_->conditions[nominal].kind != model::ConditionKind::nominal)
    ++nominal;
  if (nominal == plan_->conditions.size()) nominal = 0;
  const std::size_t begin = nominal * plan_->points;
  const std::size_t end = begin + plan_->points;
  std::size_t least = begin;
  std::size_t most = begin;
  for (std::size_t copy = begin; copy < end; ++copy) {
    if (solution_.volts[copy * watched] < solution_.volts[least * watched]) least = copy;
    if (solution_.volts[copy * watched] > solution_.volts[most * watched]) most = copy;
  }
  std::vector<std::size_t> copies{begin, least, most, end - 1};
  std::sort(copies.begin(), copies.end());
  copies.erase(std::unique(copies.begin(), copies.end()), copies.end());
  return copies;
}

void PlanRun::add_alone_copies() {
  repeated_ = true;
  const std::vector<std::size_t> copies = copies_to_repeat();
  for (auto copy = copies.rbegin(); copy != copies.rend(); ++copy) {
    if (!by_itself_[*copy]) open_.push_back({*copy, 1, stages_[*copy], true});
  }
}

model::Outcome PlanRun::outcome() {
  if (!failure_.empty()) return {std::nullopt, failure_};
  return {std::move(solution_), {}};
}

}  // namespace simulate
