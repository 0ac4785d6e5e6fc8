// Dividers made by hand: what divide would find, without a netlist.
#pragma once

#include <string>
#include <vector>

#include "model/divider.hpp"
#include "tests/network/board.hpp"

namespace advise_test {

// A rail, a fixed resistor R1 and a sensor RT1; the pin is node 2, behind whatever a test adds.
struct Made {
  network_test::Board board;
  model::Divider divider;
  model::BranchId rail, fixed, sensor;

  model::BranchId element(std::vector<model::PartName>& arm, const std::string& name, std::uint32_t a, std::uint32_t b,
                          double ohms) {
    const model::ElementId id{static_cast<std::uint32_t>(board.network.branches.size())};
    const auto branch = board.resistor(a, b, ohms);
    board.network.branches[branch.index()].element = id;
    arm.push_back({name, id});
    return branch;
  }

  model::BranchId leak(std::uint32_t node, double amperes) {
    const auto branch = board.amperes(node, 0, 0);
    divider.whole.leakages.push_back(branch);
    divider.whole.leakage_amperes.push_back(amperes);
    return branch;
  }

  const model::Divider& finished() {
    divider.whole.network = board.network;
    return divider;
  }
};

inline Made with_volts(double rail_volts) {
  Made made;
  auto& input = made.divider.input;
  input.bits = 12;
  input.high = input.nominal_high = 3.3;
  made.rail = made.board.volts(1, 0, rail_volts);
  made.divider.whole.probe = network_test::node(2);
  return made;
}

inline void sweep_sensor(Made& made) {
  made.divider.whole.sensor = made.sensor;
  made.divider.whole.swept = {{made.sensor, model::SweptQuantity::ohms, {}}};
}

inline Made sensor_below(double fixed_ohms) {
  Made made = with_volts(3.3);
  made.fixed = made.element(made.divider.upper, "R1", 1, 2, fixed_ohms);
  made.sensor = made.element(made.divider.lower, "RT1", 2, 0, 1);
  sweep_sensor(made);
  return made;
}

inline Made sensor_above(double fixed_ohms) {
  Made made = with_volts(3.3);
  made.sensor = made.element(made.divider.upper, "RT1", 1, 2, 1);
  made.fixed = made.element(made.divider.lower, "R1", 2, 0, fixed_ohms);
  sweep_sensor(made);
  return made;
}

}  // namespace advise_test
