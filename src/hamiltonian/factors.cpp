// SPDX-License-Identifier: Apache-2.0
// LDL' factors of T(E) in packs of four elements, with inertia and the condensed faces of a period.
#include <cmath>

#include "hamiltonian/packs.hpp"
#include "wellwright/hamiltonian.hpp"

namespace wellwright {

struct Factors::Parts {
  LanesVector factor;           // per pack and inner node: 1 / pivot, the column of the unit factor
  std::vector<Face> condensed;  // per element
  std::vector<double> pivot, step, border;  // per chain node: pivot, coupling upward and to node 0 over it
};

namespace {

double away_from_zero(double pivot, double tiny) {
  if (std::abs(pivot) >= tiny) return pivot;
  return pivot < 0 ? -tiny : tiny;
}

}  // namespace

Factors::Factors(const Hamiltonian& hamiltonian)
    : h_(&hamiltonian),
      p_(hamiltonian.profile().grid.degree),
      elements_(hamiltonian.profile().grid.elements()),
      periodic_(hamiltonian.profile().ends == Ends::periodic),
      tiny_(1e-60 * hamiltonian.norm()),
      parts_(std::make_unique<Parts>()) {
  const Packs& packs = hamiltonian.packs();
  const DegreeTables& tables = *packs.tables;
  parts_->factor.resize(
      static_cast<std::size_t>(packs.count * tables.column[static_cast<std::size_t>(p_ - 1)]));
  parts_->condensed.resize(static_cast<std::size_t>(elements_));
  for (auto* chain : {&parts_->pivot, &parts_->step, &parts_->border})
    chain->assign(static_cast<std::size_t>(elements_ + 1), 0);
}

Factors::~Factors() = default;

void Factors::eliminate_chain(double cos_phase) {
  auto& [factor, condensed, pivot, step, border] = *parts_;
  double s00 = condensed[0].left_left;
  double carry = condensed[0].right_right, to_zero = condensed[0].left_right;
  for (int e = 1; e < elements_; ++e) {
    const auto at = static_cast<std::size_t>(e);
    const Face& face = condensed[at];
    const double d = away_from_zero(carry + face.left_left, tiny_);
    if (d < 0) ++negative_;
    pivot[at] = d;
    step[at] = face.left_right / d;
    border[at] = to_zero / d;
    carry = face.right_right - step[at] * face.left_right;
    s00 -= border[at] * to_zero;
    to_zero = -step[at] * to_zero;
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
  negative_ = eliminate_packs(h_->packs(), E, tiny_, parts_->factor.data(), parts_->condensed.data());
  eliminate_chain(cos_phase);
}

void Factors::solve(Eigen::VectorXd& x) const {
  const int N = elements_ * p_;
  const auto& [factor, condensed, pivot, step, border] = *parts_;
  double* value = x.data();
  double at_zero = periodic_ ? value[0] : 0;
  value[0] = value[N] = 0;
  reduce_packs(h_->packs(), factor.data(), value);
  at_zero += value[0] + value[N];  // what the inner nodes hand to the faces
  for (int e = 1; e < elements_; ++e) {
    const auto at = static_cast<std::size_t>(e);
    const double v = value[e * p_];
    if (e + 1 < elements_)
      value[(e + 1) * p_] -= step[at] * v;
    else
      at_zero -= step[at] * v;
    at_zero -= border[at] * v;
    value[e * p_] = v / pivot[at];
  }
  const double face = periodic_ ? at_zero / last_ : 0;
  value[0] = value[N] = face;
  for (int e = elements_ - 1; e > 0; --e) {
    const auto at = static_cast<std::size_t>(e);
    value[e * p_] -= step[at] * value[(e + 1) * p_] + border[at] * face;
  }
  restore_packs(h_->packs(), factor.data(), value);
}

}  // namespace wellwright
