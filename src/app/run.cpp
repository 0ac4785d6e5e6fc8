#include "app/run.hpp"

#include <algorithm>
#include <filesystem>
#include <fmt/format.h>
#include <string>
#include <vector>

#include "app/output.hpp"
#include "app/values.hpp"
#include "base/text.hpp"
#include "report/json.hpp"
#include "report/text.hpp"

namespace app {
namespace {

namespace fs = std::filesystem;

model::RunReport collect(const Request& request, const World& world) {
  model::RunReport out;
  out.version = TAPSPAN_VERSION;
  out.simulator = world.simulator;
  out.as_of = request.as_of.empty() ? today() : request.as_of;
  for (const std::string& netlist : request.netlists) {
    audit::BoardRun board = world.board(netlist);
    world.err(board.diagnostics);
    out.boards.push_back(std::move(board.report));
  }
  return out;
}

bool same_file(const fs::path& a, const fs::path& b) {
  std::error_code error;
  return fs::equivalent(a, b, error) && !error;
}

// What the user named that the report would overwrite, if any.
const fs::path* named_and_overwritten(const Request& request, const std::vector<fs::path>& named) {
  const auto at =
      std::find_if(named.begin(), named.end(), [&](const fs::path& path) { return same_file(request.json, path); });
  return at == named.end() ? nullptr : &*at;
}

// What the boards read that the report would overwrite, if any: their declarations and includes too, whose names are
// seen from the netlist's folder.
const std::string* read_and_overwritten(const Request& request, const model::RunReport& report) {
  for (const model::BoardReport& board : report.boards) {
    for (std::uint32_t i = 0; i < board.sources.size(); ++i) {
      const std::string& name = board.sources[source::SourceId{i}].name;
      if (same_file(request.json, name) || same_file(request.json, fs::path(board.netlist).parent_path() / name))
        return &name;
    }
  }
  return nullptr;
}

// Whether inputs were picked by name and no board has one of them, though all was read.
bool finds_nothing(const Request& request, const model::RunReport& report) {
  const auto has_none = [](const model::BoardReport& board) { return board.done_in_whole && board.inputs.empty(); };
  return !request.options.only.empty() && std::all_of(report.boards.begin(), report.boards.end(), has_none);
}

ExitStatus refuse_overwriting(const std::string& what, const World& world) {
  world.err(fmt::format("tapspan: --json: {} is read by this run\n", base::printable_short(what, 200)));
  return ExitStatus::incomplete;
}

// Whether a write went well; if not, says why.
bool wrote(const base::Result<base::Done>& result, const World& world) {
  if (!result.ok()) world.err(fmt::format("tapspan: {}\n", result.error()));
  return result.ok();
}

bool write_reports(const model::RunReport& report, const Request& request, bool trace, const World& world) {
  if (request.json == "-") return wrote(world.out(report::json(report)), world);
  bool well = true;
  if (!request.json.empty()) well = wrote(write_file(request.json, report::json(report)), world);
  report::TextOptions options;
  options.colour = world.colour;
  options.quiet = request.quiet;
  options.trace = trace;
  return wrote(world.out(report::text(report, options)), world) && well;
}

template <class Judge>
ExitStatus carry_out(const Request& request, bool trace, const World& world, Judge status_of) {
  std::vector<fs::path> named(request.netlists.begin(), request.netlists.end());
  named.insert(named.end(), request.options.with.begin(), request.options.with.end());
  if (const fs::path* path = named_and_overwritten(request, named)) return refuse_overwriting(path->string(), world);
  const model::RunReport report = collect(request, world);
  if (const std::string* name = read_and_overwritten(request, report)) return refuse_overwriting(*name, world);
  const bool well = write_reports(report, request, trace, world);
  if (finds_nothing(request, report)) {
    world.err("tapspan: --only: no declared input has such a name\n");
    return ExitStatus::incomplete;
  }
  return well ? status_of(report) : ExitStatus::incomplete;
}

}  // namespace

ExitStatus run(const AuditCommand& command, const World& world) {
  const bool chosen = !command.request.options.only.empty();
  return carry_out(command.request, false, world,
                   [&](const model::RunReport& report) { return audit_status(report, command.gate, chosen); });
}

ExitStatus run(const TraceCommand& command, const World& world) {
  return carry_out(command.request, true, world, [](const model::RunReport& report) { return trace_status(report); });
}

}  // namespace app
