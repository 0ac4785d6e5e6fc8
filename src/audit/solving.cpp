#include "audit/solving.hpp"

#include <optional>
#include <string>
#include <utility>
#include <vector>

#include "audit/advice.hpp"
#include "audit/plans.hpp"
#include "audit/reading_form.hpp"
#include "judge/judge.hpp"
#include "sensor/law.hpp"

namespace audit {
namespace {

// An input on its way through the simulator.
struct Job {
  std::size_t input = 0;  // in the report
  Prepared prepared;
  std::size_t whole_plan = 0;
  std::optional<model::Outcome> whole;
  std::optional<model::Outcome> bare;
};

class Solving {
 public:
  Solving(const Reading& reading, std::size_t points, model::BoardReport& report)
      : reading_(reading), points_(points), report_(report) {}

  void run(simulate::Session& session) {
    for (std::size_t i = 0; i < report_.inputs.size(); ++i) prepare_input(i);
    session.solve(plans_, reading_.circuit, reading_.names,
                  [this](std::size_t plan, model::Outcome outcome) { take(plan, std::move(outcome)); });
  }

 private:
  [[nodiscard]] const model::SensorDeclaration* sensor_of(const model::Divider& divider) const {
    return divider.sensor ? &reading_.sheet.sensors[*divider.sensor] : nullptr;
  }

  void prepare_input(std::size_t i) {
    model::AuditedInput& input = report_.inputs[i];
    const model::SensorDeclaration* sensor = sensor_of(input.divider);
    if (!input.divider.not_audited.empty()) return judge(input);
    if (sensor == nullptr || !input.divider.no_divider.empty() || input.divider.no_sensor) {
      input.audited = true;  // the finding is the result
      return judge(input);
    }
    auto prepared = prepare(input.divider, reading_.circuit, *sensor, needs_, points_);
    if (!prepared.ok()) return fail(input, prepared.error());
    const std::size_t job = jobs_.size();
    plans_.push_back(std::move(prepared->whole));
    owners_.push_back({job, false});
    if (prepared->bare) {
      plans_.push_back(std::move(*prepared->bare));
      owners_.push_back({job, true});
    }
    jobs_.push_back({i, std::move(*prepared), 0, std::nullopt, std::nullopt});
  }

  void take(std::size_t plan, model::Outcome outcome) {
    const auto [index, is_bare] = owners_[plan];
    Job& job = jobs_[index];
    if (!is_bare) job.whole_plan = plan;
    (is_bare ? job.bare : job.whole) = std::move(outcome);
    if (!job.whole || (job.prepared.bare && !job.bare)) return;
    finish(job);
    job = Job{};  // its volts are no longer needed
  }

  void finish(const Job& job) {
    model::AuditedInput& input = report_.inputs[job.input];
    for (const auto* outcome : {&job.whole, &job.bare})
      if (*outcome && !(*outcome)->solution) return fail(input, (*outcome)->failure);
    auto solved = solved_of(input.divider, job.prepared, plans_[job.whole_plan], *job.whole->solution,
                            job.bare ? &*job.bare->solution : nullptr);
    if (!solved.ok()) return fail(input, solved.error());
    if (std::string why = turning_range(*solved); !why.empty()) return fail(input, std::move(why));
    settle_range(input.divider, *solved);
    const sensor::Kind* kind = sensor::find_kind(sensor_of(input.divider)->kind.value);
    input.sweep = judge::curve_of(input.divider.input, *solved, std::string(kind->measurand), std::string(kind->unit));
    input.figures = judge::figures_of(input.divider, *solved, *input.sweep);
    add_advice(input.divider, job.prepared, *solved, input.figures);
    settle_form(input.divider, *solved);
    input.audited = true;
    judge(input);
  }

  void fail(model::AuditedInput& input, std::string why) {
    input.divider.not_audited.push_back(std::move(why));
    judge(input);
  }

  void judge(model::AuditedInput& input) {
    judge::judge_input(input, sensor_of(input.divider),
                       {&reading_.netlist, &reading_.circuit, &reading_.names, &reading_.sources});
  }

  struct Owner {
    std::size_t job = 0;
    bool is_bare = false;
  };

  const Reading& reading_;
  std::size_t points_;
  model::BoardReport& report_;
  std::vector<model::ConditionKind> needs_ = judge::needs_of();
  std::vector<model::Plan> plans_;
  std::vector<Owner> owners_;
  std::vector<Job> jobs_;
};

}  // namespace

void solve_and_judge(const Reading& reading, std::size_t points, simulate::Session& session,
                     model::BoardReport& report) {
  Solving(reading, points, report).run(session);
}

}  // namespace audit
