// SPDX-License-Identifier: Apache-2.0
// Strain, monolayers and critical thickness.
#include "materials/strain.hpp"

#include <cmath>
#include <limits>
#include <numbers>

namespace wellwright {
namespace {

constexpr double room = 300;  // monolayers are converted at this temperature [K]

// J.W. Matthews, A.E. Blakeslee, J. Cryst. Growth 27, 118 (1974): h = b (1 - nu cos^2 alpha) / (k pi f (1 +
// nu) cos lambda) (ln(h / b) + 1), alpha = lambda = 60 deg, b = a / sqrt 2; k = 8 for one uncapped layer, 4
// for a buried one, 2 in a superlattice.
double matthews_blakeslee(double k, double f, double a, double nu) {
  if (f == 0) return std::numeric_limits<double>::infinity();
  const double b = a / std::numbers::sqrt2, cosine = 0.5;
  const double front =
      b * (1 - nu * cosine * cosine) / (k * std::numbers::pi * std::abs(f) * (1 + nu) * cosine);
  double h = front * 30;
  for (int i = 0; i < 200; ++i) {
    const double next = front * (std::log(std::max(h / b, 1.0)) + 1);
    if (std::abs(next - h) < 1e-12 * h) return next;
    h = next;
  }
  return h;
}

}  // namespace

Strain strain_of(const MaterialTable::Data& data, const Alloy& alloy, const Values& v,
                 const Environment& environment) {
  if (!environment.substrate || alloy.is_medium()) return {};
  const double a = at(v, P::lattice_constant);
  const double wanted =
      at(values_of(data, *environment.substrate, environment.temperature), P::lattice_constant);
  if (!std::isfinite(wanted))
    throw InputError("the substrate " + environment.substrate->text + " has no lattice constant", Place{});
  const double e = (wanted - a) / a;
  const double ratio = structure_of_alloy(data, alloy) == Structure::wurtzite ? at(v, P::c13) / at(v, P::c33)
                                                                              : at(v, P::c12) / at(v, P::c11);
  return {e, -2 * ratio * e};
}

StrainState MaterialTable::strain(const Alloy& alloy, const Environment& environment) const {
  const Values v = values_of(*data_, alloy, environment.temperature);
  StrainState state;
  state.relaxed_lattice = at(v, P::lattice_constant);
  const double none = std::numeric_limits<double>::infinity();
  state.critical_thickness_overlayer = state.critical_thickness_buried =
      state.critical_thickness_superlattice = none;
  if (!environment.strain) return state;
  const Strain e = strain_of(*data_, alloy, v, environment);
  state.in_plane = e.in_plane;
  state.along_growth = e.along;
  if (std::abs(e.in_plane) < 1e-9) return state;
  const bool cubic = structure_of_alloy(*data_, alloy) != Structure::wurtzite;
  const double nu = cubic ? at(v, P::c12) / (at(v, P::c11) + at(v, P::c12)) : std::nan("");
  state.critical_thickness_overlayer = matthews_blakeslee(8, e.in_plane, state.relaxed_lattice, nu);
  state.critical_thickness_buried = matthews_blakeslee(4, e.in_plane, state.relaxed_lattice, nu);
  state.critical_thickness_superlattice = matthews_blakeslee(2, e.in_plane, state.relaxed_lattice, nu);
  return state;
}

double MaterialTable::monolayer(const Alloy& alloy, const Environment& environment) const {
  Environment at_room = environment;
  at_room.temperature = room;
  const Values v = values_of(*data_, alloy, room);
  const Strain e = environment.strain ? strain_of(*data_, alloy, v, at_room) : Strain{};
  const bool wurtzite = !alloy.is_medium() && structure_of_alloy(*data_, alloy) == Structure::wurtzite;
  return 0.5 * at(v, wurtzite ? P::c_lattice_constant : P::lattice_constant) * (1 + e.along);
}

}  // namespace wellwright
