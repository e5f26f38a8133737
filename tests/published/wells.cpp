// SPDX-License-Identifier: Apache-2.0
// Intersubband energies of single wells: GaAs, InGaAs, II-VI, SiGe holes, GaN; and where one electron is not
// enough.
#include <catch2/catch.hpp>

#include "published.hpp"

using namespace published;

namespace {

struct Pair {
  double energy, dipole;  // of levels 1 -> 2 [meV], [nm]
};

Pair first_line(const std::string& head, const std::string& barrier, const std::string& well, double nm,
                double around, const std::string& model,
                wellwright::Carrier carrier = wellwright::Carrier::electron) {
  const auto study = read(head + "layers:\n  - {material: " + barrier +
                          ", thickness: " + std::to_string(around) + " nm}\n  - {material: " + well +
                          ", thickness: " + std::to_string(nm) + " nm}\n  - {material: " + barrier +
                          ", thickness: " + std::to_string(around) + " nm}\nmodel: {" + model + "}\n");
  const auto levels = solve(study, carrier);
  return {1000 * (levels.energy[1] - levels.energy[0]), std::abs(dipoles(levels)(0, 1))};
}

}  // namespace

// L.C. West, S.J. Eglash, Appl. Phys. Lett. 46, 1156 (1985), numbers from memory: 152, 121, 108 meV at 300 K
// for wells of 6.5, 8.2, 9.2 nm; oscillator strength just over 12. Doped to some 1e12 cm^-2: the measured
// lines hold the depolarization shift (+5 % at this density for 10 nm) and the exchange that lowers the
// filled level (about +5 meV), so one electron must come out lower, by 7 to 15 %. Ratios and strength, which
// both shifts leave, are held to 4 % and 16 % (8 % in the dipole).
TEST_CASE("the first intersubband line of GaAs wells") {
  const double nm[] = {6.5, 8.2, 9.2}, printed[] = {152, 121, 108};
  double computed[3] = {}, f = 0;
  for (int i = 0; i < 3; ++i) {
    const Pair line =
        first_line("temperature: 300 K\n", "Al0.3Ga0.7As", "GaAs", nm[i], 15, "bands: two, levels: 2");
    computed[i] = line.energy;
    if (i == 0) f = strength(line.energy / 1000, line.dipole);
    row("C01 GaAs well, one electron (collective shift missing)", printed[i], line.energy, "meV");
    CHECK(line.energy < 0.93 * printed[i]);
    CHECK(line.energy > 0.85 * printed[i]);
  }
  row("C01 oscillator strength of 6.5 nm", 12.2, f, "");
  CHECK(computed[0] / computed[1] == Approx(152.0 / 121).epsilon(0.04));
  CHECK(computed[2] / computed[1] == Approx(108.0 / 121).epsilon(0.04));
  CHECK(f == Approx(12.2).epsilon(0.16));
}

// B.F. Levine et al., Appl. Phys. Lett. 52, 1481 (1988), from memory: 4.4 um (279 meV) for 5 nm wells on InP.
// +-7 %; a parabolic band overshoots by more than 60 meV.
TEST_CASE("the first intersubband line of an InGaAs well") {
  const std::string head = "substrate: InP\ntemperature: 300 K\n";
  const double two =
      first_line(head, "In0.52Al0.48As", "In0.53Ga0.47As", 5, 15, "bands: two, levels: 2").energy;
  const double one =
      first_line(head, "In0.52Al0.48As", "In0.53Ga0.47As", 5, 15, "bands: one, levels: 2").energy;
  row("C03 InGaAs well 5 nm", 279, two, "meV");
  CHECK(two == Approx(279).epsilon(0.07));
  CHECK(one > 279 + 60);
}

// H. Lu et al., Appl. Phys. Lett. 89, 241921 (2006); K.J. Franz, thesis (2009), ch. 2: 180 meV at 300 K, +-8
// %. Media as in the source (offset 0.78 eV, masses 0.128 and 0.181). Doped 1e18 cm^-3: the source's own
// self-consistent value is 184 meV, so the flat-band value lies above the measured one by what the charge
// takes back.
TEST_CASE("a II-VI well on InP") {
  const std::string media =
      "temperature: 300 K\nmaterials:\n  Well: {conduction_band_edge: 0 eV, electron_mass: 0.128, band_gap: "
      "2.08 eV, "
      "spin_orbit_splitting: 0.4 eV, permittivity: 9}\n  Barrier: {conduction_band_edge: 0.78 eV, "
      "electron_mass: 0.181, "
      "band_gap: 3.03 eV, spin_orbit_splitting: 0.4 eV, permittivity: 9}\n";
  const double E = first_line(media, "Barrier", "Well", 5, 14, "bands: two, levels: 2").energy;
  row("A05 ZnCdSe well, flat bands (charge missing)", 180, E, "meV");
  CHECK(E == Approx(180).epsilon(0.08));
  CHECK(E > 184);
}

// R.P.G. Karunasiri et al., Appl. Phys. Lett. 57, 2585 (1990): HH1-HH2 near 8.1 um (153 meV) at 300 K for 4.0
// nm Si0.6Ge0.4 on Si. +-15 %: mass of the strained alloy and the doping shift.
TEST_CASE("heavy holes in a SiGe well") {
  const double E = first_line("substrate: Si\ntemperature: 300 K\n", "Si", "Si0.6Ge0.4", 4, 15,
                              "carrier: heavy hole, levels: 2", wellwright::Carrier::heavy_hole)
                       .energy;
  row("A09 SiGe well, HH1-HH2", 153, E, "meV");
  CHECK(E == Approx(153).epsilon(0.15));
}

// D.A.B. Miller et al., Phys. Rev. Lett. 53, 2173 (1984); Phys. Rev. B 32, 1043 (1985), number from memory:
// the exciton of a 9.5 nm well moves by -20 meV at 100 kV/cm, +-20 %. Electron and hole shifts; the binding,
// which is missing, changes by one or two meV the other way.
TEST_CASE("the quantum-confined Stark shift") {
  const auto sum = [](double kV_cm) {
    const std::string text =
        "temperature: 300 K\nfield: " + std::to_string(kV_cm) +
        " kV/cm\nlayers:\n  - {material: Al0.32Ga0.68As, thickness: 9.8 nm}\n  - {material: GaAs, "
        "thickness: 9.5 nm}\n  - {material: Al0.32Ga0.68As, thickness: 9.8 nm}\n"
        "model: {carrier: [electron, heavy hole], levels: 1}\n";
    const auto study = read(text);
    return solve(study).energy[0] + solve(study, wellwright::Carrier::heavy_hole).energy[0];
  };
  const double rest = sum(0), shift = 1000 * (sum(100) - rest);
  row("C15 quantum-confined Stark shift at 100 kV/cm", -20, shift, "meV");
  CHECK(shift == Approx(-20).epsilon(0.2));
  // Quadratic at first: a quarter of the field, about a sixteenth of the shift.
  CHECK((sum(25) - rest) / (sum(50) - rest) == Approx(0.25).epsilon(0.05));
}

// H. Luo et al., Appl. Phys. Lett. 86, 231103 (2005), from memory: peaks at 9.7, 5.4, 3.2 THz (+-0.1). The
// wells are shallow and filled: without Hartree, exchange and depolarization the line must be 25 to 42 % too
// low. What is missing is known for the linear gap difference with a conduction share of 0.65, which is
// therefore asked for here; the cubic gap of the default table is a third steeper at such compositions.
TEST_CASE("shallow terahertz wells lie low without many-body terms") {
  struct Row {
    const char* barrier;
    double well, around, THz;
  };
  for (const Row& r : {Row{"Al0.05Ga0.95As", 11.9, 55.2, 9.7}, Row{"Al0.03Ga0.97As", 15.5, 70.2, 5.4},
                       Row{"Al0.015Ga0.985As", 22.1, 95.1, 3.2}}) {
    const auto study = read("temperature: 10 K\nlayers:\n  - {material: " + std::string(r.barrier) +
                            ", thickness: " + std::to_string(r.around) +
                            " nm}\n  - {material: GaAs, thickness: " + std::to_string(r.well) +
                            " nm}\n  - {material: " + r.barrier + ", thickness: " + std::to_string(r.around) +
                            " nm}\nmaterials:\n  AlGaAs: {variant: linear 300 K}\n"
                            "model: {bands: two, levels: 12, offset_ratio: 0.65}\n");
    const auto levels = solve(study);
    const auto dipole = dipoles(levels);
    double best = 0, peak = 0;
    for (int i = 1; i < levels.count(); ++i) {
      const double E = levels.energy[i] - levels.energy[0], f = strength(E, dipole(0, i));
      if (f > best) best = f, peak = E;
    }
    const double THz = wellwright::frequency_of(peak);
    row("C05 terahertz well, one electron (many-body missing)", r.THz, THz, "THz");
    CHECK(THz < 0.75 * r.THz);
    CHECK(THz > 0.58 * r.THz);
  }
}

// C. Gmachl, H.M. Ng, Electron. Lett. 39, 567 (2003): 590 +-20 meV for 1.75 nm GaN in 5.1 nm AlN grown along
// a, where no polarization acts (the study leaves it out). +-20 %: a monolayer of width is 12 %, and an
// interface of finite width, which is not known and not put in, lowers the line. A parabolic band misses
// badly.
TEST_CASE("the first intersubband line of a non-polar GaN well") {
  const double two =
      first_line("temperature: 300 K\n", "AlN", "GaN", 1.75, 5.1, "bands: two, levels: 2").energy;
  const double one =
      first_line("temperature: 300 K\n", "AlN", "GaN", 1.75, 5.1, "bands: one, levels: 2").energy;
  row("A10 non-polar GaN well", 590, two, "meV");
  CHECK(two == Approx(590).epsilon(0.2));
  CHECK(one > 1.3 * 590);
}

// Al-free GaInP/GaAs quantum well infrared photodetectors, Appl. Phys. Lett. 70, 360 (1997): photocurrent
// peaks at 10.4, 12.8, 13.3 um (119.2, 96.9, 93.2 meV) at 77 K for wells of 4.0, 6.5, 7.5 nm; barriers of
// about 28 nm from memory. The offset is not known on its own: 0.12 to 0.20 eV are in the literature, and the
// table's 0.19 eV stands near the upper end. So the measured peaks must lie between those of the two ends,
// and the ratios, in which it mostly cancels, hold to 8 %.
TEST_CASE("bound-to-quasi-continuum peaks of GaInP/GaAs wells") {
  // Peak of the strength from the ground level into all others, each line a Gaussian of 14 meV full width.
  const auto peak = [](double nm, const std::string& materials) {
    const auto study =
        read("substrate: GaAs\ntemperature: 77 K\n" + materials +
             "layers:\n  - {material: Ga0.51In0.49P, thickness: 28 nm}\n  - {material: GaAs, thickness: " +
             std::to_string(nm) +
             " nm}\n  - {material: Ga0.51In0.49P, thickness: 28 nm}\nmodel: {bands: two, levels: 20}\n");
    const auto levels = solve(study);
    const auto dipole = dipoles(levels);
    double best = 0, at = 0;
    for (double photon = 0.03; photon < 0.4; photon += 5e-4) {
      double sum = 0;
      for (int i = 1; i < levels.count(); ++i) {
        const double E = levels.energy[i] - levels.energy[0], x = (photon - E) / 0.006;
        sum += strength(E, dipole(0, i)) * std::exp(-x * x / 2);
      }
      if (sum > best) best = sum, at = photon;
    }
    return 1000 * at;
  };
  const double nm[] = {4.0, 6.5, 7.5}, printed[] = {119.2, 96.9, 93.2};
  double computed[3] = {};
  for (int i = 0; i < 3; ++i) {
    computed[i] = peak(nm[i], "");
    row("A08 GaInP/GaAs detector, offset of the table", printed[i], computed[i], "meV");
    CHECK(peak(nm[i], "materials:\n  Ga0.51In0.49P: {conduction_band_edge: 0.12 eV}\n") < printed[i]);
    CHECK(peak(nm[i], "materials:\n  Ga0.51In0.49P: {conduction_band_edge: 0.20 eV}\n") > printed[i]);
  }
  CHECK(computed[0] / computed[1] == Approx(printed[0] / printed[1]).epsilon(0.08));
  CHECK(computed[2] / computed[1] == Approx(printed[2] / printed[1]).epsilon(0.08));
}
