// SPDX-License-Identifier: Apache-2.0
// The chain of a study: which parts an answer has, and that asking twice gives the same.
#include <catch2/catch.hpp>
#include <string>

#include "wellwright/answer.hpp"

using namespace wellwright;

namespace {

const std::string stack =
    "layers:\n  - {material: Al0.3Ga0.7As, thickness: 15 nm}\n  - {material: GaAs, thickness: 9 nm}\n"
    "  - {material: Al0.3Ga0.7As, thickness: 15 nm}\n";

Answer ask(const std::string& rest) {
  static const MaterialTable table;
  Notes notes;
  const Study study = read_study(stack + rest, "study.yaml", table, {}, notes);
  return answer(study, notes, {});
}

}  // namespace

TEST_CASE("A plain study has electrons alone: no pairs, no motion, no minibands") {
  const Answer a = ask("");
  REQUIRE(a.carriers.size() == 1);
  CHECK(a.find(Carrier::electron) == &a.carriers[0]);
  CHECK(a.find(Carrier::light_hole) == nullptr);
  CHECK(a.interband.empty());
  CHECK_FALSE(a.dynamics);
  CHECK_FALSE(a.carriers[0].minibands);
  CHECK(a.carriers[0].transitions.energy.rows() == a.carriers[0].levels.count());
  CHECK(a.edges.grid.rows() == a.edges.conduction_band_edge.size());
  CHECK(a.converged);
}

TEST_CASE("A photoexcited start brings its holes along; the electron moves") {
  const Answer a = ask("dynamics: {start: {photoexcited: {hole: light hole, level: 1}}, samples: 11}\n");
  REQUIRE(a.find(Carrier::light_hole));
  REQUIRE(a.interband.size() == 1);
  CHECK(a.interband[0].hole == Carrier::light_hole);
  REQUIRE(a.dynamics);
  CHECK(a.dynamics->amplitude.size() == a.find(Carrier::electron)->levels.count());
}

TEST_CASE("A listed transition to a level that the window does not hold is named") {
  const std::string window = "model: {levels: {below: 0.2 eV}, transitions: [[1, 2], [2, 7]]}\n";
  const Answer a = ask(window);
  REQUIRE(a.carriers[0].levels.count() == 2);
  REQUIRE(a.notes.warnings().size() == 1);
  CHECK(a.notes.warnings()[0] ==
        "transition [2, 7] of the electron is left out: it names level 7, and 2 levels were computed");
  CHECK(a.carriers[0].sensitivity.transitions == std::vector<std::pair<int, int>>{{1, 2}});
  CHECK(ask("model: {transitions: [[1, 2], [2, 6]]}\n").notes.warnings().empty());
}

TEST_CASE("The same study gives the same answer, digit by digit") {
  const std::string motion = "dynamics: {start: {mix: [{level: 1}, {level: 2}]}, samples: 11}\n";
  const Answer one = ask(motion), two = ask(motion);
  CHECK(one.carriers[0].levels.energy == two.carriers[0].levels.energy);
  CHECK(one.dynamics->mean_position == two.dynamics->mean_position);
  CHECK(one.notes.warnings() == two.notes.warnings());
}
