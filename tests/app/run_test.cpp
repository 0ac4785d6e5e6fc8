#include "app/run.hpp"

#include <catch2/catch.hpp>

#include "tests/app/folder.hpp"

using app::AuditCommand;
using app::ExitStatus;
using app::TraceCommand;

namespace {

model::AuditedInput input(bool audited) {
  model::AuditedInput out;
  out.audited = audited;
  out.divider.input.name = "ADC_AIR";
  out.divider.input.converter = "U1";
  out.divider.input.bits = 12;
  out.divider.input.nominal_high = 3.3;
  return out;
}

// A world in memory. Boards are named by what they are: "good", "gated", "missing", "part".
struct Fake {
  std::string out;
  std::string err;
  std::vector<std::string> asked;
  bool pipe_closed = false;

  app::World world() {
    app::World world;
    world.board = [this](const std::string& netlist) { return board(netlist); };
    world.out = [this](std::string_view bytes) -> base::Result<base::Done> {
      if (pipe_closed) return base::Error{"cannot write standard output: Broken pipe"};
      out += bytes;
      return base::Done{};
    };
    world.err = [this](std::string_view bytes) { err += bytes; };
    world.simulator = "ngspice-39";
    return world;
  }

  audit::BoardRun board(const std::string& netlist) {
    asked.push_back(netlist);
    audit::BoardRun run;
    run.report.netlist = netlist;
    run.report.inputs = {input(netlist != "missing")};
    if (netlist == "gated") run.report.inputs[0].findings.emplace_back().message = "too far";
    run.report.done_in_whole = netlist != "part";
    run.diagnostics = netlist + ":1:1: note: read\n";
    return run;
  }
};

AuditCommand audited(std::vector<std::string> netlists, std::string json = "") {
  AuditCommand out;
  out.request.netlists = std::move(netlists);
  out.request.json = std::move(json);
  out.request.as_of = "2026-12-01";
  return out;
}

bool has(const std::string& haystack, const std::string& needle) {
  return haystack.find(needle) != std::string::npos;
}

}  // namespace

TEST_CASE("every board is run in order, with its diagnostics on standard error as they are") {
  Fake fake;
  CHECK(run(audited({"good", "gated", "good"}), fake.world()) == ExitStatus::gated);
  CHECK(fake.asked == std::vector<std::string>{"good", "gated", "good"});
  CHECK(fake.err == "good:1:1: note: read\ngated:1:1: note: read\ngood:1:1: note: read\n");
  CHECK(has(fake.out, "\n3 boards, 3 inputs, 3 audited: 1 error (tapspan 0.1.0, "));
}

TEST_CASE("the status follows the gate, and a missing result wins") {
  Fake fake;
  AuditCommand never = audited({"gated"});
  never.gate = app::Gate::never;
  CHECK(run(never, fake.world()) == ExitStatus::passed);
  CHECK(run(audited({"good"}), fake.world()) == ExitStatus::passed);
  CHECK(run(audited({"gated", "missing"}), fake.world()) == ExitStatus::incomplete);
  CHECK(run(audited({"part"}), fake.world()) == ExitStatus::incomplete);
}

TEST_CASE("a report file is written whatever was found, beside the text") {
  const Folder folder;
  for (const char* netlist : {"good", "gated", "missing", "part"}) {
    Fake fake;
    const std::string path = folder / (std::string(netlist) + ".json");
    static_cast<void>(run(audited({netlist}, path), fake.world()));
    CHECK(has(contents(path), "\"netlist\": \"" + std::string(netlist) + "\""));
    CHECK(has(fake.out, "1 board, 1 input"));
  }
}

TEST_CASE("a report on standard output takes the place of the text") {
  Fake fake;
  CHECK(run(audited({"good"}, "-"), fake.world()) == ExitStatus::passed);
  CHECK(fake.out.front() == '{');
  CHECK_FALSE(has(fake.out, "1 board,"));
}

TEST_CASE("quiet is one line a board") {
  Fake fake;
  AuditCommand command = audited({"good", "gated"});
  command.request.quiet = true;
  static_cast<void>(run(command, fake.world()));
  CHECK(fake.out == "good: 1 input, 1 audited: nothing found\ngated: 1 input, 1 audited: 1 error\n");
}

TEST_CASE("a report that cannot be written is status 2 with one line, and the text still comes") {
  Fake fake;
  CHECK(run(audited({"good"}, "/dev/full"), fake.world()) == ExitStatus::incomplete);
  CHECK(fake.err == "good:1:1: note: read\ntapspan: cannot write /dev/full: No space left on device\n");
  CHECK(has(fake.out, "1 board, 1 input"));
}

TEST_CASE("a reader of standard output that went away is status 2 with one line, and the file is written") {
  const Folder folder;
  Fake fake;
  fake.pipe_closed = true;
  CHECK(run(audited({"good"}, folder / "out.json"), fake.world()) == ExitStatus::incomplete);
  CHECK(fake.err == "good:1:1: note: read\ntapspan: cannot write standard output: Broken pipe\n");
  CHECK(has(contents(folder / "out.json"), "tapspan.report/1"));
}

TEST_CASE("a report never overwrites a netlist of the run") {
  const Folder folder;
  const std::string netlist = folder / "board.cir";
  std::ofstream(netlist) << "R1 a b 1\n";
  Fake fake;
  CHECK(run(audited({netlist}, folder / "../" / folder.path().filename() / "board.cir"), fake.world()) ==
        ExitStatus::incomplete);
  CHECK(fake.err == "tapspan: --json: " + netlist + " is read by this run\n");
  CHECK(fake.asked.empty());
  CHECK(contents(netlist) == "R1 a b 1\n");
}

TEST_CASE("a report never overwrites declarations or an included file, named by the user or found beside the netlist") {
  const Folder folder;
  for (const char* name : {"board.cir", "board.tap.toml", "parts.inc", "more.toml"})
    std::ofstream(folder / name) << "kept";
  for (const char* name : {"board.tap.toml", "parts.inc", "more.toml"}) {
    Fake fake;
    app::World world = fake.world();
    world.board = [&](const std::string& netlist) {
      audit::BoardRun run = fake.board(netlist);
      run.report.sources.add({netlist, "kept", {}});
      run.report.sources.add({(folder / "board.tap.toml").string(), "kept", {}});
      run.report.sources.add({"parts.inc", "kept", {}});
      return run;
    };
    AuditCommand command = audited({folder / "board.cir"}, folder / name);
    command.request.options.with = {folder / "more.toml"};
    CHECK(run(command, world) == ExitStatus::incomplete);
    CHECK(has(fake.err, "tapspan: --json: "));
    CHECK(has(fake.err, std::string(name) + " is read by this run\n"));
    CHECK(contents(folder / name) == "kept");
  }
}

TEST_CASE("names that no declared input has are told once, and are status 2") {
  Fake fake;
  app::World world = fake.world();
  world.board = [&fake](const std::string& netlist) {
    audit::BoardRun run = fake.board(netlist);
    run.report.inputs.clear();
    return run;
  };
  AuditCommand command = audited({"good", "gated"});
  command.request.options.only = {"NOPE*"};
  CHECK(run(command, world) == ExitStatus::incomplete);
  CHECK(has(fake.err, "tapspan: --only: no declared input has such a name\n"));
  TraceCommand trace;
  trace.request = command.request;
  CHECK(run(trace, world) == ExitStatus::incomplete);
}

TEST_CASE("a trace tells what was found and ends well when all could be read") {
  Fake fake;
  app::World world = fake.world();
  world.simulator.clear();
  TraceCommand command;
  command.request = audited({"missing"}).request;
  CHECK(run(command, world) == ExitStatus::passed);
  CHECK(has(fake.out, "1 board, 1 input (tapspan 0.1.0, as of 2026-12-01)"));
  command.request.netlists = {"part"};
  CHECK(run(command, world) == ExitStatus::incomplete);
}

TEST_CASE("a run without a date is of today") {
  Fake fake;
  AuditCommand command = audited({"good"}, "-");
  command.request.as_of.clear();
  static_cast<void>(run(command, fake.world()));
  const std::size_t at = fake.out.find("\"as_of\": \"");
  REQUIRE(at != std::string::npos);
  CHECK(fake.out[at + 14] == '-');
}
