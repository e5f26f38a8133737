// SPDX-License-Identifier: Apache-2.0
// Levels, their groups, signs and numbers, and the certificate.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made_levels.hpp"
#include "wellwright/levels.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::solve;
using hand_made::well;

TEST_CASE(
    "A hard-wall well has E_n = n^2 pi^2 hbar^2 / 2 m L^2, <z> in the middle and the closed-form spread") {
  Study study = hand_made::study({{well, 10}}, Bands::one);
  study.model.accuracy = 1e-12;
  const Levels levels = solve(study);
  REQUIRE(levels.count() == 6);
  const double pi = 3.14159265358979323846;
  for (int n = 1; n <= 6; ++n) {
    const double exact = n * n * pi * pi * constants::hbar2_over_2m0 / 0.067 / 100;
    CHECK(std::abs(levels.energy[n - 1] - exact) < 1e-11 * exact);
    CHECK(std::abs(levels.energy[n - 1] - exact) <= levels.error_estimate[n - 1]);
    CHECK(levels.mean_position[n - 1] == Approx(5).epsilon(1e-10));
    // L^2 (1/12 - 1/(2 pi^2 n^2)): C. Cohen-Tannoudji et al., Quantum Mechanics (1977), complement A_I.
    CHECK(levels.spread[n - 1] == Approx(10 * std::sqrt(1.0 / 12 - 1 / (2 * pi * pi * n * n))).epsilon(1e-9));
    CHECK(levels.in_plane_mass[n - 1] == Approx(0.067).epsilon(1e-12));
    CHECK(levels.bound[static_cast<std::size_t>(n - 1)] == 0);
  }
  CHECK(levels.certificate.certified);
  CHECK(levels.certificate.count_below == 0);
}

TEST_CASE("The energy-dependent mass of a hard-wall well solves its own quadratic equation") {
  // (E) (1 + E/Eg) = pi^2 n^2 hbar^2 / 2 m L^2 for a well with its valence edge Eg below.
  Study study = hand_made::study({{well, 10}}, Bands::two);
  study.model.accuracy = 1e-12;
  const Levels levels = solve(study);
  for (int n = 1; n <= 6; ++n) {
    const double parabolic = n * n * 9.86960440108935862 * constants::hbar2_over_2m0 / 0.067 / 100;
    const double exact = 0.75 * (std::sqrt(1 + 4 * parabolic / 1.5) - 1);
    CHECK(std::abs(levels.energy[n - 1] - exact) < 1e-11 * exact);
  }
}

TEST_CASE("Levels are orthonormal in the full product, also with wide barriers and fifty wells") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three}) {
    std::vector<hand_made::Slab> fifty{{barrier, 10}};
    for (int i = 0; i < 50; ++i) {
      fifty.push_back({well, 8});
      fifty.push_back({barrier, 6});
    }
    for (const auto& slabs :
         {fifty,
          std::vector<hand_made::Slab>{{barrier, 60}, {well, 8}, {barrier, 60}, {well, 8}, {barrier, 60}}}) {
      const Levels levels = solve(hand_made::study(slabs, bands));
      const Eigen::MatrixXd product = levels.moment(Eigen::VectorXd::Ones(levels.profile.grid.rows()));
      CHECK((product - Eigen::MatrixXd::Identity(levels.count(), levels.count())).cwiseAbs().maxCoeff() <
            1e-10);
      CHECK(levels.certificate.certified);
    }
  }
}

TEST_CASE("Uncoupled wells form a group, ordered by position, whose members live in one well each") {
  const Levels levels = solve(
      hand_made::study({{barrier, 60}, {well, 8}, {barrier, 60}, {well, 8}, {barrier, 60}}, Bands::two));
  CHECK(levels.group[0] == levels.group[1]);
  CHECK(levels.group[2] != levels.group[1]);
  CHECK(levels.mean_position[0] == Approx(64).margin(1e-3));
  CHECK(levels.mean_position[1] == Approx(132).margin(1e-3));
  CHECK(levels.layer_probability(0, 1) > 0.8);
  CHECK(levels.layer_probability(1, 3) > 0.8);
  CHECK(levels.layer_probability.rowwise().sum().minCoeff() == Approx(1).epsilon(1e-12));
}

TEST_CASE("A group is never cut: six of ten uncoupled wells come as ten") {
  std::vector<hand_made::Slab> slabs{{barrier, 10}};
  for (int i = 0; i < 10; ++i) {
    slabs.push_back({well, 8});
    slabs.push_back({barrier, 30});
  }
  CHECK(solve(hand_made::study(slabs, Bands::one)).count() == 10);
}

TEST_CASE("The first extremum above 5 % of the largest is positive, going up") {
  const Levels levels = solve(hand_made::double_well(Bands::two));
  for (int i = 0; i < levels.count(); ++i) {
    const Eigen::VectorXd psi = levels.envelope.col(i);
    const double largest = psi.cwiseAbs().maxCoeff();
    for (Eigen::Index r = 1; r < psi.size(); ++r)
      if (std::abs(psi[r]) > 0.05 * largest && std::abs(psi[r + 1]) < std::abs(psi[r])) {
        CHECK(psi[r] > 0);
        break;
      }
  }
}

TEST_CASE("Below the lower outer edge a level is bound") {
  const Levels levels = solve(hand_made::double_well(Bands::one, 0.001));
  for (int i = 0; i < levels.count(); ++i) {
    CAPTURE(i, levels.energy[i]);
    CHECK(levels.bound[static_cast<std::size_t>(i)] == (levels.energy[i] < 0.25 ? 1 : 0));
  }
  CHECK(levels.bound.back() == 0);
}

TEST_CASE(
    "Where the field lifts valence edges among the levels, nothing is certified and a warning says why") {
  Notes notes;
  const Levels levels = solve_levels(hand_made::double_well(Bands::two, 0.04), Carrier::electron, notes, {});
  CHECK_FALSE(levels.certificate.certified);
  CHECK_FALSE(levels.certificate.reason.empty());
  REQUIRE(notes.warnings().size() == 1);
  CHECK(notes.warnings()[0].find("tunnelling between the bands") != std::string::npos);
}

TEST_CASE("The work stops on request") {
  Notes notes;
  CHECK_THROWS_AS(solve_levels(hand_made::double_well(Bands::one), Carrier::electron, notes,
                               [](double, std::string_view) { return false; }),
                  Stopped);
}

TEST_CASE("The in-plane mass is the limit of the dispersion") {
  const Levels levels = solve(hand_made::double_well(Bands::three));
  Eigen::VectorXd k(2);
  k << 0, 0.004;
  const Dispersion d = in_plane_dispersion(levels, k);
  for (int i = 0; i < levels.count(); ++i) {
    CHECK(d.energy(i, 0) == Approx(levels.energy[i]).epsilon(1e-12));
    const double mass = constants::hbar2_over_2m0 * k[1] * k[1] / (d.energy(i, 1) - d.energy(i, 0));
    CHECK(mass == Approx(levels.in_plane_mass[i]).epsilon(1e-4));
  }
}

TEST_CASE("Hole levels rise with the in-plane momentum by their own in-plane mass") {
  const Levels levels = solve(hand_made::double_well(Bands::two, 0), Carrier::heavy_hole);
  CHECK(levels.companion.empty());
  CHECK(levels.energy[0] > 0);
  CHECK(levels.in_plane_mass[0] == Approx(0.11).epsilon(1e-10));
}
