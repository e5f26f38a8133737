// SPDX-License-Identifier: Apache-2.0
// The f-sum rule and the consistency of transition tables.
#include <catch2/catch.hpp>

#include "cases.hpp"
#include "wellwright/optics.hpp"

using namespace wellwright;

// Thomas, Reiche, Kuhn with a mass that depends on place: the sum over all final states, continuum of the box
// included, is <m0/m>; [z, [H, z]] = hbar^2/m holds exactly for the operator on the elements. For an
// energy-dependent mass there is no closed sum over conduction levels, and none is given.
TEST_CASE("the f-sum rule") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    const Transitions lines = transitions(levels);
    REQUIRE(lines.f_sum.size() == levels.count());
    if (!c.one_band()) {
      CHECK(lines.f_sum.array().isNaN().all());
      CHECK(lines.f_sum_expected.array().isNaN().all());
      continue;
    }
    const Eigen::VectorXd inverse_mass =
        levels.density().transpose() * levels.profile.grid.weight.cwiseProduct(levels.profile.at.a0);
    for (int i = 0; i < levels.count(); ++i) {
      CHECK(lines.f_sum_expected[i] == Approx(inverse_mass[i]).epsilon(1e-10));
      CHECK(lines.f_sum[i] == Approx(lines.f_sum_expected[i]).epsilon(1e-8));
      // The listed levels alone give a part of it.
      CHECK(lines.oscillator_strength.row(i).sum() < lines.f_sum_expected[i] + 1e-9);
    }
  }
}

TEST_CASE("energies, dipoles, strengths, wavelengths and periods of transitions are one table") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    const Transitions lines = transitions(levels);
    const Eigen::MatrixXd z = levels.moment(levels.profile.grid.z);
    for (int i = 0; i < levels.count(); ++i)
      for (int f = 0; f < levels.count(); ++f) {
        const double energy = levels.energy[f] - levels.energy[i];
        CHECK(lines.energy(i, f) == Approx(energy).margin(1e-15));
        CHECK(lines.dipole(i, f) == Approx(z(i, f)).margin(1e-9));
        if (i == f) continue;
        CHECK(lines.oscillator_strength(i, f) ==
              Approx(energy * z(i, f) * z(i, f) / constants::hbar2_over_2m0).margin(1e-9));
        CHECK(lines.beat_period(i, f) == Approx(constants::planck / std::abs(energy)).epsilon(1e-12));
        CHECK(lines.wavelength(i, f) * lines.frequency(i, f) ==
              Approx(constants::light_speed).epsilon(1e-12));
      }
  }
}
