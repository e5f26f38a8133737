// SPDX-License-Identifier: Apache-2.0
// The table in force: rows sorted by material, variants chosen, overrides of a study applied; private to the
// room.
#pragma once

#include <map>
#include <optional>

#include "materials/raw_table.hpp"

namespace wellwright {

/// Where a value in force came from.
struct Origin {
  std::string_view source, range, note, trust;
  bool recalled = false;
  bool overridden = false;  ///< by the study
};

struct Binary {
  std::string_view name;
  Structure structure = Structure::zinc_blende;
  Values values;
  std::array<Origin, parameter_count> origins;
  int cation = -1, anion = -1;  ///< indices into element_names; of Si and Ge both are the element
};

/// Bowing of one parameter: C(x) = c[0] + c[1] x + c[2] x^2; or a difference c[0] x + c[1] x^2 + ... to
/// `from`.
struct Bow {
  bool known = false, difference = false;
  double c[3] = {0, 0, 0};
  Origin origin;
};

struct AlloyRecord {
  std::string_view name, range;
  int from = 0, to = 0;
  std::array<Bow, parameter_count> bow;
  /// What the alloy adds to the mean of its ends: x (1 - x) C(x) with the sign of the sum, at values of the
  /// ends.
  double excess(P p, double x, double from_value, double to_value) const;
};

/// Values that a study sets for one alloy by its name, for a whole ternary, or for a medium of its own.
struct Override {
  std::string name;
  bool is_medium = false;
  std::array<double, 9> fraction{};  ///< of an alloy as named
  std::vector<int> elements;         ///< of a whole ternary (fraction all zero)
  std::vector<std::pair<P, double>> values;
  std::optional<double> conduction_band_edge;
};

struct MaterialTable::Data {
  std::vector<Binary> binaries;
  std::vector<AlloyRecord> alloys;
  std::vector<RawValue> rows;  ///< all, for variants
  std::vector<RawSource> sources;
  std::vector<RawError> errors;
  std::string hash;
  std::vector<Override> overrides;
  std::vector<std::pair<std::string, std::string>> variants;  ///< chosen: material, variant
  std::shared_ptr<const OwnedTable> owner;                    ///< keeps the texts of a user's table

  static Data build(const RawTable& raw);
  const Binary* binary(std::string_view name) const;
  const AlloyRecord* alloy_record(std::string_view name) const;
  /// The overrides that apply to this alloy, general ones first.
  std::vector<const Override*> overrides_of(const Alloy& alloy) const;
  const Override* medium(std::string_view name) const;
  std::string source_text(std::string_view source) const;
};

/// Puts the value of a row into its binary or alloy.
void apply_row(MaterialTable::Data& data, const RawValue& row);
/// Hole masses and the like that follow from other values, unless they stand in the table themselves.
void derive(Binary& binary);

/// All parameters of an alloy at a temperature [K]: gaps and lattice by their laws, ends mixed by the sum of
/// bowings, overrides applied. Gaps under their 0 K keys are then those at `temperature`.
Values values_of(const MaterialTable::Data& data, const Alloy& alloy, double temperature);

/// Gap at a temperature by the binary's law: Varshni, coth, linear or constant.
double gap_at(const Values& v, P gap, P alpha, P beta, P slope, double temperature);

/// Structure of the elements in the alloy.
Structure structure_of_alloy(const MaterialTable::Data& data, const Alloy& alloy);

/// Elements of a name like "InGaAs" without fractions; empty when it is none.
std::vector<int> elements_of(std::string_view name);

}  // namespace wellwright
