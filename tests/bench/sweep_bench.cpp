// What a sweep costs through our session, and what the bare library needs for the same deck. The working folder must
// hold an empty .spiceinit, so that the bare library reads nobody's.
#include <array>
#include <benchmark/benchmark.h>
#include <cstdio>
#include <cstdlib>
#include <memory>
#include <string>
#include <utility>
#include <vector>

#include "bench/bare_library.hpp"
#include "simulate/deck.hpp"
#include "simulate/session.hpp"

namespace {

constexpr std::size_t plan_count = 50;
constexpr std::size_t point_count = 101;

// Dividers that differ in their fixed resistor: a rail, two arms and a load, four branches; the lower arm is swept.
struct Dividers {
  model::Circuit circuit;
  base::NameTable names;
  std::vector<model::Plan> plans;
};

model::Branch branch(model::Part part, std::uint32_t first, std::uint32_t second) {
  model::Branch out;
  out.part = std::move(part);
  out.nodes = {model::NodeId{first}, model::NodeId{second}};
  out.node_count = 2;
  return out;
}

model::Plan plan(std::size_t number) {
  constexpr std::uint32_t rail = 1;
  constexpr std::uint32_t tap = 2;
  const double upper_ohms = 4700 + 137.5 * static_cast<double>(number);
  model::Plan out;
  out.network.node_count = 3;
  for (std::uint32_t node = 0; node < 3; ++node) out.network.nets.emplace_back(model::NetId{node}, model::NodeId{node});
  out.network.branches = {branch(model::VoltageSource{{3.3, {}}}, rail, 0),
                          branch(model::Resistor{{upper_ohms, {}}}, rail, tap),
                          branch(model::Resistor{{10000, {}}}, tap, 0), branch(model::Resistor{{1e6, {}}}, tap, 0)};
  model::SweptValues swept{model::BranchId{2}, false, {}};
  for (std::size_t i = 0; i < point_count; ++i) swept.values.push_back(300 + 977.13 * static_cast<double>(i));
  out.swept.push_back(std::move(swept));
  out.points = point_count;
  out.conditions = {model::Condition{}};
  out.watched = {model::NodeId{tap}};
  return out;
}

Dividers make_dividers() {
  Dividers out;
  out.circuit.nets.resize(3);
  for (std::size_t i = 0; i < plan_count; ++i) out.plans.push_back(plan(i));
  return out;
}

[[noreturn]] void fail(const std::string& why) {
  std::fprintf(stderr, "%s\n", why.c_str());
  std::exit(2);
}

simulate::Deck deck_of(const Dividers& dividers, const model::Plan& plan) {
  auto writer = simulate::DeckWriter::prepare(plan, dividers.circuit, dividers.names);
  if (!writer.ok()) fail(writer.error());
  auto deck = writer->write(0, plan.points, simulate::Tolerances::none);
  if (!deck.ok()) fail(deck.error());
  return std::move(deck).value();
}

using Volts = std::vector<std::vector<double>>;  // a plan: a point

void solve_all(simulate::Session& session, const Dividers& dividers, Volts& volts) {
  session.solve(dividers.plans, dividers.circuit, dividers.names, [&volts](std::size_t plan, model::Outcome outcome) {
    if (!outcome.solution) fail(outcome.failure);
    volts[plan] = std::move(outcome.solution->volts);
  });
}

void solve_all(std::vector<std::unique_ptr<bench::BareDeck>>& decks, Volts& volts) {
  for (std::size_t i = 0; i < decks.size(); ++i) decks[i]->solve(volts[i]);
}

void count_sweeps(benchmark::State& state) {
  state.SetItemsProcessed(static_cast<std::int64_t>(plan_count) * state.iterations());
}

}  // namespace

int main(int count, char** arguments) {
  benchmark::Initialize(&count, arguments);
  ::setenv("TZ", "UTC0", 1);  // as the worker has it; else the library looks for the local time's file at each deck
  const Dividers dividers = make_dividers();
  auto session = simulate::Session::open({TAPSPAN_WORKER, 1, 20});
  if (!session.ok()) fail(session.error());
  bench::start_bare_library();
  std::vector<std::unique_ptr<bench::BareDeck>> decks;
  for (const model::Plan& plan : dividers.plans) {
    simulate::Deck deck = deck_of(dividers, plan);
    decks.push_back(std::make_unique<bench::BareDeck>(std::move(deck.request.deck), std::move(deck.request.vectors)));
  }
  Volts ours(plan_count);
  Volts bare(plan_count);
  solve_all(*session, dividers, ours);
  solve_all(decks, bare);
  if (ours != bare) fail("session and bare library give different volts");

  benchmark::RegisterBenchmark("session", [&](benchmark::State& state) {
    for (auto _ : state) solve_all(*session, dividers, ours);
    count_sweeps(state);
  })->UseRealTime();
  benchmark::RegisterBenchmark("bare_library", [&](benchmark::State& state) {
    for (auto _ : state) solve_all(decks, bare);
    count_sweeps(state);
  })->UseRealTime();
  benchmark::RegisterBenchmark("deck_text", [&](benchmark::State& state) {
    for (auto _ : state)
      for (const model::Plan& plan : dividers.plans) benchmark::DoNotOptimize(deck_of(dividers, plan));
    count_sweeps(state);
  })->UseRealTime();
  benchmark::RunSpecifiedBenchmarks();
}
