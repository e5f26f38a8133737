// SPDX-License-Identifier: Apache-2.0
// LDL' factors of T(E) in packs of four elements, with inertia and the condensed faces of a period.
#include <algorithm>
#include <cmath>

#include "wellwright/hamiltonian.hpp"

namespace wellwright {
namespace {

constexpr int lanes = 4;

// Without pivoting: a pivot vanishes only where E is a level of the stack cut off at that node. Then it is
// replaced by a tiny number, as LAPACK's Sturm counts do (LAPACK Working Note 172), and the levels themselves
// are taken from T(E) applied, never from its factors. The number stays far below rounding: at a level the
// last pivot is rounding of its own element, which may be much wider than the one that makes the norm.
double away_from_zero(double pivot, double tiny) {
  if (std::abs(pivot) >= tiny) return pivot;
  return pivot < 0 ? -tiny : tiny;
}

}  // namespace

Factors::Factors(const Hamiltonian& hamiltonian)
    : h_(&hamiltonian),
      p_(hamiltonian.profile().grid.degree),
      elements_(hamiltonian.profile().grid.elements()),
      packs_((elements_ + lanes - 1) / lanes),
      periodic_(hamiltonian.profile().ends == Ends::periodic),
      tiny_(1e-60 * hamiltonian.norm()) {
  const ReferenceElement& reference = reference_element(p_);
  const int n = p_ + 1;
  for (int i = 1; i < p_; ++i) order_.push_back(i);
  order_.push_back(0);
  order_.push_back(p_);
  for (int j = 0, start = 0; j <= n; start += n - j, ++j) column_.push_back(start);
  const std::size_t pairs = static_cast<std::size_t>(column_.back());
  for (int q = 0; q < n; ++q)
    for (int j = 0; j < n; ++j)
      for (int i = j; i < n; ++i)
        products_.push_back(reference.weights[q] * reference.derivative(q, order_[i]) *
                            reference.derivative(q, order_[j]));
  uniform_.assign(pairs, 0);
  for (std::size_t at = 0; at < products_.size(); ++at) uniform_[at % pairs] += products_[at];
  matrix_.resize(pairs);
  factor_.resize(static_cast<std::size_t>(packs_ * column_[p_ - 1]));
  condensed_.resize(static_cast<std::size_t>(packs_ * lanes));
  for (auto* chain : {&pivot_, &step_, &border_}) chain->assign(static_cast<std::size_t>(elements_ + 1), 0);
}

void Factors::pack_matrix(int pack, double E) {
  const Grid& grid = h_->profile().grid;
  const int n = p_ + 1;
  double c[highest_degree + 1], q[highest_degree + 1];
  Lanes stiffness[highest_degree + 1], potential[highest_degree + 1];
  bool uniform = true;
  for (int t = 0; t < lanes; ++t) {
    const int e = lanes * pack + t;
    if (e >= elements_) {  // lanes beyond the last element hold the unit matrix
      for (int i = 0; i < n; ++i) {
        stiffness[i][t] = 0;
        potential[i][t] = 1;
      }
      continue;
    }
    h_->element_coefficients(e, E, c, q, nullptr, nullptr);
    const double scale = 2 / grid.width(e);
    for (int i = 0; i < n; ++i) {
      stiffness[i][t] = scale * c[i];
      potential[i][t] = grid.weight[e * n + i] * q[i];
      uniform = uniform && c[i] == c[0];
    }
  }
  const std::size_t pairs = uniform_.size();
  if (uniform) {
    for (std::size_t at = 0; at < pairs; ++at) matrix_[at] = stiffness[0] * uniform_[at];
  } else {
    const double* product = products_.data();
    for (std::size_t at = 0; at < pairs; ++at) matrix_[at] = stiffness[0] * product[at];
    for (int k = 1; k < n; ++k) {
      product += pairs;
      for (std::size_t at = 0; at < pairs; ++at) matrix_[at] += stiffness[k] * product[at];
    }
  }
  for (int j = 0; j < n; ++j) matrix_[static_cast<std::size_t>(column_[j])] += potential[order_[j]];
}

void Factors::eliminate_inner(int pack) {
  const int n = p_ + 1, inner = p_ - 1;
  Lanes* factor = &factor_[static_cast<std::size_t>(pack * column_[inner])];
  const int valid = std::min(lanes, elements_ - lanes * pack);
  for (int j = 0; j < inner; ++j) {
    Lanes* column = &matrix_[static_cast<std::size_t>(column_[j])];
    Lanes* unit = factor + column_[j];
    Lanes d = column[0];
    for (int t = 0; t < lanes; ++t) d[t] = away_from_zero(d[t], tiny_);
    for (int t = 0; t < valid; ++t) negative_ += d[t] < 0;
    const Lanes inverse = d.inverse();
    unit[0] = inverse;
    const int rest = n - j;
    for (int i = 1; i < rest; ++i) unit[i] = column[i] * inverse;
    for (int k = 1; k < rest; ++k) {
      Lanes* target = &matrix_[static_cast<std::size_t>(column_[j + k])];
      const Lanes a = column[k];
      for (int i = k; i < rest; ++i) target[i - k] -= a * unit[i];
    }
  }
  const Lanes& ll = matrix_[static_cast<std::size_t>(column_[inner])];
  const Lanes& lr = matrix_[static_cast<std::size_t>(column_[inner]) + 1];
  const Lanes& rr = matrix_[static_cast<std::size_t>(column_[inner + 1])];
  for (int t = 0; t < lanes; ++t)
    condensed_[static_cast<std::size_t>(lanes * pack + t)] = {ll[t], lr[t], rr[t]};
}

void Factors::eliminate_chain(double cos_phase) {
  double s00 = condensed_[0].left_left;
  double carry = condensed_[0].right_right, to_zero = condensed_[0].left_right;
  for (int e = 1; e < elements_; ++e) {
    const auto at = static_cast<std::size_t>(e);
    const Face& face = condensed_[at];
    const double d = away_from_zero(carry + face.left_left, tiny_);
    if (d < 0) ++negative_;
    pivot_[at] = d;
    step_[at] = face.left_right / d;
    border_[at] = to_zero / d;
    carry = face.right_right - step_[at] * face.left_right;
    s00 -= border_[at] * to_zero;
    to_zero = -step_[at] * to_zero;
  }
  inner_negative_ = negative_;
  if (!periodic_) return;
  face_[0] = s00;
  face_[1] = to_zero;
  face_[2] = carry;
  last_ = away_from_zero(s00 + carry + 2 * cos_phase * to_zero, tiny_);
  if (last_ < 0) ++negative_;
}

void Factors::compute(double E, double cos_phase) {
  negative_ = 0;
  for (int pack = 0; pack < packs_; ++pack) {
    pack_matrix(pack, E);
    eliminate_inner(pack);
  }
  eliminate_chain(cos_phase);
}

void Factors::solve(Eigen::VectorXd& x) const {
  const int inner = p_ - 1, N = elements_ * p_;
  double* value = x.data();
  Lanes load[highest_degree + 1];  // inner nodes, then left and right
  double at_zero = periodic_ ? value[0] : 0;
  value[0] = value[N] = 0;
  for (int pack = 0; pack < packs_; ++pack) {
    const Lanes* factor = &factor_[static_cast<std::size_t>(pack * column_[inner])];
    const int valid = std::min(lanes, elements_ - lanes * pack);
    double* first = value + lanes * pack * p_;
    for (int j = 0; j < inner; ++j) {
      load[j].setZero();
      for (int t = 0; t < valid; ++t) load[j][t] = first[t * p_ + j + 1];
    }
    load[inner].setZero();
    load[inner + 1].setZero();
    for (int j = 0; j < inner; ++j) {
      const Lanes* unit = factor + column_[j];
      const Lanes v = load[j];
      for (int i = 1; i <= p_ - j; ++i) load[j + i] -= unit[i] * v;
    }
    for (int j = 0; j < inner; ++j)
      for (int t = 0; t < valid; ++t) first[t * p_ + j + 1] = load[j][t];
    for (int t = 0; t < valid; ++t) {
      first[t * p_] += load[inner][t];
      first[t * p_ + p_] += load[inner + 1][t];
    }
  }
  at_zero += value[0] + value[N];  // what the inner nodes hand to the faces
  for (int e = 1; e < elements_; ++e) {
    const auto at = static_cast<std::size_t>(e);
    const double v = value[e * p_];
    if (e + 1 < elements_)
      value[(e + 1) * p_] -= step_[at] * v;
    else
      at_zero -= step_[at] * v;
    at_zero -= border_[at] * v;
    value[e * p_] = v / pivot_[at];
  }
  const double face = periodic_ ? at_zero / last_ : 0;
  value[0] = value[N] = face;
  for (int e = elements_ - 1; e > 0; --e) {
    const auto at = static_cast<std::size_t>(e);
    value[e * p_] -= step_[at] * value[(e + 1) * p_] + border_[at] * face;
  }
  for (int pack = 0; pack < packs_; ++pack) {
    const Lanes* factor = &factor_[static_cast<std::size_t>(pack * column_[inner])];
    const int valid = std::min(lanes, elements_ - lanes * pack);
    double* first = value + lanes * pack * p_;
    for (int j = 0; j < inner + 2; ++j) {
      load[j].setZero();
      for (int t = 0; t < valid; ++t) load[j][t] = first[t * p_ + order_[j]];
    }
    for (int j = inner - 1; j >= 0; --j) {
      const Lanes* unit = factor + column_[j];
      Lanes v = load[j] * unit[0];
      for (int i = 1; i <= p_ - j; ++i) v -= unit[i] * load[j + i];
      load[j] = v;
    }
    for (int j = 0; j < inner; ++j)
      for (int t = 0; t < valid; ++t) first[t * p_ + j + 1] = load[j][t];
  }
}

}  // namespace wellwright
