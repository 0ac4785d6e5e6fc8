// The session's inside: slots for worker processes, one poll loop that carries decks out and answers back.
#pragma once

#include <chrono>
#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <utility>
#include <vector>

#include "simulate/plan_run.hpp"
#include "simulate/session.hpp"
#include "simulate/worker_line.hpp"

namespace simulate {

class Session::Pool {
 public:
  explicit Pool(const SessionOptions& options) : options_(options) {}

  // Starts the first process. Error: it cannot be started.
  [[nodiscard]] base::Result<base::Done> start();

  // From here on every plan fails with this reason.
  void give_up(std::string reason) { broken_ = std::move(reason); }

  void solve(std::span<const model::Plan> plans, const model::Circuit& circuit, const base::NameTable& names,
             const std::function<void(std::size_t, model::Outcome)>& done);

  [[nodiscard]] const std::string& simulator();

 private:
  using Clock = std::chrono::steady_clock;

  // A place for one process and the plan that it works on. Processes come and go, a plan stays until it is done.
  struct Slot {
    std::optional<WorkerLine> line;
    std::optional<PlanRun> run;
    std::size_t plan = 0;
    bool sent = false;                          // the run's deck is with the process
    bool retried = false;                       // it is there for the second time
    std::optional<Clock::time_point> deadline;  // from the plan's first deck on
  };

  struct Work {
    std::span<const model::Plan> plans;
    const model::Circuit* circuit;
    const base::NameTable* names;
    const std::function<void(std::size_t, model::Outcome)>* done;
    std::size_t next = 0;
    std::size_t finished = 0;
  };

  [[nodiscard]] std::size_t slots_for(std::span<const model::Plan> plans) const;
  void advance(Slot& slot, Work& work);
  [[nodiscard]] bool give_plan(Slot& slot, Work& work) const;
  [[nodiscard]] bool send_deck(Slot& slot);
  [[nodiscard]] bool open_line(Slot& slot);
  void wait(std::span<Slot> slots);
  void handle(Slot& slot);
  void take_answer(Slot& slot);
  void lose(Slot& slot, const std::string& why, bool for_good);
  void check_clock(Slot& slot);
  [[nodiscard]] std::optional<Clock::time_point> alarm_of(const Slot& slot) const;
  [[nodiscard]] Clock::duration greeting_limit() const;

  SessionOptions options_;
  std::vector<Slot> slots_;
  std::string simulator_;
  int failed_starts_ = 0;  // in a row
  std::string broken_;     // why no process can be had; empty: one can
};

}  // namespace simulate
