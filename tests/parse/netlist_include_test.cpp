// Included files.
#include <filesystem>
#include <fmt/format.h>
#include <fstream>
#include <unistd.h>

#include <catch2/catch.hpp>

#include "netlist_reading.hpp"
#include "source/file.hpp"

namespace fs = std::filesystem;
using parse_test::NetlistReading;
using Said = std::vector<std::string>;

namespace {

// A folder that goes away with the test.
class Folder {
 public:
  Folder() : path_(fs::temp_directory_path() / fmt::format("netlist-include-{}", ::getpid())) {
    fs::create_directories(path_ / "root/sub");
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  ~Folder() { fs::remove_all(path_); }

  void write(const std::string& name, const std::string& text) const { std::ofstream(path_ / name) << text; }
  [[nodiscard]] const fs::path& path() const { return path_; }

 private:
  fs::path path_;
};

Said read_in(const Folder& folder, const std::string& text, std::size_t& elements) {
  folder.write("root/board.cir", text);
  source::Sources sources;
  base::NameTable names;
  source::Diagnostics diagnostics;
  const source::Limits limits;
  const std::string name = (folder.path() / "root/board.cir").string();
  const source::SourceId root = sources.add({name, text, {}});
  const parse::Includer include = parse::files_below(folder.path() / "root", sources, limits);
  const model::Netlist netlist = parse::read_netlist(root, sources, names, include, limits, diagnostics);
  elements = netlist.scopes[0].elements.size();
  Said said;
  for (const source::Diagnostic& diagnostic : diagnostics) said.push_back(diagnostic.message);
  return said;
}

}  // namespace

TEST_CASE("netlist includes: an included file has no title and its cards stand where its card stands") {
  const NetlistReading reading("title\nR1 a b 1\n.include \"x.inc\"\nR3 a b 3\n", {{"x.inc", "R2 a b 2\n.end\n"}});
  CHECK(reading.said().empty());
  REQUIRE(reading.top().elements.size() == 3);
  CHECK(reading.show(reading.top().elements[1]) == "r R2(a b) = 2");
  CHECK(reading.netlist().cards.size() == 5);
}

TEST_CASE("netlist includes: paths stand in quotes, without, or without and with blanks") {
  const parse_test::Files files{{"a.inc", "R1 a b 1\n"}, {"my file.inc", "R2 a b 2\n"}};
  CHECK(NetlistReading("title\n.inc a.inc\n.INCLUDE 'a.inc'\n.include my file.inc\n.include \"my file.inc\"\n", files)
            .top()
            .elements.size() == 4);
}

TEST_CASE("netlist includes: a missing file is a warning that names it, and reading goes on") {
  const NetlistReading reading("title\n.include \"C:\\parts\\x.lib\"\n.lib my parts.lib\nR1 a b 1\n");
  CHECK(reading.said() == Said{"t.cir:2:10: warning: cannot include \"C:\\parts\\x.lib\": no such file",
                               "t.cir:3:6: warning: cannot include \"my parts.lib\": no such file"});
  CHECK(reading.netlist().missing_includes.size() == 2);
  CHECK(reading.fates() == "1 0 2 0");
}

TEST_CASE("netlist includes: a section of a library is read, and only that") {
  const parse_test::Files files{{"x.lib", "* sections\n.lib fast\nR1 a b 1\n.endl\n.lib slow\nR2 a b {\n.endl slow\n"}};
  const NetlistReading reading("title\n.lib 'x.lib' FAST\n", files);
  CHECK(reading.said().empty());
  CHECK(reading.element("R1") == "r R1(a b) = 1");
  CHECK(reading.element("R2") == "no such element");
  CHECK(NetlistReading("title\n.lib x.lib typical\n", files).said() ==
        Said{"t.cir:2:12: warning: \"x.lib\" has no section typical"});
}

TEST_CASE("netlist includes: a library without sections is read whole") {
  CHECK(NetlistReading("title\n.lib x.lib\n", {{"x.lib", "R1 a b 1\n"}}).element("R1") == "r R1(a b) = 1");
}

TEST_CASE("netlist includes: errors in an included file name it") {
  CHECK(NetlistReading("title\n.include x.inc\n", {{"x.inc", "* c\nR1 a\n"}}).said() ==
        Said{"x.inc:2:1: error: a resistor needs two nodes and a value"});
}

TEST_CASE("netlist includes: a subcircuit may begin and end in different files, and models of any file are known") {
  const NetlistReading reading("title\n.subckt S c b e\n.include q.inc\n.ends\n.include m.inc\n",
                               {{"q.inc", "Q1 c b e 0 BC\n"}, {"m.inc", ".model bc NPN\n"}});
  CHECK(reading.said().empty());
  CHECK(reading.element("Q1") == "q Q1(c b e 0) BC");
}

TEST_CASE("netlist includes: a file that includes itself is an error, at once or in a chain") {
  CHECK(NetlistReading("title\n.include a.inc\n", {{"a.inc", ".include a.inc\n"}}).said() ==
        Said{"a.inc:1:10: error: a.inc includes itself"});
  CHECK(NetlistReading("title\n.include a.inc\n", {{"a.inc", ".include b.inc\n"}, {"b.inc", "\n.include a.inc\n"}})
            .said() == Said{"b.inc:2:10: error: a.inc includes itself"});
}

TEST_CASE("netlist includes: depth and number of files are limited, and the limit is named") {
  source::Limits limits;
  limits.include_depth = 2;
  const parse_test::Files chain{{"a", ".include b\n"}, {"b", ".include c\n"}, {"c", "R1 a b 1\n"}};
  CHECK(NetlistReading("title\n.include b\n", chain, limits).said().empty());
  CHECK(NetlistReading("title\n.include a\n", chain, limits).said() ==
        Said{"b:1:10: error: files include one another deeper than the limit include_depth = 2"});
  limits.includes = 1;
  CHECK(NetlistReading("title\n.include c\n.include c\n", chain, limits).said() ==
        Said{"t.cir:3:10: error: more files are included than the limit includes = 1"});
}

TEST_CASE("netlist includes: files below the root are found from the folder of the file that asks") {
  const Folder folder;
  folder.write("root/sub/a.inc", ".include b.inc\nR1 a b 1\n");
  folder.write("root/sub/b.inc", "R2 a b 1\n.include ../c.inc\n");
  folder.write("root/c.inc", "R3 a b 1\n");
  std::size_t elements = 0;
  CHECK(read_in(folder, "title\n.include sub/a.inc\n.include sub\\b.inc\n", elements).empty());
  CHECK(elements == 5);
}

TEST_CASE("netlist includes: what lies outside the root is refused, by path and by link") {
  const Folder folder;
  folder.write("outside.inc", "R1 a b 1\n");
  fs::create_symlink(folder.path() / "outside.inc", folder.path() / "root/link.inc");
  fs::create_symlink(folder.path(), folder.path() / "root/sub/up");
  std::size_t elements = 0;
  CHECK(read_in(folder,
                "title\n.include ../outside.inc\n.include link.inc\n.include sub/up/outside.inc\n.include sub\n",
                elements) == Said{"cannot include \"../outside.inc\": lies outside the root folder",
                                  "cannot include \"link.inc\": lies outside the root folder",
                                  "cannot include \"sub/up/outside.inc\": lies outside the root folder",
                                  "cannot include \"sub\": is not a regular file"});
  CHECK(elements == 0);
}
