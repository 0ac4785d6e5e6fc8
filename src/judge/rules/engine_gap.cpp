#include <cmath>
#include <fmt/format.h>

#include "base/text.hpp"
#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

// On a linear network the closed form is held against ngspice; on any other, points solved alone against the same
// points of the sweep.
void run(const InputContext& context, Findings& out) {
  const model::AuditedInput& input = context.input;
  const double limit = limit_of(input.divider.input, model::RuleId::engine_gap);
  const bool linear = input.figures.engine_gap_lsb.has_value();
  const double gap = linear ? *input.figures.engine_gap_lsb
                            : input.sweep->alone_difference / std::fabs(input.divider.input.lsb_volts());
  if (gap <= limit) return;
  const Compared texts = compared(gap, limit, base::number_text);
  model::Finding finding = out.blank();
  finding.value = gap;
  finding.limit = limit;
  finding.unit = "LSB";
  if (linear) {
    finding.at = input.sweep->at[input.figures.engine_gap_point];
    finding.message = fmt::format(
        "ngspice and the closed form differ by {} LSB at {}, where {} LSB is the most accepted: one of them is wrong, "
        "so "
        "trust neither before it is known which",
        texts.value, measurand_text(*finding.at, context.unit), texts.limit);
  } else {
    finding.message = fmt::format(
        "points of this nonlinear network that were solved again alone differ by {} LSB from the sweep, where {} LSB "
        "is "
        "the most accepted: the circuit may have more than one solution",
        texts.value, texts.limit);
  }
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule engine_gap{model::RuleId::engine_gap, Stage::sweep, {}, run, nullptr};

}  // namespace judge::rules
