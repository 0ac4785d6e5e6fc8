#include "source/file.hpp"

#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

#include <algorithm>
#include <cerrno>
#include <cstring>
#include <system_error>

#include <fmt/format.h>

namespace source {
namespace {

namespace fs = std::filesystem;

// A descriptor that closes itself.
class Descriptor {
 public:
  explicit Descriptor(int fd) : fd_(fd) {}
  Descriptor(const Descriptor&) = delete;
  Descriptor& operator=(const Descriptor&) = delete;
  ~Descriptor() {
    if (fd_ >= 0) ::close(fd_);
  }
  [[nodiscard]] int get() const { return fd_; }

 private:
  int fd_;
};

base::Error failed(const fs::path& path, int error) {
  return {fmt::format("cannot read {}: {}", path.string(), std::generic_category().message(error))};
}

bool is_below(const fs::path& root, const fs::path& path) {
  const auto [end, _] = std::mismatch(root.begin(), root.end(), path.begin(), path.end());
  return end == root.end();
}

}  // namespace

base::Result<std::string> read_file(const fs::path& path, const Limits& limits) {
  // O_NONBLOCK: opening a FIFO without a writer must not hang; a regular file does not mind.
  const Descriptor file(::open(path.c_str(), O_RDONLY | O_CLOEXEC | O_NONBLOCK));
  if (file.get() < 0) return failed(path, errno);
  struct stat info {};
  if (::fstat(file.get(), &info) != 0) return failed(path, errno);
  if (!S_ISREG(info.st_mode)) return base::Error{fmt::format("cannot read {}: not a regular file", path.string())};
  const auto size = static_cast<std::uint64_t>(info.st_size);
  if (size > limits.file_bytes)
    return base::Error{fmt::format("{} has {} bytes, more than the limit file_bytes = {}", path.string(), size, limits.file_bytes)};
  std::string bytes(size, '\0');
  std::size_t have = 0;
  while (have < bytes.size()) {
    const ssize_t got = ::read(file.get(), bytes.data() + have, bytes.size() - have);
    if (got < 0 && errno == EINTR) continue;
    if (got < 0) return failed(path, errno);
    if (got == 0) break;  // it shrank meanwhile: what was read is what there is
    have += static_cast<std::size_t>(got);
  }
  bytes.resize(have);
  return bytes;
}

base::Result<fs::path> resolve_below(const fs::path& root, const fs::path& from, const std::string& wanted) {
  std::string text = wanted;
  std::replace(text.begin(), text.end(), '\\', '/');
  if (text.empty() || text.find('\0') != std::string::npos) return base::Error{"names no file"};
  std::error_code error;
  const fs::path top = fs::canonical(root, error);
  if (error) return base::Error{fmt::format("the root {} cannot be opened: {}", root.string(), error.message())};
  const fs::path found = fs::canonical(fs::path(text).is_absolute() ? fs::path(text) : from / text, error);
  if (error) {
    // Outside the root, whether a file is there is nobody's business.
    const fs::path aim = fs::weakly_canonical(fs::path(text).is_absolute() ? fs::path(text) : from / text, error);
    if (!error && !is_below(top, aim)) return base::Error{"lies outside the root folder"};
    return base::Error{"no such file"};
  }
  if (!is_below(top, found)) return base::Error{"lies outside the root folder"};
  if (!fs::is_regular_file(found, error)) return base::Error{"is not a regular file"};
  return found;
}

}  // namespace source
