// SPDX-License-Identifier: Apache-2.0
// Tables of transitions: signs, units, the velocity form, equal levels, and the pairs that are listed.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made_levels.hpp"
#include "wellwright/optics.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::solve;
using hand_made::well;

TEST_CASE("Units and signs of a table of transitions") {
  // 20 nm between hard walls, m = 0.067: E1 = 14.03098 meV, E2 - E1 = 3 E1, |z12| = 16 L / 9 pi^2 and
  // f12 = 256 / 27 pi^2 in units of m0/m, from the closed form.
  Study study = hand_made::study({{well, 20}}, Bands::one);
  study.model.accuracy = 1e-11;
  const Transitions t = transitions(solve(study));
  const double pi = 3.14159265358979323846, split = 3 * 0.01403098;
  CHECK(t.energy(0, 1) == Approx(split).epsilon(1e-6));
  CHECK(t.energy(1, 0) == -t.energy(0, 1));
  CHECK(std::abs(t.dipole(0, 1)) == Approx(16 * 20 / (9 * pi * pi)).epsilon(1e-10));
  CHECK(t.dipole(0, 0) == Approx(10).epsilon(1e-12));  // <z> of a level stands on the diagonal
  CHECK(t.oscillator_strength(0, 1) == Approx(256 / (27 * pi * pi) / 0.067).epsilon(1e-9));
  CHECK(t.oscillator_strength(1, 0) == Approx(-t.oscillator_strength(0, 1)));  // negative downward
  CHECK(t.oscillator_strength(2, 2) == 0);
  // hc = 1239.841984 eV nm, h = 4.135667697e-3 eV ps (CODATA 2018 and 2022: exact).
  CHECK(t.wavelength(0, 1) == Approx(1239.841984 / split).epsilon(1e-6));
  CHECK(t.wavelength(1, 0) == t.wavelength(0, 1));
  CHECK(t.frequency(0, 1) == Approx(split / 4.135667697e-3).epsilon(1e-6));
  CHECK(t.frequency(1, 0) == t.frequency(0, 1));
  CHECK(t.beat_period(0, 1) == Approx(0.0982509).epsilon(1e-6));
  CHECK(t.beat_period(1, 0) == t.beat_period(0, 1));
  for (int i = 0; i < 6; ++i) {
    CHECK(std::isnan(t.wavelength(i, i)));
    CHECK(std::isnan(t.frequency(i, i)));
    CHECK(std::isnan(t.beat_period(i, i)));
  }
  CHECK(t.f_sum[0] == Approx(1 / 0.067).epsilon(1e-12));
  CHECK(t.f_sum_expected[0] == Approx(1 / 0.067).epsilon(1e-12));
}

TEST_CASE("Between hard ends the velocity form is energy times dipole, for every band model") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three}) {
    Study study = hand_made::double_well(bands, 0.002);
    study.model.accuracy = 1e-11;
    const Levels levels = solve(study);
    const Eigen::MatrixXd z = levels.moment(levels.profile.grid.z), v = velocity_moment(levels);
    CAPTURE(static_cast<int>(bands));
    // The closed sum over final states is that of one band alone.
    CHECK(transitions(levels).f_sum.array().isNaN().all() == (bands != Bands::one));
    for (int f = 0; f < levels.count(); ++f)
      for (int i = 0; i < levels.count(); ++i)
        // 1e-8 of the typical 0.1 eV x 10 nm: the accuracy asked of the levels enters by its root.
        CHECK(v(f, i) == Approx((levels.energy[f] - levels.energy[i]) * z(f, i)).margin(1e-8));
  }
}

TEST_CASE("A periodic cell without a potential has the plane waves' momentum") {
  // Phase 0 in a cell of length d: 1, then pairs cos(2 pi n z / d), sin(2 pi n z / d) of one energy. From the
  // constant no line leads anywhere: momentum is diagonal in plane waves. Closed form.
  Study study = hand_made::study({{well, 6}, {well, 4}}, Bands::one);
  study.model.ends = Ends::periodic;
  study.model.levels.count = 5;
  const Levels levels = solve(study);
  REQUIRE(levels.count() == 5);
  CHECK(levels.certificate.certified);
  CHECK(std::abs(levels.energy[0]) < 1e-12);  // the constant lies at the flat edge itself
  const Eigen::MatrixXd v = velocity_moment(levels);
  for (int f = 1; f < 5; ++f) CHECK(std::abs(v(f, 0)) < 1e-9);
  // Within a pair |<cos|[H, z]|sin>| = 2 (hbar^2/2m) q, and the pairs do not mix.
  const double q = 2 * 3.14159265358979323846 / 10, unit = 2 * constants::hbar2_over_2m0 / 0.067;
  CHECK(std::abs(v(2, 1)) == Approx(unit * q).epsilon(1e-8));
  CHECK(std::abs(v(4, 3)) == Approx(unit * 2 * q).epsilon(1e-8));
  CHECK(std::abs(v(3, 1)) < 1e-7);
  const Transitions t = transitions(levels);
  CHECK(std::isnan(t.dipole(1, 2)));  // equal energies: the velocity form defines no dipole
  CHECK(std::isnan(t.beat_period(1, 2)));
  CHECK(std::isnan(t.dipole(0, 0)));
  CHECK(t.oscillator_strength(0, 0) == 0);
  CHECK(std::isnan(t.f_sum[0]));
  CHECK(std::abs(t.dipole(0, 3)) < 1e-7);
}

TEST_CASE("In a periodic cell the velocity form is that of the same well between far hard walls") {
  // A 9 nm well in 40 nm of barrier: its two levels do not feel the ends (the decay over 20 nm is e^-12).
  for (const Bands bands : {Bands::one, Bands::two}) {
    Study study = hand_made::study({{barrier, 20}, {well, 9}, {barrier, 20}}, bands);
    study.model.levels.count = 2;
    study.model.accuracy = 1e-10;
    const Transitions hard = transitions(solve(study));
    study.model.ends = Ends::periodic;
    const Transitions periodic = transitions(solve(study));
    CHECK(periodic.dipole(0, 1) == Approx(hard.dipole(0, 1)).epsilon(1e-5));  // sign and all
    CHECK(periodic.dipole(1, 0) == Approx(hard.dipole(1, 0)).epsilon(1e-5));
    CHECK(periodic.oscillator_strength(0, 1) == Approx(hard.oscillator_strength(0, 1)).epsilon(1e-5));
  }
}

TEST_CASE("Wells that do not feel one another have no beat between their equal levels") {
  const Study study =
      hand_made::study({{barrier, 40}, {well, 9}, {barrier, 60}, {well, 9}, {barrier, 40}}, Bands::two);
  const Levels levels = solve(study);
  REQUIRE(levels.group[0] == levels.group[1]);
  const Transitions t = transitions(levels);
  CHECK(std::isnan(t.beat_period(0, 1)));
  CHECK(std::isnan(t.wavelength(0, 1)));
  CHECK(std::abs(t.dipole(0, 1)) < 1e-6);  // rotated to diagonalise z
  CHECK(std::abs(t.oscillator_strength(0, 1)) < 1e-12);
}

TEST_CASE("Listed transitions are those asked for, or all pairs of the lowest four") {
  Study study = hand_made::double_well(Bands::one);
  using Pairs = std::vector<std::pair<int, int>>;
  CHECK(listed_transitions(study, 6) == Pairs{{1, 2}, {1, 3}, {1, 4}, {2, 3}, {2, 4}, {3, 4}});
  CHECK(listed_transitions(study, 2) == Pairs{{1, 2}});
  CHECK(listed_transitions(study, 1).empty());
  study.model.transitions = {{3, 1}, {1, 5}};
  CHECK(listed_transitions(study, 6) == Pairs{{3, 1}, {1, 5}});
  CHECK(listed_transitions(study, 4) == Pairs{{3, 1}});
}
