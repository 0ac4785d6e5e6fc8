// Which of several sensors move a reading. Where a rail that others draw from is also the range, what they do to it
// cancels: every voltage of a linear network that one source feeds goes with that source (superposition). Told by
// solving, not by shape.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "divide/networks.hpp"
#include "divide/sensors.hpp"
#include "model/divider.hpp"
#include "model/sheet.hpp"
#include "network/values.hpp"

namespace divide {

// How much more a leakage may move the reading than it does with the still sensors where the network holds them.
struct LeakageShare {
  std::vector<double> of_each;  // of ProbedNetwork::leakages; at least 1
  std::string where;            // "VDD at 2 V": where it is largest; empty where it is nowhere 1 % more
};

class Influence {
 public:
  // Nothing where no solve can tell: a network that is not linear, two sensors that share a parameter, a sensor without
  // a value somewhere in its range. `subject` without a sensor.
  [[nodiscard]] static std::optional<Influence> make(const Subject& subject, const model::Sheet& sheet,
                                                     std::span<const Mover> movers);

  // Whether the reading (without leakage) is the same wherever these movers stand in their ranges, to a ten-thousandth
  // of an LSB, tried with them and all others at their ends, in their middle and apart from each other. False where the
  // network has no solution or the range's ends meet on the way.
  [[nodiscard]] bool stand_still(std::span<const std::size_t> movers) const;

  // Over all that the still movers may do, while `own` moves: with leakages of these shares the held network's reading
  // goes as far as anywhere. Nothing where a leakage moves the reading somewhere and not at rest, or one of them or all
  // together so far that shares of it tell little (one sign's way differs from the other's by a twentieth).
  [[nodiscard]] std::optional<LeakageShare> leakage_share(std::size_t own, std::span<const std::size_t> still) const;

  // Where the network has to hold a mover: the middle of its range; nothing for a rail, which stays at rest.
  [[nodiscard]] std::optional<Held> held(std::size_t mover) const;
  [[nodiscard]] std::string held_text(std::size_t mover) const;  // "RT2 at 25 degC", "VDD at rest"

 private:
  enum class Stand : unsigned char { from, middle, to, rest };
  using Stands = std::vector<Stand>;  // one a mover
  struct Moved {
    Held middle;
    bool is_rail = false;
    bool rests = false;  // a rail that stands somewhere while nobody sweeps it
    std::string name;
    std::string unit;
    std::vector<double> at;                              // measurands at from, middle, to
    std::vector<std::vector<model::Override>> branches;  // likewise
  };
  struct Reading {
    double own = 0;                   // without leakage
    std::vector<double> plus, minus;  // what each leakage alone adds, by its sign
    double up = 0, down = 0;          // what all of them add together, each with the sign for that

    [[nodiscard]] double largest(std::size_t leakage) const;
  };
  using Scales = std::vector<double>;  // of the leakages; 0, or empty for all: not wanted

  Influence(const Subject& subject) : input_(&subject.input) {}
  [[nodiscard]] bool add(const Subject& subject, const model::Sheet& sheet, const Mover& mover);
  [[nodiscard]] std::optional<Reading> read(const Stands& stands, const Scales& scales) const;
  [[nodiscard]] std::size_t own_leakage() const;
  [[nodiscard]] std::optional<Scales> felt(std::size_t own) const;
  [[nodiscard]] bool cover(LeakageShare& share, const Scales& felt, const std::vector<Stands>& worst,
                           std::size_t own) const;
  [[nodiscard]] std::vector<Stands> worst_stands(const Scales& felt, std::span<const std::size_t> still) const;
  [[nodiscard]] std::string place_text(std::size_t mover, Stand stand) const;
  [[nodiscard]] std::string where_text(const Stands& worst, std::span<const std::size_t> still) const;

  const model::Input* input_;
  model::ProbedNetwork probed_;
  std::vector<Moved> moved_;
};

}  // namespace divide
