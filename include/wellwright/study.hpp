// SPDX-License-Identifier: Apache-2.0
// Conditions, model and questions of a study as plain structs, and the reader that makes them from the study
// file.
#pragma once

#include <optional>
#include <string>
#include <utility>
#include <variant>
#include <vector>

#include "wellwright/stack.hpp"

namespace wellwright {

enum class Carrier { electron, heavy_hole, light_hole };
enum class Bands { one = 1, two = 2, three = 3 };
enum class Ends { hard, periodic };

std::string_view name_of(Carrier carrier);  ///< "electron", "heavy hole", "light hole"

/// Which levels are wanted. Exactly one way: a count from the lowest; a window; or the lowest `count` that
/// live mostly in some layers.
struct LevelRequest {
  std::optional<int> count = 6;
  std::optional<double> above, below;  ///< window [eV]
  std::vector<int> in_layers;          ///< 0-based; with `count`
};

struct Model {
  std::vector<Carrier> carriers{Carrier::electron};
  Bands bands = Bands::two;
  Ends ends = Ends::hard;
  LevelRequest levels;
  std::vector<std::pair<int, int>> transitions;  ///< counted from 1; empty: all pairs of the lowest four
  int bloch_phases = 51;
  double accuracy = 1e-6;  ///< [eV]
};

/// Starts of the dynamics, one struct each.
struct PacketStart {
  double centre = 0, spread = 0, wavenumber = 0;
};  // nm, nm, nm^-1
struct MixStart {
  struct Part {
    int level = 1;
    double amplitude = 1, phase = 0;
  };
  std::vector<Part> parts;
};  // phase in rad
struct LocalizedStart {
  std::vector<int> layers;
  int levels = 2;
};  // 0-based layers
struct FieldStepStart {
  double field = 0;
  int level = 1;
};  // V/nm
struct PhotoexcitedStart {
  Carrier hole = Carrier::heavy_hole;
  int level = 1;
  std::optional<double> photon_energy;  // eV; default: the strongest line
  double duration = 0.1;                // ps, full width at half maximum of the intensity
};
using Start = std::variant<PacketStart, MixStart, LocalizedStart, FieldStepStart, PhotoexcitedStart>;

struct DynamicsRequest {
  Start start;
  double duration = 10;  ///< [ps]
  int samples = 2001;
  bool density_map = true;
  Place place;  ///< of the start, for errors found later
};

struct Study {
  std::string title;
  std::string text;  ///< the whole study file
  std::string file;
  std::vector<std::string> settings;  ///< the --set list
  Stack stack;
  double field = 0;  ///< F along +z [V/nm]
  std::optional<double>
      bias;  ///< when given: potential of the top minus the bottom [V], and field = -bias / length
  Model model;
  std::optional<DynamicsRequest> dynamics;
};

/// Reads a study from YAML text. `settings` are "path=value" texts applied first. Throws InputError.
Study read_study(const std::string& text, const std::string& file, const MaterialTable& table,
                 const std::vector<std::string>& settings, Notes& notes);

/// Every key of the study file, as declared (for defaults, the reference page, the editor's schema).
const std::vector<KeyDeclaration>& study_keys();

}  // namespace wellwright
