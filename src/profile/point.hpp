// SPDX-License-Identifier: Apache-2.0
// The operator's coefficients at one point from its band parameters, before field; private to the room.
#pragma once

#include <array>

#include "wellwright/profile.hpp"

namespace wellwright {

struct Point {
  double edge = 0, a0 = 0, in_plane = 1;
  std::array<double, 2> b{}, v{};
};

int poles_of(Carrier carrier, Bands bands);

/// `hole_edge` is Ev_max of the hole kind; ignored for electrons. The operator holds 1/m(E) = a0 + sum_j b_j
/// / (E - v_j).
Point point_of(const BandParameters& parameters, Carrier carrier, Bands bands, double hole_edge);

/// Valence edge that a hole of this kind sees [eV].
double hole_edge_of(const BandParameters& parameters, Carrier carrier);

}  // namespace wellwright
