// SPDX-License-Identifier: Apache-2.0
// Element coefficients and the application of T(E).
#include "wellwright/hamiltonian.hpp"

#include <algorithm>
#include <cmath>

namespace wellwright {

using constants::hbar2_over_2m0;

Hamiltonian::Hamiltonian(const Profile& profile, double k) : profile_(&profile), k_(k) {
  const Coefficients& at = profile.at;
  const Grid& grid = profile.grid;
  highest_pole_ = at.poles() > 0 && at.v.rows() > 0 ? at.v.maxCoeff() : -1e300;
  lowest_edge_ = at.edge.minCoeff();
  highest_edge_ = at.edge.maxCoeff();
  // Bound of the mass-scaled operator: row sums of each element's stiffness with the band-edge masses.
  const ReferenceElement& reference = reference_element(grid.degree);
  const int n = grid.degree + 1;
  Eigen::VectorXd row_sum(n);
  for (int i = 0; i < n; ++i) {
    double sum = 0;
    for (int j = 0; j < n; ++j) {
      double entry = 0;
      for (int q = 0; q < n; ++q)
        entry += reference.weights[q] * reference.derivative(q, i) * reference.derivative(q, j);
      sum += std::abs(entry);
    }
    row_sum[i] = sum / reference.weights[i];
  }
  const double largest = row_sum.maxCoeff();
  norm_ = 0;
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
  }
  norm_ += highest_edge_ - lowest_edge_;
}

int Hamiltonian::nodes() const {
  return profile_->grid.elements() * profile_->grid.degree + 1;
}
int Hamiltonian::poles() const {
  return profile_->at.poles();
}

void Hamiltonian::element_coefficients(int element, double E, double* stiffness, double* potential,
                                       double* d_stiffness, double* d_potential) const {
  const Coefficients& at = profile_->at;
  const int n = profile_->grid.degree + 1, poles = at.poles();
  const double k2 = k_ * k_;
  for (int i = 0; i < n; ++i) {
    const int row = element * n + i;
    double inverse_mass = at.a0[row], slope = 0;
    for (int j = 0; j < poles; ++j) {
      const double distance = 1 / (E - at.v(row, j));
      const double share = at.b(row, j) * distance;
      inverse_mass += share;
      slope += share * distance;
    }
    const double across = k2 * at.in_plane[row];
    stiffness[i] = hbar2_over_2m0 * inverse_mass;
    potential[i] = at.edge[row] - E + across * stiffness[i];
    if (d_stiffness) d_stiffness[i] = hbar2_over_2m0 * slope;
    if (d_potential) d_potential[i] = 1 + across * hbar2_over_2m0 * slope;
  }
}

void Hamiltonian::apply(double E, const Eigen::VectorXd& x, Eigen::VectorXd& y,
                        Eigen::VectorXd* slope) const {
  const Grid& grid = profile_->grid;
  const ReferenceElement& reference = reference_element(grid.degree);
  const int p = grid.degree, n = p + 1;
  double c[highest_degree + 1], q[highest_degree + 1], dc[highest_degree + 1], dq[highest_degree + 1];
  Eigen::Matrix<double, Eigen::Dynamic, 1, 0, highest_degree + 1, 1> u(n), du(n), flux(n), d_flux(n);
  y.setZero(nodes());
  if (slope) slope->setZero(nodes());
  for (int e = 0; e < grid.elements(); ++e) {
    element_coefficients(e, E, c, q, dc, dq);
    const double scale = 2 / grid.width(e);
    u = x.segment(e * p, n);
    du.noalias() = scale * (reference.derivative * u);
    for (int i = 0; i < n; ++i) {
      const double w = grid.weight[e * n + i] * du[i];
      flux[i] = w * c[i];
      d_flux[i] = w * dc[i];
    }
    y.segment(e * p, n).noalias() += scale * (reference.derivative.transpose() * flux);
    for (int i = 0; i < n; ++i) y[e * p + i] += grid.weight[e * n + i] * q[i] * u[i];
    if (!slope) continue;
    slope->segment(e * p, n).noalias() += scale * (reference.derivative.transpose() * d_flux);
    for (int i = 0; i < n; ++i) (*slope)[e * p + i] += grid.weight[e * n + i] * dq[i] * u[i];
  }
  const int N = nodes() - 1;
  for (auto* out : {&y, slope}) {
    if (!out) continue;
    if (profile_->ends == Ends::hard) {
      (*out)[0] = (*out)[N] = 0;
    } else {  // the two face nodes are one
      (*out)[0] += (*out)[N];
      (*out)[N] = 0;
    }
  }
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
