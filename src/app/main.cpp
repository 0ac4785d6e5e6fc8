#include <csignal>
#include <exception>
#include <fcntl.h>
#include <string>
#include <unistd.h>
#include <variant>
#include <vector>

#include "app/options.hpp"
#include "app/output.hpp"
#include "app/start.hpp"

namespace {

// A standard stream that the caller closed must not become the number of a file that is opened later.
void hold_standard_streams() {
  for (int fd = 0; fd <= 2; ++fd)
    if (::fcntl(fd, F_GETFD) < 0) static_cast<void>(::open("/dev/null", O_RDONLY));
}

}  // namespace

int main(int argc, char** argv) {
  hold_standard_streams();
  std::signal(SIGPIPE, SIG_IGN);  // a reader that went away is an error of writing
  try {
    const std::vector<std::string> words(argv + (argc > 0 ? 1 : 0), argv + argc);
    const app::Command command = app::parse_arguments(words);
    return static_cast<int>(std::visit([](const auto& kind) { return app::start(kind); }, command));
  } catch (const std::exception& error) {
    app::write_standard_error(std::string("tapspan: internal error: ") + error.what() + '\n');
    return static_cast<int>(app::ExitStatus::incomplete);
  }
}
