// SPDX-License-Identifier: Apache-2.0
// Stacks whose levels are known in closed form, one line each.
#pragma once

#include <string>
#include <vector>

#include "support/closed_forms.hpp"

struct ClosedCase {
  std::string name;
  plain::Stack stack;
  std::vector<plain::Real> levels;  // the lowest, exact
};

inline std::vector<ClosedCase> closed_cases() {
  using plain::graded;
  using plain::Medium;
  using plain::Real;
  using plain::Stack;
  using plain::uniform;
  std::vector<ClosedCase> cases;
  const auto mass = [](double m, double edge = 0, double gap = 1.5, double so = 0.34) {
    return Medium{edge, m, gap, so};
  };

  std::vector<Real> box;
  for (int n = 1; n <= 6; ++n) box.push_back(closed::infinite_well(10, 0.067, n));
  cases.push_back({"infinite well 10 nm", {{uniform(mass(0.067), 10)}}, box});

  const auto well = [&](const std::string& name, Medium w, Medium b, double L, int bands, double d) {
    Stack stack{{uniform(b, d), uniform(w, L), uniform(b, d)}, 0, bands};
    cases.push_back({name, stack, closed::finite_well(w, b, L, bands, d)});
  };
  // Depths and masses: J.H. Davies (1998) for the first, P. Harrison, Quantum Wells, Wires and Dots for the
  // one of 167.098 meV, both from memory; the levels come from the matching equation, so that they are no
  // source here.
  well("finite well, one mass, 10 nm 0.3 eV", mass(0.067), mass(0.067, 0.3), 10, 1, 100);
  well("finite well, mass step, 10 nm", mass(0.067), mass(0.0919, 0.22446), 10, 1, 80);
  well("finite well, mass step, 6.5 nm", mass(0.067), mass(0.0919, 0.22446), 6.5, 1, 80);
  well("finite well, mass step, 20 nm", mass(0.067), mass(0.0919, 0.22446), 20, 1, 60);
  well("finite well, 0.52 eV, 5 nm", mass(0.043), mass(0.075, 0.52), 5, 1, 60);
  well("finite well, 167.098 meV", mass(0.067), mass(0.0836, 0.167098), 10, 1, 60);
  well("electron in 1 nm, 1 eV", mass(1), mass(1, 1), 1, 1, 8);
  well("finite well with near walls", mass(0.067), mass(0.0919, 0.22446), 10, 1, 4);
  for (int bands = 2; bands <= 3; ++bands) {
    const std::string text = bands == 2 ? "two-band" : "three-band";
    well(text + " well, 6 nm", mass(0.067, 0, 1.519, 0.341), mass(0.0919, 0.22446, 1.9, 0.32), 6, bands, 60);
    well(text + " well, 4.5 nm, 0.52 eV", mass(0.043, 0, 0.81, 0.36), mass(0.075, 0.52, 1.53, 0.3), 4.5,
         bands, 40);
    well(text + " InAs-like well, 15 nm", mass(0.023, 0, 0.41, 0.39), mass(0.12, 1.3, 1.6, 0.7), 15, bands,
         30);
  }

  const auto pair = [&](const std::string& name, Medium w, Medium b, double a, double between, int bands,
                        double d) {
    Stack stack{{uniform(b, d), uniform(w, a), uniform(b, between), uniform(w, a), uniform(b, d)}, 0, bands};
    cases.push_back({name, stack, closed::double_well(w, b, a, between, bands, d)});
  };
  pair("double well 8/2/8 nm", mass(0.067), mass(0.0919, 0.243165), 8, 2, 1, 40);
  pair("double well 10/14/10 nm", mass(0.067), mass(0.0919, 0.243165), 10, 14, 1, 40);
  pair("two-band double well 8/2/8 nm", mass(0.067, 0, 1.519), mass(0.0919, 0.243165, 1.9), 8, 2, 2, 40);
  pair("three-band double well 5/1.5/5 nm", mass(0.043, 0, 0.81, 0.36), mass(0.075, 0.52, 1.53, 0.3), 5, 1.5,
       3, 30);

  const auto triangle = [&](const std::string& name, double F, double L) {
    std::vector<Real> levels;
    for (int n = 1; n <= 4; ++n) levels.push_back(closed::triangular_well(0.067, F, n));
    cases.push_back({name, {{uniform(mass(0.067), L)}, F}, levels});
  };
  triangle("triangular well 20 kV/cm", 0.002, 130);
  triangle("triangular well 50 kV/cm", 0.005, 90);
  triangle("triangular well 100 kV/cm", 0.01, 70);
  cases.push_back({"box 20 nm, 50 kV/cm",
                   {{uniform(mass(0.067), 20)}, 0.005},
                   closed::tilted_box(20, 0.067, 0.005, 6, 1e-3L)});

  std::vector<Real> oscillator;
  for (int n = 0; n < 6; ++n) oscillator.push_back((n + 0.5L) * closed::oscillator_quantum(200, 0.15, 0.067));
  const Medium centre = mass(0.067), rim = mass(0.067, 0.15);
  cases.push_back(
      {"parabola 200 nm", {{graded(rim, centre, 2, 100), graded(centre, rim, 2, 100)}}, oscillator});
  return cases;
}
