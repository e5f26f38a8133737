// SPDX-License-Identifier: Apache-2.0
// Exchange and correlation in the local density approximation.
//
// Vxc = -(C / r_s) [1 + 0.7734 x ln(1 + 1/x)] Ry*, x = r_s / 21, C = 2 / (pi alpha), alpha = (4 / 9
// pi)^(1/3), with the local mass and permittivity in the effective radius a* and Rydberg. Source: L. Hedin,
// B.I. Lundqvist, J. Phys. C 4, 2064 (1971), doi:10.1088/0022-3719/4/14/022; F. Stern, S. Das Sarma, Phys.
// Rev. B 30, 840 (1984).
#include <cmath>
#include <numbers>

#include "wellwright/charge.hpp"

namespace wellwright {

LocalExchange hedin_lundqvist(double density, double mass, double permittivity) {
  constexpr double least = 1e-12;  // [nm^-3]: nothing below
  if (!(density > least)) return {0, 0};
  const double coulomb =
      constants::charge_over_permittivity / (4 * std::numbers::pi);  // e^2 / 4 pi eps0 [eV nm]
  const double radius = 2 * constants::hbar2_over_2m0 / mass * permittivity / coulomb;
  const double rydberg = coulomb / (2 * permittivity * radius);
  const double rs = std::cbrt(3 / (4 * std::numbers::pi * density)) / radius, x = rs / 21;
  const double C = 2 / std::numbers::pi / std::cbrt(4 / (9 * std::numbers::pi));
  return {-C / rs * (1 + 0.7734 * x * std::log1p(1 / x)) * rydberg,
          -C / (3 * density * rs) * (1 + 0.7734 * x / (1 + x)) * rydberg};
}

}  // namespace wellwright
