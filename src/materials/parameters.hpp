// SPDX-License-Identifier: Apache-2.0
// The quantities that a material has in the table: key, unit, class; private to the room.
#pragma once

#include <array>
#include <string_view>

#include "wellwright/units.hpp"

namespace wellwright {

/// Every quantity of the table, in the order of parameter_table.
enum class P {
  lattice_constant,
  lattice_constant_slope,
  c_lattice_constant,
  internal_parameter,
  relative_lattice_slope,
  relative_c_lattice_slope,
  band_gap,
  band_gap_alpha,
  band_gap_beta,
  band_gap_coth_amplitude,
  band_gap_coth_temperature,
  x_gap,
  x_gap_alpha,
  x_gap_beta,
  x_gap_slope,
  l_gap,
  l_gap_alpha,
  l_gap_beta,
  delta_gap,
  delta_gap_alpha,
  delta_gap_beta,
  spin_orbit_splitting,
  crystal_field_splitting,
  valence_band_offset,
  average_valence_band_offset,
  electron_mass,
  electron_in_plane_mass,
  heavy_hole_mass,
  heavy_hole_in_plane_mass,
  light_hole_mass,
  light_hole_in_plane_mass,
  split_off_mass,
  x_longitudinal_mass,
  x_transverse_mass,
  x_density_mass,
  l_longitudinal_mass,
  l_transverse_mass,
  l_density_mass,
  delta_longitudinal_mass,
  delta_transverse_mass,
  luttinger_1,
  luttinger_2,
  luttinger_3,
  luttinger_3_minus_2,
  luttinger_kappa,
  kane_energy,
  in_plane_kane_energy,
  kane_remote_bands,
  valence_a1,
  valence_a2,
  valence_a3,
  valence_a4,
  valence_a5,
  valence_a6,
  valence_a7,
  electron_deformation_potential,
  valence_deformation_potential,
  shear_deformation_potential,
  rhombohedral_deformation_potential,
  l_deformation_potential,
  l_uniaxial_deformation_potential,
  delta_uniaxial_deformation_potential,
  delta_gap_deformation_potential,
  deformation_a1,
  deformation_a2,
  deformation_d1,
  deformation_d2,
  deformation_d3,
  deformation_d4,
  deformation_d5,
  deformation_d6,
  c11,
  c12,
  c13,
  c33,
  c44,
  permittivity,
  in_plane_permittivity,
  high_frequency_permittivity,
  in_plane_high_frequency_permittivity,
  refractive_index,
  lo_phonon_energy,
  to_phonon_energy,
  in_plane_lo_phonon_energy,
  in_plane_to_phonon_energy,
  optical_phonon_energy,
  density,
  sound_velocity,
  acoustic_deformation_potential,
  alloy_scattering_potential,
  spontaneous_polarization,
  e14,
  e15,
  e31,
  e33,
  count
};
inline constexpr int parameter_count = static_cast<int>(P::count);

struct ParameterInfo {
  std::string_view key;
  Dimension dimension;    ///< number where `unit` is none that Dimension knows
  std::string_view unit;  ///< in which the program holds it
  bool in_study = false;  ///< a key of a medium in a study
};
extern const std::array<ParameterInfo, parameter_count> parameter_table;

/// The parameter of this key; P::count when there is none.
P parameter_of(std::string_view key);

/// Values of all parameters; NaN where not known.
using Values = std::array<double, parameter_count>;
inline double& at(Values& values, P p) {
  return values[static_cast<std::size_t>(p)];
}
inline double at(const Values& values, P p) {
  return values[static_cast<std::size_t>(p)];
}

}  // namespace wellwright
