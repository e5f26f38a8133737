// SPDX-License-Identifier: Apache-2.0
// The layer stack in growth order: repeats unrolled, monolayers converted, donors placed, media resolved.
#pragma once

#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "wellwright/input/declared.hpp"
#include "wellwright/materials.hpp"

namespace wellwright {

/// How a graded layer runs between its ends. `power` q: y = y_vertex + (y_far - y_vertex) t^q, t measured
/// from the vertex, the face with the lower conduction-band edge (`from` when equal). Linear: q = 1,
/// parabolic: q = 2.
struct Grading {
  Alloy to;
  double power = 1;
  bool vertex_on_top = false;  ///< found by resolve_stack
};

struct Layer {
  std::string name;  ///< "" when the user gave none
  int copy = 0;      ///< 1, 2, ... inside a repeat; 0 outside
  Alloy material;    ///< of a uniform layer, or the bottom face (`from`) of a graded one
  std::optional<Grading> grading;
  double thickness = 0;  ///< [nm]
  double monolayer =
      0;  ///< thickness of one monolayer of this layer [nm]; NaN where the lattice is not known
  double donors = 0, acceptors = 0;  ///< sheet density [nm^-2], spread evenly over the layer
  bool donors_by_volume = false,
       acceptors_by_volume = false;  ///< written so: the sheet follows the thickness
  Place place;                       ///< in the study file
  /// "wide well", "wide well[2]" or "3 (GaAs)" for tables and messages; `number` counts from 1.
  std::string label(int number) const;
};

/// The resolved stack. z = 0 is the bottom face; layer i spans [bottom(i), bottom(i) + thickness].
struct Stack {
  std::vector<Layer> layers;
  Environment environment;
  std::shared_ptr<const MaterialTable> table;
  std::shared_ptr<const MaterialTable> scale_table;  ///< without overrides, for the zero; null: `table`
  double interdiffusion = 0;                         ///< rms width of the smearing [nm]
  bool periodic = false;                             ///< the smearing goes round from the top to the bottom
  double zero_of_energy = 0;          ///< on the table's scale; subtracted from every edge handed out [eV]
  std::vector<BandParameters> bands;  ///< of each layer at its bottom face, unsmeared, from the zero

  double length() const;
  std::vector<double> faces() const;  ///< layer boundaries, size layers + 1
  bool uniform() const;               ///< no grading anywhere and no smearing
};

/// Parameters of `alloy` under the stack's conditions, edges from its zero (explicit edges of the study as
/// they are).
BandParameters bands_of(const Stack& stack, const Alloy& alloy);
/// Parameters inside layer `layer` (0-based) at the part `t` (0..1) of its thickness, grading included,
/// unsmeared. Resolved anew from `layers`; t slightly outside continues the grading.
BandParameters bands_in_layer(const Stack& stack, int layer, double t);
/// Parameters at z [nm] with the sublattice fractions smeared by a Gaussian of the stack's interdiffusion.
BandParameters bands_smeared(const Stack& stack, double z);
/// The same at many points; the layers' faces are added up once.
std::vector<BandParameters> bands_smeared(const Stack& stack, const std::vector<double>& z);

/// Builds the stack from the study's `layers`, `substrate`, ... nodes. `root` is the whole study.
/// Throws InputError.
Stack read_stack(const Node& root, const MaterialTable& table, Notes& notes);

/// Resolves `bands`, `monolayer` and the zero again after `layers` or `environment` was changed in memory
/// (`keep_zero` leaves zero_of_energy, as in sweeps and derivatives).
void resolve_stack(Stack& stack, bool keep_zero);

/// The 0-based layers that an address means: a name (all its copies), a name with its copy ("wide well[2]"),
/// or a number counted from 1 after repeats are unrolled. Throws InputError at `place` with the nearest
/// names.
std::vector<int> find_layers(const Stack& stack, std::string_view address, const Place& place);

/// Strain of a stack grown on a substrate, for `check`.
struct StrainReport {
  struct Row {
    int layer = 0;   ///< 0-based, the thickest run of this alloy
    double run = 0;  ///< thickness of that run of neighbours of one alloy [nm]
    StrainState state;
    double critical = 0;  ///< Matthews-Blakeslee for where the run lies [nm]
    bool over = false;
  };
  std::vector<Row> rows;   ///< one for each strained alloy, in order of first appearance
  double mean_strain = 0;  ///< in-plane strain averaged over the thickness
  double stress_weighted_strain =
      0;  ///< averaged with the biaxial moduli: zero when strain is balanced; NaN: unknown
};
StrainReport strain_report(const Stack& stack);

/// The keys of the study file that make the stack, in the order of the reference page.
const std::vector<KeyDeclaration>& stack_keys();

/// Limits on hostile input.
inline constexpr int largest_layer_count = 100'000;
inline constexpr double smallest_thickness = 1e-3;  ///< of one layer [nm]
inline constexpr double largest_thickness = 1e6;    ///< of one layer [nm]

}  // namespace wellwright
