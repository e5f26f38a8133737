// SPDX-License-Identifier: Apache-2.0
// Twenty stacks that shooting and the program solve side by side; each is run with one, two and three bands.
#pragma once

#include <string>
#include <vector>

#include "support/plain_stack.hpp"

struct NamedStack {
  std::string name;
  plain::Stack stack;
};

inline std::vector<NamedStack> stacks_for_shooting() {
  using plain::graded;
  using plain::Medium;
  using plain::Stack;
  using plain::uniform;
  // Round numbers of the size of GaAs, AlGaAs, InGaAs and AlInAs on InP, InAs, AlSb, GaN, AlN. Fields in
  // V/nm.
  const Medium gaas{0, 0.067, 1.519, 0.341}, al15{0.12, 0.0795, 1.72, 0.335}, al20{0.16, 0.0836, 1.79, 0.332},
      al30{0.243, 0.0919, 1.92, 0.325}, al45{0.34, 0.1, 2.07, 0.32}, ingaas{0, 0.043, 0.816, 0.356},
      inalas{0.52, 0.075, 1.53, 0.3}, inas{0, 0.026, 0.417, 0.39}, alsb{1.35, 0.14, 2.38, 0.68},
      gan{0, 0.2, 3.51, 0.017}, aln{1.8, 0.31, 6.2, 0.019}, shallow{0.04, 0.07, 1.57, 0.34};
  std::vector<NamedStack> all;
  const auto add = [&](const char* name, double field, std::vector<plain::Layer> layers) {
    all.push_back({name, {std::move(layers), field}});
  };
  add("one well in a field", 0.005, {uniform(al30, 15), uniform(gaas, 10), uniform(al30, 15)});
  add("coupled wells near resonance", -0.0008,
      {uniform(al20, 20), uniform(gaas, 14.5), uniform(al20, 2.5), uniform(gaas, 10), uniform(al20, 20)});
  add("nearly equal wells, 14 nm barrier, 3e-5 eV apart", 0,
      {uniform(al20, 20), uniform(gaas, 10), uniform(al20, 14), uniform(gaas, 10.0066), uniform(al20, 20)});
  add("equal shallow wells, 14 nm barrier", 0,
      {uniform(shallow, 40), uniform(gaas, 12), uniform(shallow, 14), uniform(gaas, 12),
       uniform(shallow, 40)});
  {
    std::vector<plain::Layer> ten{uniform(al30, 12)};
    for (int i = 0; i < 10; ++i) {
      ten.push_back(uniform(gaas, 7));
      ten.push_back(uniform(al30, i < 9 ? 3 : 12));
    }
    add("ten coupled wells", 0.0002, ten);
    add("ten coupled wells, no field", 0, ten);
  }
  add("step well", 0.003, {uniform(al30, 12), uniform(gaas, 6), uniform(al15, 9), uniform(al30, 12)});
  add("linear ramps", 0,
      {uniform(al30, 8), graded(al30, gaas, 1, 9), graded(gaas, al20, 1, 14), uniform(al30, 8)});
  add("parabola in a field", 0.002,
      {uniform(al30, 6), graded(al30, gaas, 2, 30), graded(gaas, al30, 2, 30), uniform(al30, 6)});
  add("power 1.5 and 0.8", -0.002,
      {uniform(al30, 8), graded(al30, gaas, 1.5, 12), graded(gaas, al30, 0.8, 12), uniform(al30, 8)});
  {  // layers of a cascade on InP, bottom first, at 72 kV/cm: K.J. Franz, Princeton thesis (2009), ch. 3
    std::vector<plain::Layer> cascade;
    const double nm[] = {3.23, 9.77, 1.29, 8.60, 1.29, 3.52, 0.97, 3.52, 0.97,
                         1.95, 1.61, 2.74, 1.61, 1.95, 1.94, 1.56, 2.26, 2.35};
    for (int i = 0; i < 18; ++i) cascade.push_back(uniform(i % 2 == 0 ? inalas : ingaas, nm[i]));
    cascade.push_back(uniform(inalas, 3.23));
    add("cascade on InP", -0.0072, cascade);
  }
  {  // layers of a GaAs cascade at 48 kV/cm: C. Sirtori et al., Appl. Phys. Lett. 73, 3486 (1998), from
     // memory
    std::vector<plain::Layer> cascade;
    const double nm[] = {5.8, 1.5, 2.0, 4.9, 1.7, 4.0, 3.4, 3.2, 2.0, 2.8, 2.3, 2.3, 2.5, 2.3, 2.5, 2.1};
    for (int i = 0; i < 16; ++i) cascade.push_back(uniform(i % 2 == 0 ? al30 : gaas, nm[i]));
    cascade.push_back(uniform(al30, 5.8));
    add("cascade on GaAs", -0.0048, cascade);
  }
  add("strongly non-parabolic well", 0.004, {uniform(alsb, 6), uniform(inas, 8), uniform(alsb, 6)});
  add("two strongly coupled non-parabolic wells", -0.003,
      {uniform(alsb, 5), uniform(inas, 6), uniform(alsb, 1.2), uniform(inas, 4.5), uniform(alsb, 5)});
  add("monolayers", 0.01,
      {uniform(al30, 8), uniform(gaas, 2.83), uniform(al45, 0.283), uniform(gaas, 2.83), uniform(al45, 0.283),
       uniform(gaas, 2.83), uniform(al30, 8)});
  add("wide well, quantum-confined Stark effect", 0.001,
      {uniform(al20, 15), uniform(gaas, 40), uniform(al20, 15)});
  add("strong field 200 kV/cm", 0.02, {uniform(al30, 10), uniform(gaas, 9), uniform(al30, 10)});
  add("wide gap, 2 nm wells", 0.05,
      {uniform(aln, 4), uniform(gan, 1.75), uniform(aln, 1.1), uniform(gan, 2.1), uniform(aln, 4)});
  add("three media, three wells", 0.0025,
      {uniform(al45, 9), uniform(gaas, 5), uniform(al15, 3), uniform(gaas, 7), uniform(al30, 2),
       uniform(al15, 6), uniform(al45, 9)});
  add("barriers of 60 nm", 0.0004,
      {uniform(al30, 60), uniform(gaas, 8), uniform(al30, 60), uniform(gaas, 9), uniform(al30, 60)});
  return all;
}
