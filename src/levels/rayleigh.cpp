// SPDX-License-Identifier: Apache-2.0
// Rayleigh quotient iteration for T(E) psi = 0, single and in blocks.
//
// The Rayleigh functional of psi is the energy at which psi' T(E) psi = 0; the step solves
// T(E) y = -T'(E) psi, which is the inverse iteration of the linear problem in (psi, chi) with chi
// eliminated. Source: A. Ruhe, SIAM J. Numer. Anal. 10, 674 (1973); B.N. Parlett, The Symmetric Eigenvalue
// Problem (1998).
#include <Eigen/Eigenvalues>
#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>

#include "levels/pairs.hpp"

namespace wellwright {
namespace {

constexpr int most_steps = 12;
constexpr double small_step = 1e-5;  // [eV] of one Newton step, whose square over an electronvolt is nothing
constexpr double eps = std::numeric_limits<double>::epsilon();

}  // namespace

Eigen::VectorXd lumped_mass(const Hamiltonian& hamiltonian) {
  const Grid& grid = hamiltonian.profile().grid;
  const int p = grid.degree, N = hamiltonian.nodes() - 1;
  Eigen::VectorXd mass = Eigen::VectorXd::Zero(N + 1);
  for (int e = 0; e < grid.elements(); ++e)
    mass.segment(e * p, p + 1) += grid.weight.segment(e * (p + 1), p + 1);
  if (hamiltonian.profile().ends == Ends::periodic)
    mass[0] += mass[N];
  else
    mass[0] = 0;
  mass[N] = 0;
  return mass;
}

Rayleigh::Rayleigh(const Hamiltonian& hamiltonian, Factors& factors)
    : h_(&hamiltonian),
      factors_(&factors),
      mass_(lumped_mass(hamiltonian)),
      inverse_mass_((mass_.array() > 0).select(mass_.cwiseInverse(), 0)),
      x_(hamiltonian.nodes()),
      y_(hamiltonian.nodes()),
      slope_(hamiltonian.nodes()),
      floor_(16 * eps * hamiltonian.rounding_norm()),
      stagnation_(1e4 * eps * hamiltonian.norm()) {}

double Rayleigh::norm_of(const Eigen::VectorXd& residual) const {
  return std::sqrt(residual.cwiseAbs2().dot(inverse_mass_));
}

bool Rayleigh::improve(double& energy, Eigen::Ref<Eigen::VectorXd> psi, double& residual, double enough) {
  x_ = psi;
  h_->slope(energy, x_, slope_);
  for (int step = 0; step < most_steps; ++step) {
    factors_->compute(energy);
    x_ = slope_;
    factors_->solve(x_);
    h_->slope(energy, x_, y_);
    const double norm = x_.dot(y_);
    if (!(norm > 0)) return false;
    const double change = x_.dot(slope_) / norm;  // x'T(E)x over -x'T'(E)x
    energy += change;
    slope_ -= change * y_;  // T(E + change) x
    const double scale = 1 / std::sqrt(norm);
    residual = scale * norm_of(slope_);
    if (residual <= enough && (h_->poles() == 0 || std::abs(change) < small_step)) {
      psi = scale * x_;
      return std::isfinite(energy);
    }
    slope_ = scale * y_;
  }
  return false;
}

bool Rayleigh::polish(double& energy, Eigen::Ref<Eigen::VectorXd> psi, double& residual) {
  double last = std::numeric_limits<double>::infinity();
  x_ = psi;
  for (int step = 0; step < most_steps; ++step) {
    double change = 0, norm = 0;
    for (int newton = 0; newton < 3; ++newton) {  // the functional; one step when the mass is constant
      h_->apply(energy, x_, y_, &slope_);
      norm = x_.dot(slope_);
      if (!(norm > 0)) return false;
      change = x_.dot(y_) / norm;
      energy += change;
      if (std::abs(change) < 1e-4 || h_->poles() == 0) break;
    }
    const double scale = 1 / std::sqrt(norm);
    y_ -= change * slope_;
    residual = scale * norm_of(y_);
    if (residual <= floor_ || (step > 1 && residual > 0.3 * last && residual < stagnation_)) {
      psi = scale * x_;
      return std::isfinite(energy);
    }
    last = residual;
    factors_->compute(energy);
    x_.swap(slope_);
    factors_->solve(x_);
    x_ *= 1 / x_.cwiseAbs().maxCoeff();
  }
  return false;
}

bool Rayleigh::polish_block(Eigen::Ref<Eigen::VectorXd> energy, Eigen::Ref<Eigen::MatrixXd> psi,
                            Eigen::Ref<Eigen::VectorXd> residual) {
  const Eigen::Index m = energy.size();
  Eigen::MatrixXd T(m, m), S(m, m), Y(psi.rows(), m), slopes(psi.rows(), m);
  double last = std::numeric_limits<double>::infinity();
  for (int step = 0; step < 3 * most_steps; ++step) {
    // A little off the middle, so that no level of the block outweighs the others beyond recovery.
    const double middle = energy.mean();
    const double E = middle + std::max(1e-3 * (energy.maxCoeff() - energy.minCoeff()), 1e-12);
    for (Eigen::Index j = 0; j < m; ++j) {
      x_ = psi.col(j);
      h_->apply(E, x_, y_, &slope_);
      Y.col(j) = y_;
      slopes.col(j) = slope_;
    }
    T.noalias() = psi.transpose() * Y;
    S.noalias() = psi.transpose() * slopes;
    T = (0.5 * (T + T.transpose())).eval();
    S = (0.5 * (S + S.transpose())).eval();
    const Eigen::GeneralizedSelfAdjointEigenSolver<Eigen::MatrixXd> ritz(T, S);
    if (ritz.info() != Eigen::Success) return false;
    const Eigen::MatrixXd& V = ritz.eigenvectors();
    psi = (psi * V).eval();
    Y = (Y * V).eval();
    slopes = (slopes * V).eval();
    for (Eigen::Index j = 0; j < m; ++j) {
      energy[j] = E + ritz.eigenvalues()[j];
      y_ = Y.col(j) - ritz.eigenvalues()[j] * slopes.col(j);
      residual[j] = norm_of(y_);
    }
    const double worst = residual.maxCoeff();
    if (worst <= floor_ || (step > 3 && worst > 0.3 * last && worst < stagnation_)) return true;
    last = worst;
    factors_->compute(E);
    for (Eigen::Index j = 0; j < m; ++j) {
      x_ = slopes.col(j);
      factors_->solve(x_);
      psi.col(j) = x_ / x_.cwiseAbs().maxCoeff();
    }
    // Orthonormal in the plain product, so that the Ritz matrices stay well conditioned.
    for (Eigen::Index j = 0; j < m; ++j) {
      for (int twice = 0; twice < 2; ++twice)
        for (Eigen::Index i = 0; i < j; ++i)
          psi.col(j) -= psi.col(i).cwiseProduct(mass_).dot(psi.col(j)) * psi.col(i);
      const double norm = std::sqrt(psi.col(j).cwiseAbs2().dot(mass_));
      if (!(norm > 0)) return false;
      psi.col(j) /= norm;
    }
  }
  return false;
}

bool Rayleigh::polish_all(Pairs& pairs, double enough) {
  const int n = pairs.count();
  pairs.residual.resize(n);
  const auto sort = [&] {
    std::vector<Eigen::Index> order(static_cast<std::size_t>(n));
    std::iota(order.begin(), order.end(), 0);
    std::stable_sort(order.begin(), order.end(),
                     [&](auto a, auto b) { return pairs.energy[a] < pairs.energy[b]; });
    if (std::is_sorted(order.begin(), order.end())) return;
    Pairs sorted = pairs;
    for (int i = 0; i < n; ++i) {
      sorted.energy[i] = pairs.energy[order[static_cast<std::size_t>(i)]];
      sorted.residual[i] = pairs.residual[order[static_cast<std::size_t>(i)]];
      sorted.psi.col(i) = pairs.psi.col(order[static_cast<std::size_t>(i)]);
    }
    pairs = std::move(sorted);
  };
  sort();
  for (int i = 0; i < n;) {
    int end = i + 1;
    while (end < n && pairs.energy[end] - pairs.energy[end - 1] < cluster_width) ++end;
    const int m = end - i;
    const bool fine = m > 1 ? polish_block(pairs.energy.segment(i, m), pairs.psi.middleCols(i, m),
                                           pairs.residual.segment(i, m))
                      : enough > floor_
                          ? improve(pairs.energy[i], pairs.psi.col(i), pairs.residual[i], enough)
                          : polish(pairs.energy[i], pairs.psi.col(i), pairs.residual[i]);
    if (!fine) return false;
    i = end;
  }
  sort();
  // Two starts that fell on one level show as parallel envelopes of equal energy.
  for (int i = 0; i + 1 < n; ++i) {
    if (pairs.energy[i + 1] - pairs.energy[i] > 10 * (pairs.residual[i] + pairs.residual[i + 1] + floor_))
      continue;
    const double overlap = pairs.psi.col(i).cwiseProduct(mass_).dot(pairs.psi.col(i + 1));
    const double norms =
        std::sqrt(pairs.psi.col(i).cwiseAbs2().dot(mass_) * pairs.psi.col(i + 1).cwiseAbs2().dot(mass_));
    if (std::abs(overlap) > 0.5 * norms) return false;
  }
  return true;
}

}  // namespace wellwright
