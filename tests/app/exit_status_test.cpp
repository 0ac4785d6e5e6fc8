#include "app/exit_status.hpp"

#include <catch2/catch.hpp>

using app::audit_status;
using app::ExitStatus;
using app::Gate;
using app::trace_status;
using base::Level;

namespace {

model::Finding finding(Level level, bool waived = false) {
  model::Finding out;
  out.level = level;
  out.waived = waived;
  return out;
}

model::AuditedInput input(std::vector<model::Finding> findings = {}) {
  model::AuditedInput out;
  out.audited = true;
  out.findings = std::move(findings);
  return out;
}

model::BoardReport board(std::vector<model::AuditedInput> inputs) {
  model::BoardReport out;
  out.inputs = std::move(inputs);
  return out;
}

model::RunReport run(std::vector<model::BoardReport> boards) {
  model::RunReport out;
  out.boards = std::move(boards);
  return out;
}

ExitStatus with(std::vector<model::Finding> findings, Gate gate) {
  return audit_status(run({board({input(std::move(findings))})}), gate, false);
}

}  // namespace

TEST_CASE("the numbers of the exit statuses are those of the manual") {
  CHECK(static_cast<int>(ExitStatus::passed) == 0);
  CHECK(static_cast<int>(ExitStatus::gated) == 1);
  CHECK(static_cast<int>(ExitStatus::incomplete) == 2);
}

TEST_CASE("a finding fails the run at its own level's gate and at every lower one") {
  const Level levels[]{Level::error, Level::warning, Level::note};
  const Gate gates[]{Gate::error, Gate::warning, Gate::note, Gate::never};
  const ExitStatus table[3][4]{
      {ExitStatus::gated, ExitStatus::gated, ExitStatus::gated, ExitStatus::passed},
      {ExitStatus::passed, ExitStatus::gated, ExitStatus::gated, ExitStatus::passed},
      {ExitStatus::passed, ExitStatus::passed, ExitStatus::gated, ExitStatus::passed},
  };
  for (std::size_t level = 0; level < 3; ++level)
    for (std::size_t gate = 0; gate < 4; ++gate) {
      CAPTURE(level, gate);
      CHECK(with({finding(levels[level])}, gates[gate]) == table[level][gate]);
    }
}

TEST_CASE("a run without findings passes every gate") {
  for (const Gate gate : {Gate::error, Gate::warning, Gate::note, Gate::never})
    CHECK(with({}, gate) == ExitStatus::passed);
}

TEST_CASE("a waived finding fails nothing") {
  CHECK(with({finding(Level::error, true)}, Gate::note) == ExitStatus::passed);
  CHECK(with({finding(Level::error, true), finding(Level::note)}, Gate::note) == ExitStatus::gated);
}

TEST_CASE("a finding of the board counts as one of an input does") {
  model::BoardReport one = board({input()});
  one.findings = {finding(Level::warning)};
  CHECK(audit_status(run({one}), Gate::warning, false) == ExitStatus::gated);
  CHECK(audit_status(run({one}), Gate::error, false) == ExitStatus::passed);
}

TEST_CASE("an input without a result makes the run incomplete, whatever the gate") {
  model::AuditedInput missing = input({finding(Level::error)});
  missing.audited = false;
  for (const Gate gate : {Gate::error, Gate::never})
    CHECK(audit_status(run({board({input()}), board({input(), missing})}), gate, false) == ExitStatus::incomplete);
}

TEST_CASE("a board that was not done in whole makes the run incomplete, and 2 wins over 1") {
  model::BoardReport part = board({input({finding(Level::error)})});
  part.done_in_whole = false;
  CHECK(audit_status(run({board({input()}), part}), Gate::error, false) == ExitStatus::incomplete);
}

TEST_CASE("no board at all and a board without inputs are incomplete") {
  CHECK(audit_status(run({}), Gate::never, false) == ExitStatus::incomplete);
  CHECK(audit_status(run({board({})}), Gate::never, false) == ExitStatus::incomplete);
  CHECK(audit_status(run({board({input()}), board({})}), Gate::never, false) == ExitStatus::incomplete);
}

TEST_CASE("where inputs are picked by name one of the boards must have one") {
  CHECK(audit_status(run({board({input()}), board({})}), Gate::error, true) == ExitStatus::passed);
  CHECK(audit_status(run({board({}), board({})}), Gate::error, true) == ExitStatus::incomplete);
}

TEST_CASE("a trace passes when all could be read, whatever was found") {
  model::AuditedInput traced = input({finding(Level::error)});
  traced.audited = false;
  CHECK(trace_status(run({board({traced})})) == ExitStatus::passed);
  model::BoardReport part = board({});
  part.done_in_whole = false;
  CHECK(trace_status(run({board({}), part})) == ExitStatus::incomplete);
  CHECK(trace_status(run({})) == ExitStatus::incomplete);
  model::BoardReport broken = board({traced});
  broken.reading.error = 1;
  CHECK(trace_status(run({broken})) == ExitStatus::incomplete);
  CHECK(audit_status(run({board({input()})}), Gate::error, false) == ExitStatus::passed);
  model::BoardReport without = board({traced});
  without.include_missing = true;
  CHECK(trace_status(run({without})) == ExitStatus::incomplete);
}
