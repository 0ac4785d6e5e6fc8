#include "report/json.hpp"

#include <cmath>
#include <string_view>

#include <nlohmann/json.hpp>

#include "report/json_points.hpp"
#include "report/summary.hpp"

namespace report {
namespace {

using Json = nlohmann::ordered_json;

// Numbers that are not finite have no place in JSON: the key is left out.
void put(Json& object, const char* key, const std::optional<double>& value) {
  if (value && std::isfinite(*value)) object[key] = *value + 0.0;  // never -0
}

void put(Json& object, const char* key, const std::string& text) {
  if (!text.empty()) object[key] = text;
}

Json names(const std::vector<model::PartName>& parts) {
  Json out = Json::array();
  for (const model::PartName& part : parts) out.push_back(part.name);
  return out;
}

// Without a tap nothing is known of arms: then only the lists that say something are given.
void put(Json& object, const char* key, const std::vector<model::PartName>& parts, bool always) {
  if (always || !parts.empty()) object[key] = names(parts);
}

Json divider_of(const model::Divider& divider, const model::BoardReport& board) {
  Json out = Json::object();
  const bool found = divider.tap.valid() && divider.no_divider.empty();
  put(out, "sensor", divider.sensor_name);
  if (found) put(out, "tap", net_name(board, divider.tap));
  put(out, "upper", divider.upper, found);
  put(out, "lower", divider.lower, found);
  put(out, "sense", divider.sense, found);
  put(out, "load", divider.load, found);
  put(out, "upper_rail", divider.upper_rail);
  put(out, "lower_rail", divider.lower_rail);
  if (divider.sensor_arm) out["sensor_arm"] = *divider.sensor_arm == model::Arm::upper ? "upper" : "lower";
  if (divider.bare_form) {
    put(out, "open_volts", divider.bare_form->open_volts);
    put(out, "short_volts", divider.bare_form->short_volts);
    put(out, "source_ohms", divider.bare_form->source_ohms);
  }
  if (!divider.held.empty()) out["held"] = divider.held;
  put(out, "leakage_counted_with", divider.leakage_where);
  return out;
}

Json sweep_of(const model::Sweep& sweep) {
  Json out{{"measurand", sweep.measurand}, {"unit", sweep.unit}};
  if (sweep.rung != model::Rung::linear) out["rung"] = rung_text(sweep.rung);
  if (sweep.stepped) out["stepped"] = true;
  out["points"] = nullptr;  // with_points() puts them in
  return out;
}

Json figures_of(const model::Figures& figures) {
  Json out = Json::object();
#define FIGURE(name, unit, sentence) put(out, #name, figures.name);
#include "model/figures.def"
#undef FIGURE
  put(out, "best_part", figures.best_part);
  put(out, "best_ohms", figures.best_ohms);
  return out;
}

Json finding_of(const model::Finding& finding, const source::Sources& sources) {
  Json out{{"rule", model::rule_text(finding.rule).name}, {"level", base::level_text(finding.level)}};
  put(out, "value", finding.value);
  put(out, "limit", finding.limit);
  put(out, "unit", finding.unit);
  put(out, "at", finding.at);
  out["message"] = finding.message;
  out["waived"] = finding.waived;
  if (finding.where.valid()) {
    const source::Position position = sources.position(finding.where.begin);
    out["where"] =
        Json{{"file", sources[finding.where.begin.source].name}, {"line", position.line}, {"column", position.column}};
  }
  return out;
}

Json findings_of(const model::FindingList& findings, const source::Sources& sources) {
  Json out = Json::array();
  for (const model::Finding& finding : findings) out.push_back(finding_of(finding, sources));
  return out;
}

Json input_of(const model::AuditedInput& input, const model::BoardReport& board) {
  const model::Input& keys = input.divider.input;
  Json out{{"net", keys.name}, {"converter", keys.converter}, {"bits", keys.bits}};
  put(out, "low", keys.nominal_low);
  put(out, "high", keys.nominal_high);
  out["audited"] = input.audited;
  if (Json divider = divider_of(input.divider, board); !divider.empty()) out["divider"] = std::move(divider);
  if (input.audited && input.sweep) out["sweep"] = sweep_of(*input.sweep);
  if (Json figures = figures_of(input.figures); input.audited && !figures.empty()) out["figures"] = std::move(figures);
  out["findings"] = findings_of(input.findings, board.sources);
  return out;
}

Json board_of(const model::BoardReport& board) {
  const model::ReadingCount& reading = board.reading;
  Json out{{"netlist", board.netlist},
           {"reading",
            {{"cards", reading.cards},
             {"modelled", reading.modelled},
             {"unmodelled", reading.unmodelled},
             {"skipped", reading.skipped},
             {"error", reading.error}}}};
  Json inputs = Json::array();
  for (const model::AuditedInput& input : board.inputs) inputs.push_back(input_of(input, board));
  out["inputs"] = std::move(inputs);
  out["findings"] = findings_of(board.findings, board.sources);
  if (!board.not_checked.empty()) out["not_checked"] = board.not_checked;
  return out;
}

Json summary_of(const Summary& summary) {
  return {{"boards", summary.boards}, {"inputs", summary.inputs},   {"audited", summary.audited},
          {"error", summary.error},   {"warning", summary.warning}, {"note", summary.note},
          {"waived", summary.waived}};
}

// Points are the bulk of a report: written as text, they cost a third of what a tree of them does. Nothing else in the
// document is null, and inside a string the quotes of the key would be escaped.
std::string with_points(const std::string& document, const model::RunReport& report) {
  static constexpr std::string_view place = "\"points\": null";
  std::string out;
  std::size_t from = 0;
  for (const model::BoardReport& board : report.boards)
    for (const model::AuditedInput& input : board.inputs) {
      if (!input.audited || !input.sweep) continue;
      const std::size_t at = document.find(place, from);
      out.append(document, from, at - from);
      append_points(*input.sweep, out);
      from = at + place.size();
    }
  return out.append(document, from);
}

}  // namespace

std::string json(const model::RunReport& report) {
  Json tool{{"name", "tapspan"}, {"version", report.version}};
  put(tool, "simulator", report.simulator);
  Json out{{"schema", "tapspan.report/1"}, {"tool", std::move(tool)}, {"as_of", report.as_of}};
  Json boards = Json::array();
  for (const model::BoardReport& board : report.boards) boards.push_back(board_of(board));
  out["boards"] = std::move(boards);
  out["summary"] = summary_of(summary_of(report));
  return with_points(out.dump(1, ' ', false, Json::error_handler_t::replace), report) + '\n';
}

}  // namespace report
