#include "base/pages.hpp"

#include <cstdint>
#include <numeric>

#include <catch2/catch.hpp>

TEST_CASE("a large vector keeps what it holds while it grows, moves and is copied") {
  base::LargeVector<std::uint32_t> numbers;
  for (std::uint32_t i = 0; i < 3'000'000; ++i) numbers.push_back(i);
  const base::LargeVector<std::uint32_t> copy = numbers;
  const std::uint32_t* const where = numbers.data();
  const base::LargeVector<std::uint32_t> moved = std::move(numbers);
  CHECK(moved.data() == where);
  CHECK(moved == copy);
  CHECK(std::accumulate(moved.begin(), moved.end(), std::uint64_t{0}) == std::uint64_t{2'999'999} * 1'500'000);
}

TEST_CASE("memory of every size is good to its last byte, and large memory begins at a large page") {
  for (const std::size_t bytes : {std::size_t{1}, std::size_t{4096}, (std::size_t{1} << 18) - 1, std::size_t{1} << 18,
                                  (std::size_t{1} << 21) + 1}) {
    char* const memory = static_cast<char*>(base::take_memory(bytes));
    memory[0] = 'a';
    memory[bytes - 1] = 'z';
    CHECK(memory[bytes - 1] == 'z');
    if (bytes >= std::size_t{1} << 18) CHECK(reinterpret_cast<std::uintptr_t>(memory) % (std::size_t{1} << 21) == 0);
    base::give_memory_back(memory, bytes);
  }
}

TEST_CASE("more than the address space holds is refused") {
  base::LargeVector<std::uint64_t> numbers;
  CHECK_THROWS(numbers.reserve(std::size_t{1} << 59));
  CHECK_THROWS_AS(base::take_memory(std::size_t{1} << 62), std::bad_alloc);
}
