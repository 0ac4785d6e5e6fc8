#include "app/output.hpp"

#include <sys/stat.h>
#include <unistd.h>

#include <catch2/catch.hpp>

#include "tests/app/folder.hpp"

namespace fs = std::filesystem;
using app::write_file;

namespace {

std::string failure(const base::Result<base::Done>& result) {
  return result.ok() ? "written" : result.error();
}

}  // namespace

TEST_CASE("a report is written whole and leaves nothing beside it") {
  const Folder folder;
  CHECK(write_file(folder / "out.json", std::string("a\0b", 3)).ok());
  CHECK(contents(folder / "out.json") == std::string("a\0b", 3));
  CHECK(folder.entries() == 1);
}

TEST_CASE("a report takes the place of an older one") {
  const Folder folder;
  REQUIRE(write_file(folder / "out.json", "an older and longer report").ok());
  CHECK(write_file(folder / "out.json", "new").ok());
  CHECK(contents(folder / "out.json") == "new");
  CHECK(folder.entries() == 1);
}

TEST_CASE("a report through a link is written where the link leads") {
  const Folder folder;
  REQUIRE(write_file(folder / "real.json", "old").ok());
  fs::create_symlink("real.json", folder / "link.json");
  CHECK(write_file(folder / "link.json", "new").ok());
  CHECK(fs::is_symlink(folder / "link.json"));
  CHECK(contents(folder / "real.json") == "new");
}

TEST_CASE("a link that leads nowhere yet stays a link: the report is made where it leads") {
  const Folder folder;
  fs::create_symlink("later.json", folder / "link.json");
  CHECK(write_file(folder / "link.json", "new").ok());
  CHECK(fs::is_symlink(folder / "link.json"));
  CHECK(contents(folder / "later.json") == "new");
}

TEST_CASE("a link to itself is an error") {
  const Folder folder;
  fs::create_symlink("link.json", folder / "link.json");
  CHECK_FALSE(write_file(folder / "link.json", "new").ok());
  CHECK(folder.entries() == 1);
}

TEST_CASE("a report into a folder that is not there is an error with its reason") {
  const Folder folder;
  const std::string path = folder / "missing/out.json";
  CHECK(failure(write_file(path, "x")) == "cannot write " + path + ": No such file or directory");
}

TEST_CASE("a report onto a folder is an error and leaves nothing behind") {
  const Folder folder;
  CHECK(failure(write_file(folder.path(), "x")) == "cannot write " + folder.path().string() + ": Is a directory");
  CHECK(folder.entries() == 0);
}

TEST_CASE("a device is written to and stays a device") {
  CHECK(write_file("/dev/null", "x").ok());
  struct stat info {};
  REQUIRE(::stat("/dev/null", &info) == 0);
  CHECK(S_ISCHR(info.st_mode));
}

TEST_CASE("a full disk is an error with its reason") {
  CHECK(failure(write_file("/dev/full", "x")) == "cannot write /dev/full: No space left on device");
}

TEST_CASE("a new report can be read by whom the user's mask lets") {
  const Folder folder;
  const mode_t before = ::umask(027);
  REQUIRE(write_file(folder / "out.json", "x").ok());
  ::umask(before);
  struct stat info {};
  REQUIRE(::stat((folder / "out.json").c_str(), &info) == 0);
  CHECK((info.st_mode & 0777U) == 0640U);
}
