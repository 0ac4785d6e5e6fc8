// Workers that crash, hang and lie: a plan that meets one fails with a sentence, the others go on, no process is left.
#include <cstdlib>
#include <filesystem>

#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

using test::Board;

namespace {

// A folder with the fake worker under the name that says how it misbehaves.
class Fake {
 public:
  explicit Fake(const std::string& how) {
    std::string name = (std::filesystem::temp_directory_path() / "fake-XXXXXX").string();
    REQUIRE(::mkdtemp(name.data()) != nullptr);
    folder_ = name;
    options.worker = folder_ / how;
    std::filesystem::create_symlink(TAPSPAN_FAKE_WORKER, options.worker);
    options.timeout_seconds = 5;
  }
  Fake(const Fake&) = delete;
  Fake& operator=(const Fake&) = delete;
  ~Fake() { std::filesystem::remove_all(folder_); }

  simulate::SessionOptions options;

 private:
  std::filesystem::path folder_;
};

// Three plans, the second of which makes the fake misbehave at its third point.
std::vector<model::Outcome> outcomes_with(const simulate::SessionOptions& options) {
  const Board good = test::divider({1e3, 2e3, 3e3, 4e3});
  const Board bad = test::divider({1e3, 2e3, 666, 4e3});
  return test::solve(options, good, {good.plan, bad.plan, good.plan});
}

// The sentence of the second plan; the first and the third must be solved, and no process be left.
std::string failure_with(const simulate::SessionOptions& options) {
  const std::vector<model::Outcome> outcomes = outcomes_with(options);
  CHECK(outcomes[0].solution.has_value());
  CHECK_FALSE(outcomes[1].solution.has_value());
  CHECK(outcomes[2].solution.has_value());
  CHECK_FALSE(test::has_children());
  return outcomes[1].failure;
}

std::string failure_with(const std::string& how) {
  const Fake fake(how);
  return failure_with(fake.options);
}

// The sentence that every plan fails with.
std::string failure_of_all(const std::string& how, double timeout_seconds = 5) {
  Fake fake(how);
  fake.options.timeout_seconds = timeout_seconds;
  const std::vector<model::Outcome> outcomes = outcomes_with(fake.options);
  for (const model::Outcome& outcome : outcomes) CHECK(outcome.failure == outcomes[0].failure);
  CHECK_FALSE(test::has_children());
  return outcomes[0].failure;
}

}  // namespace

TEST_CASE("a worker that crashes at one deck costs the plan of that deck, and says by which signal") {
  CHECK(failure_with("crash") == "the simulator process ended by signal 9");
}

TEST_CASE("a worker that exits at one deck costs the plan of that deck, and says with which status") {
  CHECK(failure_with("exit") == "the simulator process ended with status 9");
}

TEST_CASE("a worker that crashes once is started anew, and the same deck then solved") {
  const Fake fake("crash-once");
  for (const model::Outcome& outcome : outcomes_with(fake.options)) CHECK(outcome.solution.has_value());
}

TEST_CASE("a worker that hangs is ended when the plan's time is over") {
  Fake fake("hang");
  fake.options.timeout_seconds = 0.2;
  CHECK(failure_with(fake.options) == "the simulation took more than 0.2 s");
}

TEST_CASE("a worker that answers garbage, too few numbers or half an answer costs the plan that asked") {
  CHECK(failure_with("garbage") == "the simulator process answered nonsense");
  CHECK(failure_with("few") == "the simulator process answered nonsense");
  CHECK(failure_with("truncated") == "the simulator process ended with status 0");
}

TEST_CASE("a worker that closes its line but lives on is ended") {
  CHECK(failure_with("closes") == "the simulator process ended by closing its socket");
}

TEST_CASE("an answer that nobody asked for is no answer to the next deck") {
  const Fake fake("twice");
  const std::vector<model::Outcome> outcomes = outcomes_with(fake.options);
  for (const model::Outcome& outcome : outcomes) CHECK(outcome.solution.has_value());
  CHECK_FALSE(test::has_children());
}

TEST_CASE("a worker that ends before it is ready fails every plan") {
  CHECK(failure_of_all("exits") == "the simulator process ended with status 7 before it was ready");
}

TEST_CASE("a worker of another protocol version fails every plan and names both versions") {
  CHECK(failure_of_all("version") == "the simulator process speaks version 2 of the protocol, this program version 1");
}

TEST_CASE("a worker that greets with garbage fails every plan") {
  CHECK(failure_of_all("garbage-hello") == "the simulator process answered nonsense");
}

TEST_CASE("a worker that never greets fails every plan after a while") {
  CHECK(failure_of_all("silent", 1) == "the simulator process was not ready in time");
}

TEST_CASE("several workers that crash cost no more than one does") {
  Fake fake("crash");
  fake.options.jobs = 3;
  const std::vector<double> ohms = test::geometric(1e3, 1e4, 1500);
  std::vector<double> with_bad = ohms;
  with_bad[700] = 666;
  const Board good = test::divider(ohms);
  const Board bad = test::divider(with_bad);
  const auto outcomes =
      test::solve(fake.options, good, {good.plan, bad.plan, good.plan, bad.plan, good.plan, good.plan});
  for (std::size_t i = 0; i < outcomes.size(); ++i) CHECK(outcomes[i].solution.has_value() == (i != 1 && i != 3));
  CHECK_FALSE(test::has_children());
}

TEST_CASE("what a worker says of its library is made printable") {
  const Fake fake("crash");
  const auto session = simulate::Session::open(fake.options);
  REQUIRE(session.ok());
  CHECK(session->simulator() == "ngspice-0 \\x1b[31m");
}
