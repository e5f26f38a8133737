// SPDX-License-Identifier: Apache-2.0
// Subbands of one carrier: levels, dispersion and sheet densities.
#include "charge/subbands.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "charge/statistics.hpp"

namespace wellwright {
namespace {

constexpr int k_points = 14;
constexpr double widest_k = 1.5;  // [1/nm]

}  // namespace

double Subbands::sheet(int level, double fermi, double temperature) const {
  const Eigen::VectorXd above =
      dispersion.energy.row(level).transpose().array() - dispersion.energy(level, 0);
  return subband_density(dispersion.k, above, filling(level, fermi), temperature);
}

Subbands subbands_of(const Profile& profile, int count, const Subbands* near, double reach) {
  Subbands bands;
  bands.levels = levels_on_profile(profile, count, near ? &near->levels : nullptr);
  bands.density = bands.levels.density();
  const double mass = bands.levels.in_plane_mass.maxCoeff();
  const double k = std::clamp(std::sqrt(1.2 * reach * mass / constants::hbar2_over_2m0), 0.05, widest_k);
  bands.dispersion = in_plane_dispersion(bands.levels, Eigen::VectorXd::LinSpaced(k_points, 0, k));
  return bands;
}

Parabolic parabolic_density(double mass, double filling, double temperature) {
  const double states = mass / (2 * std::numbers::pi * constants::hbar2_over_2m0);  // m / (pi hbar^2)
  const double kT = constants::boltzmann * temperature;
  if (kT <= 0) return {states * std::max(filling, 0.0), filling > 0 ? states : 0};
  return {states * kT * log_one_plus_exp(filling / kT), states / (1 + std::exp(-filling / kT))};
}

}  // namespace wellwright
