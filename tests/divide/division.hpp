// A board and its declarations as texts -> the division of it, with all that the tests want to ask.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "model/divider.hpp"
#include "model/netlist.hpp"
#include "model/sheet.hpp"
#include "source/diagnostic.hpp"
#include "source/text.hpp"

namespace test {

using Texts = std::vector<std::string>;

struct Board {
  source::Sources sources;
  base::NameTable names;
  model::Sheet sheet;
  model::Netlist netlist;
  model::Circuit circuit;
  model::Division division;
  Texts said;  // errors of divide, as headlines: "tap.toml:3:1: error: ..."

  // The divider of an input by its name; a test that asks for one that is not there fails.
  [[nodiscard]] const model::Divider& at(std::string_view input) const;
  [[nodiscard]] const model::Divider& only() const;
  [[nodiscard]] std::string net(model::NetId net) const;
  [[nodiscard]] Texts assumed() const;

  // Pin or tap volts of a linear network at each of `points` points of its sensor's range.
  [[nodiscard]] std::vector<double> pin_volts(const model::Divider& divider, std::size_t points) const;
  [[nodiscard]] std::vector<double> bare_volts(const model::Divider& divider, std::size_t points) const;
};

// The netlist's title is added; a fault of the texts themselves (not of divide) fails the test unless `may_be_broken`.
[[nodiscard]] Board board_of(const std::string& netlist, const std::string& declarations, const Texts& only = {},
                             bool may_be_broken = false);

// Names of parts between blanks.
[[nodiscard]] std::string list(const std::vector<model::PartName>& parts);

// "VCC > R1 > TAP > RT > 0; sense R2; load R3" without the empty pieces: rails, arms and what is beside them in one
// line.
[[nodiscard]] std::string drawn(const Board& board, const model::Divider& divider);

// A 12-bit converter from 0 to the net VCC, with these inputs.
[[nodiscard]] std::string converter(const std::string& inputs);

// An NTC of 10 kohm at 25 degC (beta 3977 K; B equation of IEC 60539-1), 0 to 50 degC: what follows its name are
// further lines.
[[nodiscard]] std::string ntc(const std::string& name, const std::string& more = {});

}  // namespace test
