// SPDX-License-Identifier: Apache-2.0
// The program's levels against independent shooting: twenty stacks, three band models, fields, holes,
// in-plane momenta.
#include <catch2/catch.hpp>

#include <cstdio>

#include "stacks_for_shooting.hpp"
#include "support/shooting.hpp"
#include "support/study_builder.hpp"

using plain::Real;
using shooting::Shooter;

TEST_CASE("levels agree with shooting to 1e-9 eV") {
  const auto stacks = stacks_for_shooting();
  REQUIRE(stacks.size() == 20);
  std::printf("%-50s %12s %12s %12s\n", "largest |E - shooting| [eV]", "one", "two", "three");
  for (const NamedStack& named : stacks) {
    double worst[3] = {0, 0, 0};
    for (int model = 1; model <= 3; ++model) {
      CAPTURE(named.name, model);
      plain::Stack stack = named.stack;
      stack.bands = model;
      const auto found = plain::levels_of(stack, "6", "1e-10 eV");
      CAPTURE(found.certificate.reason);
      CHECK(found.certificate.certified);
      REQUIRE(found.count() >= 6);
      const Shooter shooter(stack);
      for (int n = 0; n < found.count(); ++n) {
        const double error = std::abs(static_cast<double>(found.energy[n] - shooter.level(n)));
        CAPTURE(n, error, found.error_estimate[n]);
        CHECK(error < 1e-9);
        CHECK(error <= found.error_estimate[n]);
        worst[model - 1] = std::max(worst[model - 1], error);
      }
    }
    std::printf("%-50s %12.1e %12.1e %12.1e\n", named.name.c_str(), worst[0], worst[1], worst[2]);
  }
}

// Splitting of 3e-5 eV: the pair is resolved to the accuracy of the energies themselves.
TEST_CASE("the splitting of nearly equal wells behind 14 nm") {
  for (int model = 1; model <= 3; ++model) {
    plain::Stack stack = stacks_for_shooting()[2].stack;
    stack.bands = model;
    const auto found = plain::levels_of(stack, "2", "1e-11 eV");
    const Shooter shooter(stack);
    const double splitting = static_cast<double>(shooter.level(1) - shooter.level(0));
    CHECK(splitting == Approx(3e-5).epsilon(0.1));
    CHECK(std::abs(found.energy[1] - found.energy[0] - splitting) < 1e-11);
  }
}

TEST_CASE("a window in the middle of a cascade holds exactly the levels of shooting") {
  for (const std::size_t which : {std::size_t{10}, std::size_t{11}})
    for (int model = 1; model <= 3; ++model) {
      plain::Stack stack = stacks_for_shooting()[which].stack;
      stack.bands = model;
      CAPTURE(which, model);
      const Shooter shooter(stack);
      const double above = 0.02, below = 0.18;
      const auto found = plain::levels_of(stack, "{above: 0.02 eV, below: 0.18 eV}", "1e-10 eV");
      REQUIRE(found.certificate.certified);
      const int first = shooter.count(above);
      REQUIRE(found.count() == shooter.count(below) - first);
      CHECK(found.certificate.count_below == first);
      CHECK(shooter.count(found.certificate.window_bottom) == first);
      CHECK(shooter.count(found.certificate.window_top) == first + found.count());
      for (int n = 0; n < found.count(); ++n)
        CHECK(std::abs(static_cast<double>(found.energy[n] - shooter.level(first + n))) < 1e-9);
    }
}

TEST_CASE("holes fall with the field and agree with shooting") {
  const plain::Medium gaas{0, 0.34}, algaas{0.13, 0.39};
  for (const auto carrier : {plain::Carrier::heavy_hole, plain::Carrier::light_hole})
    for (const double field : {0.0, 0.005, -0.005}) {
      plain::Stack stack{{plain::uniform(algaas, 10), plain::uniform(gaas, 7), plain::uniform(algaas, 2),
                          plain::uniform(gaas, 5), plain::uniform(algaas, 10)},
                         field,
                         1,
                         carrier};
      CAPTURE(static_cast<int>(carrier), field);
      const auto found = plain::levels_of(stack, "6", "1e-10 eV");
      const Shooter shooter(stack);
      REQUIRE(found.count() == 6);
      for (int n = 0; n < 6; ++n)
        CHECK(std::abs(static_cast<double>(found.energy[n] - shooter.level(n))) < 1e-9);
    }
}

TEST_CASE("in-plane dispersion and mass agree with shooting at k > 0") {
  plain::Medium well{0, 0.043, 0.816, 0.356, 0.045}, barrier{0.52, 0.075, 1.53, 0.3, 0.08};
  for (int model = 1; model <= 3; ++model) {
    const plain::Stack stack{
        {plain::uniform(barrier, 6), plain::uniform(well, 6), plain::uniform(barrier, 1.5),
         plain::uniform(well, 4), plain::uniform(barrier, 6)},
        -0.004,
        model};
    CAPTURE(model);
    const auto found = plain::levels_of(stack, "4", "1e-11 eV");
    const Eigen::Vector3d k(0, 0.1, 0.4);
    const auto dispersion = wellwright::in_plane_dispersion(found, k);
    for (int i = 0; i < 3; ++i) {
      const Shooter shooter(stack, k[i]);
      for (int n = 0; n < 4; ++n) {
        CAPTURE(k[i], n);
        CHECK(std::abs(static_cast<double>(dispersion.energy(n, i) - shooter.level(n))) < 1e-9);
      }
    }
    // 1/m = dE/d(K k^2) at k = 0, from E(k) of shooting at small k, extrapolated once.
    const Shooter at_rest(stack), small(stack, 0.01L), smaller(stack, 0.005L);
    for (int n = 0; n < 4; ++n) {
      const Real zero = at_rest.level(n);
      const Real a = (small.level(n) - zero) / (plain::K * 1e-4L),
                 b = (smaller.level(n) - zero) / (plain::K * 25e-6L);
      CHECK(1 / found.in_plane_mass[n] == Approx(static_cast<double>((4 * b - a) / 3)).epsilon(1e-7));
    }
  }
}
