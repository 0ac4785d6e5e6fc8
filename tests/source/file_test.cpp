#include "source/file.hpp"

#include <filesystem>
#include <fstream>
#include <string>
#include <sys/stat.h>
#include <unistd.h>

#include <catch2/catch.hpp>

namespace fs = std::filesystem;

namespace {

// A folder of its own for each test case, gone afterwards.
class Folder {
 public:
  Folder() {
    std::string name = (fs::temp_directory_path() / "source_test_XXXXXX").string();
    path_ = fs::canonical(::mkdtemp(name.data()));
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  ~Folder() {
    std::error_code ignored;
    fs::remove_all(path_, ignored);
  }

  [[nodiscard]] const fs::path& path() const { return path_; }
  fs::path write(const std::string& name, const std::string& bytes) const {
    fs::create_directories((path_ / name).parent_path());
    std::ofstream(path_ / name, std::ios::binary) << bytes;
    return path_ / name;
  }

 private:
  fs::path path_;
};

std::string failure(const base::Result<source::Bytes>& result) {
  return result.ok() ? "read" : result.error();
}
std::string failure(const base::Result<fs::path>& result) {
  return result.ok() ? "found" : result.error();
}

}  // namespace

TEST_CASE("a file is read byte for byte") {
  const Folder folder;
  const std::string bytes("a\r\n\0\xff", 5);
  const auto got = source::read_file(folder.write("a.cir", bytes), {});
  REQUIRE(got.ok());
  CHECK(std::string_view(*got) == bytes);
  const auto empty = source::read_file(folder.write("empty.cir", ""), {});
  REQUIRE(empty.ok());
  CHECK(empty->size() == 0);
}

TEST_CASE("a file of exactly the limit is read, one byte more is refused with both numbers") {
  const Folder folder;
  source::Limits limits;
  limits.file_bytes = 5;
  CHECK(source::read_file(folder.write("a", "12345"), limits).ok());
  const fs::path longer = folder.write("b", "123456");
  CHECK(failure(source::read_file(longer, limits)) ==
        longer.string() + " has 6 bytes, more than the limit file_bytes = 5");
}

TEST_CASE("a file of 4 GiB is refused whatever the limit says") {
  const Folder folder;
  const fs::path path = folder.write("big", "");
  REQUIRE(::truncate(path.c_str(), off_t{1} << 32) == 0);  // sparse: takes no room
  source::Limits limits;
  limits.file_bytes = std::uint64_t{1} << 40;
  CHECK(failure(source::read_file(path, limits)) ==
        path.string() + " has 4294967296 bytes; files of 4 GiB and more cannot be read");
}

TEST_CASE("what is no regular file is refused and never waited for") {
  const Folder folder;
  const fs::path fifo = folder.path() / "fifo";
  REQUIRE(::mkfifo(fifo.c_str(), 0600) == 0);
  CHECK(failure(source::read_file(fifo, {})) == "cannot read " + fifo.string() + ": not a regular file");
  CHECK(failure(source::read_file(folder.path(), {})) ==
        "cannot read " + folder.path().string() + ": not a regular file");
  CHECK(failure(source::read_file("/dev/zero", {})) == "cannot read /dev/zero: not a regular file");
}

TEST_CASE("a file that is not there is said so with its name") {
  CHECK(failure(source::read_file("/nowhere/at all.cir", {})) ==
        "cannot read /nowhere/at all.cir: No such file or directory");
}

TEST_CASE("an include below the root is found from the folder of the file that names it") {
  const Folder folder;
  const fs::path file = folder.write("parts/r.lib", "x");
  const auto direct = source::resolve_below(folder.path(), folder.path(), "parts/r.lib");
  REQUIRE(direct.ok());
  CHECK(*direct == file);
  const auto up = source::resolve_below(folder.path(), folder.path() / "parts", "../parts/r.lib");
  REQUIRE(up.ok());
  CHECK(*up == file);
}

TEST_CASE("an empty folder is the current one") {
  const auto found = source::resolve_below("", "", "missing_here.lib");
  CHECK(failure(found) == "no such file");
  CHECK(failure(source::resolve_below("", "", "../missing_here.lib")) == "lies outside the root folder");
}

TEST_CASE("backslashes count as slashes") {
  const Folder folder;
  folder.write("parts/r.lib", "x");
  CHECK(source::resolve_below(folder.path(), folder.path(), "parts\\r.lib").ok());
}

TEST_CASE("an absolute name is taken when it leads below the root, and only then") {
  const Folder folder;
  const fs::path inside = folder.write("root/a.lib", "x");
  const fs::path outside = folder.write("b.lib", "x");
  CHECK(source::resolve_below(folder.path() / "root", folder.path() / "root", inside.string()).ok());
  CHECK(failure(source::resolve_below(folder.path() / "root", folder.path() / "root", outside.string())) ==
        "lies outside the root folder");
}

TEST_CASE("no way leads out of the root") {
  const Folder folder;
  const fs::path root = folder.path() / "root";
  folder.write("root/a.lib", "x");
  folder.write("secret", "x");
  folder.write("root_twin/b.lib", "x");
  const auto wanted = [&](const std::string& name) { return failure(source::resolve_below(root, root, name)); };
  CHECK(wanted("../secret") == "lies outside the root folder");
  CHECK(wanted("../root_twin/b.lib") == "lies outside the root folder");
  CHECK(wanted("/etc/passwd") == "lies outside the root folder");
  fs::create_symlink(folder.path() / "secret", root / "link");
  CHECK(wanted("link") == "lies outside the root folder");
  fs::create_directory_symlink(folder.path(), root / "folder");
  CHECK(wanted("folder/secret") == "lies outside the root folder");
}

TEST_CASE("whether a file outside the root exists cannot be asked") {
  const Folder folder;
  const fs::path root = folder.path() / "root";
  folder.write("root/a.lib", "x");
  const auto wanted = [&](const std::string& name) { return failure(source::resolve_below(root, root, name)); };
  CHECK(wanted("../nothing here") == "lies outside the root folder");
  CHECK(wanted("/nothing/here") == "lies outside the root folder");
  fs::create_symlink(folder.path() / "nothing", root / "link");
  CHECK(wanted("link") == "lies outside the root folder");
}

TEST_CASE("a link that stays below the root is followed") {
  const Folder folder;
  const fs::path file = folder.write("root/parts/a.lib", "x");
  fs::create_symlink("parts/a.lib", folder.path() / "root" / "link");
  const auto found = source::resolve_below(folder.path() / "root", folder.path() / "root", "link");
  REQUIRE(found.ok());
  CHECK(*found == file);
}

TEST_CASE("a root that is itself reached by a link is a root") {
  const Folder folder;
  folder.write("root/a.lib", "x");
  fs::create_directory_symlink(folder.path() / "root", folder.path() / "alias");
  CHECK(source::resolve_below(folder.path() / "alias", folder.path() / "alias", "a.lib").ok());
}

TEST_CASE("a folder, a FIFO, a missing file, a ring of links and no name at all are no include") {
  const Folder folder;
  folder.write("parts/a.lib", "x");
  REQUIRE(::mkfifo((folder.path() / "fifo").c_str(), 0600) == 0);
  fs::create_symlink("ring_b", folder.path() / "ring_a");
  fs::create_symlink("ring_a", folder.path() / "ring_b");
  const auto wanted = [&](const std::string& name) {
    return failure(source::resolve_below(folder.path(), folder.path(), name));
  };
  CHECK(wanted("parts") == "is not a regular file");
  CHECK(wanted("fifo") == "is not a regular file");
  CHECK(wanted("missing.lib") == "no such file");
  CHECK(wanted("ring_a") == "no such file");
  CHECK(wanted("") == "names no file");
  CHECK(wanted(std::string("a\0b", 3)) == "names no file");
  CHECK(wanted(std::string(10'000, 'x')) == "no such file");
}

TEST_CASE("a root that is not there is said so") {
  CHECK(failure(source::resolve_below("/nowhere", "/nowhere", "a")) ==
        "the root /nowhere cannot be opened: No such file or directory");
}
