// SPDX-License-Identifier: Apache-2.0
// Poles of the inverse mass, field, hole edges, and the first division into elements.
#include "wellwright/profile.hpp"

#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made.hpp"

using namespace wellwright;

namespace {

double inverse_mass(const Profile& profile, int row, double E) {
  double sum = profile.at.a0[row];
  for (int j = 0; j < profile.at.poles(); ++j) sum += profile.at.b(row, j) / (E - profile.at.v(row, j));
  return sum;
}

}  // namespace

TEST_CASE("At the band edge every model has the tabled mass; above it the mass grows as the gap says") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three}) {
    const Study study = hand_made::double_well(bands, 0);
    const Grid grid = make_grid(study.stack.faces(), {}, 6);
    const Profile profile = make_profile(study, Carrier::electron, grid);
    CHECK(profile.at.poles() == static_cast<int>(bands) - 1);
    CHECK(inverse_mass(profile, 8, 0.0) == Approx(1 / 0.067).epsilon(1e-14));
    CHECK(inverse_mass(profile, 0, 0.25) == Approx(1 / 0.092).epsilon(1e-14));
    const double above = inverse_mass(profile, 8, 0.2);
    if (bands == Bands::one) CHECK(above == Approx(1 / 0.067).epsilon(1e-14));
    if (bands == Bands::two) CHECK(above == Approx(1.5 / 1.7 / 0.067).epsilon(1e-14));
    if (bands == Bands::three) {
      // Light hole and split-off edges with weights 2 : 1 (E.O. Kane, J. Phys. Chem. Solids 1, 249 (1957)).
      const double P = 1 / 0.067 / (2 / 1.5 / 3 + 1 / 1.84 / 3);
      CHECK(above == Approx(2 * P / 3 / 1.7 + P / 3 / 2.04).epsilon(1e-14));
    }
  }
}

TEST_CASE("A field lifts electrons and their poles at the top, and lowers holes") {
  const double F = 0.002;
  const Study study = hand_made::double_well(Bands::two, F);
  const Grid grid = make_grid(study.stack.faces(), {}, 5);
  const Profile electron = make_profile(study, Carrier::electron, grid);
  const int top = grid.rows() - 1;
  CHECK(electron.at.edge[top] - electron.at.edge[0] == Approx(F * 67).epsilon(1e-13));
  CHECK(electron.at.v(top, 0) - electron.at.v(0, 0) == Approx(F * 67).epsilon(1e-13));
  const Profile heavy = make_profile(study, Carrier::heavy_hole, grid);
  CHECK(heavy.hole_edge == Approx(-1.5));  // the valence edge of the well
  CHECK(heavy.at.edge[0] == Approx(-1.5 - (0.25 - 1.9)).epsilon(1e-13));
  CHECK(heavy.at.edge[top] - heavy.at.edge[0] == Approx(-F * 67).epsilon(1e-13));
  CHECK(heavy.at.a0[0] == Approx(1 / 0.35));
  CHECK(heavy.at.in_plane[0] == Approx(0.35 / 0.11));
}

TEST_CASE("Elements span at most five radians of the highest level or seven decay lengths") {
  const Study study = hand_made::double_well(Bands::one, 0);
  const double top = 0.4;
  const auto cuts = first_cuts(study, Carrier::electron, top);
  const Grid grid = make_grid(study.stack.faces(), cuts, 6);
  for (int e = 0; e < grid.elements(); ++e) {
    const bool in_well = grid.layer[e] % 2 == 1;
    const double mass = in_well ? 0.067 : 0.092, edge = in_well ? 0 : 0.25;
    CHECK(grid.width(e) * std::sqrt((top - edge) * mass / constants::hbar2_over_2m0) < 5.0001);
    CHECK(grid.width(e) * std::sqrt(edge * mass / constants::hbar2_over_2m0) < 7.0001);
  }
  const auto finer = halved(cuts);
  CHECK(make_grid(study.stack.faces(), finer, 6).elements() == 2 * grid.elements());
}

TEST_CASE("The guessed top has about as many levels below it as were asked for") {
  // 10 nm between hard walls: E_n = n^2 pi^2 hbar^2 / (2 m L^2).
  const Study study = hand_made::study({{hand_made::well, 10}}, Bands::one);
  for (const int count : {1, 6, 30}) {
    const double top = guessed_top(study, Carrier::electron, count);
    const double n = 10 * std::sqrt(top * 0.067 / constants::hbar2_over_2m0) / 3.141592653589793;
    CHECK(n > count);
    CHECK(n < 1.5 * count + 2);
  }
}
