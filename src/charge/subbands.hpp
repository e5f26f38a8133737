// SPDX-License-Identifier: Apache-2.0
// The subbands of one carrier and how full they are at given Fermi levels; private to the room.
#pragma once

#include "wellwright/charge.hpp"

namespace wellwright {

/// Levels of one carrier with their in-plane dispersion. Fillings are measured on the carrier's own axis:
/// Fermi level minus level for electrons, and (hole edge - Fermi level) - level for holes.
struct Subbands {
  Levels levels;
  Dispersion dispersion;
  Eigen::MatrixXd density;  ///< (local node, level) [1/nm]
  std::vector<int> module;  ///< of each level, 0-based

  bool electrons() const { return levels.profile.carrier == Carrier::electron; }
  /// Fermi level on the carrier's own axis [eV].
  double own_axis(double fermi) const { return electrons() ? fermi : levels.profile.hole_edge - fermi; }
  double filling(int level, double fermi) const { return own_axis(fermi) - levels.energy[level]; }
  double sheet(int level, double fermi, double temperature) const;
};

/// The levels of a carrier in a profile and their dispersion as far as carriers reach.
Subbands subbands_of(const Profile& profile, int count, const Subbands* near, double reach);

/// Density of a parabolic subband with this in-plane mass and its derivative in the filling [nm^-2],
/// [nm^-2/eV].
struct Parabolic {
  double density, slope;
};
Parabolic parabolic_density(double mass, double filling, double temperature);

}  // namespace wellwright
