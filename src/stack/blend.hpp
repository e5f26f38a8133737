// SPDX-License-Identifier: Apache-2.0
// Arithmetic on band parameters and on sublattice fractions; private to the room.
#pragma once

#include "wellwright/stack.hpp"

namespace wellwright {

inline constexpr double BandParameters::*all_parameters[] = {
    &BandParameters::conduction_band_edge,     &BandParameters::mean_valence_edge,
    &BandParameters::heavy_hole_edge,          &BandParameters::light_hole_edge,
    &BandParameters::split_off_edge,           &BandParameters::band_gap,
    &BandParameters::spin_orbit_splitting,     &BandParameters::electron_mass,
    &BandParameters::electron_in_plane_mass,   &BandParameters::heavy_hole_mass,
    &BandParameters::heavy_hole_in_plane_mass, &BandParameters::light_hole_mass,
    &BandParameters::light_hole_in_plane_mass, &BandParameters::permittivity};

inline constexpr double BandParameters::*all_edges[] = {
    &BandParameters::conduction_band_edge, &BandParameters::mean_valence_edge,
    &BandParameters::heavy_hole_edge, &BandParameters::light_hole_edge, &BandParameters::split_off_edge};

/// sum += weight * term, for every parameter. A weight of 0 adds nothing, even where the term is not known.
inline void add(BandParameters& sum, double weight, const BandParameters& term) {
  if (weight == 0) return;
  for (const auto member : all_parameters) sum.*member += weight * term.*member;
}

/// A mixture with these fractions; it has no name, so that overrides of an alloy by its name do not apply to
/// it.
inline Alloy mixture(const std::array<double, 9>& fraction) {
  Alloy alloy;
  alloy.fraction = fraction;
  return alloy;
}

/// What the study's overrides of this alloy by its name add to a mixture of the same fractions; zero without
/// overrides.
BandParameters correction_of(const Stack& stack, const Alloy& alloy);

/// Part of the way from the bottom to the top alloy at the part t of the thickness.
double part_of_way(const Grading& grading, double t);

}  // namespace wellwright
