// SPDX-License-Identifier: Apache-2.0
// The layer stack in growth order: repeats unrolled, monolayers converted, donors placed, media resolved.
#pragma once

#include <memory>
#include <optional>
#include <string>
#include <vector>

#include "wellwright/materials.hpp"

namespace wellwright {

/// How a graded layer runs between its ends. `power` q: y = y_vertex + (y_far - y_vertex) t^q, t measured
/// from the vertex, the face with the lower conduction-band edge (`from` when equal). Linear: q = 1,
/// parabolic: q = 2.
struct Grading {
  Alloy to;
  double power = 1;
};

struct Layer {
  std::string name;  ///< "" when the user gave none
  int copy = 0;      ///< 1, 2, ... inside a repeat; 0 outside
  Alloy material;    ///< of a uniform layer, or the bottom face (`from`) of a graded one
  std::optional<Grading> grading;
  double thickness = 0;              ///< [nm]
  double monolayer = 0;              ///< thickness of one monolayer of this layer [nm]
  double donors = 0, acceptors = 0;  ///< sheet density [nm^-2], spread evenly over the layer
  Place place;                       ///< in the study file
  /// "wide well", "wide well[2]" or "3 (GaAs)" for tables and messages; `number` counts from 1.
  std::string label(int number) const;
};

/// The resolved stack. z = 0 is the bottom face; layer i spans [bottom(i), bottom(i) + thickness].
struct Stack {
  std::vector<Layer> layers;
  Environment environment;
  std::shared_ptr<const MaterialTable> table;
  double interdiffusion = 0;          ///< rms width of the smearing [nm]
  double zero_of_energy = 0;          ///< on the table's scale; subtracted from every edge handed out [eV]
  std::vector<BandParameters> bands;  ///< of each layer at its bottom face, unsmeared, from the zero

  double length() const;
  std::vector<double> faces() const;  ///< layer boundaries, size layers + 1
  bool uniform() const;               ///< no grading anywhere and no smearing
};

/// Parameters inside layer `layer` (0-based) at the part `t` (0..1) of its thickness, grading included,
/// unsmeared.
BandParameters bands_in_layer(const Stack& stack, int layer, double t);
/// Parameters at z [nm] with the sublattice fractions smeared by a Gaussian of the stack's interdiffusion.
BandParameters bands_smeared(const Stack& stack, double z);

/// Builds the stack from the study's `layers`, `substrate`, ... nodes. `root` is the whole study.
/// Throws InputError.
Stack read_stack(const Node& root, const MaterialTable& table, Notes& notes);

/// Resolves `bands`, `monolayer` and the zero again after `layers` or `environment` was changed in memory
/// (`keep_zero` leaves zero_of_energy, as in sweeps and derivatives).
void resolve_stack(Stack& stack, bool keep_zero);

/// Limits on hostile input.
inline constexpr int largest_layer_count = 100'000;

}  // namespace wellwright
