// SPDX-License-Identifier: Apache-2.0
// Transitions between levels: energies, dipoles, oscillator strengths; interband energies and overlaps.
#pragma once

#include <Eigen/Core>
#include <utility>
#include <vector>

#include "wellwright/charge.hpp"

namespace wellwright {

/// All pairs of one carrier's levels; (initial, final) matrices, energy = E_final - E_initial.
struct Transitions {
  Eigen::MatrixXd energy;               ///< [eV]
  Eigen::MatrixXd wavelength;           ///< [nm], of |energy|; NaN on the diagonal
  Eigen::MatrixXd frequency;            ///< [THz], of |energy|; NaN on the diagonal
  Eigen::MatrixXd dipole;               ///< z_fi [nm], all components; velocity form for periodic ends
  Eigen::MatrixXd oscillator_strength;  ///< free electron mass convention, negative downward
  Eigen::MatrixXd beat_period;          ///< h/|energy| [ps]; NaN on the diagonal
  /// `bands: one`, hard ends: for each initial level the closed sum over all final states of the discrete
  /// operator and <m0/m>; both NaN otherwise.
  Eigen::VectorXd f_sum, f_sum_expected;
};
Transitions transitions(const Levels& levels);

/// <f|[H, z]|i> over all components [eV nm], (final, initial): (E_f - E_i) z_fi between hard ends, and the
/// form that holds between periodic ones.
Eigen::MatrixXd velocity_moment(const Levels& levels);

/// The pairs worth a line in a summary: those asked for, or all pairs of the lowest four. Counted from 1.
std::vector<std::pair<int, int>> listed_transitions(const Study& study, int level_count);

/// Electron-hole pairs without exciton binding.
struct Interband {
  Carrier hole = Carrier::heavy_hole;
  double gap = 0;           ///< Ec_min - Ev_max of that kind [eV]
  Eigen::MatrixXd energy;   ///< (electron level, hole level): E_e + E_h + gap [eV]
  Eigen::MatrixXd overlap;  ///< <psi_e|psi_h> of the envelopes
  Eigen::MatrixXd
      exciton_binding;  ///< variational, two-dimensional 1s trial [eV], positive; NaN: not computed
};
Interband interband(const Levels& electrons, const Levels& holes);

/// A grid that refines both grids of one stack, with a degree whose quadrature is exact for products of their
/// functions.
Grid common_grid(const Grid& one, const Grid& other);

}  // namespace wellwright
