// The least that the bare simulator library needs for a deck: the yardstick of a sweep's cost.
#pragma once

#include <string>
#include <vector>

namespace bench {

// A deck and the vectors wanted of it, cut into lines beforehand: the library's own interface takes lines.
class BareDeck {
 public:
  // Both texts hold lines that end in \n.
  BareDeck(std::string deck, std::string vectors);
  BareDeck(const BareDeck&) = delete;
  BareDeck& operator=(const BareDeck&) = delete;

  // Loads the deck, finds its operating point, reads the vectors into `values` and forgets the deck. No check of any
  // kind, but a missing vector or a library that asks for its end stops the program.
  void solve(std::vector<double>& values);

 private:
  std::string deck_;
  std::string vectors_;
  std::vector<char*> lines_;
  std::vector<char*> names_;
};

// Once, before the first deck.
void start_bare_library();

}  // namespace bench
