// Solutions -> curve -> figures -> findings. Each rule is a file in rules/ and a line of model/rules.def.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/divider.hpp"
#include "model/figures.hpp"
#include "model/finding.hpp"
#include "model/netlist.hpp"
#include "model/plan.hpp"
#include "model/report.hpp"
#include "model/sheet.hpp"
#include "model/sweep.hpp"
#include "source/text.hpp"

namespace judge {

// The solved plan of an input. All vectors have one value a point of the sweep.
struct Solved {
  std::vector<double> at;           // measurand
  std::vector<double> sensor_ohms;  // empty for a swept rail
  // Volts at the pin and at the ends of the converter's range, all of one condition.
  struct Volts {
    std::vector<double> pin;
    std::vector<double> low;
    std::vector<double> high;
  };
  Volts nominal;
  std::optional<Volts> leakage_high;
  std::optional<Volts> leakage_low;
  // The bare divider at its tap: by ngspice where the arms are not linear, else in closed form. Ends left empty stand
  // for those of `nominal`.
  Volts bare;
  std::vector<double> bare_slope;  // its d(reading)/d(measurand); empty, or not a number: what the points of the sweep
                                   // tell
  std::optional<Volts> closed_form;       // the whole network again, where it is linear; nominal
  std::optional<Volts> closed_form_high;  // and with the leakage's two signs
  std::optional<Volts> closed_form_low;
  model::Rung rung = model::Rung::linear;
  bool stepped = false;
  double alone_difference = 0;  // V at the pin
};

// The curve: every condition as reading u = gain (V - low)/(high - low), volts and ends of the same point and
// condition, put back in nominal volts (Input::volts_of). So what is ratiometric cancels exactly.
[[nodiscard]] model::Sweep curve_of(const model::Input& input, const Solved& solved, std::string measurand,
                                    std::string unit);

// The code of a reading: floor(u 2^bits + 1/2), clipped to 0..2^bits - 1 (the rounding convention; a converter that
// truncates reads half an LSB lower). Not a number reads 0.
[[nodiscard]] long long code_of(double reading, int bits);

// The figures of a curve. What advise found (span_best, span_reachable, best_*), pin_source_ohms and largest_load are
// filled in by the caller before rules run.
[[nodiscard]] model::Figures figures_of(const model::Divider& divider, const Solved& solved, const model::Sweep& sweep);

// Where rules find the names and places of parts. What is null is left out of the messages.
struct BoardView {
  const model::Netlist* netlist = nullptr;
  const model::Circuit* circuit = nullptr;
  const base::NameTable* names = nullptr;
  const source::Sources* sources = nullptr;
};

// What a rule sees of an input.
struct InputContext {
  const model::AuditedInput& input;
  const model::SensorDeclaration* sensor = nullptr;
  std::string unit;  // of the measurand
  BoardView board;
};

// Runs every rule of inputs and appends its findings in the order of rules.def; levels and limits as declared. An input
// that claims a result without having one (no sweep, or a reading that is no number) is set to not audited, with the
// reason in Divider::not_audited. Not for `trace`, which judges nothing.
void judge_input(model::AuditedInput& input, const model::SensorDeclaration* sensor, const BoardView& board = {});

// What the rules of whole boards look at.
struct BoardFacts {
  struct Unreadable {
    source::Span where;  // of the error
    source::Span card;
    std::string reason;     // a clause; empty where none is known
    std::size_t taken = 0;  // further cards that are lost by the same error
  };
  struct Missing {
    source::Span where;
    std::string what;  // which and why, a clause: cannot include "models/clamp.lib": no such file
  };
  struct Elsewhere {
    source::Span where;  // the first of them
    std::size_t count = 0;
  };
  std::vector<Unreadable> unreadable;
  std::vector<Missing> missing_includes;
  std::vector<std::string> assumptions;     // one sentence each, without a full stop
  std::vector<Elsewhere> suspects;          // outside audited networks: one entry a file
  std::vector<model::LevelSetting> levels;  // the sheet's
  source::Span netlist;                     // where findings of the board as a whole are placed
};

// Runs every rule of boards and appends its findings to report.findings in the order of rules.def. Cards are quoted
// where report.sources holds their text.
void judge_board(model::BoardReport& report, const BoardFacts& facts);

// The limit of a rule for an input: declared for it, declared for the board, or the rule's default. NaN: none is
// declared and the rule works it out itself.
[[nodiscard]] double limit_of(const model::Input& input, model::RuleId rule);

struct Rule;

// The rules in the order of rules.def.
[[nodiscard]] std::span<const Rule* const> all_rules();

// The conditions that these rules need solved, each once, in the order of ConditionKind; nominal is always among them.
[[nodiscard]] std::vector<model::ConditionKind> needs_of(std::span<const Rule* const> rules = all_rules());

}  // namespace judge
