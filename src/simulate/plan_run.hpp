// One plan on its way through the simulator: which deck comes next, what an answer means, and what is made of the
// numbers. It knows no processes: the pool carries decks and answers. Chunks and rungs follow fixed rules (design:
// "Sweeping"), so that the outcome depends on the plan alone.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "model/sweep.hpp"
#include "simulate/deck.hpp"
#include "simulate/protocol.hpp"

namespace simulate {

class PlanRun {
 public:
  // `plan`, `circuit` and `names` must outlive the run.
  PlanRun(const model::Plan& plan, const model::Circuit& circuit, const base::NameTable& names);

  // The deck to solve now; null when the run is finished. The same until an answer or a failure is given.
  [[nodiscard]] const Deck* deck();

  void take(const Answer& answer);
  // The deck could not be solved at all; `why` is a sentence without a full stop.
  void deck_failed(const std::string& why);
  // The plan is given up.
  void give_up(const std::string& why);

  // Once deck() is null.
  [[nodiscard]] model::Outcome outcome();

 private:
  // The rungs of the ladder. Stepping is allowed on the last two only, where a deck is one copy.
  enum class Stage : std::uint8_t { linear, tight, medium, last_tight, last_medium };

  struct Chunk {
    std::size_t first = 0;
    std::size_t count = 0;
    Stage stage = Stage::linear;
    bool alone = false;  // a copy that is solved a second time, by itself, to be compared
  };

  void split_into_chunks();
  void add_alone_copies();
  [[nodiscard]] std::vector<std::size_t> copies_to_repeat() const;
  void keep(const Answer& answer);
  void compare(const Answer& answer);
  [[nodiscard]] double number(const Answer& answer, std::size_t place) const;

  const model::Plan* plan_;
  std::optional<DeckWriter> writer_;
  std::optional<Deck> deck_;
  std::vector<Chunk> open_;      // the last is next
  std::vector<Stage> stages_;    // of each copy that is solved
  std::vector<bool> by_itself_;  // whether a copy was solved in a deck of its own
  bool repeated_ = false;
  model::Solution solution_;
  std::string failure_;
};

}  // namespace simulate
