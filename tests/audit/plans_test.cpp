// Plans of an input, and what hand-made solutions of them become.
#include <cmath>
#include <limits>

#include <catch2/catch.hpp>

#include "audit/leakage.hpp"
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
  model::Solution whole;
  for (const double pin : {1.65, 1.655, 1.645}) whole.volts.insert(whole.volts.end(), 3, pin);
  const auto solved = audit::solved_of(subject.divider, *prepared, prepared->whole, whole, nullptr);
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
  CHECK(prepared.error() == "the resistance of RS is 0 ohm at 0");
}

namespace {

// A is read against REF, and both are inputs that leak; `more` is what else there is.
std::string reference_board(const std::string& more) {
  return "title\nV1 VCC 0 5\nR1 VCC A 10k\nRT A 0 10k\nR3 VCC REF 10k\nR4 REF 0 30k\n" + more;
}
std::string reference_converters(const std::string& others) {
  return "[converter.U1]\nbits = 12\nhigh = \"REF\"\ninputs = [\"A\"]\nleakage = \"1uA\"\n[converter.U2]\nbits = "
         "12\nhigh = "
         "5\ninputs = [\"REF\"" +
         others + "]\nleakage = \"2uA\"\n" + ntc("RT");
}

std::vector<double> held_amperes(const model::Condition& condition) {
  std::vector<double> amperes;
  for (const auto& held : condition.held) amperes.push_back(held.value);
  return amperes;
}

}  // namespace

TEST_CASE("where an end of the range leaks too, each leakage has the sign of its own effect on the reading") {
  const Board board(reference_board(""), reference_converters(""));
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE(prepared.ok());
  REQUIRE(prepared->whole.conditions.size() == 3);
  CHECK(prepared->whole.conditions[1].kind == Kind::leakage_high);
  CHECK(held_amperes(prepared->whole.conditions[1]) == std::vector{1e-6, -2e-6});
  CHECK(prepared->whole.conditions[2].kind == Kind::leakage_low);
  CHECK(held_amperes(prepared->whole.conditions[2]) == std::vector{-1e-6, 2e-6});
}

TEST_CASE("on a network that is not linear every set of signs of a few leakages is simulated") {
  const Board board(reference_board("D1 A REF DX\n.model DX D(IS=1e-14)\n"), reference_converters(""));
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE(prepared.ok());
  const auto& conditions = prepared->whole.conditions;
  REQUIRE(conditions.size() == 5);
  CHECK(held_amperes(conditions[1]) == std::vector{1e-6, 2e-6});
  CHECK(held_amperes(conditions[2]) == std::vector{-1e-6, 2e-6});
  CHECK(held_amperes(conditions[3]) == std::vector{1e-6, -2e-6});
  CHECK(held_amperes(conditions[4]) == std::vector{-1e-6, -2e-6});
}

TEST_CASE("of many leakages on a network that is not linear each is simulated alone with either sign") {
  const Board board(reference_board("D1 A REF DX\n.model DX D(IS=1e-14)\nR5 A B 1k\nR6 B C 1k\nR7 C D 1k\n"),
                    reference_converters(", \"B\", \"C\", \"D\""));
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE(prepared.ok());
  const auto& conditions = prepared->whole.conditions;
  REQUIRE(conditions.size() == 3 + 2 * 5);
  CHECK(conditions[1].held.size() == 5);
  CHECK(conditions[2].held.size() == 5);
  for (std::size_t c = 3; c < conditions.size(); ++c) {
    CHECK(conditions[c].kind == Kind::leakage_alone);
    CHECK(conditions[c].held.size() == 1);
  }
}

TEST_CASE("diodes at a pin with fixed ends of the range need no more than all leakages up and all down") {
  const Board board(half + "R2 A B 1k\nD1 B VCC DX\n.model DX D(IS=1e-14)\n",
                    converter("\"A\", \"B\"") + "leakage = \"1uA\"\n" + ntc("RT"));
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE(prepared.ok());
  CHECK(prepared->whole.conditions.size() == 3);
}

TEST_CASE("the furthest corner counts at each point, and effects found one by one are added in magnitude") {
  const auto at = [](std::vector<double> pin) {
    const std::size_t points = pin.size();
    return judge::Solved::Volts{std::move(pin), std::vector<double>(points, 0.0), std::vector<double>(points, 10.0)};
  };
  model::Input input;
  input.nominal_high = 10;
  judge::Solved solved;
  solved.nominal = at({5, 5});
  std::vector<audit::LeakageCorner> corners{{Kind::leakage_high, at({6, 5.5}), std::nullopt},
                                            {Kind::leakage_high, at({5.5, 6}), std::nullopt},
                                            {Kind::leakage_low, at({6.5, 4}), std::nullopt}};
  audit::join_leakage(input, corners, solved);
  CHECK(solved.leakage_high->pin == std::vector{6.5, 6.0});
  CHECK(solved.leakage_low->pin == std::vector{5.5, 4.0});
  // One leakage moves by +1 and -1, the other by -0.75 and +0.5, a third by 0.25 whatever its sign.
  for (const auto& pin : {std::vector{6.0, 6.0}, {4.0, 4.0}, {4.25, 4.25}, {5.5, 5.5}, {5.25, 5.25}, {5.25, 5.25}})
    corners.push_back({Kind::leakage_alone, at(pin), std::nullopt});
  audit::join_leakage(input, corners, solved);
  CHECK(solved.leakage_high->pin == std::vector{6.75, 6.75});
  CHECK(solved.leakage_low->pin == std::vector{3.25, 3.25});
}

TEST_CASE("slopes of the bare divider are exact with two points of the sweep as with many") {
  // u = R(T)/(R1 + R(T)), R(T) = R25 exp(B (1/T - 1/T25)): du/dT = -(B/T^2) u (1 - u); IEC 60539-1 terms.
  const Board board(half, converter("\"A\"") + ntc("RT"));
  for (const std::size_t points : {2U, 5U, 101U}) {
    const auto prepared = made(board, "A").prepare(all, points);
    REQUIRE(prepared.ok());
    REQUIRE(prepared->bare_slope.size() == points);
    for (std::size_t i = 0; i < points; ++i) {
      const double kelvin = prepared->at[i] + 273.15;
      const double u = 1 / (1 + std::exp(-3977 * (1 / kelvin - 1 / 298.15)));
      CHECK(prepared->bare_slope[i] == Approx(-3977 / (kelvin * kelvin) * u * (1 - u)).epsilon(1e-6));
    }
  }
}

TEST_CASE("slopes over decades of light are exact at both ends") {
  // R = R10 (E/10)^-gamma above 2.2 kohm: u = 2200/(2200 + R), du/dE = gamma/E u (1 - u).
  const Board board(
      "title\nV1 VCC 0 3.3\nRP VCC A 10k\nR1 A 0 2200\n",
      converter("\"A\"") +
          "[sensor.RP]\nkind = \"photoresistor\"\nohms_at_10lx = \"12k\"\ngamma = 0.7\nfrom = 0.01\nto = 1e5\n");
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE(prepared.ok());
  REQUIRE(prepared->bare_slope.size() == 3);
  for (std::size_t i = 0; i < 3; ++i) {
    const double light = prepared->at[i];
    const double u = 2200 / (2200 + 12e3 * std::pow(light / 10, -0.7));
    CHECK(prepared->bare_slope[i] == Approx(0.7 / light * u * (1 - u)).epsilon(1e-6));
  }
}

TEST_CASE("a divider that only the simulator solves has no slopes of its own") {
  const Board board(
      "title\nV1 VCC 0 3.3\nR1 VCC A 10k\nXRT A 0 BEAD T=25\n.subckt BEAD P N PARAMS: T=25\nG1 P N "
      "VALUE={V(P,N)/(400*T)*(1+0*V(P,N))}\n.ends\n",
      converter("\"A\"") + "[sensor.XRT]\nkind = \"parameter\"\nsweep = \"T\"\nfrom = 10\nto = 40\n");
  const auto prepared = made(board, "A").prepare(all);
  REQUIRE(prepared.ok());
  CHECK(prepared->bare_slope.empty());
}
