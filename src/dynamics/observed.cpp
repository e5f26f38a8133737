// SPDX-License-Identifier: Apache-2.0
// Observables of a superposition as matrix products over a block of times.
#include "dynamics/observed.hpp"

#include <complex>

namespace wellwright {

void Density::form(const std::vector<Eigen::MatrixXd>& components, const Eigen::MatrixXcd& a) {
  real = a.real();
  imaginary = a.imag();
  value.setZero(a.cols(), components.front().rows());
  for (const Eigen::MatrixXd& component : components)
    for (const Eigen::MatrixXd* times : {&real, &imaginary}) {
      part.noalias() = times->transpose() * component.transpose();
      value += part.cwiseAbs2();
    }
}

Observed::Observed(const Grid& grid, const Movers& movers, int layers)
    : grid_(&grid), movers_(&movers), rows_(layers + 1), pairs_(movers.count() * (movers.count() + 1) / 2) {
  const auto components = static_cast<Eigen::Index>(movers.components.size());
  by_pairs_ =
      pairs_ * (rows_ + 1) < 2 * components * grid.rows() * movers.count() && pairs_ * rows_ < most_values;
  if (!by_pairs_) return;
  of_pair_.setZero(rows_, pairs_);
  Eigen::VectorXd product;
  for (Eigen::Index i = 0, pair = 0; i < movers.count(); ++i)
    for (Eigen::Index j = 0; j <= i; ++j, ++pair) {
      product.setZero(grid.rows());
      for (const Eigen::MatrixXd& part : movers.components) product += part.col(i).cwiseProduct(part.col(j));
      of_pair_.col(pair) = integrals(product);
    }
}

void Observed::at(const Eigen::MatrixXcd& a, Eigen::MatrixXd& values) {
  if (!by_pairs_) {
    density_.form(movers_->components, a);
    values = integrals(density_.value.transpose());
    return;
  }
  interference_.resize(pairs_, a.cols());
  for (Eigen::Index t = 0; t < a.cols(); ++t)
    for (Eigen::Index i = 0, pair = 0; i < a.rows(); ++i)
      for (Eigen::Index j = 0; j <= i; ++j, ++pair)
        interference_(pair, t) = (i == j ? 1 : 2) * (std::conj(a(i, t)) * a(j, t)).real();
  values.noalias() = of_pair_ * interference_;
}

// Of element-local densities in columns: the integral over each layer, then that of z times the density.
Eigen::MatrixXd Observed::integrals(const Eigen::Ref<const Eigen::MatrixXd>& density) const {
  Eigen::MatrixXd out = Eigen::MatrixXd::Zero(rows_, density.cols());
  const int n = grid_->degree + 1;
  for (int e = 0; e < grid_->elements(); ++e)
    out.row(grid_->layer[static_cast<std::size_t>(e)]) +=
        grid_->weight.segment(e * n, n).transpose() * density.middleRows(e * n, n);
  out.row(rows_ - 1) = grid_->weight.cwiseProduct(grid_->z).transpose() * density;
  return out;
}

}  // namespace wellwright
