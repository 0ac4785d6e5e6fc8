// Sessions with the real worker.
#include "simulate/session.hpp"

#include <filesystem>
#include <fstream>
#include <set>
#include <stdlib.h>
#include <unistd.h>

#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

using test::Board;

namespace {

namespace fs = std::filesystem;

// A temporary folder that is also the working folder, the home and the place for temporary files while it lives.
class Surroundings {
 public:
  Surroundings() : old_folder_(fs::current_path()), old_home_(::getenv("HOME") != nullptr ? ::getenv("HOME") : "") {
    std::string name = (fs::temp_directory_path() / "session-XXXXXX").string();
    REQUIRE(::mkdtemp(name.data()) != nullptr);
    path = name;
    fs::current_path(path);
    ::setenv("HOME", path.c_str(), 1);
    ::setenv("TMPDIR", path.c_str(), 1);
  }
  Surroundings(const Surroundings&) = delete;
  Surroundings& operator=(const Surroundings&) = delete;
  ~Surroundings() {
    fs::current_path(old_folder_);
    ::setenv("HOME", old_home_.c_str(), 1);
    ::unsetenv("TMPDIR");
    fs::remove_all(path);
  }

  fs::path path;

 private:
  fs::path old_folder_;
  std::string old_home_;
};

std::size_t open_descriptors() {
  std::size_t count = 0;
  for ([[maybe_unused]] const auto& entry : fs::directory_iterator("/proc/self/fd")) ++count;
  return count;
}

// Linear and nonlinear plans on one circuit, enough for several workers.
Board many_plans(std::vector<model::Plan>& plans) {
  Board board;
  board.volts(1, 0, 3.3);
  board.resistor(1, 2, 10e3);
  const model::BranchId sensor = board.resistor(2, 0, 1);
  board.sweep(sensor, test::geometric(300, 300e3, 301));
  board.watch(2);
  const model::Plan linear = board.plan;
  board.device(model::DeviceType::diode, {2, 1}, {{"is", 1e-12}});
  board.device(model::DeviceType::diode, {0, 2}, {{"is", 1e-12}});
  for (int i = 0; i < 20; ++i) plans.push_back(i % 4 == 3 ? board.plan : linear);
  plans[7].network.branches.clear();
  return board;
}

}  // namespace

TEST_CASE("without a worker a session does not open, and says which program is missing") {
  const auto session = simulate::Session::open({"/nowhere/tapspan-worker", 1, 20});
  REQUIRE_FALSE(session.ok());
  CHECK(session.error() == "cannot start the simulator /nowhere/tapspan-worker: No such file or directory");
  CHECK_FALSE(test::has_children());
}

TEST_CASE("a session without a worker fails every plan with its reason, and names no library") {
  std::vector<model::Plan> plans;
  const Board board = many_plans(plans);
  simulate::Session session = simulate::Session::without_worker("the simulator is out");
  std::size_t failed = 0;
  session.solve(plans, board.circuit, board.names, [&failed](std::size_t, const model::Outcome& outcome) {
    if (outcome.failure == "the simulator is out") ++failed;
  });
  CHECK(failed == plans.size() - 1);  // one has nothing to solve and fails by itself
  CHECK(session.simulator().empty());
}

TEST_CASE("a session says which library its worker has") {
  const auto session = simulate::Session::open(test::real_worker());
  REQUIRE(session.ok());
  CHECK(session->simulator() == "ngspice-39");
}

TEST_CASE("results are the same to the last bit with one, two and four workers, and in a second session") {
  std::vector<model::Plan> plans;
  const Board board = many_plans(plans);
  const auto all_bits = [&](unsigned jobs) {
    std::vector<std::string> bits;
    for (const model::Outcome& outcome : test::solve(test::real_worker(jobs), board, plans))
      bits.push_back(test::bits(outcome));
    return bits;
  };
  const std::vector<std::string> one = all_bits(1);
  CHECK(one == all_bits(1));
  CHECK(one == all_bits(2));
  CHECK(one == all_bits(4));
  CHECK(one[7] == "the plan contradicts itself: a swept branch has not one value a point");
  CHECK(one[3].size() > 301 * sizeof(double));
}

TEST_CASE("a session solves again and again, and no plans at all") {
  auto opened = simulate::Session::open(test::real_worker());
  REQUIRE(opened.ok());
  simulate::Session session = std::move(opened).value();
  const Board board = test::divider({10e3});
  const std::vector<model::Plan> plans{board.plan};
  int solved = 0;
  const auto count = [&](std::size_t, const model::Outcome& outcome) {
    solved += outcome.solution.has_value() ? 1 : 0;
  };
  session.solve({}, board.circuit, board.names, count);
  session.solve(plans, board.circuit, board.names, count);
  session.solve(plans, board.circuit, board.names, count);
  CHECK(solved == 2);
}

TEST_CASE("a session leaves no process, no descriptor and no file") {
  const Surroundings here;
  const std::size_t before = open_descriptors();
  std::vector<model::Plan> plans;
  const Board board = many_plans(plans);
  (void)test::solve(test::real_worker(3), board, plans);
  { const auto unused = simulate::Session::open(test::real_worker()); }
  CHECK_FALSE(test::has_children());
  CHECK(open_descriptors() == before);
  CHECK(fs::is_empty(here.path));
}

TEST_CASE("start-up files in the home and in the working folder are not read") {
  const Surroundings here;
  const fs::path mark = here.path / "mark";
  for (const char* name : {".spiceinit", "spice.rc", "spinit"})
    std::ofstream(here.path / name) << "*\nshell touch " << mark.string() << "\nset ngbehavior=ltps\n";
  ::setenv("SPICE_SCRIPTS", here.path.c_str(), 1);
  ::setenv("SPICE_LIB_DIR", here.path.c_str(), 1);
  CHECK(test::solve(test::divider({10e3})).volts[0] == Approx(1.65).epsilon(1e-14));
  CHECK_FALSE(fs::exists(mark));
  ::unsetenv("SPICE_SCRIPTS");
  ::unsetenv("SPICE_LIB_DIR");
}

TEST_CASE("a simulation that needs more time than it has fails its plan alone") {
  Board board = test::divider(test::geometric(300, 300e3, 20000));
  model::Plan brief = board.plan;
  brief.points = 1;
  brief.swept[0].values.resize(1);
  simulate::SessionOptions options = test::real_worker();
  options.timeout_seconds = 0.01;
  const auto outcomes = test::solve(options, board, {board.plan});
  CHECK(outcomes[0].failure == "the simulation took more than 0.01 s");
  options.timeout_seconds = 20;
  CHECK(test::solve(options, board, {brief})[0].solution.has_value());
}
