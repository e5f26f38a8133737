// SPDX-License-Identifier: Apache-2.0
// The list of beats, the level about which a ladder is measured, and the points of the map.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made_levels.hpp"
#include "wellwright/dynamics.hpp"

using namespace wellwright;
using hand_made::solve;
using hand_made::well;

namespace {

Dynamics run(const Study& study, const Levels& levels, const Start& start) {
  Notes notes;
  return superpose(hand_made::with_start(study, start, 1, 3), levels, transitions(levels), nullptr, notes);
}

}  // namespace

TEST_CASE("Beats stand by size, lower level first, and faint ones are kept") {
  // |c1| = 0.2 / n, |c2| = 1 / n, |c3| = 5e-5 / n: 2-1 before 3-2 before 3-1, which stays above 1e-6 nm.
  const Study study = hand_made::double_well(Bands::two);
  const Levels levels = solve(study);
  const Dynamics d = run(study, levels, MixStart{{{1, 0.2, 0}, {2, 1, 0}, {3, 5e-5, 0}}});
  const Eigen::MatrixXd z = levels.moment(levels.profile.grid.z);
  const double square = 0.04 + 1 + 25e-10;
  const auto size = [&](int i, int j, double product) { return 4 * product / square * std::abs(z(i, j)); };
  REQUIRE(d.beats.size() == 3);
  const double sizes[] = {size(0, 1, 0.2), size(1, 2, 5e-5), size(0, 2, 1e-5)};
  REQUIRE(sizes[1] > sizes[2]);
  const int lower[] = {1, 2, 1}, upper[] = {2, 3, 3};
  for (int b = 0; b < 3; ++b) {
    CAPTURE(b);
    const Beat& beat = d.beats[static_cast<std::size_t>(b)];
    CHECK(beat.lower == lower[b]);
    CHECK(beat.upper == upper[b]);
    CHECK(beat.dipole_amplitude == Approx(sizes[b]).epsilon(1e-9));
    const double energy = levels.energy[upper[b] - 1] - levels.energy[lower[b] - 1];
    CHECK(beat.energy == Approx(energy).epsilon(1e-14));
    CHECK(beat.frequency == Approx(energy / constants::planck).epsilon(1e-14));
  }
}

TEST_CASE("A ladder is measured at the level nearest to the mean") {
  // Energies of 0, 10, 21, 33 meV; weights of 0.36, 1, 1, 1 have their mean at 1.79, so the third level is
  // meant: h / (23 meV / 2) and 2 h / 1 meV (R.W. Robinett, Phys. Rep. 392, 1 (2004)).
  const Study study = hand_made::study({{well, 20}}, Bands::one);
  Levels levels = solve(study);
  for (int n = 0; n < levels.count(); ++n) levels.energy[n] = 1e-3 * (10 * n + 0.5 * n * (n - 1));
  const Dynamics d = run(study, levels, MixStart{{{1, 0.6, 0}, {2, 1, 0}, {3, 1, 0}, {4, 1, 0}}});
  REQUIRE(d.classical_period);
  CHECK(*d.classical_period == Approx(constants::planck / 11.5e-3).epsilon(1e-12));
  REQUIRE(d.revival_time);
  CHECK(*d.revival_time == Approx(2 * constants::planck / 1e-3).epsilon(1e-9));
}

TEST_CASE("The map has a point every quarter of a nanometre, 201 at least and 801 at most, from end to end") {
  struct Case {
    double length;
    std::size_t points;
  };
  for (const Case c : {Case{12, 201}, Case{70, 281}, Case{70.1, 282}, Case{190, 761}, Case{260, 801}}) {
    Study study = hand_made::study({{well, c.length}}, Bands::one);
    study.model.levels.count = 1;
    const Levels levels = solve(study);
    const auto z = run(study, levels, MixStart{{{1, 1, 0}}}).density_z;
    CAPTURE(c.length);
    REQUIRE(z.size() == c.points);
    CHECK(z.front() == 0);
    CHECK(z.back() == Approx(c.length).epsilon(1e-15));
    CHECK(z[1] == Approx(c.length / static_cast<double>(c.points - 1)).epsilon(1e-14));
    Study without = hand_made::with_start(study, MixStart{{{1, 1, 0}}}, 1, 3);
    without.dynamics->density_map = false;
    Notes notes;
    CHECK(superpose(without, levels, transitions(levels), nullptr, notes).density_z.empty());
  }
}
