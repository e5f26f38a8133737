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

enum class Filling { equilibrium, per_module };

/// What one outer face does to the potential.
struct FaceCondition {
  std::optional<double> pinned;  ///< conduction edge minus Fermi level at the face [eV]; absent: flat
};

struct Model {
  std::vector<Carrier> carriers{Carrier::electron};
  Bands bands = Bands::two;
  Ends ends = Ends::hard;
  LevelRequest levels;
  std::vector<std::pair<int, int>> transitions;  ///< counted from 1; empty: all pairs of the lowest four
  int bloch_phases = 51;
  double accuracy = 1e-6;  ///< [eV]
  Filling filling = Filling::equilibrium;
  bool self_consistent = false;       ///< the field of the stack's own charge
  FaceCondition bottom, top;          ///< only with `self_consistent`
  bool exchange_correlation = false;  ///< Hedin and Lundqvist, only with `self_consistent`
  bool polarization = true;           ///< of wurtzite layers
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
  double carrier_temperature = 300;  ///< [K]
  double field = 0;                  ///< F along +z [V/nm]
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

/// One value in force, for `check`: as the study writes it, or the declared default.
struct EffectiveValue {
  std::string path;         ///< "model.accuracy"
  std::string value;        ///< "1 ueV"
  bool by_default = false;  ///< not written in the study
  bool by_setting = false;  ///< from --set
};
/// The values of conditions, model and dynamics in force, in the order of study_keys(); layers and materials
/// are not among them. Keys without default that the study leaves out are left out here too.
std::vector<EffectiveValue> effective_values(const Study& study);

/// What an address such as "field", "temperature" or "layers.wide well.thickness" measures. Throws InputError
/// at `place` for an address that is none, with the nearest candidates.
Dimension dimension_of_address(const Study& study, std::string_view address, const Place& place);
/// The value at an address [internal unit]; of the first copy where a name has several. Throws InputError.
double value_at(const Study& study, std::string_view address, const Place& place = {});
/// The study with another value [internal unit] at an address: field, bias, temperature,
/// model.interdiffusion, model.offset_ratio, layers.N.thickness, .composition, .from.composition,
/// .to.composition, .donors, .acceptors (sheet densities). A name sets all its copies. The zero of energy
/// stays; the key the user wrote (field or bias) keeps its value. The text stays that of the file. Throws
/// InputError.
Study with_value(const Study& study, std::string_view address, double value, const Place& place = {});

/// Limits on hostile input.
inline constexpr int largest_level_count = 1000;
inline constexpr int largest_sample_count = 1'000'000;
inline constexpr int largest_phase_count = 10'001;

}  // namespace wellwright
