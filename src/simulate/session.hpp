// Plans -> decks -> ngspice in worker processes -> solutions. Nothing of a netlist's text reaches a deck: nodes and
// elements get names of our own, values are plain decimal numbers.
#pragma once

#include <filesystem>
#include <functional>
#include <memory>
#include <span>
#include <string>

#include "base/names.hpp"
#include "base/result.hpp"
#include "model/circuit.hpp"
#include "model/plan.hpp"
#include "model/sweep.hpp"

namespace simulate {

struct SessionOptions {
  std::filesystem::path worker;  // the worker's executable
  unsigned jobs = 1;             // worker processes at most
  double timeout_seconds = 20;   // a plan, wall clock, all its decks together
};

// Worker processes that live as long as the session. Opening starts the first of them, so that it wakes up while the
// netlist is read.
class Session {
 public:
  // Does not wait for it. Error: the worker cannot be started. One that starts but does not speak our protocol, or is
  // not ready in time, fails every plan with a sentence that says so.
  [[nodiscard]] static base::Result<Session> open(const SessionOptions& options);

  // A session without any worker: every plan fails with `reason`.
  [[nodiscard]] static Session without_worker(std::string reason);

  Session(Session&&) noexcept;
  Session& operator=(Session&&) noexcept;
  ~Session();  // kills and reaps the workers, removes their private directory

  // `names` holds the parameter names of the circuit's device models. Solves every plan and calls `done(index,
  // outcome)` once for each, in any order; the outcome itself does not depend on jobs, order or time (but for a plan
  // that runs out of time). A plan that fails, hangs or crashes its worker costs only itself.
  void solve(std::span<const model::Plan> plans, const model::Circuit& circuit, const base::NameTable& names,
             const std::function<void(std::size_t, model::Outcome)>& done);

  // "ngspice-39", as the worker's library says of itself; waits for the worker to be ready. Empty if it never is.
  [[nodiscard]] const std::string& simulator() const;

 private:
  class Pool;
  explicit Session(std::unique_ptr<Pool> pool);
  std::unique_ptr<Pool> pool_;
};

}  // namespace simulate
