#include "source/file.hpp"

#include <algorithm>
#include <cerrno>
#include <fcntl.h>
#include <fmt/format.h>
#include <limits>
#include <sys/stat.h>
#include <system_error>
#include <unistd.h>

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

// `path` with the first link in it that leads nowhere replaced by its target.
fs::path follow_dead_link(const fs::path& path) {
  std::error_code ignored;
  fs::path prefix;
  for (auto part = path.begin(); part != path.end(); ++part) {
    prefix /= *part;
    if (!fs::is_symlink(fs::symlink_status(prefix, ignored))) continue;
    fs::path followed = prefix.parent_path() / fs::read_symlink(prefix, ignored);
    while (++part != path.end()) followed /= *part;
    return followed;
  }
  return path;
}

// Where a path that cannot be opened would lead: canonical as far as it exists, dead links followed too.
fs::path aim_of(fs::path path) {
  constexpr int most_links = 40;
  std::error_code error;
  for (int i = 0; i < most_links; ++i) {
    const fs::path known = fs::weakly_canonical(path, error);
    if (error) break;
    path = follow_dead_link(known);
    if (path == known) break;
  }
  return path;
}

// The folder of a bare file name is the empty path: it means where we are.
fs::path canonical_folder(const fs::path& folder, std::error_code& error) {
  return fs::canonical(folder.empty() ? fs::path(".") : folder, error);
}

}  // namespace

base::Result<Bytes> read_file(const fs::path& path, const Limits& limits) {
  // O_NONBLOCK: opening a FIFO without a writer must not hang; a regular file does not mind.
  const Descriptor file(::open(path.c_str(), O_RDONLY | O_CLOEXEC | O_NONBLOCK));
  if (file.get() < 0) return failed(path, errno);
  struct stat info {};
  if (::fstat(file.get(), &info) != 0) return failed(path, errno);
  if (!S_ISREG(info.st_mode)) return base::Error{fmt::format("cannot read {}: not a regular file", path.string())};
  const auto size = static_cast<std::uint64_t>(info.st_size);
  if (size > limits.file_bytes)
    return base::Error{
        fmt::format("{} has {} bytes, more than the limit file_bytes = {}", path.string(), size, limits.file_bytes)};
  // Places hold 32-bit offsets.
  if (size > std::numeric_limits<std::uint32_t>::max())
    return base::Error{fmt::format("{} has {} bytes; files of 4 GiB and more cannot be read", path.string(), size)};
  Bytes bytes;
  bytes.resize(size);
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
  const fs::path top = canonical_folder(root, error);
  if (error) return base::Error{fmt::format("the root {} cannot be opened: {}", root.string(), error.message())};
  // From the canonical folder on, so that even where nothing is there the way can be held against the root.
  const fs::path asked = canonical_folder(from, error) / text;
  if (error) return base::Error{"no such file"};
  const fs::path found = fs::canonical(asked, error);
  if (error) {
    // Outside the root, whether a file is there is nobody's business.
    return base::Error{is_below(top, aim_of(asked)) ? "no such file" : "lies outside the root folder"};
  }
  if (!is_below(top, found)) return base::Error{"lies outside the root folder"};
  if (!fs::is_regular_file(found, error)) return base::Error{"is not a regular file"};
  return found;
}

}  // namespace source
