// SPDX-License-Identifier: Apache-2.0
// LDL' factors of T(E), element by element, with inertia and the condensed faces of a period.
#include <algorithm>
#include <cmath>

#include "wellwright/hamiltonian.hpp"

namespace wellwright {

// Without pivoting: a pivot vanishes only where E is a level of the stack cut off at that node. Then it is
// replaced by a number of rounding size, as LAPACK's Sturm counts do (LAPACK Working Note 172), and the
// levels themselves are taken from T(E) applied, never from its factors.
Factors::Factors(const Hamiltonian& hamiltonian)
    : h_(&hamiltonian),
      p_(hamiltonian.profile().grid.degree),
      elements_(hamiltonian.profile().grid.elements()),
      periodic_(hamiltonian.profile().ends == Ends::periodic),
      matrix_(p_ + 1, p_ + 1) {
  const ReferenceElement& reference = reference_element(p_);
  const int n = p_ + 1;
  for (int q = 0; q < n; ++q)
    for (int j = 0; j < n; ++j)
      for (int i = j; i < n; ++i)
        products_.push_back(reference.weights[q] * reference.derivative(q, i) * reference.derivative(q, j));
  const std::size_t pairs = static_cast<std::size_t>(n * (n + 1) / 2);
  uniform_.assign(pairs, 0);
  packed_.assign(pairs, 0);
  for (std::size_t at = 0; at < products_.size(); ++at) uniform_[at % pairs] += products_[at];
  factor_.resize(static_cast<std::size_t>(elements_ * p_ * n));
  pivot_.resize(static_cast<std::size_t>(elements_ * p_ + 1));
  border_.assign(static_cast<std::size_t>(elements_ * p_ + 1), 0);
}

void Factors::element_matrix(int element, double E) {
  double c[highest_degree + 1], q[highest_degree + 1];
  h_->element_coefficients(element, E, c, q, nullptr, nullptr);
  const Grid& grid = h_->profile().grid;
  const int n = p_ + 1;
  const double scale = 2 / grid.width(element);
  const std::size_t pairs = uniform_.size();
  bool uniform = true;
  for (int k = 1; k < n; ++k) uniform = uniform && c[k] == c[0];
  if (uniform) {
    for (std::size_t pair = 0; pair < pairs; ++pair) packed_[pair] = scale * c[0] * uniform_[pair];
  } else {
    std::fill(packed_.begin(), packed_.end(), 0);
    for (int k = 0; k < n; ++k) {
      const double factor = scale * c[k];
      const double* product = &products_[static_cast<std::size_t>(k) * pairs];
      for (std::size_t pair = 0; pair < pairs; ++pair) packed_[pair] += factor * product[pair];
    }
  }
  const double* entry = packed_.data();
  for (int j = 0; j < n; ++j)
    for (int i = j; i < n; ++i) matrix_(i, j) = *entry++;
  for (int i = 0; i < n; ++i) matrix_(i, i) += grid.weight[element * n + i] * q[i];
}

void Factors::compute(double E, double cos_phase) {
  const int n = p_ + 1;
  const double tiny = 1e-18 * h_->norm();
  double carry = 0, carry_border = 0, s00 = 0;
  double border[highest_degree + 1];
  negative_ = 0;
  for (int e = 0; e < elements_; ++e) {
    element_matrix(e, E);
    double* factor = &factor_[static_cast<std::size_t>(e * p_ * n)];
    double* pivot = &pivot_[static_cast<std::size_t>(e * p_)];
    double* to_border = &border_[static_cast<std::size_t>(e * p_)];
    int first = 0;
    if (e == 0) {
      first = 1;  // node 0: zero for hard ends, kept to the end for periodic ones
      s00 = matrix_(0, 0);
      for (int i = 1; i < n; ++i) border[i] = periodic_ ? matrix_(i, 0) : 0;
    } else {
      matrix_(0, 0) += carry;
      border[0] = carry_border;
      for (int i = 1; i < n; ++i) border[i] = 0;
    }
    for (int j = first; j < p_; ++j) {
      double d = matrix_(j, j);
      if (std::abs(d) < tiny) d = d < 0 ? -tiny : tiny;
      if (d < 0) ++negative_;
      pivot[j] = d;
      double* column = factor + j * n;
      const double inverse = 1 / d;
      for (int i = j + 1; i < n; ++i) column[i] = matrix_(i, j) * inverse;
      for (int k = j + 1; k < n; ++k) {
        const double a = matrix_(k, j);
        for (int i = k; i < n; ++i) matrix_(i, k) -= a * column[i];
      }
      if (periodic_) {
        const double b = border[j] * inverse;
        to_border[j] = b;
        s00 -= b * border[j];
        for (int k = j + 1; k < n; ++k) border[k] -= b * matrix_(k, j);
      }
    }
    carry = matrix_(p_, p_);
    carry_border = border[p_];
  }
  inner_negative_ = negative_;
  if (!periodic_) return;
  face_[0] = s00;
  face_[1] = carry_border;
  face_[2] = carry;
  last_ = s00 + carry + 2 * cos_phase * carry_border;
  if (std::abs(last_) < tiny) last_ = last_ < 0 ? -tiny : tiny;
  if (last_ < 0) ++negative_;
}

void Factors::solve(Eigen::VectorXd& x) const {
  const int n = p_ + 1, N = elements_ * p_;
  double at_zero = periodic_ ? x[0] : 0;
  x[0] = x[N] = 0;
  for (int e = 0; e < elements_; ++e) {
    const double* factor = &factor_[static_cast<std::size_t>(e * p_ * n)];
    double* part = &x[e * p_];
    for (int j = e == 0 ? 1 : 0; j < p_; ++j) {
      const double* column = factor + j * n;
      const double value = part[j];
      for (int i = j + 1; i < n; ++i) part[i] -= column[i] * value;
      if (periodic_) at_zero -= border_[static_cast<std::size_t>(e * p_ + j)] * value;
    }
  }
  if (periodic_) {
    at_zero = (at_zero + x[N]) / last_;
    x[N] = at_zero;
  } else {
    x[N] = 0;
  }
  for (int e = elements_ - 1; e >= 0; --e) {
    const double* factor = &factor_[static_cast<std::size_t>(e * p_ * n)];
    double* part = &x[e * p_];
    for (int j = p_ - 1; j >= (e == 0 ? 1 : 0); --j) {
      const double* column = factor + j * n;
      double value = part[j] / pivot_[static_cast<std::size_t>(e * p_ + j)];
      for (int i = j + 1; i < n; ++i) value -= column[i] * part[i];
      if (periodic_) value -= border_[static_cast<std::size_t>(e * p_ + j)] * at_zero;
      part[j] = value;
    }
  }
  x[0] = periodic_ ? at_zero : 0;
}

}  // namespace wellwright
