#include "report/json.hpp"

#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <limits>
#include <set>

#include <catch2/catch.hpp>
#include <nlohmann/json.hpp>

#include "tests/report/golden.hpp"
#include "tests/report/sample.hpp"

using Json = nlohmann::ordered_json;

namespace {

Json parsed(const model::RunReport& run) {
  return Json::parse(report::json(run));
}
Json of(model::AuditedInput input) {
  return parsed(sample::run({sample::board({std::move(input)})}))["boards"][0]["inputs"][0];
}

std::vector<std::string> keys(const Json& object) {
  std::vector<std::string> out;
  for (const auto& item : object.items()) out.push_back(item.key());
  return out;
}

using Keys = std::vector<std::string>;

// Exit status of the validator on these reports, with the schema closed against unknown keys. What it says is shown
// only where no error is expected.
int validated(const std::vector<std::string>& documents, bool quiet = false) {
  std::string name = (std::filesystem::temp_directory_path() / "report_test_XXXXXX").string();
  const std::filesystem::path folder = ::mkdtemp(name.data());
  std::string command = std::string("python3 ") + REPORT_VALIDATOR + " " + REPORT_SCHEMA;
  for (std::size_t i = 0; i < documents.size(); ++i) {
    const std::filesystem::path path = folder / (std::to_string(i) + ".json");
    std::ofstream(path, std::ios::binary) << documents[i];
    command += " " + path.string();
  }
  if (quiet) command += " >/dev/null";
  const int status = std::system(command.c_str());
  std::filesystem::remove_all(folder);
  return status;
}

}  // namespace

TEST_CASE("the JSON of a whole run is its golden file") {
  const std::string now = report::json(sample::run({sample::board({sample::good(), sample::poor_span()})}));
  CHECK(golden("report.json", now) == now);
}

TEST_CASE("keys come in the published order") {
  const Json report = parsed(sample::everything());
  CHECK(keys(report) == Keys{"schema", "tool", "as_of", "boards", "summary"});
  CHECK(keys(report["boards"][0]) == Keys{"netlist", "reading", "inputs", "findings", "not_checked"});
  const Json& input = report["boards"][0]["inputs"][0];
  CHECK(keys(input) ==
        Keys{"net", "converter", "bits", "low", "high", "audited", "divider", "sweep", "figures", "findings"});
  CHECK(keys(input["divider"]) == Keys{"sensor", "tap", "upper", "lower", "sense", "load", "upper_rail", "lower_rail",
                                       "sensor_arm", "open_volts", "short_volts", "source_ohms"});
  CHECK(keys(input["sweep"]["points"][0]) ==
        Keys{"at", "sensor_ohms", "bare_volts", "pin_volts", "pin_low", "pin_high", "code"});
  const Json& finding = report["boards"][0]["inputs"][1]["findings"][0];
  CHECK(keys(finding) == Keys{"rule", "level", "value", "limit", "unit", "message", "waived", "where"});
  CHECK(keys(finding["where"]) == Keys{"file", "line", "column"});
  CHECK(keys(report["summary"]) == Keys{"boards", "inputs", "audited", "error", "warning", "note", "waived"});
}

TEST_CASE("every report is valid against the schema") {
  CHECK(validated({report::json(sample::everything()), report::json(sample::traced()), report::json(sample::run({})),
                   report::json(sample::run({sample::board({})}))}) == 0);
}

TEST_CASE("the validator refuses unknown keys, wrong types, missing keys and numbers that are none") {
  const Json good = parsed(sample::everything());
  Json unknown = good;
  unknown["boards"][0]["inputs"][0]["figures"]["span_used"] = 0.5;
  Json null = good;
  null["boards"][0]["inputs"][0]["figures"]["span_use"] = nullptr;
  Json missing = good;
  missing["summary"].erase("waived");
  Json swept = good;
  swept["boards"][0]["inputs"][0]["audited"] = false;
  for (const Json& wrong : {unknown, null, missing, swept}) CHECK(validated({wrong.dump()}, true) != 0);
  CHECK(validated({R"({"schema": NaN})"}, true) != 0);
  CHECK(validated({"{"}, true) != 0);
}

TEST_CASE("the schema knows exactly the figures of the table") {
  std::ifstream in(REPORT_SCHEMA);
  const Json schema = Json::parse(in);
  std::set<std::string> known;
  for (const std::string& key : keys(schema["$defs"]["figures"]["properties"])) known.insert(key);
  std::set<std::string> table{"best_part", "best_ohms"};
#define FIGURE(name, unit, sentence) table.insert(#name);
#include "model/figures.def"
#undef FIGURE
  CHECK(known == table);
}

TEST_CASE("places are file, line and column as separate values") {
  const Json where = of(sample::poor_span())["findings"][0]["where"];
  CHECK(where["file"] == "greenhouse.cir");
  CHECK(where["line"] == 3);
  CHECK(where["column"] == 1);
}

TEST_CASE("what does not apply is absent") {
  const Json nothing = of(sample::no_divider());
  CHECK(nothing["audited"] == true);
  CHECK_FALSE(nothing.contains("divider"));
  CHECK_FALSE(nothing.contains("sweep"));
  CHECK_FALSE(nothing.contains("figures"));
  const Json rail = of(sample::swept_rail_off_scale());
  CHECK_FALSE(rail["sweep"]["points"][0].contains("sensor_ohms"));
  CHECK_FALSE(rail["divider"].contains("open_volts"));
  CHECK(rail["sweep"]["rung"] == "tight");
  CHECK_FALSE(of(sample::good())["sweep"].contains("rung"));
  CHECK_FALSE(parsed(sample::traced())["tool"].contains("simulator"));
  CHECK_FALSE(parsed(sample::traced())["boards"][0].contains("not_checked"));
}

TEST_CASE("an end of the range whose volts are not known is absent, never 0") {
  model::AuditedInput input = sample::not_audited();
  input.divider.input.nominal_high = std::numeric_limits<double>::quiet_NaN();
  const Json out = of(input);
  CHECK_FALSE(out.contains("high"));
  CHECK(out["low"] == 0.0);
}

TEST_CASE("an empty arm, sense path or load of a divider is an empty list") {
  model::AuditedInput input = sample::good();
  input.divider.upper.clear();
  input.divider.load.clear();
  const Json divider = of(input)["divider"];
  CHECK(divider["upper"] == Json::array());
  CHECK(divider["load"] == Json::array());
}

TEST_CASE("an input that is not audited has no sweep and no figures, whatever is left in it") {
  model::AuditedInput input = sample::good();
  input.audited = false;
  const Json out = of(input);
  CHECK(out["audited"] == false);
  CHECK_FALSE(out.contains("sweep"));
  CHECK_FALSE(out.contains("figures"));
  CHECK(out["divider"]["tap"] == "AIR_TAP");
}

TEST_CASE("numbers that are not finite never come out") {
  model::AuditedInput input = sample::good();
  input.figures.span_use = std::numeric_limits<double>::quiet_NaN();
  input.figures.gap_low = std::numeric_limits<double>::infinity();
  input.sweep->pin_volts[0] = -std::numeric_limits<double>::infinity();
  input.divider.bare_form->source_ohms = std::numeric_limits<double>::infinity();
  const Json out = of(input);
  CHECK_FALSE(out["figures"].contains("span_use"));
  CHECK_FALSE(out["figures"].contains("gap_low"));
  CHECK_FALSE(out["sweep"]["points"][0].contains("pin_volts"));
  CHECK_FALSE(out["divider"].contains("source_ohms"));
  CHECK(report::json(sample::run({sample::board({input})})).find("null") == std::string::npos);
}

TEST_CASE("a double comes back as it was, and zero has no sign") {
  model::AuditedInput input = sample::good();
  input.figures.span_use = 0.1 + 0.2;
  input.figures.gap_low = -0.0;
  input.sweep->pin_volts[0] = 1.0 / 3;
  const std::string text = report::json(sample::run({sample::board({input})}));
  const Json out = Json::parse(text)["boards"][0]["inputs"][0];
  CHECK(out["figures"]["span_use"].get<double>() == 0.1 + 0.2);
  CHECK(out["sweep"]["points"][0]["pin_volts"].get<double>() == 1.0 / 3);
  CHECK(text.find("-0.0,") == std::string::npos);
}

TEST_CASE("names of any bytes give valid UTF-8") {
  const Json out = of(sample::hostile());
  CHECK(out["net"] == "\x1b[2J\"net\"\xEF\xBF\xBD\xE2\x80\xAE");  // the stray byte became U+FFFD
  CHECK(out["divider"]["sensor"] == "RT\n1\\");
}

TEST_CASE("a report ends with a line feed and is the same each time") {
  const std::string once = report::json(sample::everything());
  CHECK(once.back() == '\n');
  CHECK(once == report::json(sample::everything()));
}

TEST_CASE("the summary counts findings of inputs and boards") {
  const Json summary = parsed(sample::everything())["summary"];
  CHECK(summary.dump() == R"({"boards":1,"inputs":6,"audited":5,"error":3,"warning":3,"note":1,"waived":1})");
}
