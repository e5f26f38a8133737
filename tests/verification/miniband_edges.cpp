// SPDX-License-Identifier: Apache-2.0
// Miniband edges of periodic stacks against the Kronig-Penney relation, and bands inside the zone against
// shooting.
#include <catch2/catch.hpp>

#include <cstdio>

#include "support/closed_forms.hpp"
#include "support/shooting.hpp"
#include "support/study_builder.hpp"

using plain::Medium;
using plain::Real;
using plain::Stack;
using plain::uniform;

namespace {

struct Superlattice {
  const char* name;
  double well, barrier;
  Medium inside, between;
  int model, count;
};

const Medium gaas{0, 0.067, 1.519, 0.341}, ingaas{0, 0.043, 0.81, 0.36}, inalas{0.52, 0.075, 1.53, 0.3};

// The first four: wells of GaAs-like mass in AlGaAs-like barriers, the third that of M. Helm et al., Phys.
// Rev. B 48, 1601 (1993), from memory; then the widths for C. Waschke et al., Phys. Rev. Lett. 70, 3319
// (1993).
const std::vector<Superlattice> superlattices = {
    {"9.7/1.7 nm", 9.7, 1.7, gaas, {0.22446, 0.0919}, 1, 2},
    {"4.0/2.0 nm", 4.0, 2.0, gaas, {0.26187, 0.09605}, 1, 1},
    {"7.5/2.5 nm", 7.5, 2.5, gaas, {0.2394, 0.09356}, 1, 2},
    {"10/10 nm", 10, 10, gaas, {0.167098, 0.0836}, 1, 2},
    {"11.1/1.7 nm, x = 0.3", 11.1, 1.7, gaas, {0.243165, 0.0919}, 1, 3},
    {"9.7/1.7 nm, x = 0.3", 9.7, 1.7, gaas, {0.243165, 0.0919}, 1, 3},
    {"6.7/1.7 nm, x = 0.3", 6.7, 1.7, gaas, {0.243165, 0.0919}, 1, 3},
    {"two-band 9.7/1.7 nm", 9.7, 1.7, gaas, {0.243165, 0.0919, 1.9, 0.32}, 2, 3},
    {"two-band 4.5/1.2 nm", 4.5, 1.2, ingaas, inalas, 2, 2},
    {"three-band 4.5/1.2 nm", 4.5, 1.2, ingaas, inalas, 3, 2},
};

Stack period_of(const Superlattice& s) {
  Stack stack{{uniform(s.inside, s.well), uniform(s.between, s.barrier)}, 0, s.model};
  stack.periodic = true;
  return stack;
}

}  // namespace

TEST_CASE("miniband edges to 1e-11") {
  std::printf("%-24s %4s %20s %10s %20s %10s\n", "miniband edges", "band", "bottom [eV]", "relative",
              "top [eV]", "relative");
  for (const Superlattice& s : superlattices) {
    CAPTURE(s.name);
    const auto exact =
        closed::miniband_edges(s.inside, s.between, s.well, s.barrier, s.model, s.count, 2e-5L);
    const auto levels = plain::levels_of(period_of(s), std::to_string(s.count), "1e-11 eV");
    CHECK(levels.certificate.certified);
    const auto bands = wellwright::minibands(levels, 3);
    REQUIRE(bands.energy.rows() == s.count);
    for (int n = 0; n < s.count; ++n) {
      const auto [bottom, top] = exact[static_cast<std::size_t>(n)];
      const double low = n % 2 == 0 ? bands.energy(n, 0) : bands.energy(n, 2);
      const double high = n % 2 == 0 ? bands.energy(n, 2) : bands.energy(n, 0);
      const double low_error = static_cast<double>((low - bottom) / bottom);
      const double high_error = static_cast<double>((high - top) / top);
      std::printf("%-24s %4d %20.16Lf %10.1e %20.16Lf %10.1e\n", n == 0 ? s.name : "", n + 1, bottom,
                  low_error, top, high_error);
      CHECK(std::abs(low_error) < 1e-11);
      CHECK(std::abs(high_error) < 1e-11);
      CHECK(std::abs(levels.energy[n] - (n % 2 == 0 ? low : high)) < 1e-11);  // /levels holds phase 0
    }
  }
}

TEST_CASE("published miniband widths of the closed form") {
  // 1.7 nm barriers of x = 0.30: widths evaluated to four digits.
  for (const auto& [well, width] : {std::pair{11.1, 13.37}, {9.7, 17.93}, {6.7, 38.07}}) {
    const auto levels = plain::levels_of(period_of({"", well, 1.7, gaas, {0.243165, 0.0919}, 1, 1}), "1");
    const auto band = wellwright::minibands(levels, 2);
    CHECK(1000 * (band.energy(0, 1) - band.energy(0, 0)) == Approx(width).epsilon(4e-4));
  }
}

TEST_CASE("minibands inside the zone against shooting, asymmetric period") {
  for (int model = 1; model <= 3; ++model) {
    CAPTURE(model);
    Stack stack{{uniform(gaas, 6), uniform({0.25, 0.09, 1.9, 0.3}, 2), uniform(gaas, 3.5),
                 uniform({0.15, 0.08, 1.75, 0.32}, 1.5)},
                0,
                model};
    stack.periodic = true;
    const auto bands = wellwright::minibands(plain::levels_of(stack, "3", "1e-11 eV"), 7);
    const shooting::Shooter shooter(stack);
    for (int n = 0; n < 3; ++n)
      for (int i = 0; i < 7; ++i) {
        const Real exact = shooter.bloch_level(n, std::cos(plain::pi * i / 6));
        CAPTURE(n, i);
        CHECK(std::abs(static_cast<double>(bands.energy(n, i) - exact)) < 1e-10);
      }
  }
}
