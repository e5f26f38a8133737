// SPDX-License-Identifier: Apache-2.0
// Poisson's equation on the elements: stiffness, loads, Newton matrices.
#include "charge/poisson.hpp"

#include <cmath>

#include "wellwright/diagnostics.hpp"

namespace wellwright {

using constants::charge_over_permittivity;

Poisson::Poisson(const Grid& grid, const Eigen::VectorXd& permittivity, const Hold& hold) : grid_(&grid) {
  const int p = grid.degree, n = p + 1, elements = grid.elements();
  const int global = elements * p + (hold.periodic ? 0 : 1);
  for (int e = 0; e < elements; ++e)
    for (int i = 0; i < n; ++i) node_.push_back((e * p + i) % (hold.periodic ? global : global + 1));
  held_.assign(static_cast<std::size_t>(global), false);
  if (hold.bottom) held_.front() = true;
  if (hold.top) held_.back() = true;
  mass_.setZero(global);
  const Eigen::MatrixXd& D = reference_element(p).derivative;
  std::vector<Eigen::Triplet<double>> entries;
  for (int e = 0; e < elements; ++e) {
    const double scale = 4 / (grid.width(e) * grid.width(e));
    const Eigen::VectorXd c =
        scale * grid.weight.segment(e * n, n).cwiseProduct(permittivity.segment(e * n, n));
    const Eigen::MatrixXd K = D.transpose() * c.asDiagonal() * D;
    for (int i = 0; i < n; ++i) {
      mass_[node_of(e * n + i)] += grid.weight[e * n + i];
      for (int j = 0; j < n; ++j) entries.emplace_back(node_of(e * n + i), node_of(e * n + j), K(i, j));
    }
  }
  stiffness_.resize(global, global);
  stiffness_.setFromTriplets(entries.begin(), entries.end());
}

bool Poisson::floating() const {
  return !held_.front() && !held_.back();
}

Eigen::VectorXd Poisson::load(const Eigen::VectorXd& density) const {
  Eigen::VectorXd load = Eigen::VectorXd::Zero(nodes());
  for (Eigen::Index row = 0; row < density.size(); ++row)
    load[node_of(static_cast<int>(row))] += grid_->weight[row] * density[row];
  return load;
}

Eigen::VectorXd Poisson::load_of_sheets(const Eigen::VectorXd& sheet) const {
  Eigen::VectorXd load = Eigen::VectorXd::Zero(nodes());
  const int period = nodes();
  for (Eigen::Index b = 0; b < sheet.size(); ++b)
    load[(static_cast<int>(b) * grid_->degree) % period] += sheet[b];
  return load;
}

Eigen::VectorXd Poisson::residual(const Eigen::VectorXd& V, const Eigen::VectorXd& charge) const {
  Eigen::VectorXd r = stiffness_ * V + charge_over_permittivity * charge;
  for (int i = 0; i < nodes(); ++i)
    if (held(i)) r[i] = 0;
  return r;
}

void Poisson::factor(const Eigen::VectorXd& response) {
  Eigen::SparseMatrix<double> A = stiffness_;
  pinned_bottom_ = floating() && !(response.maxCoeff() > 0);
  const auto fixed = [&](Eigen::Index i) { return held(static_cast<int>(i)) || (pinned_bottom_ && i == 0); };
  for (Eigen::Index column = 0; column < A.outerSize(); ++column)
    for (Eigen::SparseMatrix<double>::InnerIterator it(A, column); it; ++it) {
      if (fixed(it.row()) || fixed(it.col()))
        it.valueRef() = it.row() == it.col() ? 1 : 0;
      else if (it.row() == it.col())
        it.valueRef() += charge_over_permittivity * response[it.row()];
    }
  factors_.compute(A);
  if (factors_.info() != Eigen::Success)
    throw NotConverged("Poisson's equation has no solution for this charge");
}

Eigen::VectorXd Poisson::solve(const Eigen::VectorXd& right) const {
  Eigen::VectorXd r = right;
  for (int i = 0; i < nodes(); ++i)
    if (held(i) || (pinned_bottom_ && i == 0)) r[i] = 0;
  return factors_.solve(r);
}

Eigen::VectorXd Poisson::scatter(const Eigen::VectorXd& global) const {
  Eigen::VectorXd local(static_cast<Eigen::Index>(node_.size()));
  for (Eigen::Index row = 0; row < local.size(); ++row) local[row] = global[node_of(static_cast<int>(row))];
  return local;
}

}  // namespace wellwright
