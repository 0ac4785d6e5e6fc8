#include "tests/divide/division.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <catch2/catch.hpp>

#include "divide/divide.hpp"
#include "divide/sweep_values.hpp"
#include "flatten/flatten.hpp"
#include "network/sweep.hpp"
#include "parse/netlist.hpp"
#include "parse/sheet.hpp"

namespace test {
namespace {

std::vector<double> volts_of(const Board& board, const model::Divider& divider, const model::ProbedNetwork& probed,
                             std::size_t points) {
  REQUIRE(divider.sensor);
  const model::SensorDeclaration& sensor = board.sheet.sensors[*divider.sensor];
  const auto at = divide::measurands(sensor, points);
  REQUIRE(at.ok());
  const auto swept = divide::swept_values(probed, board.circuit, sensor, *at);
  INFO((swept.ok() ? std::string{} : swept.error()));
  REQUIRE(swept.ok());
  const auto volts = network::sweep_volts(probed.network, *swept, points, {}, std::vector{probed.probe});
  INFO((volts.ok() ? std::string{} : volts.error()));
  REQUIRE(volts.ok());
  return *volts;
}

std::vector<flatten::SweepRequest> sweeps_of(const model::Sheet& sheet) {
  std::vector<flatten::SweepRequest> sweeps;
  for (const auto& sensor : sheet.sensors)
    if (sensor.kind.value == "parameter" && sensor.sweep) sweeps.push_back({sensor.name, sensor.sweep->value});
  return sweeps;
}

}  // namespace

const model::Divider& Board::at(std::string_view input) const {
  INFO(fmt::format("{}", fmt::join(said, "\n")));
  for (const auto& divider : division.dividers)
    if (divider.input.name == input) return divider;
  FAIL("no input " << input);
  return division.dividers.front();
}

const model::Divider& Board::only() const {
  INFO(fmt::format("{}", fmt::join(said, "\n")));
  REQUIRE(division.dividers.size() == 1);
  return division.dividers.front();
}

std::string Board::net(model::NetId net) const {
  if (!net.valid()) return "none";
  return net == model::ground ? "0" : std::string(names.text(circuit.nets[net.index()].name));
}

Texts Board::assumed() const {
  Texts texts;
  for (const auto& assumption : division.assumptions) texts.push_back(assumption.text);
  return texts;
}

std::vector<double> Board::pin_volts(const model::Divider& divider, std::size_t points) const {
  return volts_of(*this, divider, divider.whole, points);
}

std::vector<double> Board::bare_volts(const model::Divider& divider, std::size_t points) const {
  return volts_of(*this, divider, divider.bare, points);
}

Board board_of(const std::string& netlist, const std::string& declarations, const Texts& only, bool may_be_broken) {
  Board board;
  source::Diagnostics diagnostics;
  const auto root = board.sources.add({"board.cir", "title\n" + netlist, {}});
  const auto toml = board.sources.add({"tap.toml", declarations, {}});
  const std::vector<parse::SheetSource> places{{root, true}, {toml, false}};
  board.sheet = parse::read_sheet(places, board.sources, diagnostics);
  const parse::Includer none = [](const std::string&, source::Place) { return base::Error{"no files here"}; };
  board.netlist = parse::read_netlist(root, board.sources, board.names, none, {}, diagnostics);
  board.circuit =
      flatten::flatten(board.netlist, board.names, {sweeps_of(board.sheet), board.sheet.bare_m.value}, {}, diagnostics);
  if (!may_be_broken)
    for (const auto& one : diagnostics)
      if (one.level == base::Level::error) FAIL(source::draw(board.sources, one));
  source::Diagnostics own;
  board.division = divide::divide({board.netlist, board.sources, board.circuit, board.sheet, board.names, only}, own);
  for (const auto& one : own) board.said.push_back(source::headline(board.sources, one));
  return board;
}

std::string list(const std::vector<model::PartName>& parts) {
  Texts names;
  for (const auto& part : parts) names.push_back(part.name);
  return fmt::format("{}", fmt::join(names, " "));
}

std::string drawn(const Board& board, const model::Divider& divider) {
  if (!divider.no_divider.empty()) return divider.no_divider;
  const std::string sense = divider.sense.empty() ? "" : "; sense " + list(divider.sense);
  const std::string load = divider.load.empty() ? "" : "; load " + list(divider.load);
  return fmt::format("{} > {} > {} > {} > {}{}{}", divider.upper_rail, list(divider.upper), board.net(divider.tap),
                     list(divider.lower), divider.lower_rail, sense, load);
}

std::string converter(const std::string& inputs) {
  return fmt::format("[converter.ADC]\nbits = 12\nhigh = \"VCC\"\ninputs = [{}]\n", inputs);
}

std::string ntc(const std::string& name, const std::string& more) {
  return fmt::format("[sensor.{}]\nkind = \"ntc\"\nr25 = \"10k\"\nbeta = 3977\nfrom = 0\nto = 50\n{}", name, more);
}

}  // namespace test
