// SPDX-License-Identifier: Apache-2.0
// Names, overrides, media, strain and the agreement of the compiled table with its files.
#include <catch2/catch.hpp>
#include <cmath>
#include <filesystem>

#include "wellwright/materials.hpp"

using namespace wellwright;

namespace {

const MaterialTable table;
Alloy alloy(const MaterialTable& t, const char* text) {
  return t.alloy(text, Place{});
}
MaterialTable with(const char* yaml) {
  return table.with_overrides(read_yaml(yaml, "study.yaml"));
}
std::string trouble(const std::function<void()>& work) {
  try {
    work();
  } catch (const InputError& error) {
    return error.what();
  }
  return "";
}
std::string trouble_of_name(const char* text) {
  return trouble([&] { table.alloy(text, Place{}); });
}
Environment at(double T) {
  Environment e;
  e.temperature = T;
  return e;
}

}  // namespace

TEST_CASE("Alloys are read in any order; the composition is the first fraction as written") {
  CHECK(alloy(table, "Al0.3Ga0.7As").composition() == Approx(0.3));
  CHECK(alloy(table, "Ga0.7Al0.3As").composition() == Approx(0.7));
  CHECK(alloy(table, "InAs0.9Sb0.1").composition() == Approx(0.9));
  CHECK(std::isnan(alloy(table, "GaAs").composition()));
  const Alloy four = alloy(table, "In0.2Al0.3Ga0.5As").with_composition(0.4);
  CHECK(four.fraction[0] == Approx(0.3 * 0.6 / 0.8));
  CHECK(four.fraction[1] == Approx(0.5 * 0.6 / 0.8));
  const BandParameters one = table.resolve(alloy(table, "Al0.3Ga0.7As"), at(77)),
                       other = table.resolve(alloy(table, "Ga0.7Al0.3As"), at(77));
  CHECK(one.band_gap == other.band_gap);
}

TEST_CASE("A mistake in a name is said with what would be right") {
  CHECK(trouble_of_name("AlGaAs").find("lacks fractions") != std::string::npos);
  CHECK(trouble_of_name("AlGaAs").find("Al0.3Ga0.7As") != std::string::npos);
  CHECK(trouble_of_name("Al0.3Ga0.6As").find("sum to 0.9") != std::string::npos);
  CHECK(trouble_of_name("GaAz").find("did you mean") != std::string::npos);
  CHECK(trouble_of_name("Al1.3Ga-0.3As").find("no material") != std::string::npos);
  CHECK(trouble_of_name("Ga0.5In0.5").find("no compound") != std::string::npos);
  CHECK(trouble_of_name("GaAs0.99N0.01").find("zinc blende and wurtzite") != std::string::npos);
  CHECK(trouble_of_name("Ga0.5Ga0.5As").find("twice") != std::string::npos);
}

TEST_CASE("Overrides reach a binary and its alloys, an alloy as named, or a whole ternary") {
  const MaterialTable mass = with("GaAs: {electron_mass: 0.070}");
  CHECK(mass.resolve(alloy(mass, "GaAs"), at(300)).electron_mass == 0.070);
  CHECK(mass.resolve(alloy(mass, "Al0.5Ga0.5As"), at(300)).electron_mass == Approx(0.5 * (0.070 + 0.15)));
  const MaterialTable named = with("Al0.15Ga0.85As: {electron_mass: 0.09, conduction_band_edge: 0.135 eV}");
  const Alloy barrier = alloy(named, "Al0.15Ga0.85As");
  CHECK(named.resolve(barrier, at(300)).electron_mass == 0.09);
  CHECK(named.edge_is_final(barrier));
  CHECK(named.resolve(barrier, at(300)).conduction_band_edge == 0.135);
  const BandParameters moved = named.resolve(barrier, at(300)),
                       plain = table.resolve(alloy(table, "Al0.15Ga0.85As"), at(300));
  CHECK(moved.conduction_band_edge - moved.heavy_hole_edge ==
        Approx(plain.conduction_band_edge - plain.heavy_hole_edge));
  CHECK_FALSE(named.edge_is_final(alloy(named, "Al0.2Ga0.8As")));
  const MaterialTable ternary = with("AlGaAs: {permittivity: 12}");
  CHECK(ternary.resolve(alloy(ternary, "Al0.2Ga0.8As"), at(300)).permittivity == 12);
  CHECK(ternary.resolve(alloy(ternary, "GaAs"), at(300)).permittivity == 12.9);
  const MaterialTable gap = with("GaAs: {band_gap: 1.5 eV}");
  CHECK(gap.resolve(alloy(gap, "GaAs"), at(4)).band_gap == 1.5);
  CHECK(gap.resolve(alloy(gap, "GaAs"), at(300)).band_gap == 1.5);
}

TEST_CASE("A medium of the study has what the study gives it, at every temperature") {
  const MaterialTable t = with(
      "Spacer: {conduction_band_edge: 0.25 eV, electron_mass: 0.092, band_gap: 1.9 eV, "
      "spin_orbit_splitting: 0.3 eV, permittivity: 12.0}");
  const Alloy spacer = alloy(t, "Spacer");
  REQUIRE(spacer.is_medium());
  for (const double T : {0.0, 300.0}) {
    const BandParameters b = t.resolve(spacer, at(T));
    CHECK(b.conduction_band_edge == 0.25);
    CHECK(b.mean_valence_edge == Approx(-1.65));
    CHECK(b.split_off_edge == Approx(-1.95));
    CHECK(b.electron_in_plane_mass == 0.092);
    CHECK(std::isnan(b.heavy_hole_mass));
  }
  CHECK(trouble([] { with("GaAsS: {electron_mass: 0.07}"); }).find("did you mean") != std::string::npos);
  CHECK(trouble([] { with("AlGaAs: {variant: linear 3 K}"); }).find("linear 300 K") != std::string::npos);
  CHECK(trouble([] { with("GaAs: {elektron_mass: 0.07}"); }).find("electron_mass") != std::string::npos);
  CHECK(trouble([] { with("GaAs: {electron_mass: 0.07 eV}"); }).find("unit") != std::string::npos);
  CHECK(trouble([] { with("GaAs: {electron_mass: -0.07}"); }).find("larger than zero") != std::string::npos);
}

TEST_CASE("A layer on its own substrate is unstrained; strain keeps the volume rule of elasticity") {
  Environment e = at(300);
  e.strain = true;
  e.substrate = alloy(table, "InP");
  const StrainState none = table.strain(alloy(table, "InP"), e);
  CHECK(none.in_plane == 0);
  CHECK(std::isinf(none.critical_thickness_buried));
  const auto relaxed = table.resolve(alloy(table, "InP"), at(300)),
             strained = table.resolve(alloy(table, "InP"), e);
  CHECK(strained.conduction_band_edge == relaxed.conduction_band_edge);
  CHECK(strained.light_hole_edge == relaxed.light_hole_edge);
  // Tension lifts the light hole above the heavy one, compression the other way round (common practice).
  const auto tension = table.resolve(alloy(table, "In0.4Ga0.6As"), e),
             compression = table.resolve(alloy(table, "In0.7Ga0.3As"), e);
  CHECK(tension.light_hole_edge > tension.heavy_hole_edge);
  CHECK(compression.heavy_hole_edge > compression.light_hole_edge);
}

TEST_CASE("A cubic alloy has one electron mass, along z and in the plane, unless the study says otherwise") {
  for (const char* name : {"GaAs", "In0.53Ga0.47As", "GaAs0.5Sb0.5"}) {
    const BandParameters b = table.resolve(alloy(table, name), at(300));
    CHECK(b.electron_in_plane_mass == b.electron_mass);
  }
  const MaterialTable other = with("GaAs: {electron_in_plane_mass: 0.07}");
  CHECK(other.resolve(alloy(other, "GaAs"), at(300)).electron_in_plane_mass == 0.07);
  const BandParameters gan = table.resolve(alloy(table, "GaN"), at(300));
  CHECK(gan.electron_in_plane_mass != gan.electron_mass);
}

TEST_CASE("Parameters are smooth through the ends of the composition") {
  const Alloy a = alloy(table, "Al0.3Ga0.7As");
  const auto gap = [&](double x) { return table.resolve(a.with_composition(x), at(300)).band_gap; };
  const double h = 1e-3;
  const double inside = (gap(h) - gap(0)) / h, across = (gap(h) - gap(-h)) / (2 * h);
  CHECK(inside == Approx(across).epsilon(1e-2));
  CHECK(gap(0) == Approx(table.resolve(alloy(table, "GaAs"), at(300)).band_gap).epsilon(1e-12));
  CHECK(gap(1) == Approx(table.resolve(alloy(table, "AlAs"), at(300)).band_gap).epsilon(1e-12));
}

TEST_CASE("The compiled table is what its files say") {
  std::string text;
  const auto folder = std::filesystem::path(PROJECT_ROOT) / "materials";
  // One root: the sections of all files under one another.
  std::string sections[4];
  const char* names[] = {"binaries", "alloys", "sources", "standard_errors"};
  for (const auto& file : std::filesystem::directory_iterator(folder)) {
    std::string now, line;
    int section = -1;
    const std::string all = read_file(file.path().string());
    for (std::size_t at = 0; at < all.size();) {
      const auto end = std::min(all.find('\n', at), all.size() - 1);
      line = all.substr(at, end - at + 1);
      at = end + 1;
      bool heading = false;
      for (int s = 0; s < 4; ++s)
        if (line == std::string(names[s]) + ":\n") {
          section = s;
          heading = true;
        }
      if (!heading && section >= 0) sections[section] += line;
    }
  }
  for (int s = 0; s < 4; ++s) text += std::string(names[s]) + ":\n" + sections[s];
  const MaterialTable read = MaterialTable::from_yaml(read_yaml(text, "materials"));
  auto mine = table.names(), other = read.names();
  std::sort(mine.begin(), mine.end());
  std::sort(other.begin(), other.end());
  REQUIRE(mine == other);
  for (const char* name :
       {"GaAs", "InSb", "AlN", "Ge", "Al0.3Ga0.7As", "In0.2Al0.3Ga0.5As", "In0.1Ga0.9N", "InAs0.9Sb0.1"}) {
    const auto a = table.explain(alloy(table, name), at(77)), b = read.explain(alloy(read, name), at(77));
    REQUIRE(a.size() == b.size());
    for (std::size_t i = 0; i < a.size(); ++i) {
      CHECK(a[i].key == b[i].key);
      CHECK(a[i].value == b[i].value);
      CHECK(a[i].source == b[i].source);
      CHECK_FALSE(a[i].source.empty());
    }
  }
}

TEST_CASE("A table of the user names its materials by their elements") {
  const auto trouble_of_table = [](const std::string& yaml) {
    return trouble([&] { MaterialTable::from_yaml(read_yaml(yaml, "materials.yaml")); });
  };
  const auto binary = [](const char* name, const char* structure) {
    return std::string(name) + ": {structure: " + structure +
           ", values: {band_gap: {value: 1 eV, source: derived}}}";
  };
  CHECK(trouble_of_table("binaries: {" + binary("GaAs", "zinc blende") + ", " + binary("Si", "diamond") + "}")
            .empty());
  for (const char* name : {"Foo", "Ga", "AsGa", "GaAsP", "AlGaAs", "Si"})
    CHECK(trouble_of_table("binaries: {" + binary(name, "zinc blende") + "}").find("is no binary") !=
          std::string::npos);
  for (const char* name : {"Ga", "SiGe", "GaAs"})
    CHECK(trouble_of_table("binaries: {" + binary(name, "diamond") + "}").find("is no binary") !=
          std::string::npos);
  const auto alloy_of = [&](const char* alloy) {
    return trouble_of_table("binaries: {" + binary("GaAs", "zinc blende") + ", " +
                            binary("AlAs", "zinc blende") + ", " + binary("InP", "zinc blende") + ", " +
                            binary("GaN", "wurtzite") + ", " + binary("Si", "diamond") + ", " +
                            binary("Ge", "diamond") + "}\nalloys: {" + alloy + "}");
  };
  CHECK(alloy_of("AlGaAs: {from: GaAs, to: AlAs}, SiGe: {from: Si, to: Ge}").empty());
  CHECK(alloy_of("Bar: {from: GaAs, to: AlAs}").find("does not name") != std::string::npos);
  CHECK(alloy_of("AlInAs: {from: GaAs, to: AlAs}").find("does not name") != std::string::npos);
  CHECK(alloy_of("GaAs: {from: GaAs, to: GaAs}").find("make no alloy") != std::string::npos);
  CHECK(alloy_of("InGaAsP: {from: GaAs, to: InP}").find("make no alloy") != std::string::npos);
  CHECK(alloy_of("GaAsN: {from: GaAs, to: GaN}").find("make no alloy") != std::string::npos);
}

TEST_CASE("Warnings say what the Gamma electron leaves out and which values are doubtful") {
  Notes notes;
  table.warn(alloy(table, "Al0.6Ga0.4As"), at(300), notes);
  REQUIRE(notes.warnings().size() == 1);
  CHECK(notes.warnings()[0].find("X valley") != std::string::npos);
  Notes fine;
  table.warn(alloy(table, "Al0.3Ga0.7As"), at(300), fine);
  CHECK(fine.warnings().empty());
  Notes doubtful;
  table.warn(alloy(table, "In0.2Al0.8N"), at(300), doubtful);
  REQUIRE_FALSE(doubtful.warnings().empty());
  CHECK(doubtful.warnings()[0].find("low trust") != std::string::npos);
}

TEST_CASE("Every class of quantities has a standard error with its source") {
  for (const char* name :
       {"gap", "alloy gap", "offset", "electron mass", "hole mass", "deformation potential"}) {
    const ResolvedValue error = table.standard_error(name);
    CHECK(error.value > 0);
    CHECK_FALSE(error.source.empty());
  }
  CHECK(std::isnan(table.standard_error("weight").value));
}
