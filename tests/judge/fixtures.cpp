#include "judge/fixtures.hpp"

#include <utility>

namespace fixtures {

model::Input converter_input(int bits, double low, double high, double gain) {
  model::Input input;
  input.name = "ADC_AIR";
  input.bits = bits;
  input.low = low;
  input.high = high;
  input.nominal_low = low;
  input.nominal_high = high;
  input.gain = gain;
  input.declared_at = place(7);
  return input;
}

judge::Solved::Volts volts(std::vector<double> pin, double low, double high) {
  const std::size_t points = pin.size();
  return {std::move(pin), std::vector<double>(points, low), std::vector<double>(points, high)};
}

judge::Solved solved(std::vector<double> at, std::vector<double> readings, const model::Input& input) {
  for (double& reading : readings) reading = input.volts_of(reading);
  judge::Solved out;
  out.at = std::move(at);
  out.sensor_ohms.assign(out.at.size(), 1000);
  out.nominal = volts(std::move(readings), input.nominal_low, input.nominal_high);
  out.bare = out.nominal;
  return out;
}

model::AuditedInput sound_input() {
  model::AuditedInput input;
  input.audited = true;
  input.divider.input = converter_input();
  const judge::Solved points = solved({-40, 25, 125}, {0.9, 0.5, 0.1}, input.divider.input);
  input.sweep = judge::curve_of(input.divider.input, points, "temperature", "degC");
  input.figures = judge::figures_of(input.divider, points, *input.sweep);
  input.figures.engine_gap_lsb = 0;
  return input;
}

model::SensorDeclaration accurate_to(double accuracy) {
  model::SensorDeclaration sensor;
  sensor.accuracy = model::Declared<double>{accuracy, {}};
  return sensor;
}

model::FindingList all_findings(model::AuditedInput input, const model::SensorDeclaration* sensor) {
  judge::judge_input(input, sensor);
  return input.findings;
}

model::FindingList findings_of(model::RuleId rule, model::AuditedInput input, const model::SensorDeclaration* sensor,
                               const judge::BoardView& board) {
  judge::judge_input(input, sensor, board);
  model::FindingList found;
  for (const model::Finding& finding : input.findings)
    if (finding.rule == rule) found.push_back(finding);
  return found;
}

model::FindingList board_findings(const judge::BoardFacts& facts, model::BoardReport report) {
  judge::judge_board(report, facts);
  return report.findings;
}

void set_limit(model::AuditedInput& input, std::string rule, double limit) {
  input.divider.input.limits.push_back({std::move(rule), {limit, {}}});
}

model::LevelSetting level(std::string rule, std::optional<base::Level> level) {
  return {std::move(rule), {level, {}}};
}

void set_level(model::AuditedInput& input, std::string rule, std::optional<base::Level> wanted) {
  input.divider.input.levels.push_back(level(std::move(rule), wanted));
}

source::Span place(std::uint32_t offset, std::uint32_t length) {
  return {{source::SourceId{0}, offset}, length};
}

SmallBoard::SmallBoard() {
  const std::string text = "R1 TAP 0 4k7\nJ1 CONN 0 HEADER\nX1.U7 TAP CONN opamp\n";
  sources.add({"invented.cir", text, std::nullopt});
  literal = place(9, 3);
  const auto card = [&](std::uint32_t begin, std::uint32_t end) {
    netlist.cards.push_back({source::SourceId{0}, begin, end, model::CardFate::modelled});
  };
  card(0, 12);
  card(13, 29);
  card(30, 50);
  for (const char* net : {"0", "TAP", "CONN"}) circuit.nets.push_back({names.intern(net)});
  const auto element = [&](const char* name, std::uint32_t index, char letter, model::Part part) {
    model::Element made;
    made.name = names.intern(name);
    made.card = model::CardId{index};
    made.letter = letter;
    made.part = std::move(part);
    circuit.elements.push_back(std::move(made));
  };
  element("R1", 0, 'r', model::Resistor{{4700, {}}});
  element("J1", 1, 'j', model::Unmodelled{model::Unmodelled::Why::no_value, {}});
  element("X1.U7", 2, 'u', model::Unmodelled{model::Unmodelled::Why::no_model, names.intern("opamp")});
}

}  // namespace fixtures
