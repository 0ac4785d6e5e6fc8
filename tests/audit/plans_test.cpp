// Plans of an input, and what hand-made solutions of them become.
#include <limits>

#include <catch2/catch.hpp>

#include "tests/audit/board.hpp"

using Kind = model::ConditionKind;
using test::Board;
using test::converter;
using test::made;
using test::ntc;

namespace {

const std::string half = "title\nV1 VCC 0 3.3\nR1 VCC A 10k\nRT A 0 10k\n";
const std::vector<Kind> all{Kind::nominal, Kind::leakage_high, Kind::leakage_low, Kind::bare};

// A solution in which every watched volt is its own index.
model::Solution counted(const model::Plan& plan) {
  model::Solution solution;
  const std::size_t size = plan.conditions.size() * plan.points * plan.watched.size();
  for (std::size_t i = 0; i < size; ++i) solution.volts.push_back(static_cast<double>(i));
  return solution;
}

}  // namespace

TEST_CASE("a plan has the sweep's points, the sensor's ohms and the nominal condition") {
  const Board board(half, converter("\"A\"") + ntc("RT"));
  const auto subject = made(board, "A");
  const auto prepared = subject.prepare(all, 5);
  REQUIRE(prepared.ok());
  CHECK(prepared->at == std::vector{0.0, 12.5, 25.0, 37.5, 50.0});
  REQUIRE(prepared->sensor_ohms.size() == 5);
  CHECK(prepared->sensor_ohms[2] == Approx(10e3));
  CHECK(prepared->whole.points == 5);
  REQUIRE(prepared->whole.conditions.size() == 1);  // no leakage is declared
  CHECK(prepared->whole.conditions[0].kind == Kind::nominal);
  CHECK(prepared->whole.watched == std::vector{subject.divider.whole.probe});
  CHECK_FALSE(prepared->bare.has_value());  // linear: the closed form is the bare divider
}

TEST_CASE("leakage makes two conditions, in which all leakages of the network push one way") {
  const Board board(half + "R2 A B 1k\n", converter("\"A\", \"B\"") + "leakage = \"1uA\"\n" + ntc("RT"));
  const auto subject = made(board, "A");
  const auto prepared = subject.prepare(all);
  REQUIRE(prepared.ok());
  REQUIRE(prepared->whole.conditions.size() == 3);
  for (const auto& held : prepared->whole.conditions[1].held) CHECK(held.value == 1e-6);
  for (const auto& held : prepared->whole.conditions[2].held) CHECK(held.value == -1e-6);
  CHECK(prepared->whole.conditions[1].held.size() == 2);
  CHECK(prepared->whole.conditions[2].held.size() == 2);
}

TEST_CASE("conditions that no rule needs are not solved") {
  const Board board(half, converter("\"A\"") + "leakage = \"1uA\"\n" + ntc("RT"));
  const auto prepared = made(board, "A").prepare({Kind::nominal});
  REQUIRE(prepared.ok());
  CHECK(prepared->whole.conditions.size() == 1);
}

TEST_CASE("arms that are not linear get a plan of their own for the bare divider") {
  const Board board(
      "title\nV1 VCC 0 3.3\nR1 VCC A 10k\nXRT A 0 BEAD T=25\n.subckt BEAD P N PARAMS: T=25\nG1 P N "
      "VALUE={V(P,N)/(400*T)*(1+0*V(P,N))}\n.ends\n",
      converter("\"A\"") + "[sensor.XRT]\nkind = \"parameter\"\nsweep = \"T\"\nfrom = 10\nto = 40\n");
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE(prepared.ok());
  REQUIRE(prepared->bare.has_value());
  REQUIRE(prepared->bare->conditions.size() == 1);
  CHECK(prepared->bare->conditions[0].kind == Kind::bare);
  CHECK(prepared->sensor_ohms.empty());
}

TEST_CASE("a sensor that only its solution tells is at the ohms that put the tap where it stands") {
  const Board board(
      "title\nV1 VCC 0 3.3\nR1 VCC A 10k\nXRT A 0 BEAD T=25\n.subckt BEAD P N PARAMS: T=25\nG1 P N "
      "VALUE={V(P,N)/(400*T)*(1+0*V(P,N))}\n.ends\n",
      converter("\"A\"") + "[sensor.XRT]\nkind = \"parameter\"\nsweep = \"T\"\nfrom = 10\nto = 40\n");
  const auto subject = made(board, "A");
  const auto prepared = subject.prepare({Kind::nominal});
  REQUIRE(prepared.ok());
  model::Solution bare;
  bare.volts = {1.65, 1.1, 2.2};  // 10 kohm, 5 kohm and 20 kohm under 10 kohm of 3.3 V (voltage divider rule)
  const auto solved = audit::solved_of(subject.divider, *prepared, prepared->whole, counted(prepared->whole), &bare);
  REQUIRE(solved.ok());
  REQUIRE(solved->sensor_ohms.size() == 3);
  CHECK(solved->sensor_ohms[0] == Approx(10e3));
  CHECK(solved->sensor_ohms[1] == Approx(5e3));
  CHECK(solved->sensor_ohms[2] == Approx(20e3));
  CHECK_FALSE(solved->closed_form.has_value());
}

TEST_CASE("volts of a solution come to the pin, the low end and the high end of their own condition and point") {
  const Board board(
      "title\nV1 VCC 0 3.3\nR0 VCC REF 1k\nR1 REF A 10k\nRT A LOW 10k\nR3 LOW 0 1k\n",
      "[converter.ADC]\nbits = 12\nlow = \"LOW\"\nhigh = \"REF\"\nleakage = \"1uA\"\ninputs = [\"A\"]\n" + ntc("RT"));
  const auto subject = made(board, "A");
  const auto prepared = subject.prepare(all);
  REQUIRE(prepared.ok());
  REQUIRE(prepared->whole.watched.size() == 3);
  const auto solved = audit::solved_of(subject.divider, *prepared, prepared->whole, counted(prepared->whole), nullptr);
  REQUIRE(solved.ok());
  CHECK(solved->nominal.pin == std::vector{0.0, 3.0, 6.0});
  CHECK(solved->nominal.low == std::vector{1.0, 4.0, 7.0});
  CHECK(solved->nominal.high == std::vector{2.0, 5.0, 8.0});
  REQUIRE(solved->leakage_high);
  CHECK(solved->leakage_high->pin == std::vector{9.0, 12.0, 15.0});
  REQUIRE(solved->leakage_low);
  CHECK(solved->leakage_low->high == std::vector{20.0, 23.0, 26.0});
}

TEST_CASE("a linear network is solved in closed form beside the simulator, with each sign of the leakage") {
  const Board board(half, converter("\"A\"") + "leakage = \"1uA\"\n" + ntc("RT"));
  const auto subject = made(board, "A");
  const auto prepared = subject.prepare(all);
  REQUIRE(prepared.ok());
  const auto solved = audit::solved_of(subject.divider, *prepared, prepared->whole, counted(prepared->whole), nullptr);
  REQUIRE(solved.ok());
  REQUIRE((solved->closed_form && solved->closed_form_high && solved->closed_form_low));
  // 1 uA into 10 kohm parallel to 10 kohm is 5 mV either way (Ohm's law).
  CHECK(solved->closed_form->pin[1] == Approx(1.65).epsilon(1e-12));
  CHECK(solved->closed_form_high->pin[1] == Approx(1.655).epsilon(1e-12));
  CHECK(solved->closed_form_low->pin[1] == Approx(1.645).epsilon(1e-12));
  CHECK(solved->bare.pin[1] == Approx(1.65).epsilon(1e-12));
}

TEST_CASE("a sweep through a resistance of zero is an error that says where") {
  const Board board("title\n.param X=1k\nV1 VCC 0 3.3\nR1 VCC A 10k\nRS A 0 {X}\n",
                    converter("\"A\"") + "[sensor.RS]\nkind = \"parameter\"\nsweep = \"X\"\nfrom = 0\nto = 6000\n");
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE_FALSE(prepared.ok());
  CHECK(prepared.error() == "its resistance is 0 ohm at 0");
}
