#include "app/run.hpp"

#include <algorithm>
#include <filesystem>
#include <fmt/format.h>

#include "app/output.hpp"
#include "app/values.hpp"
#include "base/text.hpp"
#include "report/json.hpp"
#include "report/text.hpp"

namespace app {
namespace {

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

// The netlist that a report would overwrite, if any.
const std::string* overwritten(const Request& request) {
  const auto same = [&request](const std::string& netlist) {
    std::error_code error;
    return std::filesystem::equivalent(request.json, netlist, error) && !error;
  };
  const auto at = std::find_if(request.netlists.begin(), request.netlists.end(), same);
  return at == request.netlists.end() ? nullptr : &*at;
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
  if (const std::string* netlist = overwritten(request)) {
    world.err(fmt::format("tapspan: --json: {} is a netlist of this run\n", base::printable_short(*netlist, 200)));
    return ExitStatus::incomplete;
  }
  const model::RunReport report = collect(request, world);
  const bool well = write_reports(report, request, trace, world);
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
