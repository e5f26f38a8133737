// SPDX-License-Identifier: Apache-2.0
// Shift-invert Lanczos (Spectra) on the linear Hermitian problem in (psi, chi); every solve goes through the
// factors of T(shift).
//
// With loads (f, g) the component chi = (s psi' - g) / (shift - v), s = sqrt(hbar^2 b / 2m0), is eliminated:
// T(shift) psi = f + D'(s g / (shift - v)). Variables are scaled by the square roots of the quadrature
// weights, so that the operator is symmetric in the plain product.
#include <Spectra/SymEigsShiftSolver.h>

#include <cmath>
#include <stdexcept>

#include "levels/pairs.hpp"

namespace wellwright {
namespace {

class InverseOperator {
 public:
  using Scalar = double;
  InverseOperator(const Hamiltonian& h, Factors& factors)
      : h_(h), factors_(factors), N_(h.nodes() - 1), mass_(lumped_mass(h)) {
    const bool periodic = h.profile().ends == Ends::periodic;
    first_ = periodic ? 0 : 1;
    inner_ = N_ - first_;
    root_mass_ = mass_.segment(first_, inner_).cwiseSqrt();
    root_weight_ = h.profile().grid.weight.cwiseSqrt();
    x_.resize(N_ + 1);
  }
  Eigen::Index rows() const { return inner_ + h_.poles() * h_.profile().grid.rows(); }
  Eigen::Index cols() const { return rows(); }
  Eigen::Index inner() const { return inner_; }

  void set_shift(double shift) {
    factors_.compute(shift);
    const Coefficients& at = h_.profile().at;
    const int poles = h_.poles();
    s_.resize(at.edge.size(), poles);
    inverse_.resize(at.edge.size(), poles);
    for (int j = 0; j < poles; ++j) {
      s_.col(j) = (constants::hbar2_over_2m0 * at.b.col(j)).cwiseSqrt();
      inverse_.col(j) = (shift - at.v.col(j).array()).inverse();
    }
  }

  void perform_op(const double* in, double* out) const {
    const Grid& grid = h_.profile().grid;
    const ReferenceElement& reference = reference_element(grid.degree);
    const int p = grid.degree, n = p + 1, rows = grid.rows(), poles = h_.poles();
    const Eigen::Map<const Eigen::VectorXd> f(in, inner_);
    Eigen::Map<Eigen::VectorXd> psi_out(out, inner_);
    x_.setZero();
    x_.segment(first_, inner_) = f.cwiseProduct(root_mass_);
    if (poles > 0) {
      const Eigen::Map<const Eigen::MatrixXd> g(in + inner_, rows, poles);
      for (int e = 0; e < grid.elements(); ++e) {
        const double scale = 2 / grid.width(e);
        Eigen::Matrix<double, Eigen::Dynamic, 1, 0, highest_degree + 1, 1> flux = Eigen::VectorXd::Zero(n);
        for (int j = 0; j < poles; ++j)
          for (int i = 0; i < n; ++i) {
            const int row = e * n + i;
            flux[i] += root_weight_[row] * s_(row, j) * inverse_(row, j) * g(row, j);
          }
        x_.segment(e * p, n).noalias() += scale * (reference.derivative.transpose() * flux);
      }
      if (first_ == 0) x_[0] += x_[N_];
      x_[N_] = 0;
      if (first_ == 1) x_[0] = 0;
    }
    factors_.solve(x_);
    psi_out = x_.segment(first_, inner_).cwiseProduct(root_mass_);
    if (poles == 0) return;
    const Eigen::Map<const Eigen::MatrixXd> g(in + inner_, rows, poles);
    Eigen::Map<Eigen::MatrixXd> chi(out + inner_, rows, poles);
    for (int e = 0; e < grid.elements(); ++e) {
      const Eigen::Matrix<double, Eigen::Dynamic, 1, 0, highest_degree + 1, 1> slope =
          (2 / grid.width(e)) * (reference.derivative * x_.segment(e * p, n));
      for (int j = 0; j < poles; ++j)
        for (int i = 0; i < n; ++i) {
          const int row = e * n + i;
          chi(row, j) = (s_(row, j) * root_weight_[row] * slope[i] - g(row, j)) * inverse_(row, j);
        }
    }
  }

  /// Envelope over global nodes from a vector of the solver.
  Eigen::VectorXd envelope(const Eigen::VectorXd& vector) const {
    Eigen::VectorXd psi = Eigen::VectorXd::Zero(N_ + 1);
    psi.segment(first_, inner_) = vector.head(inner_).cwiseQuotient(root_mass_);
    if (first_ == 0) psi[N_] = psi[0];
    return psi;
  }

 private:
  const Hamiltonian& h_;
  Factors& factors_;
  int N_, first_ = 1, inner_ = 0;
  Eigen::VectorXd mass_, root_mass_, root_weight_;
  Eigen::MatrixXd s_, inverse_;
  mutable Eigen::VectorXd x_;
};

}  // namespace

Pairs lanczos(const Hamiltonian& hamiltonian, Factors& factors, double shift, int count) {
  InverseOperator inverse(hamiltonian, factors);
  const Eigen::Index inner = inverse.inner();
  Pairs pairs;
  if (count < 1 || count > inner - 2) return pairs;
  const Eigen::Index basis = std::min<Eigen::Index>(inner - 1, std::max(2 * count + 4, 14));
  Spectra::SymEigsShiftSolver<InverseOperator> solver(inverse, count, basis, shift);
  // A start in psi alone, the same every time; its chi follows from the first solve.
  Eigen::VectorXd start = Eigen::VectorXd::Zero(inverse.rows()), first(inverse.rows());
  for (Eigen::Index i = 0; i < inner; ++i) {
    const auto x = static_cast<double>(i);
    start[i] = std::cos(1.3 * x * x + 0.7 * x) + 0.3;
  }
  inverse.perform_op(start.data(), first.data());
  Eigen::Index found = 0;
  try {
    solver.init(first.data());
    found = solver.compute(Spectra::SortRule::LargestAlge, 200, 1e-6, Spectra::SortRule::LargestAlge);
  } catch (const std::exception&) {
    return pairs;  // its small eigenproblem failed; the caller goes by counts instead
  }
  if (solver.info() != Spectra::CompInfo::Successful || found < count) return pairs;
  const Eigen::VectorXd energy = solver.eigenvalues();
  const Eigen::MatrixXd vectors = solver.eigenvectors();
  pairs.energy = energy;
  pairs.residual.setZero(energy.size());
  pairs.psi.resize(hamiltonian.nodes(), energy.size());
  for (Eigen::Index i = 0; i < energy.size(); ++i) pairs.psi.col(i) = inverse.envelope(vectors.col(i));
  return pairs;
}

}  // namespace wellwright
