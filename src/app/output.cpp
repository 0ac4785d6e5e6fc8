#include "app/output.hpp"

#include <cerrno>
#include <cstdlib>
#include <fcntl.h>
#include <fmt/format.h>
#include <string>
#include <system_error>
#include <unistd.h>
#include <utility>

#include "base/text.hpp"

namespace app {
namespace {

namespace fs = std::filesystem;

base::Error failed(const std::string& what, int error) {
  return {fmt::format("cannot write {}: {}", base::printable_short(what, 200), std::generic_category().message(error))};
}

// 0, or the error number.
int write_all(int fd, std::string_view bytes) {
  while (!bytes.empty()) {
    const ssize_t wrote = ::write(fd, bytes.data(), bytes.size());
    if (wrote < 0 && errno == EINTR) continue;
    if (wrote < 0) return errno;
    bytes.remove_prefix(static_cast<std::size_t>(wrote));
  }
  return 0;
}

// Opens, writes and closes; 0, or the error number. Some file systems report a full disk only on closing.
int write_to(const fs::path& path, int flags, std::string_view bytes) {
  const int fd = ::open(path.c_str(), flags | O_WRONLY | O_CLOEXEC, 0666);
  if (fd < 0) return errno;
  const int error = write_all(fd, bytes);
  const int closed = ::close(fd) == 0 ? 0 : errno;
  return error != 0 ? error : closed;
}

// The file that a name means, which need not be there yet.
fs::path behind_links(fs::path path) {
  constexpr int most_links = 40;
  std::error_code error;
  for (int i = 0; i < most_links && fs::is_symlink(fs::symlink_status(path, error)); ++i) {
    const fs::path next = fs::read_symlink(path, error);
    if (error) break;
    path = path.parent_path() / next;
  }
  return path;
}

}  // namespace

base::Result<base::Done> write_file(const fs::path& path, std::string_view bytes) {
  std::error_code ignored;
  const fs::file_status status = fs::status(path, ignored);
  if (fs::exists(status) && !fs::is_regular_file(status)) {
    const int error = write_to(path, 0, bytes);
    if (error != 0) return failed(path.string(), error);
    return base::Done{};
  }
  const fs::path target = behind_links(path);
  if (fs::is_symlink(fs::symlink_status(target, ignored))) return failed(path.string(), ELOOP);
  const fs::path fresh = target.string() + fmt::format(".{}.new", ::getpid());
  int error = write_to(fresh, O_CREAT | O_EXCL, bytes);
  if (error == EEXIST) return failed(fresh.string(), error);
  if (error == 0 && ::rename(fresh.c_str(), target.c_str()) != 0) error = errno;
  if (error == 0) return base::Done{};
  ::unlink(fresh.c_str());
  return failed(path.string(), error);
}

base::Result<base::Done> write_standard_output(std::string_view bytes) {
  const int error = write_all(STDOUT_FILENO, bytes);
  if (error != 0) return failed("standard output", error);
  return base::Done{};
}

void write_standard_error(std::string_view bytes) {
  static_cast<void>(write_all(STDERR_FILENO, bytes));
}

bool colour_wanted() {
  const char* const no_colour = std::getenv("NO_COLOR");
  const char* const terminal = std::getenv("TERM");
  const bool dumb = terminal == nullptr || std::string_view(terminal) == "dumb";
  return (no_colour == nullptr || *no_colour == '\0') && !dumb && ::isatty(STDOUT_FILENO) == 1;
}

}  // namespace app
