#include <filesystem>
#include <fstream>
#include <map>
#include <regex>
#include <set>
#include <string>
#include <vector>

#include <catch2/catch.hpp>

namespace {

namespace fs = std::filesystem;

using Rooms = std::set<std::string>;

// Each room with the rooms that it may include: base <- source <- model <- expression <- {network, sensor} <- stages <-
// audit <- app.
const std::map<std::string, Rooms>& allowed() {
  static const std::map<std::string, Rooms> edges = [] {
    std::map<std::string, Rooms> out;
    out["grammar"] = {};
    out["base"] = {};
    out["source"] = {"base"};
    out["model"] = {"base", "source"};
    out["expression"] = {"base", "source", "model"};
    const Rooms below_tools{"base", "source", "model", "expression"};
    out["network"] = out["sensor"] = below_tools;
    Rooms below_stages = below_tools;
    below_stages.insert({"network", "sensor"});
    Rooms below_audit = below_stages;
    for (const char* stage : {"parse", "flatten", "divide", "simulate", "judge", "advise", "report"}) {
      out[stage] = below_stages;
      below_audit.insert(stage);
    }
    out["parse"].insert("grammar");
    out["audit"] = below_audit;
    out["worker"] = {"simulate"};
    out["app"] = below_audit;
    out["app"].insert("audit");
    return out;
  }();
  return edges;
}

std::string room_of(const std::string& path) {
  return path.substr(0, path.find('/'));
}

// Every quoted include of a file that names a folder.
std::vector<std::string> includes_of(const fs::path& file) {
  static const std::regex pattern(R"re(^\s*#\s*include\s+"([^"]+/[^"]+)")re");
  std::vector<std::string> found;
  std::ifstream in(file);
  for (std::string line; std::getline(in, line);) {
    std::smatch match;
    if (std::regex_search(line, match, pattern)) found.push_back(match[1]);
  }
  return found;
}

struct SourceFile {
  std::string room;
  fs::path path;
};

std::vector<SourceFile> source_files() {
  const fs::path root(TAPSPAN_SOURCE_DIR);
  std::vector<SourceFile> files;
  for (const fs::path& top : {root / "src", root / "grammar"})
    for (const auto& entry : fs::recursive_directory_iterator(top)) {
      const std::string ending = entry.path().extension().string();
      if (ending != ".cpp" && ending != ".hpp" && ending != ".def") continue;
      const std::string relative = fs::relative(entry.path(), root / "src").generic_string();
      files.push_back({top.filename() == "grammar" ? "grammar" : room_of(relative), entry.path()});
    }
  return files;
}

}  // namespace

TEST_CASE("every room includes only rooms below it") {
  const auto files = source_files();
  REQUIRE(files.size() > 50);
  for (const SourceFile& file : files) {
    INFO(file.path.string());
    REQUIRE(allowed().count(file.room) == 1);
    for (const std::string& include : includes_of(file.path)) {
      INFO("includes " << include);
      const std::string room = room_of(include);
      CHECK((room == file.room || allowed().at(file.room).count(room) == 1));
    }
  }
}

TEST_CASE("only the worker sees ngspice's header") {
  for (const SourceFile& file : source_files()) {
    std::ifstream in(file.path);
    const std::string text((std::istreambuf_iterator<char>(in)), {});
    INFO(file.path.string());
    CHECK((file.room == "worker" || text.find("#include <ngspice") == std::string::npos));
  }
}
