#include "report/text.hpp"

#include <algorithm>
#include <limits>
#include <sstream>

#include <catch2/catch.hpp>

#include "report/page.hpp"
#include "tests/report/golden.hpp"
#include "tests/report/sample.hpp"

using report::text;

namespace {

std::string of(model::AuditedInput input, report::TextOptions options = {}) {
  return text(sample::run({sample::board({std::move(input)})}), options);
}

bool has(const std::string& haystack, const std::string& needle) {
  return haystack.find(needle) != std::string::npos;
}

// The text without its select-graphic-rendition sequences.
std::string uncoloured(const std::string& coloured) {
  std::string out;
  for (std::size_t at = 0; at < coloured.size(); ++at) {
    if (coloured[at] == '\x1b')
      at = coloured.find('m', at);
    else
      out += coloured[at];
  }
  return out;
}

void check_golden(const std::string& name, const std::string& now) {
  CHECK(golden(name, now) == now);
}

}  // namespace

TEST_CASE("the report of a whole run reads as its golden file") {
  check_golden("everything.txt", text(sample::everything(), {}));
}

TEST_CASE("the report of a trace reads as its golden file") {
  report::TextOptions options;
  options.trace = true;
  check_golden("traced.txt", text(sample::traced(), options));
}

TEST_CASE("the quiet report reads as its golden file") {
  report::TextOptions options;
  options.quiet = true;
  model::RunReport run = sample::everything();
  run.boards.push_back(sample::board({sample::good()}));
  run.boards.push_back(sample::board({}));
  run.boards.back().done_in_whole = false;
  const std::string now = text(run, options);
  CHECK(std::count(now.begin(), now.end(), '\n') == 3);
  check_golden("quiet.txt", now);
}

TEST_CASE("no line of a report is wider than the page") {
  report::TextOptions trace;
  trace.trace = true;
  for (const std::string& whole : {text(sample::everything(), {}), text(sample::everything(), trace)}) {
    std::istringstream in(whole);
    for (std::string line; std::getline(in, line);) {
      CAPTURE(line);
      CHECK(report::columns(line) <= report::page_columns);
    }
  }
}

TEST_CASE("no byte of a hostile name reaches the terminal as a control") {
  for (const bool trace : {false, true}) {
    report::TextOptions options;
    options.trace = trace;
    const std::string now = of(sample::hostile(), options);
    CHECK(std::none_of(now.begin(), now.end(), [](char c) { return (c >= 0 && c < 0x20 && c != '\n') || c == 0x7f; }));
    CHECK_FALSE(has(now, "\xE2\x80\xAE"));
    CHECK_FALSE(has(now, "\xff"));
    CHECK(has(now, "\\x1b[2J"));
  }
}

TEST_CASE("colour adds nothing but colour") {
  report::TextOptions options;
  const std::string plain = text(sample::everything(), options);
  options.colour = true;
  const std::string coloured = text(sample::everything(), options);
  CHECK(plain.find('\x1b') == std::string::npos);
  CHECK(coloured.find('\x1b') != std::string::npos);
  CHECK(uncoloured(coloured) == plain);
}

TEST_CASE("a passed input says so, and an input without a result never does") {
  CHECK(has(of(sample::good()), "- passed\n"));
  CHECK(has(of(sample::not_audited()), "not audited, 1 error\n"));
  model::AuditedInput silent = sample::good();
  silent.audited = false;
  const std::string now = of(silent);
  CHECK_FALSE(has(now, "passed"));
  CHECK_FALSE(has(now, "nothing found"));
  CHECK_FALSE(has(now, "span used"));
  CHECK(has(now, "1 input, 0 audited"));
}

TEST_CASE("an end of the range whose volts are not known goes by the name of its net") {
  model::AuditedInput input = sample::not_audited();
  input.divider.input.high = model::NetId{2};
  input.divider.input.nominal_high = std::numeric_limits<double>::quiet_NaN();
  CHECK(has(of(input), "12 bits over 0 V to AIR_TAP\n"));
  input.divider.input.nominal_high = 2.5;
  CHECK(has(of(input), "12 bits over 0 V to 2.5 V\n"));
}

TEST_CASE("a figure that is no number is left out") {
  CHECK_FALSE(has(of(sample::swept_rail_off_scale()), "nan"));
  model::AuditedInput input = sample::good();
  input.figures.span_use = std::numeric_limits<double>::infinity();
  CHECK_FALSE(has(of(input), "span used"));
}

TEST_CASE("a curve with a reading that is no number has no bar") {
  model::AuditedInput input = sample::good();
  REQUIRE(has(of(input), "reading"));
  input.sweep->pin_high[1] = std::nan("");
  CHECK_FALSE(has(of(input), "reading"));
  CHECK_FALSE(has(of(input), "bars:"));
}

TEST_CASE("a bar shows the rail-gap limit that holds for the input") {
  model::AuditedInput input = sample::good();
  CHECK(has(of(input), "|::-="));
  input.divider.input.limits = {{"rail-gap", {0.1, {}}}, {"rail-gap", {0.2, {}}}, {"span-use", {0.9, {}}}};
  CHECK(has(of(input), "|::!!!!!!!!!!="));
  input.divider.input.levels = {{"rail-gap", {std::nullopt, {}}}};
  CHECK(has(of(input), "|  -="));
}

TEST_CASE("a board without inputs does not look like one that passed") {
  const std::string now = text(sample::run({sample::board({})}), {});
  CHECK(has(now, "inputs       none"));
  CHECK_FALSE(has(now, "passed"));
  CHECK_FALSE(has(now, "nothing found"));
}

TEST_CASE("a board that was not done in whole says so") {
  model::BoardReport board = sample::board({sample::good()});
  board.done_in_whole = false;
  CHECK(has(text(sample::run({board}), {}), "not done in whole"));
}

TEST_CASE("a run of no boards has its summary line") {
  CHECK(text(sample::run({}), {}) == "0 boards, 0 inputs, 0 audited (tapspan 0.1.0, ngspice-39, as of 2026-12-01)\n");
}

TEST_CASE("a measurand without a unit leaves no blank where the unit would be") {
  model::AuditedInput input = sample::good();
  input.sweep->measurand = "parameter";
  input.sweep->unit.clear();
  const std::string now = of(input);
  CHECK(has(now, ", parameter -40 to 125\n"));
  CHECK(has(now, "at -40, most of it by"));
  CHECK_FALSE(has(now, " \n"));
}

TEST_CASE("a long name is cut in a title only where it does not fit") {
  model::AuditedInput input = sample::good();
  input.divider.sensor_name = "XBED1.XHEAD.XSENSOR.RT";
  CHECK(has(of(input), "ADC_AIR (U1, XBED1.XHEAD.XSENSOR.RT) ---"));
  input.divider.input.name = std::string(50, 'N');
  CHECK(has(of(input), " (U1, XBED1.XH...R.RT) ---"));
}

TEST_CASE("a candidate alone that was not weighed has no weight") {
  report::TextOptions options;
  options.trace = true;
  model::AuditedInput input = sample::good();
  input.divider.candidates.pop_back();
  input.divider.candidates.front().weight_volts = 0;
  CHECK(has(of(input, options), "candidates   AIR_TAP: arm through R1\n"));
}

TEST_CASE("an arm that is the rail itself is said to be none") {
  model::AuditedInput input = sample::good();
  input.divider.upper.clear();
  CHECK(has(of(input), "upper arm    none, +3V3 itself"));
}
