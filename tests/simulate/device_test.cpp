// Clamp diodes and other devices through the real simulator, against Newton's method on the diode equation
// I = Is (exp(V / (n Vt)) - 1) + gmin V; Vt = k T / q at 27 degC with CODATA 2014, as the simulator has it; gmin 1e-12
// S.
#include <cmath>

#include <catch2/catch.hpp>

#include "simulate/worker_access.hpp"

using test::Board;

namespace {

constexpr double thermal_volts = 1.38064852e-23 * 300.15 / 1.6021766208e-19;
constexpr double saturation_amperes = 1e-14;

double diode_amperes(double volts) {
  return saturation_amperes * std::expm1(volts / thermal_volts) + 1e-12 * volts;
}
double diode_siemens(double volts) {
  return saturation_amperes / thermal_volts * std::exp(volts / thermal_volts) + 1e-12;
}

// The node behind `ohms` from `drive` volts, with one diode to the 3.3 V rail and one from ground.
double clamped_volts(double drive, double ohms) {
  double volts = std::fmin(std::fmax(drive, 0.0), 3.3);
  for (int i = 0; i < 500; ++i) {
    const double balance = (volts - drive) / ohms + diode_amperes(volts - 3.3) - diode_amperes(-volts);
    const double slope = 1 / ohms + diode_siemens(volts - 3.3) + diode_siemens(-volts);
    const double step = balance / slope;
    volts -= std::fmin(std::fmax(step, -0.02), 0.02);
  }
  return volts;
}

Board clamped(const std::vector<double>& drive) {
  Board board;
  board.volts(1, 0, 3.3);
  const model::BranchId source = board.volts(2, 0, 0);
  board.resistor(2, 3, 1e3);
  board.device(model::DeviceType::diode, {3, 1}, {{"is", saturation_amperes}});
  board.device(model::DeviceType::diode, {0, 3}, {{"is", saturation_amperes}});
  board.sweep(source, drive);
  board.watch(3);
  return board;
}

}  // namespace

TEST_CASE("clamp diodes hold the pin where the diode equation says, conducting or not") {
  std::vector<double> drive;
  for (int i = 0; i <= 100; ++i) drive.push_back(-12 + 0.24 * i);
  const model::Solution solution = test::solve(clamped(drive));
  CHECK(solution.rung == model::Rung::tight);
  CHECK(solution.alone_difference < 1e-9);
  REQUIRE(solution.volts.size() == drive.size());
  for (std::size_t i = 0; i < drive.size(); ++i) {
    INFO(drive[i]);
    CHECK(std::fabs(solution.volts[i] - clamped_volts(drive[i], 1e3)) < 1e-7);
  }
}

TEST_CASE("a Zener diode holds a node near its breakdown voltage") {
  Board board;
  board.volts(1, 0, 12);
  board.resistor(1, 2, 1e3);
  board.device(model::DeviceType::diode, {0, 2}, {{"is", 1e-14}, {"bv", 5.1}, {"ibv", 5e-3}});
  board.nominal();
  board.watch(2);
  CHECK(test::solve(board).volts[0] == Approx(5.1).margin(0.05));
}

TEST_CASE("a transistor's collector current is its forward gain times its base current") {
  Board board;
  board.volts(1, 0, 5);
  board.resistor(1, 2, 1e3);
  board.amperes(0, 3, 10e-6);
  board.device(model::DeviceType::npn, {2, 3, 0}, {{"is", 1e-15}, {"bf", 100}});
  board.nominal();
  board.watch(2);
  CHECK(test::solve(board).volts[0] == Approx(4).epsilon(1e-4));
}

TEST_CASE("a switch is its on-resistance above its threshold and its off-resistance below") {
  Board board;
  board.volts(1, 0, 2);
  const model::BranchId control = board.volts(2, 0, 0);
  board.resistor(1, 3, 1e3);
  board.device(model::DeviceType::voltage_switch, {3, 0, 2, 0}, {{"ron", 1e3}, {"roff", 1e9}, {"vt", 1}, {"vh", 0.1}});
  board.sweep(control, {0, 2});
  board.watch(3);
  const model::Solution solution = test::solve(board);
  CHECK(solution.volts[0] == Approx(2).epsilon(2e-6));
  CHECK(solution.volts[1] == Approx(1).epsilon(1e-9));
}

TEST_CASE("field effect transistors take parameters of their own") {
  Board board;
  board.volts(1, 0, 5);
  board.volts(2, 0, 2);
  board.resistor(1, 3, 1e3);
  const model::BranchId channel = board.device(model::DeviceType::nmos, {3, 2, 0, 0}, {{"vto", 1}, {"kp", 1e-4}});
  board.circuit.device_parameters = {{board.names.intern("w"), 20e-6}, {board.names.intern("L"), 2e-6}};
  std::get<model::Device>(board.plan.network.branches[channel.index()].part).parameters = {0, 2};
  board.nominal();
  board.watch(3);
  // Saturation: I = KP/2 W/L (VGS - VTO)^2 = 0.5 mA (Shichman and Hodges 1968).
  CHECK(test::solve(board).volts[0] == Approx(4.5).epsilon(1e-6));
}
