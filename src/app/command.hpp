// What a command line asks for.
#pragma once

#include <string>
#include <variant>
#include <vector>

#include "app/exit_status.hpp"
#include "audit/audit.hpp"

namespace app {

// What both commands take.
struct Request {
  std::vector<std::string> netlists;
  audit::Options options;
  std::string json;   // file, "-" for standard output in place of the text, or empty for none
  std::string as_of;  // ISO 8601 date; empty: today
  bool quiet = false;
};

struct AuditCommand {
  Request request;
  Gate gate = Gate::error;
  unsigned jobs = 0;  // 0: one a processor
  double timeout_seconds = 20;
};

struct TraceCommand {
  Request request;
};

// Something to say instead of running: help and version on standard output, errors on standard error.
struct Message {
  std::string text;
  ExitStatus status = ExitStatus::passed;
};

using Command = std::variant<AuditCommand, TraceCommand, Message>;

}  // namespace app
