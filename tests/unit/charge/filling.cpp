// SPDX-License-Identifier: Apache-2.0
// Sheet density of a subband against its closed forms.
#include <catch2/catch.hpp>
#include <cmath>
#include <numbers>

#include "wellwright/charge.hpp"

using namespace wellwright;

namespace {
constexpr double mass = 0.067;
// E(k) of a band with hbar^2 k^2 / 2m = E (1 + a E).
Eigen::VectorXd energies(const Eigen::VectorXd& k, double a) {
  const Eigen::ArrayXd parabola = constants::hbar2_over_2m0 / mass * k.array().square();
  if (a == 0) return parabola;
  return ((1 + 4 * a * parabola).sqrt() - 1) / (2 * a);
}
const Eigen::VectorXd k = Eigen::VectorXd::LinSpaced(26, 0, 0.5);
const double states = mass / (4 * std::numbers::pi * constants::hbar2_over_2m0) * 2;  // m / (pi hbar^2)
}  // namespace

TEST_CASE("A parabolic subband holds m kT / (pi hbar^2) ln(1 + exp(eta / kT))") {
  for (const double T : {4.0, 77.0, 300.0})
    for (const double filling : {-0.1, -0.005, 0.0, 0.02, 0.2}) {
      const double kT = constants::boltzmann * T;
      const double expected = states * kT * std::log1p(std::exp(filling / kT));
      CAPTURE(T, filling);
      if (filling / kT < 300)
        CHECK(subband_density(k, energies(k, 0), filling, T) == Approx(expected).epsilon(1e-12));
    }
  CHECK(subband_density(k, energies(k, 0), 0.02, 0) == Approx(states * 0.02).epsilon(1e-13));
  CHECK(subband_density(k, energies(k, 0), -0.02, 0) == 0);
}

// f(E) integrates against states (1 + 2 a E): states [kT F0 + 2 a (kT)^2 F1]; at T = 0 states (E + a E^2).
TEST_CASE("A nonparabolic subband holds more") {
  const double a = 0.7;
  CHECK(subband_density(k, energies(k, a), 0.05, 0) == Approx(states * (0.05 + a * 0.0025)).epsilon(1e-12));
  // Sommerfeld: F1 = eta^2/2 + pi^2/6, exact but for exp(-eta).
  const double kT = constants::boltzmann * 20, eta = 0.08;
  const double expected = states * (eta + 2 * a * (eta * eta / 2 + std::pow(std::numbers::pi * kT, 2) / 6));
  CHECK(subband_density(k, energies(k, a), eta, 20) == Approx(expected).epsilon(1e-10));
}
