#include "simulate/pool.hpp"

#include <algorithm>
#include <cerrno>
#include <fmt/format.h>
#include <poll.h>

namespace simulate {
namespace {

// A second process pays from twice this on.
constexpr std::size_t copies_a_process = 1000;
constexpr int most_failed_starts = 2;

std::chrono::steady_clock::duration seconds(double count) {
  return std::chrono::duration_cast<std::chrono::steady_clock::duration>(
      std::chrono::duration<double>(std::clamp(count, 0.0, 1e8)));
}

}  // namespace

base::Result<base::Done> Session::Pool::start() {
  slots_.resize(1);
  if (!open_line(slots_[0])) return base::Error{broken_};
  return base::Done{};
}

const std::string& Session::Pool::simulator() {
  while (simulator_.empty() && broken_.empty()) {
    if (!slots_[0].line && !open_line(slots_[0])) break;
    wait({slots_.data(), 1});
  }
  return simulator_;
}

void Session::Pool::solve(std::span<const model::Plan> plans, const model::Circuit& circuit,
                          const base::NameTable& names, const std::function<void(std::size_t, model::Outcome)>& done) {
  const std::size_t count = slots_for(plans);
  if (slots_.size() < count) slots_.resize(count);
  const std::span<Slot> slots(slots_.data(), count);
  for (Slot& slot : slots) {
    if (!slot.line && broken_.empty()) (void)open_line(slot);
  }
  Work work{plans, &circuit, &names, &done};
  while (true) {
    for (Slot& slot : slots) advance(slot, work);
    if (work.finished == plans.size()) return;
    wait(slots);
  }
}

std::size_t Session::Pool::slots_for(std::span<const model::Plan> plans) const {
  std::size_t copies = 0;
  for (const model::Plan& plan : plans) copies += plan.points * plan.conditions.size();
  const std::size_t worth = std::max<std::size_t>(1, copies / copies_a_process);
  return std::max<std::size_t>(1, std::min({worth, plans.size(), static_cast<std::size_t>(options_.jobs)}));
}

// Takes a slot as far as it gets without waiting.
void Session::Pool::advance(Slot& slot, Work& work) {
  while (slot.run || give_plan(slot, work)) {
    if (slot.run->deck() != nullptr) {
      if (!broken_.empty()) {
        slot.run->give_up(broken_);
      } else if (slot.sent || (slot.line && !slot.line->ready()) || send_deck(slot)) {
        return;
      }
    } else {
      model::Outcome outcome = slot.run->outcome();
      slot.run.reset();
      ++work.finished;
      (*work.done)(slot.plan, std::move(outcome));
    }
  }
}

bool Session::Pool::give_plan(Slot& slot, Work& work) const {
  if (work.next == work.plans.size()) return false;
  slot.plan = work.next++;
  slot.run.emplace(work.plans[slot.plan], *work.circuit, *work.names);
  slot.sent = false;
  slot.retried = false;
  slot.deadline.reset();
  return true;
}

// False: the plan's state changed, look again.
bool Session::Pool::send_deck(Slot& slot) {
  if (!slot.line) {
    if (!open_line(slot)) slot.run->give_up(broken_);
    return slot.line.has_value();
  }
  if (!slot.deadline) slot.deadline = Clock::now() + seconds(options_.timeout_seconds);
  if (!slot.line->send(slot.run->deck()->request)) {
    slot.run->give_up("the network is too large for the simulator");
    return false;
  }
  slot.sent = true;
  return true;
}

bool Session::Pool::open_line(Slot& slot) {
  auto line =
      WorkerLine::start(options_.worker, static_cast<unsigned>(std::clamp(4 * options_.timeout_seconds, 600.0, 1e9)));
  if (line) {
    slot.line = std::move(line).value();
    return true;
  }
  broken_ = line.error();
  return false;
}

Session::Pool::Clock::duration Session::Pool::greeting_limit() const {
  return seconds(std::clamp(options_.timeout_seconds, 1.0, 10.0));
}

std::optional<Session::Pool::Clock::time_point> Session::Pool::alarm_of(const Slot& slot) const {
  if (!slot.line) return {};
  if (!slot.line->ready()) return slot.line->started_at() + greeting_limit();
  return slot.sent ? slot.deadline : std::nullopt;
}

void Session::Pool::wait(std::span<Slot> slots) {
  std::vector<pollfd> polled;
  std::vector<Slot*> of;
  auto until = Clock::now() + std::chrono::hours(1);
  for (Slot& slot : slots) {
    const auto alarm = alarm_of(slot);
    if (!alarm) continue;
    until = std::min(until, *alarm);
    const int events = POLLIN | (slot.line->wants_to_write() ? POLLOUT : 0);
    polled.push_back({slot.line->socket(), static_cast<short>(events), 0});
    of.push_back(&slot);
  }
  const auto left = std::chrono::ceil<std::chrono::milliseconds>(until - Clock::now()).count();
  const int ready = ::poll(polled.data(), polled.size(), static_cast<int>(std::clamp<long long>(left, 0, 3600000)));
  for (std::size_t i = 0; i < polled.size(); ++i) {
    if (ready > 0 && polled[i].revents != 0) handle(*of[i]);
    check_clock(*of[i]);
  }
}

void Session::Pool::handle(Slot& slot) {
  switch (slot.line->pump()) {
    case WorkerLine::Event::nothing:
      break;
    case WorkerLine::Event::ready:
      failed_starts_ = 0;
      simulator_ = slot.line->library();
      break;
    case WorkerLine::Event::answer:
      take_answer(slot);
      break;
    case WorkerLine::Event::lost:
      lose(slot, slot.line->why_lost(), slot.line->lost_for_good());
      break;
  }
}

void Session::Pool::take_answer(Slot& slot) {
  const Answer& answer = slot.line->last_answer();
  if (answer.verdict == Verdict::solved && answer.values.size() != slot.run->deck()->request.vector_count) {
    return lose(slot, "the simulator process answered nonsense", false);
  }
  slot.sent = false;
  slot.retried = false;
  slot.run->take(answer);
  if (answer.verdict == Verdict::controlled_exit) slot.line.reset();
}

// The same deck goes once more to a fresh process; a second loss is the deck's own.
void Session::Pool::lose(Slot& slot, const std::string& why, bool for_good) {
  const std::string reason = why;  // outlives the line
  const bool was_ready = slot.line->ready();
  slot.line.reset();
  if (for_good || (!was_ready && ++failed_starts_ >= most_failed_starts)) broken_ = reason;
  if (!slot.sent) return;
  slot.sent = false;
  if (slot.retried) slot.run->deck_failed(reason);
  slot.retried = !slot.retried;
}

void Session::Pool::check_clock(Slot& slot) {
  const auto alarm = alarm_of(slot);
  if (!alarm || Clock::now() < *alarm) return;
  if (!slot.line->ready()) {
    broken_ = "the simulator process was not ready in time";
  } else {
    slot.run->give_up(fmt::format("the simulation took more than {:g} s", options_.timeout_seconds));
  }
  slot.sent = false;
  slot.line.reset();
}

}  // namespace simulate
