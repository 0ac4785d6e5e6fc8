#include "app/worker_path.hpp"

#include <fstream>

#include <catch2/catch.hpp>

#include "tests/app/folder.hpp"

namespace fs = std::filesystem;

namespace {

void program(const fs::path& path, bool runnable = true) {
  fs::create_directories(path.parent_path());
  std::ofstream(path) << "#!/bin/true\n";
  fs::permissions(path, runnable ? fs::perms::owner_all : fs::perms::owner_read);
}

}  // namespace

TEST_CASE("the worker beside the program is taken before an installed one") {
  const Folder folder;
  program(folder / "bin/tapspan-worker");
  program(folder / "libexec/tapspan/tapspan-worker");
  CHECK(app::worker_for(folder / "bin").value() == folder / "bin/tapspan-worker");
}

TEST_CASE("an installed worker is found from the program's folder") {
  const Folder folder;
  program(folder / "libexec/tapspan/tapspan-worker");
  CHECK(app::worker_for(folder / "bin").value() == folder / "libexec/tapspan/tapspan-worker");
}

TEST_CASE("a file that cannot be run is no worker") {
  const Folder folder;
  program(folder / "bin/tapspan-worker", false);
  CHECK_FALSE(app::worker_for(folder / "bin").ok());
}

TEST_CASE("a missing worker is an error that says where it was looked for") {
  const Folder folder;
  CHECK(app::worker_for(folder / "bin").error() ==
        "the simulator's program is missing: neither " + (folder / "bin/tapspan-worker").string() + " nor " +
            (folder / "libexec/tapspan/tapspan-worker").string() + " can be run");
}

TEST_CASE("the folder of the running program holds it") {
  CHECK(fs::exists(app::program_folder() / "app_tests"));
}
