// SPDX-License-Identifier: Apache-2.0
// Bounds and the application of T(E).
#include "wellwright/hamiltonian.hpp"

#include <algorithm>
#include <cmath>

#include "hamiltonian/packs.hpp"

namespace wellwright {

using constants::hbar2_over_2m0;

Hamiltonian::Hamiltonian(const Profile& profile, double k)
    : profile_(&profile), k_(k), packs_(std::make_shared<const Packs>(profile, k)) {
  const Coefficients& at = profile.at;
  const Grid& grid = profile.grid;
  highest_pole_ = at.poles() > 0 && at.v.rows() > 0 ? at.v.maxCoeff() : -1e300;
  lowest_edge_ = at.edge.minCoeff();
  highest_edge_ = at.edge.maxCoeff();
  // Bound of the mass-scaled operator: row sums of each element's stiffness with the band-edge masses.
  const int n = grid.degree + 1;
  const double largest = packs_->tables->largest_row;
  norm_ = rounding_norm_ = 0;
  int layers = 0;
  for (const int layer : grid.layer) layers = std::max(layers, layer + 1);
  std::vector<double> widest(static_cast<std::size_t>(layers), 0);
  for (int e = 0; e < grid.elements(); ++e) {
    double& width = widest[static_cast<std::size_t>(grid.layer[static_cast<std::size_t>(e)])];
    width = std::max(width, grid.width(e));
  }
  for (int e = 0; e < grid.elements(); ++e) {
    double inverse_mass = 0;
    for (int i = 0; i < n; ++i) {
      const int row = e * n + i;
      double m = at.a0[row];
      for (int j = 0; j < at.poles(); ++j)
        m += at.b(row, j) / std::max(std::abs(std::max(at.edge[row], lowest_edge_) - at.v(row, j)), 0.05);
      inverse_mass = std::max(inverse_mass, std::abs(m));
    }
    const double h = grid.width(e);
    norm_ = std::max(norm_, hbar2_over_2m0 * inverse_mass * 4 * largest / (h * h));
    const double wide = widest[static_cast<std::size_t>(grid.layer[static_cast<std::size_t>(e)])];
    rounding_norm_ = std::max(rounding_norm_, hbar2_over_2m0 * inverse_mass * 4 * largest / (wide * wide));
  }
  rounding_norm_ += highest_edge_ - lowest_edge_;
  norm_ += highest_edge_ - lowest_edge_;
}

int Hamiltonian::nodes() const {
  return profile_->grid.elements() * profile_->grid.degree + 1;
}
int Hamiltonian::poles() const {
  return profile_->at.poles();
}

void Hamiltonian::hold_ends(Eigen::VectorXd& y) const {
  const int N = nodes() - 1;
  if (profile_->ends == Ends::hard) {
    y[0] = y[N] = 0;
  } else {  // the two face nodes are one
    y[0] += y[N];
    y[N] = 0;
  }
}

void Hamiltonian::apply(double E, const Eigen::VectorXd& x, Eigen::VectorXd& y,
                        Eigen::VectorXd* slope) const {
  y.setZero(nodes());
  if (slope) slope->setZero(nodes());
  apply_packs(*packs_, E, x.data(), y.data(), slope ? slope->data() : nullptr);
  hold_ends(y);
  if (slope) hold_ends(*slope);
}

void Hamiltonian::slope(double E, const Eigen::VectorXd& x, Eigen::VectorXd& out) const {
  out.setZero(nodes());
  apply_packs(*packs_, E, x.data(), nullptr, out.data());
  hold_ends(out);
}

Eigen::VectorXd gather(const Grid& grid, const Eigen::VectorXd& local) {
  const int p = grid.degree;
  Eigen::VectorXd global(grid.elements() * p + 1);
  for (int e = 0; e < grid.elements(); ++e) global.segment(e * p, p + 1) = local.segment(e * (p + 1), p + 1);
  return global;
}

Eigen::VectorXd scatter(const Grid& grid, const Eigen::VectorXd& global) {
  const int p = grid.degree;
  Eigen::VectorXd local(grid.rows());
  for (int e = 0; e < grid.elements(); ++e) local.segment(e * (p + 1), p + 1) = global.segment(e * p, p + 1);
  return local;
}

}  // namespace wellwright
