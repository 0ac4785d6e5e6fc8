// Disjoint sets of numbers, joined step by step: which nodes are one.
#pragma once

#include <cstddef>
#include <cstdint>
#include <numeric>
#include <utility>
#include <vector>

namespace base {

// Union-find with path halving (Tarjan and van Leeuwen, Journal of the ACM 31, 1984).
class DisjointSets {
 public:
  // The sets {0}, {1}, ... of that many numbers.
  explicit DisjointSets(std::size_t count) : parent_(count) { std::iota(parent_.begin(), parent_.end(), 0U); }

  // The smallest member of a number's set, which stands for all of it: node 0, the ground, stands for its own.
  [[nodiscard]] std::uint32_t find(std::uint32_t number) {
    while (parent_[number] != number) number = parent_[number] = parent_[parent_[number]];
    return number;
  }

  // Makes the sets of a and b one; false where they were one already.
  bool join(std::uint32_t a, std::uint32_t b) {
    a = find(a);
    b = find(b);
    if (a > b) std::swap(a, b);
    parent_[b] = a;
    return a != b;
  }

 private:
  std::vector<std::uint32_t> parent_;
};

}  // namespace base
