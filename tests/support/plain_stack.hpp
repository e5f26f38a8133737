// SPDX-License-Identifier: Apache-2.0
// A layer stack in the tests' own words, from which closed forms, shooting, a dense matrix and a study file
// are made side by side.
#pragma once

#include <cmath>
#include <limits>
#include <string>
#include <vector>

#include "wellwright/units.hpp"

namespace plain {

using Real = long double;
inline constexpr Real K = wellwright::constants::hbar2_over_2m0;  // hbar^2 / 2 m0 [eV nm^2]
inline const Real pi = std::acos(Real(-1));
inline constexpr Real infinite = std::numeric_limits<Real>::infinity();

/// One carrier's view of a material: band edge U [eV] (for holes counted downward), mass along z and in the
/// plane [m0], gap and spin-orbit splitting [eV] for the energy-dependent electron mass.
struct Medium {
  double edge = 0, mass = 0.067, gap = 1.5, split_off = 0.34, in_plane_mass = 0;
  double valence_shift = 0, split_off_shift = 0;  // of the poles by strain, whose weights stay [eV]
  double across() const { return in_plane_mass > 0 ? in_plane_mass : mass; }
  Medium with_edge(double other) const {
    Medium copy = *this;
    copy.edge = other;
    return copy;
  }
};

enum class Carrier { electron, heavy_hole, light_hole };

/// Uniform, or graded: every parameter is y = y_vertex + (y_far - y_vertex) t^power, t measured from the
/// vertex, the face with the lower edge (the bottom one when equal).
struct Layer {
  Medium medium;
  double thickness = 0;  // [nm]
  bool graded = false;
  Medium top;
  double power = 1;
  std::string name;
};

/// `bands` 1, 2 or 3 as in the study file; field in V/nm along z, so an electron's edge rises by field * z
/// and a hole's falls by it.
struct Stack {
  std::vector<Layer> layers;
  double field = 0;
  int bands = 1;
  Carrier carrier = Carrier::electron;
  bool periodic = false;
  double tilt() const { return carrier == Carrier::electron ? field : -field; }
  double length() const {
    double sum = 0;
    for (const Layer& layer : layers) sum += layer.thickness;
    return sum;
  }
};

inline Layer uniform(const Medium& medium, double thickness, std::string name = {}) {
  return {medium, thickness, false, medium, 1, std::move(name)};
}
inline Layer graded(const Medium& bottom, const Medium& top, double power, double thickness) {
  return {bottom, thickness, true, top, power, {}};
}

/// 1/m(E) [1/m0] of a medium without field, E from the same zero as its edge. `two`: one pole at the valence
/// edge. `three`: light hole and split-off with weights 2 : 1, the sum keeping the band-edge mass.
inline Real inverse_mass(const Medium& m, int bands, Real E) {
  const Real gap = m.gap, so = m.split_off, edge = 1 / Real(m.mass);
  const Real above_valence = E - m.edge + gap - m.valence_shift;
  if (bands == 1) return edge;
  if (bands == 2) return edge * gap / above_valence;
  const Real above_split_off = E - m.edge + gap + so - m.split_off_shift;
  const Real P = edge / (2 / (3 * gap) + 1 / (3 * (gap + so)));
  return 2 * P / (3 * above_valence) + P / (3 * above_split_off);
}

}  // namespace plain
