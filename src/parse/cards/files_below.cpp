// Included files: only those below the root.
#include <map>
#include <memory>
#include <system_error>
#include <utility>

#include "parse/netlist.hpp"
#include "source/file.hpp"

namespace parse {
namespace {

namespace fs = std::filesystem;

struct Folders {
  fs::path root;
  source::Sources& sources;
  source::Limits limits;
  std::map<source::SourceId, fs::path> of;  // of the files that were included

  [[nodiscard]] fs::path folder(source::SourceId id) const {
    const auto found = of.find(id);
    if (found != of.end()) return found->second;
    const fs::path parent = fs::path(sources[id].name).parent_path();
    return parent.empty() ? fs::path(".") : parent;
  }
};

// The path as messages show it: from the folder of the netlist on, whichever file asks.
std::string shown_path(const Folders& folders, const fs::path& path, source::Place asked) {
  source::SourceId netlist = asked.source;
  while (folders.sources[netlist].included_at) netlist = folders.sources[netlist].included_at->source;
  std::error_code error;
  const fs::path folder = fs::canonical(folders.folder(netlist), error);
  const fs::path shown = error ? fs::path() : path.lexically_relative(folder);
  return shown.empty() ? path.filename().string() : shown.generic_string();
}

// Where this machine keeps the file is nobody's business.
std::string without_folders(std::string message, const std::string& path, const std::string& shown) {
  for (auto at = message.find(path); at != std::string::npos; at = message.find(path, at + shown.size()))
    message.replace(at, path.size(), shown);
  return message;
}

base::Result<source::SourceId> fetch(Folders& folders, const std::string& wanted, source::Place asked) {
  const auto path = source::resolve_below(folders.root, folders.folder(asked.source), wanted);
  if (!path.ok()) return base::Error{path.error()};
  auto bytes = source::read_file(*path, folders.limits);
  std::string shown = shown_path(folders, *path, asked);
  if (!bytes.ok()) return base::Error{without_folders(bytes.error(), path->string(), shown)};
  const source::SourceId id = folders.sources.add({std::move(shown), std::move(bytes).value(), asked});
  folders.of[id] = path->parent_path();
  return id;
}

}  // namespace

Includer files_below(fs::path root, source::Sources& sources, const source::Limits& limits) {
  auto folders = std::make_shared<Folders>(Folders{std::move(root), sources, limits, {}});
  return [folders](const std::string& wanted, source::Place asked) { return fetch(*folders, wanted, asked); };
}

}  // namespace parse
