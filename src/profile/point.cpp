// SPDX-License-Identifier: Apache-2.0
// Band parameters -> inverse-mass poles.
#include "profile/point.hpp"

namespace wellwright {

int poles_of(Carrier carrier, Bands bands) {
  return carrier == Carrier::electron ? static_cast<int>(bands) - 1 : 0;
}

double hole_edge_of(const BandParameters& parameters, Carrier carrier) {
  return carrier == Carrier::heavy_hole ? parameters.heavy_hole_edge : parameters.light_hole_edge;
}

Point point_of(const BandParameters& m, Carrier carrier, Bands bands, double hole_edge) {
  Point point;
  if (carrier != Carrier::electron) {
    const bool heavy = carrier == Carrier::heavy_hole;
    const double along = heavy ? m.heavy_hole_mass : m.light_hole_mass;
    const double across = heavy ? m.heavy_hole_in_plane_mass : m.light_hole_in_plane_mass;
    point.edge = hole_edge - hole_edge_of(m, carrier);
    point.a0 = 1 / along;
    point.in_plane = along / across;
    return point;
  }
  point.edge = m.conduction_band_edge;
  point.in_plane = m.electron_mass / m.electron_in_plane_mass;
  const double gap = m.band_gap, so = m.spin_orbit_splitting, inverse = 1 / m.electron_mass;
  switch (bands) {
    case Bands::one:
      point.a0 = inverse;
      break;
    case Bands::two:  // the weight keeps the band-edge mass: b / Eg = 1/m*
      point.b[0] = gap * inverse;
      point.v[0] = m.mean_valence_edge;
      break;
    case Bands::three: {  // light hole and split-off share the weight 2 : 1
      const double P = inverse / ((2.0 / 3) / gap + (1.0 / 3) / (gap + so));
      point.b = {2 * P / 3, P / 3};
      point.v = {m.light_hole_edge, m.split_off_edge};
      break;
    }
  }
  return point;
}

}  // namespace wellwright
