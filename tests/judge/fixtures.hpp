// Invented inputs for the tests of this room: a 12-bit converter over 0 to 3.3 V, three points of a temperature sweep.
#pragma once

#include <string>
#include <vector>

#include "judge/judge.hpp"
#include "judge/rule.hpp"

namespace fixtures {

model::Input converter_input(int bits = 12, double low = 0, double high = 3.3, double gain = 1);

// Volts with fixed ends of the range.
judge::Solved::Volts volts(std::vector<double> pin, double low = 0, double high = 3.3);

// A sweep whose pin reads these fractions, with nothing that loads it.
judge::Solved solved(std::vector<double> at, std::vector<double> readings, const model::Input& input);

// An audited input that no rule finds anything wrong with: -40, 25, 125 degC read 0.9, 0.5 and 0.1 of 12 bits.
model::AuditedInput sound_input();

model::SensorDeclaration accurate_to(double accuracy);

// The findings that one rule has on the input.
model::FindingList findings_of(model::RuleId rule, model::AuditedInput input,
                               const model::SensorDeclaration* sensor = nullptr, const judge::BoardView& board = {});
model::FindingList all_findings(model::AuditedInput input, const model::SensorDeclaration* sensor = nullptr);
model::FindingList board_findings(const judge::BoardFacts& facts, model::BoardReport report = {});

void set_limit(model::AuditedInput& input, std::string rule, double limit);
model::LevelSetting level(std::string rule, std::optional<base::Level> level);
void set_level(model::AuditedInput& input, std::string rule, std::optional<base::Level> level);

// A place in source 0.
source::Span place(std::uint32_t offset, std::uint32_t length = 1);

// A small board whose parts have names and cards: R1 (card 0), J1 (card 1, no model), U7 (card 2, no model "opamp"),
// nets 0, TAP, CONN. `literal` is the span of "4k7" in the first card.
struct SmallBoard {
  SmallBoard();
  base::NameTable names;
  model::Circuit circuit;
  model::Netlist netlist;
  source::Sources sources;
  source::Span literal;
  model::ElementId r1{0}, j1{1}, u7{2};
  model::NetId tap{1}, conn{2};

  [[nodiscard]] judge::BoardView view() const { return {&netlist, &circuit, &names, &sources}; }
};

}  // namespace fixtures
