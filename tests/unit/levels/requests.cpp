// SPDX-License-Identifier: Apache-2.0
// Every way to ask for levels: a count, up to an energy, a window, and those that live in some layers.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made.hpp"
#include "wellwright/levels.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::well;

namespace {

Levels solve(Study study, const LevelRequest& request, Notes& notes) {
  study.model.levels = request;
  return solve_levels(study, Carrier::electron, notes, {});
}

LevelRequest window(std::optional<double> above, double below) {
  LevelRequest request;
  request.count.reset();
  request.above = above;
  request.below = below;
  return request;
}

}  // namespace

TEST_CASE("Levels up to an energy and in a window are those that a count finds") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three}) {
    const Study study = hand_made::double_well(bands);
    Notes notes;
    LevelRequest many;
    many.count = 12;
    const Levels all = solve(study, many, notes);
    for (const auto& [above, below] :
         std::vector<std::pair<double, double>>{{0, 0.2}, {0.06, 0.17}, {0.1, 0.11}, {0.16, 0.3}}) {
      const Levels some = solve(study, above > 0 ? window(above, below) : window({}, below), notes);
      int first = 0, count = 0;
      for (int i = 0; i < all.count(); ++i) {
        if (all.energy[i] < above)
          ++first;
        else if (all.energy[i] < below)
          ++count;
      }
      CAPTURE(static_cast<int>(bands), above, below);
      REQUIRE(some.count() == count);
      CHECK(some.certificate.certified);
      CHECK(some.certificate.count_below == first);
      for (int i = 0; i < count; ++i) CHECK(std::abs(some.energy[i] - all.energy[first + i]) < 1e-9);
    }
    CHECK(notes.warnings().empty());
  }
}

TEST_CASE("An empty window is an answer") {
  Notes notes;
  const Levels none = solve(hand_made::double_well(Bands::two), window(0.005, 0.01), notes);
  CHECK(none.count() == 0);
  CHECK(none.certificate.certified);
}

TEST_CASE("In a field, the levels of an inner well are found among those of the corner") {
  std::vector<hand_made::Slab> slabs{{barrier, 10}};
  for (int i = 0; i < 30; ++i) {
    slabs.push_back({well, 8});
    slabs.push_back({barrier, 6});
  }
  const Study study = hand_made::study(slabs, Bands::two, 0.001);
  Notes notes;
  LevelRequest request;
  request.in_layers = {21};
  request.count = 2;
  const Levels levels = solve(study, request, notes);
  REQUIRE(levels.count() == 2);
  for (int i = 0; i < 2; ++i) CHECK(levels.layer_probability(i, 21) > 0.5);
  CHECK(levels.mean_position[0] == Approx(10 + 10 * 14 + 4).margin(0.3));
  CHECK(notes.warnings().empty());
}

TEST_CASE("Fewer levels than asked for in a layer are said") {
  // A 2 nm barrier between wells: no level lives mostly there.
  Study study =
      hand_made::study({{barrier, 20}, {well, 8}, {barrier, 2}, {well, 8}, {barrier, 20}}, Bands::one);
  Notes notes;
  LevelRequest request;
  request.in_layers = {1};
  request.count = 3;
  const Levels levels = solve(study, request, notes);
  CHECK(levels.count() < 3);
  REQUIRE_FALSE(notes.warnings().empty());
  CHECK(notes.warnings()[0].find("of the 3 levels") != std::string::npos);
}
