#include "simulate/worker_access.hpp"

#include <cstring>
#include <poll.h>
#include <sys/wait.h>

#include <catch2/catch.hpp>

#include "simulate/worker_line.hpp"

namespace test {

simulate::SessionOptions real_worker(unsigned jobs) {
  return {TAPSPAN_WORKER, jobs, 20};
}

std::vector<model::Outcome> solve(const simulate::SessionOptions& options, const Board& board,
                                  const std::vector<model::Plan>& plans) {
  auto session = simulate::Session::open(options);
  REQUIRE(session.ok());
  std::vector<model::Outcome> outcomes(plans.size());
  std::vector<int> calls(plans.size());
  session.value().solve(plans, board.circuit, board.names, [&](std::size_t index, model::Outcome outcome) {
    outcomes[index] = std::move(outcome);
    ++calls[index];
  });
  CHECK(calls == std::vector<int>(plans.size(), 1));
  return outcomes;
}

model::Solution solve(const Board& board) {
  std::vector<model::Outcome> outcomes = solve(real_worker(), board, {board.plan});
  INFO(outcomes[0].failure);
  REQUIRE(outcomes[0].solution.has_value());
  return *outcomes[0].solution;
}

std::string failure_of(const Board& board) {
  const std::vector<model::Outcome> outcomes = solve(real_worker(), board, {board.plan});
  REQUIRE_FALSE(outcomes[0].solution.has_value());
  return outcomes[0].failure;
}

namespace {

simulate::WorkerLine::Event next_event(simulate::WorkerLine& line) {
  while (true) {
    const auto event = line.pump();
    if (event != simulate::WorkerLine::Event::nothing) return event;
    pollfd polled{line.socket(), POLLIN, 0};
    REQUIRE(::poll(&polled, 1, 20000) == 1);
  }
}

}  // namespace

std::vector<simulate::Answer> raw_all(const std::vector<std::string>& decks, const std::vector<std::string>& vectors) {
  auto started = simulate::WorkerLine::start(TAPSPAN_WORKER, 60);
  REQUIRE(started.ok());
  simulate::WorkerLine line = std::move(started).value();
  REQUIRE(next_event(line) == simulate::WorkerLine::Event::ready);
  std::vector<simulate::Answer> answers;
  for (const std::string& deck : decks) {
    simulate::Request request;
    request.deck = deck;
    request.vector_count = static_cast<std::uint32_t>(vectors.size());
    for (const std::string& name : vectors) request.vectors += name + "\n";
    REQUIRE(line.send(request));
    REQUIRE(next_event(line) == simulate::WorkerLine::Event::answer);
    answers.push_back(line.last_answer());
  }
  return answers;
}

simulate::Answer raw(const std::string& deck, const std::vector<std::string>& vectors) {
  return raw_all({deck}, vectors)[0];
}

bool has_children() {
  siginfo_t info{};
  return ::waitid(P_ALL, 0, &info, WEXITED | WNOHANG | WNOWAIT) == 0;  // else ECHILD
}

std::string bits(const model::Outcome& outcome) {
  std::string out = outcome.failure;
  if (!outcome.solution) return out;
  const auto add = [&out](const double* numbers, std::size_t count) {
    const std::size_t at = out.size();
    out.resize(at + count * sizeof(double));
    if (count > 0) std::memcpy(&out[at], numbers, count * sizeof(double));
  };
  const model::Solution& solution = *outcome.solution;
  add(solution.volts.data(), solution.volts.size());
  add(solution.amperes.data(), solution.amperes.size());
  add(&solution.alone_difference, 1);
  return out + std::to_string(static_cast<int>(solution.rung)) + (solution.stepped ? "s" : "");
}

}  // namespace test
