#include "tests/audit/board.hpp"

#include <cstdlib>
#include <fmt/format.h>
#include <fstream>
#include <system_error>

#include <catch2/catch.hpp>

#include "divide/divide.hpp"

namespace test {

Board::Board(const std::string& netlist, const std::string& declarations) {
  std::string name = (std::filesystem::temp_directory_path() / "audit_test_XXXXXX").string();
  folder_ = std::filesystem::canonical(::mkdtemp(name.data()));
  options.points = 3;
  add("board.cir", netlist);
  if (!declarations.empty()) add("board.tap.toml", declarations);
}

Board::~Board() {
  std::error_code ignored;
  std::filesystem::remove_all(folder_, ignored);
}

std::filesystem::path Board::add(const std::string& name, const std::string& bytes) const {
  std::ofstream(folder_ / name, std::ios::binary) << bytes;
  return folder_ / name;
}

audit::BoardRun Board::audit() const {
  auto session = simulate::Session::open({TAPSPAN_WORKER, 1, 60});
  REQUIRE(session.ok());
  return audit::audit_board(netlist(), options, &*session);
}

const model::AuditedInput& input(const audit::BoardRun& run, std::string_view name) {
  INFO(run.diagnostics);
  for (const auto& input : run.report.inputs)
    if (input.divider.input.name == name) return input;
  FAIL("no input " << name);
  return run.report.inputs.front();
}

std::string rules(const model::FindingList& findings) {
  std::string list;
  for (const auto& finding : findings)
    list += (list.empty() ? "" : " ") + std::string(model::rule_text(finding.rule).name);
  return list;
}

base::Result<audit::Prepared> Made::prepare(const std::vector<model::ConditionKind>& needs, std::size_t points) const {
  REQUIRE(sensor != nullptr);
  return audit::prepare(divider, reading.circuit, *sensor, needs, points);
}

Made made(const Board& board, std::string_view input) {
  Made made{audit::read_board(board.netlist(), board.options), {}, nullptr};
  auto& reading = made.reading;
  auto division = divide::divide(
      {reading.netlist, reading.sources, reading.circuit, reading.sheet, reading.names, {std::string(input)}},
      reading.diagnostics);
  for (const auto& diagnostic : reading.diagnostics) INFO(source::draw(reading.sources, diagnostic));
  REQUIRE(division.dividers.size() == 1);
  made.divider = std::move(division.dividers.front());
  if (made.divider.sensor) made.sensor = &reading.sheet.sensors[*made.divider.sensor];
  return made;
}

std::string converter(const std::string& inputs) {
  return fmt::format("[converter.ADC]\nbits = 12\nhigh = \"VCC\"\ninputs = [{}]\n", inputs);
}

std::string ntc(const std::string& name) {
  return fmt::format("[sensor.{}]\nkind = \"ntc\"\nr25 = \"10k\"\nbeta = 3977\nfrom = 0\nto = 50\n", name);
}

}  // namespace test
