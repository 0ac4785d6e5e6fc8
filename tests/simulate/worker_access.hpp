// The real worker, through a session and through its bare line.
#pragma once

#include <filesystem>
#include <string>
#include <vector>

#include "model/sweep.hpp"
#include "simulate/board.hpp"
#include "simulate/protocol.hpp"
#include "simulate/session.hpp"

namespace test {

[[nodiscard]] simulate::SessionOptions real_worker(unsigned jobs = 1);

// The outcomes of plans on one board's circuit, in the order of the plans. Fails the test when a plan has not exactly
// one.
[[nodiscard]] std::vector<model::Outcome> solve(const simulate::SessionOptions& options, const Board& board,
                                                const std::vector<model::Plan>& plans);

// The board's own plan through the real worker; fails the test when there is no solution.
[[nodiscard]] model::Solution solve(const Board& board);

// The failure of the board's own plan through the real worker; fails the test when there is a solution.
[[nodiscard]] std::string failure_of(const Board& board);

// Decks as they stand, one after the other through one process of the real worker.
[[nodiscard]] std::vector<simulate::Answer> raw_all(const std::vector<std::string>& decks,
                                                    const std::vector<std::string>& vectors);
[[nodiscard]] simulate::Answer raw(const std::string& deck, const std::vector<std::string>& vectors);

// Whether this process has a child that runs or waits to be reaped.
[[nodiscard]] bool has_children();

// The bits of a solution, to be compared: equal only where every number is the same to its last bit.
[[nodiscard]] std::string bits(const model::Outcome& outcome);

}  // namespace test
