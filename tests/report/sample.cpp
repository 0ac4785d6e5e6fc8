#include "tests/report/sample.hpp"

#include <cmath>
#include <utility>

namespace sample {
namespace {

using base::Level;
using model::Arm;
using model::RuleId;

constexpr model::NetId air{1}, air_tap{2}, light{3}, battery{4};

model::Input keys(const char* name, model::NetId net) {
  model::Input out;
  out.name = name;
  out.net = net;
  out.converter = "U1";
  out.bits = 12;
  out.high = 3.3;
  out.nominal_high = 3.3;
  return out;
}

model::Finding finding(RuleId rule, Level level, std::string message) {
  model::Finding out;
  out.rule = rule;
  out.level = level;
  out.message = std::move(message);
  return out;
}

void placed(model::Finding& finding, std::uint32_t offset) {
  finding.where = {{source::SourceId{0}, offset}, 2};
}

// A sweep of the plain divider: V = 3.3 Rx / (R + Rx), with an envelope of `spread` volts.
model::Sweep curve(std::vector<double> at, std::vector<double> ohms, double fixed_ohms, double spread) {
  model::Sweep out;
  out.measurand = "temperature";
  out.unit = "degC";
  out.at = std::move(at);
  out.sensor_ohms = std::move(ohms);
  for (const double rx : out.sensor_ohms) {
    const double volts = 3.3 * rx / (fixed_ohms + rx);
    out.bare_volts.push_back(volts);
    out.pin_volts.push_back(volts);
    out.pin_low.push_back(volts - spread);
    out.pin_high.push_back(volts + spread);
    out.code.push_back(std::llround(std::floor(volts / 3.3 * 4096 + 0.5)));
  }
  return out;
}

}  // namespace

model::AuditedInput good() {
  model::AuditedInput out;
  out.audited = true;
  model::Divider& divider = out.divider;
  divider.input = keys("ADC_AIR", air);
  divider.sensor_name = "RT1";
  divider.tap = air_tap;
  divider.upper = {{"R1", {}}};
  divider.lower = {{"RT1", {}}};
  divider.sense = {{"R2", {}}};
  divider.load = {{"C1", {}}, {"D1", {}}};
  divider.upper_rail = "+3V3";
  divider.lower_rail = "0";
  divider.sensor_arm = Arm::lower;
  divider.bare_form = model::OnePort{3.3, 0, 10000};
  divider.nets = {air, air_tap};
  divider.candidates = {{air_tap, 1.62, true, false, {{"R1", {}}}}, {air, 0.0021, false, true, {{"R9", {}}}}};
  out.sweep = curve({-40, 25, 125}, {248277.7, 10000, 530}, 10000, 0.0057);
  model::Figures& figures = out.figures;
  figures.span_use = 0.9109;
  figures.span_best = 0.9117;
  figures.span_reachable = 0.9115;
  figures.best_part = "R1";
  figures.best_ohms = 11500;
  figures.gap_low = 0.0486;
  figures.gap_low_point = 2;
  figures.gap_high = 0.037;
  figures.load_error_lsb = 7.03;
  figures.load_error_measurand = 0.231;
  figures.largest_load.name = "the leakage of ADC_AIR";
  figures.engine_gap_lsb = 0.0;
  figures.pin_source_ohms = 10610;
  return out;
}

model::AuditedInput poor_span() {
  model::AuditedInput out = good();
  out.divider.input = keys("ADC_SOIL", light);
  out.divider.sensor_name = "RT2";
  out.divider.upper = {{"R3", {}}};
  out.divider.lower = {{"RT2", {}}};
  out.divider.sense.clear();
  out.divider.load.clear();
  out.divider.tap = light;
  out.divider.bare_form = model::OnePort{3.3, 0, 1e6};
  out.sweep = curve({-40, 25, 125}, {248277.7, 10000, 530}, 1e6, 0.0);
  out.figures = {};
  out.figures.span_use = 0.1984;
  out.figures.span_best = 0.9117;
  out.figures.gap_low = 0.00053;
  out.figures.gap_low_point = 2;
  out.figures.gap_high = 0.8011;
  model::Finding span =
      finding(RuleId::span_use, Level::warning,
              "ADC_SOIL uses 19.8 % of the range; 50 % is the least allowed; this sensor could use 91.2 %, with R3 at "
              "11.5 kohm");
  span.value = 0.1984;
  span.limit = 0.5;
  span.unit = "fraction";
  placed(span, 16);
  model::Finding gap = finding(RuleId::rail_gap, Level::note,
                               "the reading comes within 0.053 % of the low end at 125 degC; 2 % is to be kept");
  gap.value = 0.00053;
  gap.limit = 0.02;
  gap.unit = "fraction";
  gap.at = 125;
  gap.waived = true;
  out.findings = {span, gap};
  return out;
}

model::AuditedInput swept_rail_off_scale() {
  model::AuditedInput out;
  out.audited = true;
  out.divider.input = keys("ADC_BAT", battery);
  out.divider.sensor_name = "VBAT";
  out.divider.tap = battery;
  out.divider.upper = {{"R5", {}}};
  out.divider.lower = {{"R6", {}}};
  out.divider.upper_rail = "VBAT";
  out.divider.lower_rail = "0";
  model::Sweep sweep;
  sweep.measurand = "voltage";
  sweep.unit = "V";
  sweep.at = {6, 10, 15};
  sweep.bare_volts = {1.5, 2.5, 3.75};
  sweep.pin_volts = {1.5, 2.5, 3.6};
  sweep.pin_low = {1.49, 2.49, 3.59};
  sweep.pin_high = {1.51, 2.51, 3.61};
  sweep.code = {1862, 3103, 4095};
  sweep.rung = model::Rung::tight;
  out.sweep = sweep;
  out.figures.span_use = 0.5454;
  out.figures.span_best = 0.6;
  out.figures.gap_low = 0.4515;
  out.figures.gap_high = -0.0939;
  out.figures.gap_high_point = 2;
  out.figures.load_error_lsb = std::nan("");  // must never come out
  model::Finding off =
      finding(RuleId::off_scale, Level::error, "ADC_BAT passes the high end by 9.39 % of the range at 15 V");
  off.value = 0.0939;
  off.limit = 0.0;
  off.unit = "fraction";
  off.at = 15;
  out.findings = {off};
  return out;
}

model::AuditedInput no_divider() {
  model::AuditedInput out;
  out.audited = true;
  out.divider.input = keys("ADC_SPARE", model::NetId{5});
  out.divider.no_divider = "no resistive way leads from ADC_SPARE to a rail";
  out.findings = {finding(RuleId::no_divider, Level::error, "no resistive way leads from ADC_SPARE to a rail")};
  return out;
}

model::AuditedInput not_audited() {
  model::AuditedInput out;
  out.divider.input = keys("ADC_FLOW", model::NetId{6});
  out.divider.not_audited = {"U7 touches ADC_FLOW and has no model"};
  out.findings = {finding(RuleId::not_audited, Level::error,
                          "U7 touches ADC_FLOW and has no model; declare a stand-in for it, open if it draws nothing")};
  return out;
}

model::AuditedInput hostile() {
  model::AuditedInput out = good();
  out.divider.input.name = "\x1b[2J\"net\"\xff\xE2\x80\xAE";
  out.divider.input.converter = std::string(5000, 'U');
  out.divider.sensor_name = "RT\n1\\";
  for (int i = 0; i < 300; ++i) out.divider.load.push_back({"C" + std::to_string(i), {}});
  out.findings = {
      finding(RuleId::load_error, Level::warning,
              "bytes \x1b[31m and \xff in a message, \xE2\x84\xA6 stays, and " + std::string(3000, 'x') + " is cut")};
  return out;
}

model::BoardReport board(std::vector<model::AuditedInput> inputs) {
  model::BoardReport out;
  out.netlist = "greenhouse.cir";
  out.reading = {128, 100, 8, 19, 1};
  out.inputs = std::move(inputs);
  out.net_names = {
      {model::ground, "0"}, {air, "ADC_AIR"}, {air_tap, "AIR_TAP"}, {light, "ADC_SOIL"}, {battery, "ADC_BAT"}};
  out.sources.add({"greenhouse.cir", "* a greenhouse\n\nR3 +3V3 ADC_SOIL 1MEG\nR? 1\n", {}});
  return out;
}

model::RunReport run(std::vector<model::BoardReport> boards) {
  model::RunReport out;
  out.version = "0.1.0";
  out.simulator = "ngspice-39";
  out.as_of = "2026-12-01";
  out.boards = std::move(boards);
  return out;
}

model::RunReport everything() {
  model::BoardReport one = board({good(), poor_span(), swept_rail_off_scale(), no_divider(), not_audited(), hostile()});
  model::Finding card = finding(RuleId::unreadable_card, Level::warning, "expected a net after R?, got a number");
  placed(card, 38);
  one.findings = {card, finding(RuleId::assumed_value, Level::note, "net AGND was taken as ground")};
  one.not_checked = {"settling (converter.U1.acquisition_time)", "pin-stress (converter.U1.pin_current)"};
  return run({std::move(one)});
}

model::RunReport traced() {
  std::vector<model::AuditedInput> inputs{good(), no_divider(), not_audited()};
  for (model::AuditedInput& input : inputs) {
    input.audited = false;
    input.sweep.reset();
    input.figures = {};
    input.findings.clear();
  }
  model::RunReport out = run({board(std::move(inputs))});
  out.simulator.clear();
  return out;
}

}  // namespace sample
