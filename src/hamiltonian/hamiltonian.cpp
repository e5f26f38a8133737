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
  constexpr int lanes = 4;
  const Grid& grid = profile_->grid;
  const int p = grid.degree, n = p + 1, elements = grid.elements();
  const double* D = reference_element(p).derivative.data();  // (q, i) column by column
  double c[highest_degree + 1], q[highest_degree + 1], dc[highest_degree + 1], dq[highest_degree + 1];
  Lanes u[highest_degree + 1], flux[highest_degree + 1], d_flux[highest_degree + 1], mass[highest_degree + 1],
      d_mass[highest_degree + 1];
  y.setZero(nodes());
  if (slope) slope->setZero(nodes());
  for (int first = 0; first < elements; first += lanes) {
    const int valid = std::min(lanes, elements - first);
    for (int i = 0; i < n; ++i) {
      u[i].setZero();
      for (int t = 0; t < valid; ++t) u[i][t] = x[(first + t) * p + i];
      flux[i].setZero();
    }
    for (int i = 0; i < n; ++i)
      for (int k = 0; k < n; ++k) flux[k] += D[i * n + k] * u[i];
    for (int t = 0; t < lanes; ++t) {
      if (t >= valid) {
        for (int k = 0; k < n; ++k) flux[k][t] = d_flux[k][t] = mass[k][t] = d_mass[k][t] = 0;
        continue;
      }
      const int e = first + t;
      element_coefficients(e, E, c, q, dc, dq);
      const double scale = 4 / (grid.width(e) * grid.width(e));
      for (int k = 0; k < n; ++k) {
        const double w = grid.weight[e * n + k], du = scale * w * flux[k][t];
        flux[k][t] = du * c[k];
        d_flux[k][t] = du * dc[k];
        mass[k][t] = w * q[k];
        d_mass[k][t] = w * dq[k];
      }
    }
    for (int i = 0; i < n; ++i) {
      Lanes sum = mass[i] * u[i];
      for (int k = 0; k < n; ++k) sum += D[i * n + k] * flux[k];
      for (int t = 0; t < valid; ++t) y[(first + t) * p + i] += sum[t];
      if (!slope) continue;
      sum = d_mass[i] * u[i];
      if (poles() > 0)
        for (int k = 0; k < n; ++k) sum += D[i * n + k] * d_flux[k];
      for (int t = 0; t < valid; ++t) (*slope)[(first + t) * p + i] += sum[t];
    }
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
