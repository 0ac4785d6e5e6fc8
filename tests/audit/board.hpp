// A board in a folder of its own, audited with the real worker or traced without one.
#pragma once

#include <filesystem>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "audit/audit.hpp"
#include "audit/plans.hpp"
#include "audit/reading.hpp"
#include "model/divider.hpp"

namespace test {

class Board {
 public:
  // The netlist is board.cir; `declarations`, unless empty, board.tap.toml beside it.
  explicit Board(const std::string& netlist, const std::string& declarations = {});
  Board(const Board&) = delete;
  Board& operator=(const Board&) = delete;
  ~Board();

  // One more file of the folder; gives its path.
  std::filesystem::path add(const std::string& name, const std::string& bytes) const;
  [[nodiscard]] std::string netlist() const { return (folder_ / "board.cir").string(); }

  [[nodiscard]] audit::BoardRun trace() const { return audit::audit_board(netlist(), options, nullptr); }
  [[nodiscard]] audit::BoardRun audit() const;

  audit::Options options;

 private:
  std::filesystem::path folder_;
};

// The input of that name; a test that asks for one that is not there fails.
[[nodiscard]] const model::AuditedInput& input(const audit::BoardRun& run, std::string_view name);

// The rules of findings, between blanks.
[[nodiscard]] std::string rules(const model::FindingList& findings);

// What stands between reading and simulating, for one input.
struct Made {
  audit::Reading reading;
  model::Divider divider;
  const model::SensorDeclaration* sensor = nullptr;

  [[nodiscard]] base::Result<audit::Prepared> prepare(const std::vector<model::ConditionKind>& needs,
                                                      std::size_t points = 3) const;
};
[[nodiscard]] Made made(const Board& board, std::string_view input);

// A 12-bit converter from 0 to VCC with these inputs.
[[nodiscard]] std::string converter(const std::string& inputs);

// 10 kohm at 25 degC, beta 3977 K, 0 to 50 degC.
[[nodiscard]] std::string ntc(const std::string& name);

}  // namespace test
