#include "base/disjoint_sets.hpp"

#include <catch2/catch.hpp>

TEST_CASE("the smallest member stands for a set, so that ground stands for its own") {
  base::DisjointSets sets(6);
  CHECK(sets.find(4) == 4);
  CHECK(sets.join(5, 3));
  CHECK(sets.join(3, 1));
  CHECK_FALSE(sets.join(1, 5));
  CHECK(sets.find(5) == 1);
  CHECK(sets.join(5, 0));
  CHECK(sets.find(3) == 0);
  CHECK(sets.find(2) == 2);
}
