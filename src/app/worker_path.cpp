#include "app/worker_path.hpp"

#include <fmt/format.h>
#include <system_error>
#include <unistd.h>

namespace app {

namespace fs = std::filesystem;

base::Result<fs::path> worker_for(const fs::path& folder) {
  const fs::path beside = folder / "tapspan-worker";
  const fs::path installed = (folder / ".." / "libexec" / "tapspan" / "tapspan-worker").lexically_normal();
  for (const fs::path& path : {beside, installed}) {
    std::error_code ignored;
    if (fs::is_regular_file(path, ignored) && ::access(path.c_str(), X_OK) == 0) return path;
  }
  return base::Error{fmt::format("the simulator's program is missing: neither {} nor {} can be run", beside.string(),
                                 installed.string())};
}

fs::path program_folder() {
  std::error_code error;
  const fs::path program = fs::read_symlink("/proc/self/exe", error);
  return error ? fs::current_path(error) : program.parent_path();
}

}  // namespace app
