// SPDX-License-Identifier: Apache-2.0
// The program's levels against closed forms evaluated with the program's own constants.
#include <catch2/catch.hpp>

#include <cstdio>

#include "closed_cases.hpp"
#include "support/study_builder.hpp"

using plain::Real;

namespace {
std::string count_text(const ClosedCase& c) {
  return std::to_string(c.levels.size());
}
}  // namespace

// 1e-11 relative: what a double leaves of a level of some 10 meV under an operator of norm some 100 eV.
TEST_CASE("levels of closed forms to 1e-11") {
  std::printf("%-38s %6s %22s %10s %10s\n", "levels against closed forms", "level", "E [eV]", "relative",
              "estimate");
  for (const ClosedCase& c : closed_cases()) {
    CAPTURE(c.name);
    const auto found = plain::levels_of(c.stack, count_text(c), "1e-11 eV");
    CHECK(found.certificate.certified);
    CHECK(found.certificate.count_below == 0);
    REQUIRE(found.count() == static_cast<int>(c.levels.size()));
    for (int n = 0; n < found.count(); ++n) {
      const Real exact = c.levels[static_cast<std::size_t>(n)];
      const double error = static_cast<double>((found.energy[n] - exact) / exact);
      std::printf("%-38s %6d %22.16Lf %10.1e %10.1e\n", n == 0 ? c.name.c_str() : "", n + 1, exact, error,
                  found.error_estimate[n]);
      CHECK(std::abs(error) < 1e-11);
    }
  }
}

// The promise behind every printed digit: whatever accuracy is asked, the estimate is no smaller than the
// error.
TEST_CASE("the error estimate bounds the error on every closed form") {
  for (const ClosedCase& c : closed_cases())
    for (const char* accuracy : {"1 meV", "1 ueV", "1e-9 eV"}) {
      CAPTURE(c.name, accuracy);
      const auto found = plain::levels_of(c.stack, count_text(c), accuracy);
      REQUIRE(found.count() == static_cast<int>(c.levels.size()));
      for (int n = 0; n < found.count(); ++n) {
        const double error = static_cast<double>(found.energy[n] - c.levels[static_cast<std::size_t>(n)]);
        CAPTURE(n, error, found.error_estimate[n]);
        CHECK(std::abs(error) <= found.error_estimate[n]);
      }
    }
}

TEST_CASE("the number of bound levels is exact") {
  struct Row {
    double L, V, m_w, m_b;
    int bound;
  };
  // Counts of the matching equation; the first sits just below binding a third level.
  for (const Row& r : {Row{10, 0.22446, 0.067, 0.0919, 2}, Row{6.5, 0.22446, 0.067, 0.0919, 2},
                       Row{20, 0.22446, 0.067, 0.0919, 4}, Row{5, 0.52, 0.043, 0.075, 2},
                       Row{10, 0.3, 0.067, 0.067, 3}, Row{1, 1, 1, 1, 2}}) {
    CAPTURE(r.L, r.V);
    const plain::Medium w{0, r.m_w}, b{r.V, r.m_b};
    const double d = r.m_w == 1 ? 8 : 60;
    const plain::Stack stack{{plain::uniform(b, d), plain::uniform(w, r.L), plain::uniform(b, d)}};
    REQUIRE(static_cast<int>(closed::finite_well(w, b, r.L).size()) == r.bound);
    const auto found = plain::levels_of(stack, std::to_string(r.bound + 2));
    int bound = 0;
    for (const int flag : found.bound) bound += flag;
    CHECK(bound == r.bound);
    const auto window = plain::levels_of(stack, "{below: " + plain::digits(r.V) + " eV}");
    CHECK(window.count() == r.bound);
    CHECK(window.certificate.certified);
  }
}

TEST_CASE("the field shifts the lowest level of a box by second-order perturbation theory") {
  // (15 - pi^2)/(24 pi^4) m e^2 F^2 L^4 / hbar^2: G. Bastard et al., Phys. Rev. B 28, 3241 (1983). The next
  // order goes with F^4: 1 % at 50 kV/cm, 0.1 % at 10 kV/cm.
  const double L = 10, m = 0.067, pi = M_PI;
  const double rest = static_cast<double>(closed::infinite_well(L, m, 1));
  for (const auto& [F, tolerance] : {std::pair{0.005, 1e-2}, {0.001, 1e-3}}) {
    const auto found = plain::levels_of({{plain::uniform({0, m}, L)}, F}, "1", "1e-12 eV");
    const double shift = found.energy[0] - F * L / 2 - rest;
    const double expected = -(15 - pi * pi) / (24 * std::pow(pi, 4)) * m * F * F * std::pow(L, 4) /
                            (2 * static_cast<double>(plain::K));
    CHECK(shift == Approx(expected).epsilon(tolerance));
  }
}

TEST_CASE("short parabolas keep the oscillator's lowest spacings") {
  // Cut off at 225 and 100 meV by barriers of that height: the lowest spacings hold to 1e-3, as published
  // tables allow.
  for (const auto& [W, D, printed] : {std::tuple{43.2, 0.225, 33.120e-3}, {100.0, 0.1, 9.5386e-3}}) {
    const plain::Medium centre{0, 0.067}, rim{D, 0.067};
    const auto found = plain::levels_of({{plain::uniform(rim, 20), plain::graded(rim, centre, 2, W / 2),
                                          plain::graded(centre, rim, 2, W / 2), plain::uniform(rim, 20)}},
                                        "3");
    CHECK(found.energy[1] - found.energy[0] == Approx(printed).epsilon(1e-3));
    CHECK(found.energy[2] - found.energy[1] == Approx(printed).epsilon(1e-3));
  }
}

TEST_CASE("a Wannier-Stark ladder climbs by e F d a period") {
  // Sixteen periods of 9.7/1.7 nm at 5 kV/cm: 5.700 meV. Inner wells only: the outermost feel the walls.
  const plain::Medium w{0, 0.067}, b{0.22446, 0.0919};
  plain::Stack stack{{plain::uniform(b, 15)}, 0.0005};
  for (int i = 0; i < 16; ++i) {
    stack.layers.push_back(plain::uniform(w, 9.7));
    stack.layers.push_back(plain::uniform(b, i < 15 ? 1.7 : 15));
  }
  const auto found = plain::levels_of(stack, "{above: 0.062 eV, below: 0.100 eV}", "1e-8 eV");
  REQUIRE(found.count() >= 5);
  CHECK(found.certificate.certified);
  for (int n = 1; n < found.count(); ++n)
    CHECK(found.energy[n] - found.energy[n - 1] == Approx(5.700e-3).epsilon(1e-3));
}

TEST_CASE("density of states in the plane and the numbers of a two-level beat") {
  // m/(pi hbar^2) per cm^2 and meV for 0.067, 0.20, 0.22, printed to five digits; parabolic, so every level
  // has m.
  for (const auto& [m, printed] : {std::pair{0.067, 2.7988e10}, {0.20, 8.3546e10}, {0.22, 9.1901e10}}) {
    const auto found = plain::levels_of({{plain::uniform({0, m}, 10)}}, "2");
    for (int n = 0; n < 2; ++n) {
      CHECK(found.in_plane_mass[n] == Approx(m).epsilon(1e-11));
      const double density =
          found.in_plane_mass[n] / (2 * M_PI * static_cast<double>(plain::K));  // nm^-2 eV^-1
      CHECK(density * 1e14 * 1e-3 == Approx(printed).epsilon(1e-4));
    }
  }
  // From the exact values of h, e, c (SI): 1 meV beats with 4.135667697 ps, 0.2417989242 THz, 8.065543937
  // cm^-1.
  const double h = 6.62607015e-34, e = 1.602176634e-19, c = 299792458;
  CHECK(wellwright::beat_period_of(1e-3) == Approx(h / (1e-3 * e) * 1e12).epsilon(1e-11));
  CHECK(wellwright::frequency_of(1e-3) == Approx(1e-3 * e / h * 1e-12).epsilon(1e-11));
  CHECK(wellwright::wavenumber_of(1e-3) == Approx(1e-3 * e / (h * c) / 100).epsilon(1e-11));
  CHECK(wellwright::beat_period_of(1e-3) == Approx(4.135667697).epsilon(1e-9));
  CHECK(wellwright::frequency_of(1e-3) == Approx(0.2417989242).epsilon(1e-9));
  CHECK(wellwright::wavenumber_of(1e-3) == Approx(8.065543942).epsilon(1e-9));
  // The infinite well of 20 nm revives after h/E1 = 0.2947527 ps (R.W. Robinett, Phys. Rep. 392, 1 (2004)).
  const double E1 = static_cast<double>(closed::infinite_well(20, 0.067, 1));
  CHECK(wellwright::beat_period_of(E1) == Approx(0.2947527).epsilon(1e-6));
  CHECK(wellwright::beat_period_of(3 * E1) == Approx(0.0982509).epsilon(1e-6));
}
