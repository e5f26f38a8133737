// SPDX-License-Identifier: Apache-2.0
// Hellmann-Feynman derivatives against differences of solved levels.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made.hpp"
#include "wellwright/levels.hpp"

using namespace wellwright;

namespace {

Eigen::VectorXd energies(const Study& study, Carrier carrier) {
  Notes notes;
  return solve_levels(study, carrier, notes, {}).energy;
}

// Central difference of fourth order.
template <class Change>
Eigen::VectorXd difference(const Study& study, Carrier carrier, double step, Change change) {
  const auto at = [&](double by) {
    Study moved = study;
    change(moved, by);
    return energies(moved, carrier);
  };
  return (8 * (at(step) - at(-step)) - (at(2 * step) - at(-2 * step))) / (12 * step);
}

}  // namespace

TEST_CASE("Thickness and field derivatives are those of the solved levels") {
  for (const Carrier carrier : {Carrier::electron, Carrier::heavy_hole})
    for (const Bands bands : {Bands::one, Bands::two, Bands::three}) {
      if (carrier != Carrier::electron && bands != Bands::one) continue;
      Study study = hand_made::double_well(bands, 0.001);
      study.model.accuracy = 1e-11;
      // Hole levels 3 and 4 nearly cross, where a difference of this step no longer is a derivative.
      study.model.levels.count = carrier == Carrier::electron ? 4 : 2;
      Notes notes;
      const Levels levels = solve_levels(study, carrier, notes, {});
      const Sensitivity s = sensitivity(study, levels, {{1, 2}, {2, 1}});
      CAPTURE(name_of(carrier), static_cast<int>(bands), levels.energy.transpose(),
              levels.error_estimate.transpose());
      for (int layer = 0; layer < 5; ++layer) {
        const auto by_thickness = difference(study, carrier, 0.01, [&](Study& moved, double by) {
          moved.stack.layers[static_cast<std::size_t>(layer)].thickness += by;
        });
        CHECK((s.thickness.col(layer) - by_thickness).cwiseAbs().maxCoeff() < 1e-9);
      }
      const auto by_field =
          difference(study, carrier, 1e-5, [](Study& moved, double by) { moved.field += by; });
      // 1e-11 eV over 1e-5 V/nm: the difference itself is good to about 1e-6.
      CHECK((s.field - by_field).cwiseAbs().maxCoeff() < 3e-6 * 67);
      CHECK(s.transition_field[1] == Approx(s.field[0] - s.field[1]));
      CHECK(s.transition_thickness(0, 1) == Approx(s.thickness(1, 1) - s.thickness(0, 1)));
      CHECK(std::isnan(s.composition(0, 0)));  // media without composition
    }
}

TEST_CASE("With a bias given, a thicker layer also weakens the field") {
  Study study = hand_made::double_well(Bands::two, 0.001);
  study.bias = -0.001 * study.stack.length();
  study.model.accuracy = 1e-11;
  Notes notes;
  const Levels levels = solve_levels(study, Carrier::electron, notes, {});
  const Sensitivity s = sensitivity(study, levels, {});
  const auto expected = difference(study, Carrier::electron, 0.01, [&](Study& moved, double by) {
    moved.stack.layers[1].thickness += by;
    moved.field = -*moved.bias / moved.stack.length();
  });
  CHECK((s.thickness.col(1) - expected).cwiseAbs().maxCoeff() < 1e-9);
}

TEST_CASE("Members of a group have the derivatives of the wells they live in") {
  using hand_made::barrier, hand_made::well;
  const Study study =
      hand_made::study({{barrier, 60}, {well, 8}, {barrier, 60}, {well, 8}, {barrier, 60}}, Bands::one);
  Notes notes;
  const Levels levels = solve_levels(study, Carrier::electron, notes, {});
  REQUIRE(levels.group[0] == levels.group[1]);
  const Sensitivity s = sensitivity(study, levels, {});
  // Widening one well lowers one member and leaves the other.
  CHECK(s.thickness(0, 1) < -1e-3);
  CHECK(std::abs(s.thickness(1, 1)) < 1e-9);
}
