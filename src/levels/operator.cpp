// SPDX-License-Identifier: Apache-2.0
// Where the search for levels begins when valence edges reach up into the conduction band.
#include "levels/operator.hpp"

#include <algorithm>
#include <cmath>

namespace wellwright {
namespace {

constexpr double below_edge = 1e-3;  // [eV] between periodic ends a flat edge is itself a level, the constant
constexpr double clearance = 0.05;   // [eV] kept between lowered valence edges and the lowest conduction edge

// A field along a long stack lifts the valence edges of one end above the conduction edges of the other.
// Levels then decay by tunnelling between the bands (Zener), and E crosses a pole of 1/m far from the level,
// where its envelope has died away. The poles there are lowered below every level: tunnelling between the
// bands is left out and the rest is untouched.
SearchFloor prepare(Profile& profile) {
  SearchFloor floor;
  Coefficients& at = profile.at;
  const double lowest = at.edge.minCoeff();
  floor.energy = lowest - (profile.ends == Ends::periodic ? below_edge : 0);
  if (at.poles() == 0) return floor;
  const double highest_pole = at.v.maxCoeff();
  if (highest_pole < lowest - 1e-9) {
    if (floor.energy <= highest_pole) floor.energy = 0.5 * (lowest + highest_pole);
    return floor;
  }
  const Eigen::VectorXd tilt = profile.field * profile.grid.z;
  const double flat_pole = (at.v.colwise() - tilt).maxCoeff(), flat_edge = (at.edge - tilt).minCoeff();
  if (flat_pole < flat_edge) {
    at.v = at.v.cwiseMin(lowest - std::min(clearance, 0.5 * (flat_edge - flat_pole)));
    floor.lowered = true;
  } else {
    floor.energy = std::max(lowest, highest_pole) + 1e-9;
    floor.broken_gap = true;
  }
  return floor;
}

}  // namespace

Operator::Operator(Profile whole)
    : profile(std::move(whole)), floor(prepare(profile)), hamiltonian(profile), factors(hamiltonian) {}

Operator::Operator(const Study& study, Carrier carrier, const Grid& grid, const Potential& potential)
    : Operator(make_profile(study, carrier, grid, potential)) {}

}  // namespace wellwright
