// SPDX-License-Identifier: Apache-2.0
// The material table, alloys by composition, temperature and strain: band parameters at a point, each with
// its source.
#pragma once

#include <array>
#include <map>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "wellwright/diagnostics.hpp"
#include "wellwright/input.hpp"

namespace wellwright {

enum class Structure { zinc_blende, wurtzite, diamond };
enum class GrowthPlane { zinc_blende_001, wurtzite_0001, wurtzite_000m1 };

/// Elements that alloys are made of, in the order of Alloy::fraction. Cations (group III), anions (V), group
/// IV.
inline constexpr std::array<std::string_view, 9> element_names = {"Al", "Ga", "In", "N", "P",
                                                                  "As", "Sb", "Si", "Ge"};

/// What a layer is made of: an alloy by its sublattice fractions, or a medium of the study by its name.
struct Alloy {
  std::string text;  ///< as written, e.g. "Al0.3Ga0.7As"
  std::array<double, 9>
      fraction{};      ///< on each sublattice the fractions sum to 1; all zero for a named medium
  int first = -1;      ///< index of the element whose fraction is the `composition`; -1: none
  std::string medium;  ///< name of a medium defined in the study; empty for an alloy of the table
  bool is_medium() const { return !medium.empty(); }
  /// The first fraction as written; NaN for a binary, an element or a named medium.
  double composition() const;
  /// The same alloy with another first fraction; the others of that sublattice scale to keep the sum. No
  /// range check: values slightly outside 0..1 are allowed for derivatives.
  Alloy with_composition(double x) const;
};

/// A number of the table as it reaches the user: value, unit, source, trust.
struct ResolvedValue {
  std::string key;  ///< e.g. "electron_mass"
  double value = 0;
  std::string unit;
  std::string source;     ///< printed reference, "override in the study", or "interpolated: ..."
  bool recalled = false;  ///< from memory of the source, not read in print
  std::string trust;      ///< "", "medium", "low"
  std::string range;      ///< valid range in words, may be empty
  std::string note;
};

/// Band parameters at one point of the stack, strained to the substrate, at the lattice temperature.
/// Edges [eV] count from the zero of energy once a Stack hands them out; on the table's own scale before.
struct BandParameters {
  double conduction_band_edge = 0;    ///< strained Gamma edge [eV]
  double mean_valence_edge = 0;       ///< hydrostatic shift only: the pole of the two-band electron [eV]
  double heavy_hole_edge = 0;         ///< strained [eV]
  double light_hole_edge = 0;         ///< strained [eV]
  double split_off_edge = 0;          ///< strained [eV]
  double band_gap = 0;                ///< unstrained, at temperature [eV]
  double spin_orbit_splitting = 0;    ///< [eV]
  double electron_mass = 0;           ///< along z, m* of the table, independent of temperature [m0]
  double electron_in_plane_mass = 0;  ///< [m0]
  double heavy_hole_mass = 0, heavy_hole_in_plane_mass = 0;  ///< [m0]
  double light_hole_mass = 0, light_hole_in_plane_mass = 0;  ///< [m0]
  double permittivity = 0;                                   ///< static, relative
  double polarization = 0;  ///< spontaneous and piezoelectric, along +z of the stack [nm^-2, in units of e]
};

/// Conditions under which an alloy is resolved.
struct Environment {
  double temperature = 300;  ///< lattice [K]
  GrowthPlane growth_plane = GrowthPlane::zinc_blende_001;
  bool strain = false;  ///< pseudomorphic strain to `substrate`
  std::optional<Alloy> substrate;
  bool kane_mass = false;              ///< mass rule: false bows the mass, true bows Eg, Delta, Ep, F (0 K)
  std::optional<double> offset_ratio;  ///< conduction share of the gap difference
  double offset_reference_gap = 0;     ///< Eg of the layer of lowest gap, for offset_ratio [eV]
};

/// Strain of a layer on the substrate, and when it would relax.
struct StrainState {
  double in_plane = 0;  ///< (a_substrate - a) / a at temperature
  double along_growth = 0;
  double relaxed_lattice = 0;  ///< a of the alloy [nm]
  double critical_thickness_overlayer = 0, critical_thickness_buried = 0,
         critical_thickness_superlattice = 0;  ///< Matthews-Blakeslee [nm]; infinite when unstrained
};

/// The material table with the study's overrides. A value type; copies share the immutable shipped data.
class MaterialTable {
 public:
  MaterialTable();  ///< the table compiled into the program
  /// A user's table from YAML text (`--materials FILE`), replacing the compiled one. Throws InputError.
  static MaterialTable from_yaml(const Node& root);

  /// The table with the `materials:` block of a study applied. Throws InputError.
  MaterialTable with_overrides(const Node& materials_block) const;

  /// Reads "Al0.3Ga0.7As" or the name of a medium of the study. Throws InputError at `place`.
  Alloy alloy(std::string_view text, const Place& place) const;
  bool knows_medium(std::string_view name) const;

  /// Names of all binaries, elements, ternaries and defined media, for listings and suggestions.
  std::vector<std::string> names() const;
  Structure structure(const Alloy& alloy) const;

  /// Parameters on the table's own energy scale. Throws InputError (no place) only for data that a question
  /// needs and the table lacks; compositions slightly outside 0..1 are evaluated, for derivatives.
  BandParameters resolve(const Alloy& alloy, const Environment& environment) const;
  StrainState strain(const Alloy& alloy, const Environment& environment) const;
  /// Thickness of one monolayer at 300 K, strained: a_perp/2 on (001), c/2 on (0001) [nm].
  double monolayer(const Alloy& alloy, const Environment& environment) const;
  /// The conduction edge of this alloy is an explicit number of the study (counts from the zero, final).
  bool edge_is_final(const Alloy& alloy) const;
  /// Every value of the alloy with its source, for `wellwright materials NAME` and the result file.
  std::vector<ResolvedValue> explain(const Alloy& alloy, const Environment& environment) const;
  /// Any other quantity by key ("lo_phonon_energy", "density", ...) in the internal unit; NaN when not known.
  double value(const Alloy& alloy, std::string_view key, const Environment& environment) const;
  /// Fraction of the first element of a ternary name like "InGaAs" at which it matches `substrate` at 300 K.
  Alloy lattice_matched(std::string_view ternary, const Alloy& substrate, const Place& place) const;
  /// Warnings of an alloy under these conditions: lowest valley not Gamma, extrapolated, low trust, ...
  void warn(const Alloy& alloy, const Environment& environment, Notes& notes) const;
  /// One standard error of a quantity class ("gap", "offset", "mass", ...) in its unit, with source.
  ResolvedValue standard_error(std::string_view quantity_class) const;
  /// YAML text of the entries that these alloys use, with sources (for the result file).
  std::string used_entries(const std::vector<Alloy>& alloys) const;
  std::string hash() const;  ///< of the table in force, for the result file

  struct Data;

 private:
  std::shared_ptr<const Data> data_;
};

}  // namespace wellwright
