// SPDX-License-Identifier: Apache-2.0
// Start states, their superposition of levels in time, and the beats they show.
#pragma once

#include <Eigen/Core>
#include <functional>
#include <optional>
#include <vector>

#include "wellwright/optics.hpp"

namespace wellwright {

using RowMatrix = Eigen::Matrix<double, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>;

/// One pair of levels that beats in <z>(t).
struct Beat {
  int lower = 0, upper = 0;     ///< counted from 1
  double energy = 0;            ///< [eV]
  double period = 0;            ///< [ps]
  double frequency = 0;         ///< [THz]
  double dipole_amplitude = 0;  ///< 4 |c_i c_j z_ij| [nm], peak to peak share of <z>
};

struct Dynamics {
  Eigen::VectorXd time;               ///< [ps]
  Eigen::VectorXcd amplitude;         ///< c_k at t = 0, normalised
  double captured_norm = 1;           ///< part of the start state inside the levels used
  Eigen::VectorXd mean_position;      ///< <z>(t) [nm]
  Eigen::VectorXd survival;           ///< |<psi(0)|psi(t)>|^2
  Eigen::MatrixXd layer_probability;  ///< (layer, time)
  std::vector<Beat> beats;            ///< sorted by amplitude
  std::optional<double> classical_period,
      revival_time;               ///< [ps], where the ladder around the mean level defines them
  std::vector<double> density_z;  ///< uniform points of the map [nm]; empty when off
};

/// Superposition of `levels` from the study's start. `holes` are the levels of the hole kind a photoexcited
/// start names (null otherwise). Throws InputError at the start's place (packet outside the stack, unknown
/// level, ...).
Dynamics superpose(const Study& study, const Levels& levels, const Transitions& transitions,
                   const Levels* holes, Notes& notes);

/// Amplitudes of the levels at the times of `dynamics`: c_k exp(-i E_k t / hbar), (level, time).
Eigen::MatrixXcd amplitudes_in_time(const Levels& levels, const Dynamics& dynamics);

/// The same in blocks of a few megabytes, for many times: `take(first_level, first_time, block)` gets (level,
/// time) blocks that hold some levels at all times or one level at some times, in that order.
void amplitudes_in_blocks(
    const Levels& levels, const Dynamics& dynamics,
    const std::function<void(int first_level, int first_time, const Eigen::MatrixXcd& block)>& take);

/// |psi(z, t)|^2 [1/nm] in blocks of times, formed by matrix products: `take(first_time, block)` gets (time,
/// z) blocks, row-major as files hold them.
void density_map(const Levels& levels, const Dynamics& dynamics,
                 const std::function<void(int first_time, const RowMatrix& block)>& take);

}  // namespace wellwright
