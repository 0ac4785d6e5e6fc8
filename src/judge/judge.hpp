// Solutions -> curve -> figures -> findings. Each rule is a file in rules/ and a line of model/rules.def.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "model/divider.hpp"
#include "model/figures.hpp"
#include "model/finding.hpp"
#include "model/plan.hpp"
#include "model/report.hpp"
#include "model/sheet.hpp"
#include "model/sweep.hpp"

namespace judge {

// The curve of an input out of its solved plan: readings of the pin under each condition, at the nominal range.
// `bare` is the bare divider's plan solved (by ngspice where the arms are not linear, else in closed form).
struct Solved {
  std::vector<double> at;           // measurand
  std::vector<double> sensor_ohms;  // empty for a swept rail
  // Volts a point at the pin and at the ends of the converter's range, nominal and with the leakage's two signs.
  struct Volts {
    std::vector<double> pin;
    std::vector<double> low;   // one a point
    std::vector<double> high;
  };
  Volts nominal;
  std::optional<Volts> leakage_high;
  std::optional<Volts> leakage_low;
  Volts bare;
  std::optional<Volts> closed_form;  // the whole network again, where it is linear; nominal
  model::Rung rung = model::Rung::linear;
  bool stepped = false;
  double alone_difference = 0;  // V at the pin
};

[[nodiscard]] model::Sweep curve_of(const model::Input& input, const Solved& solved, std::string measurand, std::string unit);

// The figures of a curve. What advise found is filled in by the caller before rules run.
[[nodiscard]] model::Figures figures_of(const model::Divider& divider, const Solved& solved, const model::Sweep& sweep);

// What a rule sees of an input.
struct InputContext {
  const model::AuditedInput& input;
  const model::SensorDeclaration* sensor = nullptr;
  std::string unit;  // of the measurand
};

// Runs every rule of inputs and appends its findings in the order of rules.def; levels and limits as declared.
void judge_input(model::AuditedInput& input, const model::SensorDeclaration* sensor);

// The limit of a rule for an input: declared for it, declared for the board, or the rule's default.
[[nodiscard]] double limit_of(const model::Input& input, model::RuleId rule);

}  // namespace judge
