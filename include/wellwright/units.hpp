// SPDX-License-Identifier: Apache-2.0
// Physical constants, dimensions, quantities read from text, and photon energy in its four spellings.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace wellwright {

/// CODATA 2022 in the internal units nm, eV, ps, K, electron masses, e, V/nm.
/// Source: E. Tiesinga et al., CODATA recommended values of the fundamental physical constants: 2022, NIST
/// (2024).
namespace constants {
inline constexpr double planck =
    4.135667696923859e-3;                             ///< h [eV ps], exact: 6.62607015e-34 / 1.602176634e-19
inline constexpr double hbar = 6.582119569509067e-4;  ///< h / 2 pi [eV ps]
inline constexpr double light_speed = 299792.458;     ///< c [nm/ps], exact
inline constexpr double boltzmann =
    8.617333262145179e-5;  ///< k [eV/K], exact: 1.380649e-23 / 1.602176634e-19
inline constexpr double electron_rest_energy = 510998.95069;  ///< m0 c^2 [eV], CODATA 2022, +- 0.00016
inline constexpr double hbar_c = hbar * light_speed;          ///< [eV nm]
inline constexpr double hbar2_over_2m0 =
    hbar_c * hbar_c / (2 * electron_rest_energy);             ///< hbar^2 / 2 m0 [eV nm^2]
inline constexpr double elementary_charge = 1.602176634e-19;  ///< e [C], exact
inline constexpr double vacuum_permittivity =
    8.8541878188e-12;  ///< eps0 [F/m], CODATA 2022, +- 0.0000000014e-12
inline constexpr double charge_over_permittivity =
    elementary_charge / vacuum_permittivity * 1e9;  ///< e / eps0 [V nm]
}  // namespace constants

/// What a quantity measures. Values are held in the internal unit named beside each.
enum class Dimension {
  number,           ///< 1
  length,           ///< nm
  energy,           ///< eV
  time,             ///< ps
  temperature,      ///< K
  electric_field,   ///< V/nm
  voltage,          ///< V
  sheet_density,    ///< nm^-2
  volume_density,   ///< nm^-3
  inverse_length,   ///< nm^-1
  angle,            ///< rad
  frequency,        ///< THz (1/ps)
  mass,             ///< electron masses (a plain number in files)
  pressure,         ///< GPa (elastic constants)
  polarization,     ///< C/m^2
  mass_density,     ///< g/cm^3
  speed,            ///< m/s
  speed_of_growth,  ///< nm/s
  monolayers,       ///< ML, a length that only the layer's own lattice can convert
  percent,          ///< a part of one, written with %
};

/// The unit in which the program holds and prints `dimension`, e.g. "nm".
std::string_view internal_unit(Dimension dimension);

/// A quantity as read: `value` in the internal unit of `dimension`.
struct Quantity {
  double value = 0;
  Dimension dimension = Dimension::number;
  std::string unit;  ///< the unit as written, "" for a plain number
};

/// Why a text is no quantity of the wanted kind; `offset` counts bytes into the text.
struct QuantityTrouble {
  std::string what;  ///< one sentence: what is wrong
  std::string hint;  ///< what would be right, may be empty
  std::size_t offset = 0;
};

/// Reads `text` ("14.5 nm", "9 ML", "3e10 cm^-2") as one of the `allowed` dimensions; equal dimension is
/// required, not mere convertibility. Returns true and fills `quantity`, or returns false and fills
/// `trouble`.
bool read_quantity(std::string_view text, const std::vector<Dimension>& allowed, Quantity& quantity,
                   QuantityTrouble& trouble);

/// Reads a finite decimal number that fills `text` entirely; false when it is none ("010" and ".nan" are
/// none).
bool read_number(std::string_view text, double& value);

/// Photon energy [eV] to vacuum wavelength [nm], frequency [THz], wavenumber [cm^-1]; and wavelength back to
/// energy.
double wavelength_of(double energy);
double frequency_of(double energy);
double wavenumber_of(double energy);
double energy_of_wavelength(double wavelength);

/// Beat period h / |energy| [ps] of two levels `energy` [eV] apart.
double beat_period_of(double energy);

}  // namespace wellwright
