// SPDX-License-Identifier: Apache-2.0
// Dipoles, oscillator strengths and their sum rule.
//
// f = (2 m0 / hbar^2) (E_f - E_i) |z_fi|^2, free electron mass, negative downward. The velocity form
// (E_f - E_i) z_fi = <f|[H, z]|i> sums the same components and holds between periodic ends, where z itself
// has no meaning. Sources: C. Sirtori, F. Capasso, J. Faist, S. Scandolo, Phys. Rev. B 50, 8663 (1994); sum
// rule for a mass that varies in space: G. Bastard, Wave Mechanics Applied to Semiconductor Heterostructures
// (1988).
#include <cmath>
#include <limits>

#include "wellwright/optics.hpp"

namespace wellwright {
namespace {

using constants::hbar2_over_2m0;
constexpr double undefined = std::numeric_limits<double>::quiet_NaN();
constexpr double coincident = 1e-10;  // [eV] levels closer than this have no transition

// <z psi|(H - E)|z psi> and <m0/m>: half the double commutator [z, [H, z]], one number a level.
void sum_rule(const Levels& levels, Transitions& t) {
  const Hamiltonian hamiltonian(levels.profile);
  const Grid& grid = levels.profile.grid;
  Eigen::VectorXd y;
  for (int i = 0; i < levels.count(); ++i) {
    const Eigen::VectorXd moved =
        gather(grid, (grid.z.array() - levels.mean_position[i]) * levels.envelope.col(i).array());
    hamiltonian.apply(levels.energy[i], moved, y);
    t.f_sum[i] = moved.dot(y) / hbar2_over_2m0;
    t.f_sum_expected[i] =
        (grid.weight.array() * levels.profile.at.a0.array() * levels.envelope.col(i).array().square()).sum();
  }
}

}  // namespace

Eigen::MatrixXd velocity_moment(const Levels& levels) {
  const Grid& grid = levels.profile.grid;
  const Coefficients& at = levels.profile.at;
  const Eigen::MatrixXd slope = slope_of(grid, levels.envelope);
  const Eigen::VectorXd w = hbar2_over_2m0 * grid.weight.cwiseProduct(at.a0);
  Eigen::MatrixXd half = slope.transpose() * (w.asDiagonal() * levels.envelope);
  for (int j = 0; j < at.poles(); ++j) {
    const Eigen::VectorXd s = grid.weight.array() * (hbar2_over_2m0 * at.b.col(j).array()).sqrt();
    half.noalias() +=
        levels.companion[static_cast<std::size_t>(j)].transpose() * (s.asDiagonal() * levels.envelope);
  }
  return half - half.transpose();  // (final, initial)
}

Transitions transitions(const Levels& levels) {
  const int n = levels.count();
  Transitions t;
  for (auto* matrix :
       {&t.energy, &t.wavelength, &t.frequency, &t.dipole, &t.oscillator_strength, &t.beat_period})
    matrix->setConstant(n, n, undefined);
  t.f_sum.setConstant(n, undefined);
  t.f_sum_expected.setConstant(n, undefined);
  const bool periodic = levels.profile.ends == Ends::periodic;
  const Eigen::MatrixXd moment = n == 0     ? Eigen::MatrixXd()
                                 : periodic ? velocity_moment(levels)
                                            : levels.moment(levels.profile.grid.z);
  for (int i = 0; i < n; ++i)
    for (int f = 0; f < n; ++f) {
      const double energy = levels.energy[f] - levels.energy[i];
      t.energy(i, f) = energy;
      const bool apart = std::abs(energy) > coincident;
      if (!periodic)
        t.dipole(i, f) = moment(i, f);
      else if (i != f && apart)
        t.dipole(i, f) = moment(f, i) / energy;
      t.oscillator_strength(i, f) = i == f ? 0 : energy * t.dipole(i, f) * t.dipole(i, f) / hbar2_over_2m0;
      if (i == f || !apart) continue;
      t.wavelength(i, f) = wavelength_of(std::abs(energy));
      t.frequency(i, f) = frequency_of(std::abs(energy));
      t.beat_period(i, f) = beat_period_of(energy);
    }
  if (!periodic && levels.profile.at.poles() == 0) sum_rule(levels, t);
  return t;
}

std::vector<std::pair<int, int>> listed_transitions(const Study& study, int level_count) {
  std::vector<std::pair<int, int>> pairs;
  for (const auto& pair : study.model.transitions)
    if (pair.first <= level_count && pair.second <= level_count) pairs.push_back(pair);
  if (!study.model.transitions.empty()) return pairs;
  constexpr int lowest = 4;
  for (int i = 1; i <= std::min(level_count, lowest); ++i)
    for (int f = i + 1; f <= std::min(level_count, lowest); ++f) pairs.emplace_back(i, f);
  return pairs;
}

}  // namespace wellwright
