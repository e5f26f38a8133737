// SPDX-License-Identifier: Apache-2.0
// Mirror image, field reversal, and shifts of both origins.
#include <catch2/catch.hpp>

#include "cases.hpp"

using namespace wellwright;

// Mirrored with the field reversed, U falls by F L (rises for holes) and nothing else changes. 1e-9 eV is the
// accuracy asked of the levels, ten times over.
TEST_CASE("the mirror image in the reversed field has the same levels") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    IdentityCase other = c;
    other.study = mirrored(c.study);
    const Levels image = solve(other);
    REQUIRE(image.count() == levels.count());
    const double length = c.study.stack.length();
    const double shift = (c.carrier == Carrier::electron ? -1 : 1) * c.study.field * length;
    CHECK((image.energy.array() - levels.energy.array() - shift).abs().maxCoeff() < 1e-9);
    const Eigen::MatrixXd here = levels.moment(levels.profile.grid.z),
                          there = image.moment(image.profile.grid.z);
    const int layers = static_cast<int>(c.study.stack.layers.size());
    for (int i = 0; i < levels.count(); ++i) {
      const bool alone = (i == 0 || levels.energy[i] - levels.energy[i - 1] > 1e-6) &&
                         (i + 1 == levels.count() || levels.energy[i + 1] - levels.energy[i] > 1e-6);
      if (!alone) continue;  // the states of a pair turn into one another under rounding
      CHECK(image.mean_position[i] == Approx(length - levels.mean_position[i]).margin(1e-5 * length));
      CHECK(image.spread[i] == Approx(levels.spread[i]).margin(1e-5 * length));
      CHECK(image.in_plane_mass[i] == Approx(levels.in_plane_mass[i]).epsilon(1e-7));
      CHECK(
          (image.layer_probability.row(i) - levels.layer_probability.row(i).reverse()).cwiseAbs().maxCoeff() <
          1e-6);
      for (int j = 0; j < i; ++j)
        if (levels.energy[i] - levels.energy[j] > 1e-6 && layers < 20)
          CHECK(std::abs(there(i, j)) == Approx(std::abs(here(i, j))).margin(1e-6 * length));
    }
  }
}

TEST_CASE("dipoles between levels do not depend on where z is zero") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    const Eigen::VectorXd& z = levels.profile.grid.z;
    const Eigen::MatrixXd here = levels.moment(z), there = levels.moment((z.array() - 1000).matrix());
    const Eigen::MatrixXd moved =
        here - there - 1000 * Eigen::MatrixXd::Identity(levels.count(), levels.count());
    CHECK(moved.cwiseAbs().maxCoeff() < 1e-7);  // 1e-10 of orthonormality times the shift
  }
}

// Every edge and pole lifted by 1.25 eV lifts every level by as much: nothing depends on the zero of energy.
TEST_CASE("levels move with the zero of energy") {
  for (const IdentityCase& c : identity_cases()) {
    if (c.carrier != Carrier::electron) continue;  // holes count from their own highest edge
    CAPTURE(c.name);
    const Levels levels = solve(c);
    IdentityCase other = c;
    other.study.stack.zero_of_energy -= 1.25;
    resolve_stack(other.study.stack, true);
    if (std::abs(other.study.stack.bands[0].conduction_band_edge -
                 c.study.stack.bands[0].conduction_band_edge - 1.25) > 1e-12)
      continue;  // edges written in the study are final
    const Levels lifted = solve(other);
    REQUIRE(lifted.count() == levels.count());
    CHECK((lifted.energy.array() - levels.energy.array() - 1.25).abs().maxCoeff() < 1e-9);
  }
}

// Ten wells 30 nm apart are ten levels within 1e-10 eV of one another: a request for six of them returns all
// ten, each sitting in its own well, ordered along the stack.
TEST_CASE("a group of equal levels is never cut and is ordered by position") {
  static const MaterialTable table;
  for (const char* bands : {"one", "two", "three"}) {
    CAPTURE(bands);
    Notes notes;
    const Study study = read_study(
        "layers:\n  - {material: Al0.4Ga0.6As, thickness: 30 nm}\n  - repeat: 10\n    layers:\n"
        "      - {material: GaAs, thickness: 9 nm, name: well}\n      - {material: Al0.4Ga0.6As, thickness: "
        "30 nm}\n",
        "study.yaml", table, {std::string("model.bands=") + bands, "model.levels=6"}, notes);
    const Levels levels = solve_levels(study, Carrier::electron, notes, {});
    REQUIRE(levels.count() == 10);
    CHECK(levels.certificate.certified);
    for (int i = 0; i < 10; ++i) {
      CHECK(levels.group[static_cast<std::size_t>(i)] == 1);
      CHECK(levels.mean_position[i] == Approx(34.5 + 39 * i).margin(1e-3));
      CHECK(levels.layer_probability(i, 2 * i + 1) > 0.8);
    }
    const Eigen::MatrixXd z = levels.moment(levels.profile.grid.z);
    const Eigen::VectorXd positions = z.diagonal();
    CHECK((z - Eigen::MatrixXd(positions.asDiagonal())).cwiseAbs().maxCoeff() < 1e-6);
  }
}
