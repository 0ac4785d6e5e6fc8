// Included files: only those below the root.
#include <map>
#include <memory>
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

base::Result<source::SourceId> fetch(Folders& folders, const std::string& wanted, source::Place asked) {
  const auto path = source::resolve_below(folders.root, folders.folder(asked.source), wanted);
  if (!path.ok()) return base::Error{path.error()};
  auto bytes = source::read_file(*path, folders.limits);
  if (!bytes.ok()) return base::Error{bytes.error()};
  const source::SourceId id = folders.sources.add({wanted, std::move(bytes).value(), asked});
  folders.of[id] = path->parent_path();
  return id;
}

}  // namespace

Includer files_below(fs::path root, source::Sources& sources, const source::Limits& limits) {
  auto folders = std::make_shared<Folders>(Folders{std::move(root), sources, limits, {}});
  return [folders](const std::string& wanted, source::Place asked) { return fetch(*folders, wanted, asked); };
}

}  // namespace parse
