#include "app/options.hpp"

#include <catch2/catch.hpp>

using app::AuditCommand;
using app::ExitStatus;
using app::Message;
using app::TraceCommand;

namespace {

using Words = std::vector<std::string>;

AuditCommand audited(const Words& words) {
  const app::Command command = app::parse_arguments(words);
  if (const auto* message = std::get_if<Message>(&command)) FAIL(message->text);
  return std::get<AuditCommand>(command);
}

TraceCommand traced(const Words& words) {
  const app::Command command = app::parse_arguments(words);
  if (const auto* message = std::get_if<Message>(&command)) FAIL(message->text);
  return std::get<TraceCommand>(command);
}

// The line of an error; of a command or a help text a word that no error is.
std::string error(const Words& words) {
  const app::Command command = app::parse_arguments(words);
  const auto* message = std::get_if<Message>(&command);
  if (message == nullptr) return "a command";
  return message->status == ExitStatus::incomplete ? message->text : "not an error";
}

Message message(const Words& words) {
  return std::get<Message>(app::parse_arguments(words));
}

}  // namespace

TEST_CASE("an audit of one netlist takes the defaults of the manual") {
  const AuditCommand command = audited({"audit", "board.cir"});
  CHECK(command.request.netlists == Words{"board.cir"});
  CHECK(command.request.options.points == 101);
  CHECK(command.request.options.only.empty());
  CHECK(command.request.options.with.empty());
  CHECK_FALSE(command.request.options.root);
  CHECK(command.request.json.empty());
  CHECK(command.request.as_of.empty());
  CHECK_FALSE(command.request.quiet);
  CHECK(command.gate == app::Gate::error);
  CHECK(command.jobs == 0);
  CHECK(command.timeout_seconds == 20);
}

TEST_CASE("every option of an audit reaches its place") {
  const AuditCommand command =
      audited({"audit",   "a.cir",   "--with",    "x.toml",  "--with=y.toml", "b.cir", "--json",   "-",
               "--gate",  "note",    "--only",    "ADC_*",   "--only",        "V?",    "--points", "21",
               "--jobs",  "3",       "--timeout", "1.5",     "--root",        "/usr",  "--as-of",  "2026-12-01",
               "--quiet", "--limit", "nesting=9", "--limit", "includes=2"});
  CHECK(command.request.netlists == Words{"a.cir", "b.cir"});
  CHECK(command.request.options.with == std::vector<std::filesystem::path>{"x.toml", "y.toml"});
  CHECK(command.request.json == "-");
  CHECK(command.gate == app::Gate::note);
  CHECK(command.request.options.only == Words{"ADC_*", "V?"});
  CHECK(command.request.options.points == 21);
  CHECK(command.jobs == 3);
  CHECK(command.timeout_seconds == 1.5);
  CHECK(command.request.options.root == std::filesystem::path("/usr"));
  CHECK(command.request.as_of == "2026-12-01");
  CHECK(command.request.quiet);
  CHECK(command.request.options.limits.nesting == 9);
  CHECK(command.request.options.limits.includes == 2);
}

TEST_CASE("a trace takes the options of reading and of its report") {
  const TraceCommand command = traced({"trace", "--json", "out.json", "--only", "A", "board.cir"});
  CHECK(command.request.netlists == Words{"board.cir"});
  CHECK(command.request.json == "out.json");
  CHECK(command.request.options.only == Words{"A"});
}

TEST_CASE("an option with one value does not swallow the netlists behind it") {
  CHECK(audited({"audit", "--with", "x.toml", "a.cir", "b.cir"}).request.netlists == Words{"a.cir", "b.cir"});
}

TEST_CASE("netlists may have the names of commands, begin with a dash, or be absolute") {
  CHECK(audited({"audit", "trace", "draft"}).request.netlists == Words{"trace", "draft"});
  CHECK(audited({"audit", "--", "-odd.cir", "--json"}).request.netlists == Words{"-odd.cir", "--json"});
  CHECK(audited({"audit", "/a/b.cir", ""}).request.netlists == Words{"/a/b.cir", ""});
}

TEST_CASE("a raised limit of points holds on the same line") {
  CHECK(audited({"audit", "a", "--points", "150000", "--limit", "points=200000"}).request.options.points == 150000);
  CHECK(audited({"audit", "a", "--points", "100000"}).request.options.points == 100000);
  CHECK(audited({"audit", "a", "--points", "2"}).request.options.points == 2);
}

TEST_CASE("wrong values are refused with what was expected") {
  CHECK(error({"audit", "a", "--points", "1"}) ==
        "tapspan: --points: expected a whole number from 2 to 100000, got \"1\"\n");
  CHECK(error({"audit", "a", "--points", "100001"}) ==
        "tapspan: --points: expected a whole number from 2 to 100000, got \"100001\"\n");
  CHECK(error({"audit", "a", "--points", "many"}) ==
        "tapspan: --points: expected a whole number from 2 to 100000, got \"many\"\n");
  CHECK(error({"audit", "a", "--jobs", "0"}) == "tapspan: --jobs: expected a whole number from 1 to 1024, got \"0\"\n");
  CHECK(error({"audit", "a", "--timeout", "0"}) ==
        "tapspan: --timeout: expected seconds above 0, at most 86400, got \"0\"\n");
  CHECK(error({"audit", "a", "--gate", "all"}) ==
        "tapspan: --gate: expected error, warning, note or never, got \"all\"\n");
  CHECK(error({"audit", "a", "--as-of", "2026-02-30"}) ==
        "tapspan: --as-of: \"2026-02-30\" is no day of the calendar\n");
  CHECK(error({"audit", "a", "--limit", "nesting"}) == "tapspan: --limit: expected NAME=N, got \"nesting\"\n");
  CHECK(error({"audit", "a", "--root", "/nowhere at all"}) ==
        "tapspan: --root: expected a folder, got \"/nowhere at all\"\n");
  CHECK(error({"audit", "a", "--limit", "points=50"}) ==
        "tapspan: a sweep has 101 points where --points does not say otherwise, more than the limit points = 50\n");
  CHECK(error({"trace", "a", "--points", "0"}) ==
        "tapspan: --points: expected a whole number from 2 to 100000, got \"0\"\n");
}

TEST_CASE("a missing value, an empty one and an option given twice are refused") {
  CHECK(error({"audit", "a", "--json"}) == "tapspan: --json needs a value\n");
  CHECK(error({"audit", "a", "--json", "--quiet"}) == "tapspan: --json needs a value\n");
  CHECK(error({"audit", "a", "--json="}) == "tapspan: --json needs a value\n");
  CHECK(error({"audit", "a", "--json", "x", "--json", "y"}) == "tapspan: --json is given more than once\n");
  CHECK(error({"audit", "a", "--gate", "note", "--gate", "never"}) == "tapspan: --gate is given more than once\n");
}

TEST_CASE("no command, no netlist, unknown commands and unknown options are refused with a way on") {
  CHECK(error({}) == "tapspan: expected a command, audit or trace; tapspan --help tells more\n");
  CHECK(error({"audit"}) == "tapspan: expected at least one NETLIST\n");
  CHECK(error({"trace", "--quiet"}) == "tapspan: expected at least one NETLIST\n");
  CHECK(error({"adit", "a.cir"}) == "tapspan: unknown command adit; did you mean audit?\n");
  CHECK(error({"frobnicate"}) == "tapspan: unknown command frobnicate; tapspan --help tells more\n");
  CHECK(error({"--verson"}) == "tapspan: unknown option --verson; did you mean --version?\n");
  CHECK(error({"audit", "a", "--jason", "x"}) == "tapspan: unknown option --jason; did you mean --json?\n");
  CHECK(error({"audit", "a", "--frobnicate=9"}) ==
        "tapspan: unknown option --frobnicate; tapspan audit --help tells more\n");
  CHECK(error({"audit", "a", "--bogus"}) == "tapspan: unknown option --bogus; tapspan audit --help tells more\n");
  CHECK(error({"audit", "a", "-x"}) == "tapspan: unknown option -x; tapspan audit --help tells more\n");
}

TEST_CASE("a trace has no gate, no simulators and no time to run out of") {
  for (const char* option : {"--gate", "--jobs", "--timeout"})
    CHECK(error({"trace", "a", option, "1"}) ==
          "tapspan: " + std::string(option) + " is an option of audit, not of trace\n");
}

TEST_CASE("what later versions bring is refused and never ignored") {
  CHECK(error({"draft", "a.cir"}) == "tapspan: draft is not supported by this version\n");
  CHECK(error({"draft"}) == "tapspan: draft is not supported by this version\n");
  CHECK(error({"draft", "--any", "a.cir"}) == "tapspan: draft is not supported by this version\n");
  for (const char* option : {"--sarif", "--junit", "--html", "--markdown"})
    CHECK(error({"audit", "a.cir", option, "out"}) ==
          "tapspan: " + std::string(option) + " is not supported by this version\n");
  CHECK(error({"audit", "a.cir", "--html"}) == "tapspan: --html needs a value\n");
}

TEST_CASE("hostile words reach no terminal") {
  CHECK(error({"\x1b[2J"}) == "tapspan: unknown command \\x1b[2J; tapspan --help tells more\n");
  CHECK(error({"audit", "a", "--\x1b\xff"}).find_first_of("\x1b\xff") == std::string::npos);
  CHECK(error({"audit", "a", "--points", "\x1b"}) ==
        "tapspan: --points: expected a whole number from 2 to 100000, got \"\\x1b\"\n");
}

TEST_CASE("version and help are no errors") {
  CHECK(message({"--version"}).text == "tapspan 0.1.0\n");
  CHECK(message({"--version"}).status == ExitStatus::passed);
  for (const Words& words : {Words{"--help"}, Words{"-h"}, Words{"audit", "--help"}, Words{"trace", "--help"}}) {
    CHECK(message(words).status == ExitStatus::passed);
    CHECK(message(words).text.find("Exit status: 0") != std::string::npos);
  }
}

TEST_CASE("help tells of every option that works and of none that does not") {
  const std::string help = message({"audit", "--help"}).text;
  for (const char* option : {"--with", "--json", "--gate", "--only", "--points", "--jobs", "--timeout", "--root",
                             "--as-of", "--limit", "--quiet"})
    CHECK(help.find(option) != std::string::npos);
  for (const char* option : {"--sarif", "--junit", "--html", "--markdown"})
    CHECK(help.find(option) == std::string::npos);
}
