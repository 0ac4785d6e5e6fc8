#include "network/factors.hpp"

#include <Eigen/LU>
#include <Eigen/SparseLU>

namespace network {
namespace {

constexpr std::size_t largest_dense = 150;

using Sparse = Eigen::SparseMatrix<double>;

}  // namespace

struct Factors::Impl {
  Eigen::MatrixXd matrix;
  Eigen::PartialPivLU<Eigen::MatrixXd> dense;
  std::unique_ptr<Eigen::SparseLU<Sparse>> sparse;  // it cannot be moved or copied
};

Factors::Factors() : impl_(std::make_unique<Impl>()) {}
Factors::~Factors() = default;
Factors::Factors(Factors&&) noexcept = default;
Factors& Factors::operator=(Factors&&) noexcept = default;

bool Factors::factor(std::size_t size, std::span<const Entry> entries) {
  const auto n = static_cast<Eigen::Index>(size);
  if (size <= largest_dense) {
    impl_->sparse.reset();
    impl_->matrix.setZero(n, n);
    for (const Entry& entry : entries) impl_->matrix(entry.row, entry.column) += entry.value;
    impl_->dense.compute(impl_->matrix);
    return n == 0 || (impl_->dense.matrixLU().diagonal().array() != 0).all();
  }
  std::vector<Eigen::Triplet<double>> triplets;
  triplets.reserve(entries.size());
  for (const Entry& entry : entries)
    triplets.emplace_back(static_cast<int>(entry.row), static_cast<int>(entry.column), entry.value);
  Sparse matrix(n, n);
  matrix.setFromTriplets(triplets.begin(), triplets.end());
  impl_->sparse = std::make_unique<Eigen::SparseLU<Sparse>>();
  impl_->sparse->compute(matrix);
  return impl_->sparse->info() == Eigen::Success;
}

void Factors::solve(std::span<double> side) const {
  if (side.empty()) return;
  Eigen::Map<Eigen::VectorXd> vector(side.data(), static_cast<Eigen::Index>(side.size()));
  vector = impl_->sparse ? Eigen::VectorXd(impl_->sparse->solve(vector)) : Eigen::VectorXd(impl_->dense.solve(vector));
}

}  // namespace network
