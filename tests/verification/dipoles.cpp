// SPDX-License-Identifier: Apache-2.0
// Dipoles and oscillator strengths of closed forms, the f-sum rule, and double-well numbers computed by
// another route.
#include <catch2/catch.hpp>

#include <cstdio>

#include "support/closed_forms.hpp"
#include "support/study_builder.hpp"

namespace {

const double K = static_cast<double>(plain::K);

Eigen::MatrixXd dipoles(const wellwright::Levels& levels) {
  return levels.moment(levels.profile.grid.z);
}

/// f of a transition in units of m0/m.
double strength(double energy, double dipole, double mass) {
  return energy * dipole * dipole * mass / K;
}

}  // namespace

TEST_CASE("dipoles and strengths of the infinite well") {
  const double L = 10, m = 0.067;
  const auto levels = plain::levels_of({{plain::uniform({0, m}, L)}}, "5", "1e-11 eV");
  const auto z = dipoles(levels);
  for (int i = 1; i <= 5; ++i)
    for (int j = 1; j < i; ++j) {
      CAPTURE(i, j);
      const double exact = static_cast<double>(closed::infinite_well_dipole(L, i, j));
      CHECK(std::abs(std::abs(z(i - 1, j - 1)) - exact) < 1e-10);
    }
  // f12 = 256/(27 pi^2), f23, f34, f14, f25 of the closed form in units of m0/m: seven printed digits.
  const auto f = [&](int i, int j) {
    return strength(levels.energy[j - 1] - levels.energy[i - 1], z(i - 1, j - 1), m);
  };
  CHECK(f(1, 2) == Approx(256 / (27 * M_PI * M_PI)).epsilon(1e-11));
  CHECK(f(2, 3) == Approx(1.8675521).epsilon(1e-7));
  CHECK(f(3, 4) == Approx(2.7223791).epsilon(1e-7));
  CHECK(f(1, 4) == Approx(0.0307416).epsilon(2e-6));
  CHECK(f(2, 5) == Approx(0.0700200).epsilon(1e-6));
  CHECK(std::abs(z(0, 1)) == Approx(1.801265).epsilon(1e-6));
  CHECK(std::abs(z(0, 2)) < 1e-10);
}

TEST_CASE("the oscillator's strength is m0/m exactly") {
  const plain::Medium centre{0, 0.067}, rim{0.15, 0.067};
  const auto levels = plain::levels_of(
      {{plain::graded(rim, centre, 2, 100), plain::graded(centre, rim, 2, 100)}}, "4", "1e-11 eV");
  const auto z = dipoles(levels);
  const double quantum = static_cast<double>(closed::oscillator_quantum(200, 0.15, 0.067));
  CHECK(std::abs(z(0, 1)) == Approx(std::sqrt(K / (0.067 * quantum))).epsilon(1e-10));
  CHECK(strength(levels.energy[1] - levels.energy[0], z(0, 1), 0.067) == Approx(1).epsilon(1e-10));
  CHECK(std::abs(z(0, 2)) < 1e-8);
  CHECK(std::abs(z(1, 2)) == Approx(std::sqrt(2.0) * std::abs(z(0, 1))).epsilon(1e-10));
}

// Direct diagonalisation by finite differences of 0.025 nm: E1, E2, z12, f12, the sum over all states and
// <m0/m> of an 8 nm well (depth 0.65 * 1.247 * 0.3 eV) in a box of 32 nm; to 1e-4 as finite differences are.
TEST_CASE("the f-sum of a well with a step of the mass") {
  const plain::Medium w{0, 0.067}, b{0.65 * 1.247 * 0.3, 0.0919};
  const plain::Stack stack{{plain::uniform(b, 12), plain::uniform(w, 8), plain::uniform(b, 12)}};
  const auto levels = plain::levels_of(stack, "{below: 60 eV}", "1 ueV");
  const auto z = dipoles(levels);
  CHECK(1000 * levels.energy[0] == Approx(41.596).epsilon(1e-4));
  CHECK(1000 * levels.energy[1] == Approx(160.077).epsilon(1e-4));
  CHECK(std::abs(z(0, 1)) == Approx(2.1573).epsilon(1e-4));
  CHECK(strength(levels.energy[1] - levels.energy[0], z(0, 1), 1) == Approx(14.473).epsilon(1e-4));
  double sum = 0, sum_to_15 = 0;
  for (int n = 1; n < levels.count(); ++n) {
    const double f = strength(levels.energy[n] - levels.energy[0], z(0, n), 1);
    sum += f;
    if (levels.energy[n] < 15) sum_to_15 += f;
  }
  const Eigen::VectorXd inverse_mass =
      levels.density().transpose() * levels.profile.grid.weight.cwiseProduct(levels.profile.at.a0);
  // Since psi' jumps with the mass, the strengths fall like n^-2 and what lies above E like E^-1/2: half of
  // it goes from 15 to 60 eV.
  const double all = 2 * sum - sum_to_15;
  std::printf("f-sum over %d levels: %.5f, all: %.5f, <m0/m>: %.5f\n", levels.count(), sum, all,
              inverse_mass[0]);
  CHECK(inverse_mass[0] == Approx(14.7067).epsilon(1e-4));
  CHECK(all == Approx(inverse_mass[0]).epsilon(2e-5));
  CHECK(sum < inverse_mass[0]);
}

// The same well set, 8/2/8 nm: finite differences of 0.025 nm (2e-4 meV from those of 0.05 nm).
TEST_CASE("the symmetric double well of 8/2/8 nm") {
  const plain::Medium w{0, 0.067}, b{0.65 * 1.247 * 0.3, 0.0919};
  const plain::Stack stack{{plain::uniform(b, 20), plain::uniform(w, 8), plain::uniform(b, 2),
                            plain::uniform(w, 8), plain::uniform(b, 20)}};
  const auto levels = plain::levels_of(stack, "2", "1e-10 eV");
  const double splitting = levels.energy[1] - levels.energy[0];
  CHECK(1000 * levels.energy[0] == Approx(35.966).epsilon(1e-4));
  CHECK(1000 * splitting == Approx(10.7832).epsilon(1e-4));
  CHECK(wellwright::beat_period_of(splitting) == Approx(0.38353).epsilon(1e-4));
  CHECK(std::abs(dipoles(levels)(0, 1)) == Approx(4.9570).epsilon(1e-4));
}
