#include "app/start.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <thread>

#include "app/output.hpp"
#include "app/run.hpp"
#include "app/worker_path.hpp"
#include "base/text.hpp"

namespace app {
namespace {

World world_with(const Request& request, simulate::Session* session) {
  World out;
  out.board = [&request, session](const std::string& netlist) {
    return audit::audit_board(netlist, request.options, session);
  };
  out.out = write_standard_output;
  out.err = write_standard_error;
  out.simulator = session != nullptr ? session->simulator() : "";
  out.colour = colour_wanted();
  return out;
}

base::Result<simulate::Session> open_session(const AuditCommand& command) {
  const auto worker = worker_for(program_folder());
  if (!worker.ok()) return base::Error{worker.error()};
  simulate::SessionOptions options;
  options.worker = *worker;
  options.jobs = command.jobs != 0 ? command.jobs : std::max(1U, std::thread::hardware_concurrency());
  options.timeout_seconds = command.timeout_seconds;
  return simulate::Session::open(options);
}

}  // namespace

ExitStatus start(const AuditCommand& command) {
  auto opened = open_session(command);
  // Reports are written in every case: without a simulator they say so of each input.
  if (!opened.ok()) write_standard_error(fmt::format("tapspan: {}\n", base::printable(opened.error())));
  simulate::Session session =
      opened.ok() ? std::move(opened).value() : simulate::Session::without_worker(opened.error());
  return run(command, world_with(command.request, &session));
}

ExitStatus start(const TraceCommand& command) {
  return run(command, world_with(command.request, nullptr));
}

ExitStatus start(const Message& message) {
  if (message.status != ExitStatus::passed) {
    write_standard_error(message.text);
    return message.status;
  }
  const auto wrote = write_standard_output(message.text);
  if (wrote.ok()) return message.status;
  write_standard_error(fmt::format("tapspan: {}\n", wrote.error()));
  return ExitStatus::incomplete;
}

}  // namespace app
