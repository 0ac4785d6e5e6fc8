#include "tests/report/golden.hpp"

#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string_view>

namespace {

std::string read(const std::filesystem::path& path) {
  std::ifstream in(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(in), {}};
}

}  // namespace

std::string golden(const std::string& name, const std::string& now) {
  const std::filesystem::path path = std::filesystem::path(REPORT_GOLDEN_FOLDER) / name;
  const char* const accept = std::getenv("TAPSPAN_ACCEPT");
  if (accept != nullptr && std::string_view(accept) == "1" && read(path) != now)
    std::ofstream(path, std::ios::binary) << now;
  return read(path);
}
