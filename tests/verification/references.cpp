// SPDX-License-Identifier: Apache-2.0
// The tests' own references checked against one another and against printed numbers, before the program is.
#include <catch2/catch.hpp>

#include "support/closed_forms.hpp"
#include "support/dense_matrix.hpp"
#include "support/shooting.hpp"

using plain::graded;
using plain::Medium;
using plain::Real;
using plain::Stack;
using plain::uniform;
using shooting::Shooter;

namespace {
// Printed values carry the digits of their source's constants: 1e-4 as rounded there.
void near(Real meV, double printed, double tolerance = 1e-5) {
  CHECK(static_cast<double>(1000 * meV) == Approx(printed).epsilon(tolerance));
}
void same(Real a, Real b, double tolerance = 1e-15) {
  INFO("difference " << static_cast<double>(a - b));
  CHECK(std::abs(a - b) < tolerance);
}
const Medium gaas{0, 0.067, 1.519, 0.341}, algaas{0.22446, 0.0919, 1.89, 0.32};
}  // namespace

// Numbers computed from the closed forms with the constants of CODATA 2018, which differ by a few 1e-10.
TEST_CASE("closed forms return the printed levels") {
  near(closed::infinite_well(10, 0.067L, 1), 56.1239);
  near(closed::infinite_well(10, 0.067L, 3), 505.1151);
  const auto davies = closed::finite_well({0, 0.067}, {0.3, 0.067}, 10);
  REQUIRE(davies.size() ==
          3);  // J.H. Davies, The Physics of Low-Dimensional Semiconductors (1998), from memory
  near(davies[0], 34.2084);
  near(davies[2], 271.5043);
  const auto stepped = closed::finite_well({0, 0.067}, {0.22446, 0.0919}, 10);
  REQUIRE(stepped.size() == 2);
  near(stepped[1], 116.1918);
  near(closed::triangular_well(0.067L, 0.005L, 4), 164.408);
  near(closed::oscillator_quantum(43.2L, 0.225L, 0.067L), 33.120);
  const auto bands = closed::miniband_edges({0, 0.067}, {0.22446, 0.0919}, 9.7L, 1.7L, 1, 2, 1e-3L);
  near(bands[0].first, 21.7051);
  near(bands[1].second, 163.2563);
}

TEST_CASE("shooting meets the closed forms for all three band models") {
  for (int model = 1; model <= 3; ++model) {
    CAPTURE(model);
    Stack well{{uniform(algaas, 12), uniform(gaas, 10), uniform(algaas, 12)}, 0, model};
    const auto single = closed::finite_well(gaas, algaas, 10, model, 12);
    for (std::size_t i = 0; i < single.size(); ++i) same(Shooter(well).level(static_cast<int>(i)), single[i]);
    Stack pair{
        {uniform(algaas, 12), uniform(gaas, 8), uniform(algaas, 14), uniform(gaas, 8), uniform(algaas, 12)},
        0,
        model};
    const auto doublets = closed::double_well(gaas, algaas, 8, 14, model, 12);
    for (std::size_t i = 0; i < doublets.size(); ++i)
      same(Shooter(pair).level(static_cast<int>(i)), doublets[i]);
    Stack period{{uniform(algaas, 0.85), uniform(gaas, 9.7), uniform(algaas, 0.85)}, 0, model};
    const auto bands = closed::miniband_edges(gaas, algaas, 9.7L, 1.7L, model, 2, 1e-4L);
    for (int n = 0; n < 2; ++n) {
      const auto [lower, upper] = bands[static_cast<std::size_t>(n)];
      same(Shooter(period).bloch_level(n, n % 2 == 0 ? 1 : -1), lower);
      same(Shooter(period).bloch_level(n, n % 2 == 0 ? -1 : 1), upper);
    }
  }
}

TEST_CASE("shooting meets Airy functions in a tilted box and the oscillator in a parabola") {
  const auto tilted = closed::tilted_box(20, 0.067L, 0.005L, 4, 1e-3L);
  const Stack box{{uniform(gaas, 20)}, 0.005, 1};
  for (int i = 0; i < 4; ++i)
    same(Shooter(box).level(i), tilted[static_cast<std::size_t>(i)],
         1e-14);  // 0.067L is not the double 0.067
  const Medium rim = gaas.with_edge(0.15);
  const Stack parabola{{graded(rim, gaas, 2, 100), graded(gaas, rim, 2, 100)}, 0, 1};
  const Real quantum = closed::oscillator_quantum(200, 0.15, 0.067);
  for (int i = 0; i < 4; ++i) same(Shooter(parabola).level(i), quantum * (i + 0.5L));
}

// A grading cut into layers of its middle values converges to it with the square of their width, masses
// included.
TEST_CASE("a graded layer is the limit of a fine staircase") {
  for (const double power : {0.7, 1.0, 1.5}) {
    CAPTURE(power);
    const Medium well{0, 0.067, 1.519, 0.341}, rim{0.2, 0.09, 1.9, 0.3};
    const auto stack = [&](int steps) {
      Stack s{{uniform(rim, 5)}, 0.002, 3};
      if (steps == 0) {
        s.layers.push_back(graded(well, rim, power, 15));
      } else {
        for (int i = 0; i < steps; ++i) {
          const auto at = [&](double from, double to) {
            return from + (to - from) * std::pow((i + 0.5) / steps, power);
          };
          s.layers.push_back(uniform({at(well.edge, rim.edge), at(well.mass, rim.mass), at(well.gap, rim.gap),
                                      at(well.split_off, rim.split_off)},
                                     15.0 / steps));
        }
      }
      s.layers.push_back(uniform(rim, 5));
      return s;
    };
    const Real exact = Shooter(stack(0)).level(1), coarse = Shooter(stack(200)).level(1),
               fine = Shooter(stack(400)).level(1);
    CHECK(static_cast<double>((coarse - exact) / (fine - exact)) ==
          Approx(power < 1 ? 3.25 : 4).epsilon(0.05));
    same(fine, exact, 2e-6);
  }
}

TEST_CASE("a mirrored stack in the reversed field has the same levels") {
  const Medium a{0, 0.067, 1.5, 0.34}, b{0.25, 0.09, 1.85, 0.3}, c{0.1, 0.075, 1.65, 0.33};
  for (int model = 1; model <= 3; ++model) {
    const Stack up{
        {uniform(b, 6), uniform(a, 7), graded(b, c, 1.5, 5), uniform(a, 4), uniform(b, 8)}, 0.004, model};
    const Stack down{
        {uniform(b, 8), uniform(a, 4), graded(c, b, 1.5, 5), uniform(a, 7), uniform(b, 6)}, -0.004, model};
    const Real shift = 0.004L * static_cast<Real>(up.length());
    for (int n = 0; n < 4; ++n) same(Shooter(up).level(n), Shooter(down).level(n) + shift);
  }
}

TEST_CASE("shooting and the dense matrix in (psi, chi) agree, valence-like states counted") {
  Medium a{0, 0.067, 1.5, 0.34}, b{0.25, 0.09, 1.85, 0.3};
  a.valence_shift = 0.05, b.split_off_shift = -0.03;  // strained poles
  for (int model = 1; model <= 3; ++model)
    for (const double field : {0.0, 0.006}) {
      CAPTURE(model, field);
      const Stack stack{
          {uniform(b, 6), uniform(a, 7), graded(b, a, 1, 5), uniform(a, 4), uniform(b, 8)}, field, model};
      const Shooter shooter(stack);
      const auto all = dense::spectrum(stack, 0.5);
      for (int n = 0; n < 5; ++n) same(shooter.level(n), all.energy[all.companions + n], 1e-11);
    }
}
