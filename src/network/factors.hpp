// A square matrix in factors. The only place that knows the linear-algebra library.
#pragma once

#include <cstdint>
#include <memory>
#include <span>
#include <vector>

namespace network {

struct Entry {
  std::uint32_t row = 0;
  std::uint32_t column = 0;
  double value = 0;
};

// Dense with partial pivoting while it is small, sparse beyond. Entries of one place add up.
class Factors {
 public:
  Factors();
  ~Factors();
  Factors(Factors&&) noexcept;
  Factors& operator=(Factors&&) noexcept;

  // False: a pivot is zero to the last digit. A true answer does not yet mean that the matrix is regular.
  [[nodiscard]] bool factor(std::size_t size, std::span<const Entry> entries);

  // Turns a right-hand side into the solution, in place.
  void solve(std::span<double> side) const;

 private:
  struct Impl;
  std::unique_ptr<Impl> impl_;
};

}  // namespace network
