// SPDX-License-Identifier: Apache-2.0
// Photon energy as wavelength, frequency and wavenumber, and the beat of two levels.
#include <cmath>

#include "wellwright/units.hpp"

namespace wellwright {

double wavelength_of(double energy) {
  return constants::planck * constants::light_speed / energy;
}

double frequency_of(double energy) {
  return energy / constants::planck;
}

double wavenumber_of(double energy) {
  return 1e7 / wavelength_of(energy);
}

double energy_of_wavelength(double wavelength) {
  return constants::planck * constants::light_speed / wavelength;
}

double beat_period_of(double energy) {
  return constants::planck / std::abs(energy);
}

}  // namespace wellwright
