// Disjoint sets of nodes, joined step by step (union-find).
#pragma once

#include <cstdint>
#include <numeric>
#include <utility>
#include <vector>

namespace network {

class Groups {
 public:
  explicit Groups(std::size_t nodes) : parent_(nodes) { std::iota(parent_.begin(), parent_.end(), 0U); }

  // The smallest member of the node's set: ground stands for its own.
  [[nodiscard]] std::uint32_t of(std::uint32_t node) {
    while (parent_[node] != node) node = parent_[node] = parent_[parent_[node]];
    return node;
  }

  // False where the two were one set already.
  bool join(std::uint32_t a, std::uint32_t b) {
    a = of(a);
    b = of(b);
    if (a > b) std::swap(a, b);
    parent_[b] = a;
    return a != b;
  }

 private:
  std::vector<std::uint32_t> parent_;
};

}  // namespace network
