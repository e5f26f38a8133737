// SPDX-License-Identifier: Apache-2.0
// Band parameters at a point: offsets, gaps at temperature, model-solid strain, masses.
//
// Zinc blende on (001): C.G. Van de Walle, Phys. Rev. B 39, 1871 (1989); split-off coupling as in S.L.
// Chuang, Physics of Optoelectronic Devices (1995). Wurtzite on (0001): S.L. Chuang, C.S. Chang, Phys. Rev. B
// 54, 2491 (1996). Valence edges follow the tabled offsets at every temperature, the gap's shift goes to the
// conduction band (practice of I. Vurgaftman et al., J. Appl. Phys. 89, 5815 (2001)).
#include <cmath>

#include "materials/data.hpp"
#include "materials/strain.hpp"

namespace wellwright {
namespace {

// Valence edges relative to the unstrained mean, and the shift of the conduction edge.
struct EdgeShifts {
  double conduction = 0, mean = 0, heavy = 0, light = 0, split_off = 0;
};

EdgeShifts cubic_shifts(const Values& v, const Strain& e) {
  const double so = at(v, P::spin_orbit_splitting);
  if (e.in_plane == 0) return {0, 0, 0, 0, -so};
  const double trace = 2 * e.in_plane + e.along;
  const double hydrostatic = at(v, P::valence_deformation_potential) * trace;
  const double Q = -at(v, P::shear_deformation_potential) * (e.in_plane - e.along);
  const double root = std::sqrt(so * so + 2 * so * Q + 9 * Q * Q);
  return {at(v, P::electron_deformation_potential) * trace, hydrostatic, hydrostatic - Q,
          hydrostatic + 0.5 * (Q - so + root), hydrostatic + 0.5 * (Q - so - root)};
}

// The tabled offset is that of the unstrained Gamma9 edge, to which the tabled gap belongs.
EdgeShifts wurtzite_shifts(const Values& v, const Strain& e) {
  const double d1 = at(v, P::crystal_field_splitting), d2 = at(v, P::spin_orbit_splitting) / 3;
  const double across = 2 * e.in_plane;
  double lambda = 0, theta = 0, conduction = 0;
  if (e.in_plane != 0) {
    lambda = at(v, P::deformation_d1) * e.along + at(v, P::deformation_d2) * across;
    theta = at(v, P::deformation_d3) * e.along + at(v, P::deformation_d4) * across;
    conduction = (at(v, P::deformation_a1) + at(v, P::deformation_d1)) * e.along +
                 (at(v, P::deformation_a2) + at(v, P::deformation_d2)) * across;
  }
  const double half = 0.5 * (d1 - d2 + theta), root = std::sqrt(half * half + 2 * d2 * d2), zero = d1 + d2;
  return {conduction, lambda, theta + lambda, half + lambda + root - zero, half + lambda - root - zero};
}

double known_or(double value, double other) {
  return std::isfinite(value) ? value : other;
}

// Along +z in units of e: the table's constants are for [0001], the growth direction of a Ga-face layer.
// Source: O. Ambacher et al., J. Phys. Condens. Matter 14, 3399 (2002); O. Ambacher et al., J. Appl. Phys.
// 85, 3222 (1999).
double polarization_of(Structure structure, const Values& v, const Strain& e,
                       const Environment& environment) {
  if (structure != Structure::wurtzite && !std::isfinite(at(v, P::spontaneous_polarization))) return 0;
  constexpr double per_area = 1e-18 / constants::elementary_charge;  // C/m^2 in e/nm^2
  const double spontaneous = known_or(at(v, P::spontaneous_polarization), 0);
  double piezo = 0;
  if (e.in_plane != 0) piezo = 2 * at(v, P::e31) * e.in_plane + at(v, P::e33) * e.along;
  const double sign = environment.growth_plane == GrowthPlane::wurtzite_000m1 ? -1 : 1;
  return sign * per_area * (spontaneous + piezo);
}

double kane_mass(const Values& cold) {
  const double gap = at(cold, P::band_gap), so = at(cold, P::spin_orbit_splitting);
  return 1 / (1 + 2 * at(cold, P::kane_remote_bands) +
              at(cold, P::kane_energy) * (gap + 2 * so / 3) / (gap * (gap + so)));
}

void take_masses(const Values& v, BandParameters& b) {
  b.electron_mass = at(v, P::electron_mass);
  b.electron_in_plane_mass = known_or(at(v, P::electron_in_plane_mass), b.electron_mass);
  b.heavy_hole_mass = at(v, P::heavy_hole_mass);
  b.heavy_hole_in_plane_mass = known_or(at(v, P::heavy_hole_in_plane_mass), b.heavy_hole_mass);
  b.light_hole_mass = at(v, P::light_hole_mass);
  b.light_hole_in_plane_mass = known_or(at(v, P::light_hole_in_plane_mass), b.light_hole_mass);
}

}  // namespace

BandParameters MaterialTable::resolve(const Alloy& alloy, const Environment& environment) const {
  const Values v = values_of(*data_, alloy, environment.temperature);
  BandParameters b;
  const Structure structure = alloy.is_medium() ? Structure::zinc_blende : structure_of_alloy(*data_, alloy);
  b.band_gap =
      structure == Structure::diamond ? std::fmin(at(v, P::delta_gap), at(v, P::l_gap)) : at(v, P::band_gap);
  b.spin_orbit_splitting = at(v, P::spin_orbit_splitting);
  b.permittivity = at(v, P::permittivity);
  take_masses(v, b);
  if (environment.kane_mass && !alloy.is_medium())
    b.electron_mass = b.electron_in_plane_mass = kane_mass(values_of(*data_, alloy, 0));

  const Strain e = environment.strain ? strain_of(*data_, alloy, v, environment) : Strain{};
  b.polarization = polarization_of(structure, v, e, environment);
  const EdgeShifts shifts = structure == Structure::wurtzite ? wurtzite_shifts(v, e) : cubic_shifts(v, e);
  double valence = 0, conduction = 0;
  if (environment.offset_ratio && !alloy.is_medium()) {
    conduction = *environment.offset_ratio * (b.band_gap - environment.offset_reference_gap);
    valence = conduction - b.band_gap;
  } else {
    valence = structure == Structure::diamond ? at(v, P::average_valence_band_offset) +
                                                    b.spin_orbit_splitting / 3  // of hh, lh and so to the top
                                              : at(v, P::valence_band_offset);
    conduction = valence + b.band_gap;
  }
  b.conduction_band_edge = conduction + shifts.conduction;
  b.mean_valence_edge = valence + shifts.mean;
  b.heavy_hole_edge = valence + shifts.heavy;
  b.light_hole_edge = valence + shifts.light;
  b.split_off_edge = valence + shifts.split_off;

  // An edge given in the study is final; the valence edges move along, so that the gap is kept.
  std::optional<double> final_edge;
  if (alloy.is_medium()) {
    const Override* medium = data_->medium(alloy.medium);
    final_edge = medium && medium->conduction_band_edge ? *medium->conduction_band_edge : std::nan("");
    b.mean_valence_edge = b.heavy_hole_edge = b.light_hole_edge = *final_edge - b.band_gap;
    b.split_off_edge = b.mean_valence_edge - b.spin_orbit_splitting;
    b.conduction_band_edge = *final_edge;
    return b;
  }
  for (const Override* o : data_->overrides_of(alloy))
    if (o->conduction_band_edge) final_edge = o->conduction_band_edge;
  if (final_edge) {
    const double shift = *final_edge - b.conduction_band_edge;
    for (double* edge : {&b.conduction_band_edge, &b.mean_valence_edge, &b.heavy_hole_edge,
                         &b.light_hole_edge, &b.split_off_edge})
      *edge += shift;
  }
  return b;
}

double MaterialTable::value(const Alloy& alloy, std::string_view key, const Environment& environment) const {
  if (key == "conduction_band_edge") return resolve(alloy, environment).conduction_band_edge;
  if (key == "band_gap") return resolve(alloy, environment).band_gap;
  const P p = parameter_of(key);
  if (p == P::count) return std::nan("");
  return at(values_of(*data_, alloy, environment.temperature), p);
}

}  // namespace wellwright
