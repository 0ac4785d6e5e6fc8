#include "audit/reading.hpp"

#include <filesystem>
#include <fmt/format.h>
#include <system_error>
#include <vector>

#include "base/text.hpp"
#include "flatten/flatten.hpp"
#include "parse/netlist.hpp"
#include "parse/sheet.hpp"
#include "source/file.hpp"

namespace audit {
namespace {

namespace fs = std::filesystem;

// The declarations that belong to a netlist by their name: board.cir has board.tap.toml.
fs::path beside(const fs::path& netlist) {
  fs::path path = netlist;
  return path.replace_extension(".tap.toml");
}

void add_sheet(const fs::path& path, const Options& options, Reading& reading,
               std::vector<parse::SheetSource>& places) {
  auto bytes = source::read_file(path, options.limits);
  if (!bytes.ok()) {
    reading.diagnostics.push_back({base::Level::error, {}, bytes.error()});
    reading.sheet_has_errors = true;
    return;
  }
  places.push_back({reading.sources.add({path.string(), std::move(bytes).value(), std::nullopt}), false});
}

void read_declarations(const fs::path& netlist, source::SourceId root, const Options& options, Reading& reading) {
  std::vector<parse::SheetSource> places{{root, true}};
  std::error_code ignored;
  if (const fs::path own = beside(netlist); fs::exists(own, ignored)) add_sheet(own, options, reading, places);
  for (const fs::path& path : options.with) add_sheet(path, options, reading, places);
  reading.sheet = parse::read_sheet(places, reading.sources, reading.diagnostics);
  if (source::count(reading.diagnostics, base::Level::error) != 0) reading.sheet_has_errors = true;
}

std::vector<flatten::SweepRequest> sweeps_of(const model::Sheet& sheet) {
  std::vector<flatten::SweepRequest> requests;
  for (const auto& sensor : sheet.sensors)
    if (sensor.kind.value == "parameter" && sensor.sweep) requests.push_back({sensor.name, sensor.sweep->value});
  return requests;
}

}  // namespace

Reading read_board(const std::string& netlist, const Options& options) {
  Reading reading;
  const fs::path path(netlist);
  auto bytes = source::read_file(path, options.limits);
  if (!bytes.ok()) {
    reading.failure = fmt::format("{}: error: {}\n", base::printable(netlist), base::printable(bytes.error()));
    return reading;
  }
  const source::SourceId root = reading.sources.add({netlist, std::move(bytes).value(), std::nullopt});
  read_declarations(path, root, options, reading);
  const fs::path folder = path.has_parent_path() ? path.parent_path() : fs::path(".");
  const auto include = parse::files_below(options.root.value_or(folder), reading.sources, options.limits);
  reading.netlist =
      parse::read_netlist(root, reading.sources, reading.names, include, options.limits, reading.diagnostics);
  reading.circuit =
      flatten::flatten(reading.netlist, reading.names, {sweeps_of(reading.sheet), reading.sheet.bare_m.value},
                       options.limits, reading.diagnostics);
  return reading;
}

}  // namespace audit
