// SPDX-License-Identifier: Apache-2.0
// What the resolved stack hands out: the zero, gradings, smearing, offsets, strain.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/read_text.hpp"

using namespace wellwright;
using tests::read_text;

namespace {

double edge_of(const Stack& stack, const std::string& alloy) {
  return bands_of(stack, stack.table->alloy(alloy, {})).conduction_band_edge;
}

}  // namespace

TEST_CASE("the zero is the lowest conduction edge of the table media and no override moves it") {
  const char* text = R"(
layers:
  - {material: Al0.3Ga0.7As, thickness: 20 nm}
  - {material: GaAs, thickness: 10 nm}
)";
  const Stack plain = read_text(text).stack;
  CHECK(plain.bands[1].conduction_band_edge == Approx(0).margin(1e-14));
  const Stack moved =
      read_text(std::string("materials: {GaAs: {conduction_band_edge: -0.05 eV}}") + text).stack;
  CHECK(moved.bands[1].conduction_band_edge == Approx(-0.05).margin(1e-14));
  CHECK(moved.bands[0].conduction_band_edge == Approx(plain.bands[0].conduction_band_edge).margin(1e-14));
}

TEST_CASE("a parabolic grading rises from the face with the lower edge") {
  // y = y_vertex + (y_far - y_vertex) t^2 with t from the vertex: half way there is a quarter of the
  // difference.
  for (const bool up : {true, false}) {
    const Stack stack = read_text(std::string("layers: [{graded: {from: ") +
                                  (up ? "GaAs, to: Al0.4Ga0.6As" : "Al0.4Ga0.6As, to: GaAs") +
                                  ", shape: parabolic}, thickness: 10 nm}]")
                            .stack;
    CHECK(bands_in_layer(stack, 0, 0.5).conduction_band_edge ==
          Approx(edge_of(stack, "Al0.1Ga0.9As")).margin(1e-12));
    CHECK(bands_in_layer(stack, 0, up ? 0.0 : 1.0).conduction_band_edge ==
          Approx(edge_of(stack, "GaAs")).margin(1e-12));
    CHECK(stack.layers[0].grading->vertex_on_top == !up);
  }
}

TEST_CASE(
    "smearing: the mean fraction at an interface, the error function beside it, the plain alloy far away") {
  const Stack stack = read_text(R"(
layers:
  - {material: Al0.3Ga0.7As, thickness: 20 nm}
  - {material: GaAs, thickness: 20 nm}
model: {interdiffusion: 0.5 nm}
)")
                          .stack;
  CHECK(bands_smeared(stack, 20).conduction_band_edge ==
        Approx(edge_of(stack, "Al0.15Ga0.85As")).margin(1e-10));
  CHECK(bands_smeared(stack, 10).conduction_band_edge ==
        Approx(edge_of(stack, "Al0.3Ga0.7As")).margin(1e-10));
  // One rms width beyond the interface the aluminium is 0.15 erfc(1 / sqrt 2).
  Alloy alloy = stack.table->alloy("Al0.3Ga0.7As", {}).with_composition(0.15 * std::erfc(1 / std::sqrt(2.0)));
  CHECK(bands_smeared(stack, 20.5).conduction_band_edge ==
        Approx(bands_of(stack, alloy).conduction_band_edge).margin(1e-9));
}

TEST_CASE("offset_ratio shares the difference of the gaps") {
  const Stack stack = read_text(R"(
layers:
  - {material: Al0.3Ga0.7As, thickness: 20 nm}
  - {material: GaAs, thickness: 10 nm}
model: {offset_ratio: 0.65}
)")
                          .stack;
  const double gaps = stack.bands[0].band_gap - stack.bands[1].band_gap;
  CHECK(stack.bands[0].conduction_band_edge == Approx(0.65 * gaps).margin(1e-13));
  CHECK(stack.bands[1].heavy_hole_edge - stack.bands[0].heavy_hole_edge == Approx(0.35 * gaps).margin(1e-13));
}

TEST_CASE("strain of a layer on its substrate") {
  const Stack stack = read_text(R"(
substrate: InP
layers:
  - {material: In0.53Ga0.47As, thickness: 20 nm}
  - {material: In0.6Ga0.4As, thickness: 10 nm}
  - {material: In0.53Ga0.47As, thickness: 20 nm}
)")
                          .stack;
  // Vegard's law with a(InAs) = 0.60583, a(GaAs) = 0.565325, a(InP) = 0.58697 nm at 300 K (I. Vurgaftman et
  // al., J. Appl. Phys. 89, 5815 (2001)).
  const double a = 0.6 * 0.60583 + 0.4 * 0.565325, wanted = (0.58697 - a) / a;
  const StrainReport report = strain_report(stack);
  bool seen = false;
  for (const auto& row : report.rows) {
    if (stack.layers[static_cast<std::size_t>(row.layer)].material.text != "In0.6Ga0.4As") continue;
    seen = true;
    CHECK(row.state.in_plane == Approx(wanted).epsilon(1e-3));
    CHECK(row.state.along_growth > 0);
    CHECK(row.run == Approx(10));
    CHECK_FALSE(row.over);
    CHECK(row.critical > 10);
  }
  CHECK(seen);
}

TEST_CASE(
    "a thick strained layer is over its critical thickness, and neighbours of one alloy count as one run") {
  const Stack stack = read_text(R"(
substrate: GaAs
layers:
  - {material: GaAs, thickness: 20 nm}
  - {material: In0.3Ga0.7As, thickness: 20 nm}
  - {material: In0.3Ga0.7As, thickness: 20 nm}
  - {material: GaAs, thickness: 20 nm}
)")
                          .stack;
  const StrainReport report = strain_report(stack);
  REQUIRE(report.rows.size() == 1);
  CHECK(report.rows[0].run == Approx(40));
  // 2 % misfit: some 6 to 15 nm in the equilibrium theory, common practice.
  CHECK(report.rows[0].over);
  CHECK(report.rows[0].critical < 25);
}
