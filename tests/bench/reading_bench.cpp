// How long a netlist takes from text to flat circuit. Arguments: one netlist file, then Google Benchmark's own.
#include <benchmark/benchmark.h>
#include <chrono>
#include <cstdio>
#include <filesystem>
#include <memory>
#include <utility>

#include "flatten/flatten.hpp"
#include "parse/netlist.hpp"
#include "source/file.hpp"

namespace {

// All that a reading makes. On the heap, so that a benchmark chooses when it is taken down.
struct Board {
  source::Sources sources;
  base::NameTable names;
  source::Diagnostics diagnostics;
  model::Netlist netlist;
  model::Circuit circuit;
};

std::unique_ptr<Board> read(const std::filesystem::path& path, source::Bytes bytes) {
  auto board = std::make_unique<Board>();
  const source::Limits limits;
  const source::SourceId root = board->sources.add({path.string(), std::move(bytes), std::nullopt});
  const parse::Includer include = parse::files_below(path.parent_path(), board->sources, limits);
  board->netlist = parse::read_netlist(root, board->sources, board->names, include, limits, board->diagnostics);
  board->circuit = flatten::flatten(board->netlist, board->names, {}, limits, board->diagnostics);
  return board;
}

source::Bytes bytes_of(const std::filesystem::path& path) {
  auto bytes = source::read_file(path, source::Limits{});
  if (bytes.ok()) return std::move(bytes).value();
  std::fprintf(stderr, "%s\n", bytes.error().c_str());
  std::exit(2);
}

// Only the reading is timed: neither the copy of the text before it nor the end of the board after it.
void run(benchmark::State& state, const std::filesystem::path& path, bool from_disk) {
  const source::Bytes text = bytes_of(path);
  for (auto _ : state) {
    source::Bytes copy = from_disk ? source::Bytes() : text;
    const auto begin = std::chrono::steady_clock::now();
    const auto board = read(path, from_disk ? bytes_of(path) : std::move(copy));
    state.SetIterationTime(std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count());
    if (!board->diagnostics.empty()) state.SkipWithError(board->diagnostics.front().message.c_str());
    state.counters["elements"] = static_cast<double>(board->circuit.elements.size());
    state.counters["nets"] = static_cast<double>(board->circuit.nets.size());
  }
}

}  // namespace

int main(int count, char** arguments) {
  benchmark::Initialize(&count, arguments);
  if (count != 2) {
    std::fprintf(stderr, "usage: reading_bench NETLIST [--benchmark_...]\n");
    return 2;
  }
  const std::filesystem::path path(arguments[1]);
  for (const bool from_disk : {true, false}) {
    const auto body = [path, from_disk](benchmark::State& state) { run(state, path, from_disk); };
    benchmark::RegisterBenchmark(from_disk ? "from_disk" : "from_memory", body)
        ->UseManualTime()
        ->Iterations(1)
        ->Unit(benchmark::kNanosecond);
  }
  benchmark::RunSpecifiedBenchmarks();
}
