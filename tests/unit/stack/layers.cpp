// SPDX-License-Identifier: Apache-2.0
// Repeats, names, monolayers and donors of the layer list.
#include <catch2/catch.hpp>
#include <chrono>

#include "support/read_text.hpp"

using namespace wellwright;
using tests::read_text;

TEST_CASE("repeats are unrolled in growth order and their copies counted") {
  const Stack stack = read_text(R"(
layers:
  - {material: AlAs, thickness: 5 nm}
  - repeat: 2
    layers:
      - repeat: 3
        layers: [{material: GaAs, thickness: 1 nm, name: w}]
      - {material: AlAs, thickness: 2 nm, name: b}
)")
                          .stack;
  REQUIRE(stack.layers.size() == 9);
  CHECK(stack.length() == Approx(5 + 2 * (3 * 1 + 2)));
  CHECK(stack.layers[0].copy == 0);
  CHECK(stack.layers[0].label(1) == "1 (AlAs)");
  CHECK(stack.layers[4].label(5) == "b[1]");
  CHECK(stack.layers[7].label(8) == "w[6]");
  CHECK(find_layers(stack, "w", {}) == std::vector<int>{1, 2, 3, 5, 6, 7});
  CHECK(find_layers(stack, "w[4]", {}) == std::vector<int>{5});
  CHECK(find_layers(stack, "9", {}) == std::vector<int>{8});
  CHECK_THROWS_AS(find_layers(stack, "10", {}), InputError);
  CHECK_THROWS_AS(find_layers(stack, "w[7]", {}), InputError);
  CHECK_THROWS_AS(find_layers(stack, "v", {}), InputError);
  const auto faces = stack.faces();
  REQUIRE(faces.size() == 10);
  CHECK(faces[0] == 0);
  CHECK(faces[1] == Approx(5));
}

TEST_CASE("a monolayer is half the lattice constant along growth at 300 K, whatever the temperature") {
  // a(GaAs) = 0.565325 nm at 300 K: I. Vurgaftman et al., J. Appl. Phys. 89, 5815 (2001), table I.
  for (const char* temperature : {"10 K", "300 K"}) {
    const Stack stack = read_text(std::string("temperature: ") + temperature +
                                  "\nlayers: [{material: GaAs, thickness: 9 ML}]")
                            .stack;
    CHECK(stack.layers[0].thickness == Approx(9 * 0.565325 / 2).epsilon(1e-6));
    CHECK(stack.layers[0].monolayer == Approx(0.565325 / 2).epsilon(1e-6));
  }
}

TEST_CASE("donors by volume become a sheet over the layer") {
  const Stack stack = read_text(R"(
layers:
  - {material: GaAs, thickness: 8 nm, donors: 1e17 cm^-3}
  - {material: GaAs, thickness: 8 nm, acceptors: 3e10 cm^-2}
)")
                          .stack;
  CHECK(stack.layers[0].donors == Approx(1e17 * 8e-7 * 1e-14));  // cm^-3 times cm, then nm^-2
  CHECK(stack.layers[0].donors_by_volume);
  CHECK(stack.layers[1].acceptors == Approx(3e10 * 1e-14));
  CHECK_FALSE(stack.layers[1].acceptors_by_volume);
}

TEST_CASE("ten thousand layers resolve in well under a second") {
  const auto start = std::chrono::steady_clock::now();
  const Stack stack = read_text(R"(
substrate: GaAs
layers:
  - repeat: 5000
    layers: [{material: Al0.3Ga0.7As, thickness: 3 nm}, {material: GaAs, thickness: 7 nm, donors: 1e10 cm^-2}]
)")
                          .stack;
  const std::chrono::duration<double> seconds = std::chrono::steady_clock::now() - start;
  CHECK(stack.layers.size() == 10000);
  CHECK(seconds.count() < 0.5);
}
