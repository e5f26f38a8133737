// SPDX-License-Identifier: Apache-2.0
// Every key of the study file, declared once, in the order of the reference page.
#include "study/read.hpp"

namespace wellwright {
namespace {

std::vector<KeyDeclaration> own_keys() {
  using enum Dimension;
  return {
      {.path = "title", .type = "text", .sentence = "Free text, printed on top of every answer."},
      {.path = "carrier_temperature",
       .type = "quantity",
       .dimensions = {temperature},
       .sentence = "Temperature of the carriers that fill the levels; absent: `temperature`."},
      {.path = "field",
       .type = "quantity",
       .dimensions = {electric_field},
       .default_text = "0 kV/cm",
       .sentence = "Electric field along +z (growth direction): a positive field lifts electrons at the top.",
       .other_names = {"F", "E", "electric_field"}},
      {.path = "bias",
       .type = "quantity",
       .dimensions = {voltage},
       .sentence = "Potential of the top minus the bottom, instead of `field`: the field is -bias / length."},
      {.path = "model",
       .type = "map",
       .sentence = "How the carriers are described and which levels are wanted."},
      {.path = "model.carrier",
       .type = "word or list",
       .default_text = "electron",
       .allowed = {"electron", "heavy hole", "light hole"},
       .sentence = "The carrier, or a list of carriers.",
       .other_names = {"particle"}},
      {.path = "model.bands",
       .type = "word",
       .default_text = "two",
       .allowed = {"one", "two", "three"},
       .sentence =
           "Bands of the electron: one (constant mass), two or three (mass that grows with energy); holes "
           "always have one."},
      {.path = "model.ends",
       .type = "word",
       .default_text = "hard",
       .allowed = {"hard", "periodic"},
       .sentence = "What stands at the two outer faces: hard walls, or the same stack again.",
       .later = {{"open", 3}}},
      {.path = "model.levels",
       .type = "whole number or map",
       .default_text = "6",
       .sentence = "The levels wanted: a count from the lowest, a window {above: 0.1 eV, below: 0.3 eV}, or "
                   "{in: [wide well], count: 4}, the lowest that live mostly in those layers."},
      {.path = "model.levels.above",
       .type = "quantity",
       .dimensions = {energy},
       .sentence = "Lower edge of the window of energies; with `below`."},
      {.path = "model.levels.below",
       .type = "quantity",
       .dimensions = {energy},
       .sentence = "Upper edge of the window of energies."},
      {.path = "model.levels.in",
       .type = "list",
       .sentence =
           "Layers by name or number; the levels that have more than half their weight in them are wanted."},
      {.path = "model.levels.count",
       .type = "whole number",
       .default_text = "6",
       .sentence = "How many levels, with `in` or by itself."},
      {.path = "model.transitions",
       .type = "list",
       .sentence =
           "Pairs of levels listed in summaries and derivatives, such as [[1, 2], [1, 3]]; absent: all pairs "
           "of the lowest four."},
      {.path = "model.bloch_phases",
       .type = "whole number",
       .default_text = "51",
       .sentence = "Points over the Bloch phase from 0 to pi, for periodic ends."},
      {.path = "model.filling",
       .type = "word",
       .default_text = "equilibrium",
       .allowed = {"equilibrium", "per module"},
       .sentence = "How the levels are filled: one Fermi level, or one for each copy of a repeat, neutral by "
                   "itself."},
      {.path = "model.accuracy",
       .type = "quantity",
       .dimensions = {energy},
       .default_text = "1 ueV",
       .sentence = "Numerical error asked of each level; the grid is refined until the estimate meets it."},
      {.path = "model.charge",
       .type = "word",
       .default_text = "none",
       .allowed = {"none", "self-consistent"},
       .sentence = "The field of the stack's own charge: left out, or made consistent with the levels."},
      {.path = "model.faces",
       .type = "map",
       .sentence = "What the outer faces do to the potential, with `charge: self-consistent`: {bottom: flat, "
                   "top: {pinned: 0.7 eV}}."},
      {.path = "model.faces.bottom",
       .type = "word or map",
       .default_text = "flat",
       .allowed = {"flat"},
       .sentence =
           "The face next to the substrate: flat (no field of the stack's own outside), or {pinned: 0.7 "
           "eV}."},
      {.path = "model.faces.bottom.pinned",
       .type = "quantity",
       .dimensions = {energy},
       .sentence = "How far below the conduction edge the Fermi level lies at the face."},
      {.path = "model.faces.top",
       .type = "word or map",
       .default_text = "flat",
       .allowed = {"flat"},
       .sentence = "The upper face, likewise."},
      {.path = "model.faces.top.pinned",
       .type = "quantity",
       .dimensions = {energy},
       .sentence = "How far below the conduction edge the Fermi level lies at the face."},
      {.path = "model.exchange_correlation",
       .type = "word",
       .default_text = "none",
       .allowed = {"none", "hedin-lundqvist"},
       .sentence = "Exchange and correlation of the electrons in the local density, with `charge: "
                   "self-consistent`."},
      {.path = "model.polarization",
       .type = "on|off",
       .default_text = "on",
       .sentence = "Spontaneous and piezoelectric polarization of wurtzite layers."},
      {.path = "absorption", .type = "map", .sentence = "Absorption between levels.", .step = 2},
      {.path = "scattering", .type = "map", .sentence = "Scattering rates and lifetimes.", .step = 3},
      {.path = "dynamics", .type = "map", .sentence = "What happens in time after a start."},
      {.path = "dynamics.start",
       .type = "map",
       .sentence = "The state at t = 0: exactly one of the starts below."},
      {.path = "dynamics.start.packet", .type = "map", .sentence = "A Gaussian packet."},
      {.path = "dynamics.start.packet.centre",
       .type = "quantity",
       .dimensions = {length},
       .sentence = "Mean position, counted from the bottom face."},
      {.path = "dynamics.start.packet.spread",
       .type = "quantity",
       .dimensions = {length},
       .sentence = "Rms width of the probability density."},
      {.path = "dynamics.start.packet.wavenumber",
       .type = "quantity",
       .dimensions = {inverse_length},
       .default_text = "0 nm^-1",
       .sentence = "Mean wavenumber; positive moves up."},
      {.path = "dynamics.start.mix",
       .type = "list",
       .sentence = "A mix of levels: [{level: 1, amplitude: 1}, {level: 2, amplitude: 1, phase: 90 deg}]."},
      {.path = "dynamics.start.mix[].level",
       .type = "whole number",
       .sentence = "The level, counted from 1."},
      {.path = "dynamics.start.mix[].amplitude",
       .type = "number",
       .dimensions = {number},
       .default_text = "1",
       .sentence = "Its amplitude; the mix is normalised."},
      {.path = "dynamics.start.mix[].phase",
       .type = "quantity",
       .dimensions = {angle},
       .default_text = "0 deg",
       .sentence = "The phase of its amplitude."},
      {.path = "dynamics.start.localized",
       .type = "map",
       .sentence = "The combination of the lowest levels with the largest probability in a layer."},
      {.path = "dynamics.start.localized.layer", .type = "text", .sentence = "The layer by name or number."},
      {.path = "dynamics.start.localized.levels",
       .type = "whole number",
       .default_text = "2",
       .sentence = "How many of the lowest levels are combined."},
      {.path = "dynamics.start.field_step",
       .type = "map",
       .sentence = "A level of the stack at another field, released at t = 0."},
      {.path = "dynamics.start.field_step.field",
       .type = "quantity",
       .dimensions = {electric_field},
       .sentence = "The field before t = 0."},
      {.path = "dynamics.start.field_step.level",
       .type = "whole number",
       .default_text = "1",
       .sentence = "The level at that field."},
      {.path = "dynamics.start.photoexcited",
       .type = "map",
       .sentence = "The electron that a short pulse lifts out of a hole level; only the electron moves."},
      {.path = "dynamics.start.photoexcited.hole",
       .type = "word",
       .default_text = "heavy hole",
       .allowed = {"heavy hole", "light hole"},
       .sentence = "The kind of hole."},
      {.path = "dynamics.start.photoexcited.level",
       .type = "whole number",
       .default_text = "1",
       .sentence = "The hole level."},
      {.path = "dynamics.start.photoexcited.photon_energy",
       .type = "quantity",
       .dimensions = {energy, length, frequency, inverse_length},
       .sentence =
           "Centre of the pulse's spectrum as an energy, wavelength, frequency or wavenumber; absent: the "
           "strongest line."},
      {.path = "dynamics.start.photoexcited.duration",
       .type = "quantity",
       .dimensions = {time},
       .default_text = "100 fs",
       .sentence = "Full width at half maximum of the pulse's intensity."},
      {.path = "dynamics.start.pulse", .type = "map", .sentence = "A pulse on the filled levels.", .step = 4},
      {.path = "dynamics.duration",
       .type = "quantity",
       .dimensions = {time},
       .default_text = "10 ps",
       .sentence = "How long the motion is followed."},
      {.path = "dynamics.samples",
       .type = "whole number",
       .default_text = "2001",
       .sentence = "Points in time, both ends included."},
      {.path = "dynamics.density_map",
       .type = "on|off",
       .default_text = "on",
       .sentence = "Whether the probability density over z and t is stored."},
      {.path = "dynamics.method",
       .type = "word",
       .default_text = "superposition",
       .allowed = {"superposition"},
       .sentence = "How the motion is computed.",
       .later = {{"stepping", 4}, {"density matrix", 4}}},
      {.path = "dynamics.dephasing", .type = "map", .sentence = "Loss of phase.", .step = 4},
      {.path = "dynamics.relaxation", .type = "word", .sentence = "Relaxation between levels.", .step = 4},
      {.path = "dynamics.drive", .type = "map", .sentence = "A steady driving field.", .step = 4},
      {.path = "dynamics.probe", .type = "map", .sentence = "A probe pulse.", .step = 4},
      {.path = "sweep", .type = "list", .sentence = "Values that are varied.", .step = 5},
      {.path = "targets", .type = "map", .sentence = "What the stack is to reach.", .step = 5},
      {.path = "tolerance", .type = "map", .sentence = "What growth error does.", .step = 5},
      {.path = "growth_rates", .type = "map", .sentence = "Growth rates of the binaries.", .step = 5},
      {.path = "measured", .type = "map", .sentence = "Measured lines to fit.", .step = 5},
  };
}

}  // namespace

// Top-level keys in the order of the page, those of the stack among the others.
const Declarations& study_declarations() {
  static const Declarations declarations([] {
    static const char* const order[] = {
        "title",    "substrate", "growth_plane", "temperature", "carrier_temperature", "field",
        "bias",     "materials", "layers",       "model",       "absorption",          "scattering",
        "dynamics", "sweep",     "targets",      "tolerance",   "growth_rates",        "measured"};
    const auto own = own_keys();
    std::vector<KeyDeclaration> keys;
    const auto take = [&](const std::vector<KeyDeclaration>& from, const std::string& top) {
      for (const auto& key : from)
        if (key.path == top || key.path.starts_with(top + ".") || key.path.starts_with(top + "["))
          keys.push_back(key);
    };
    for (const std::string top : order) {
      take(own, top);
      take(stack_keys(), top);
    }
    return keys;
  }());
  return declarations;
}

const std::vector<KeyDeclaration>& study_keys() {
  return study_declarations().all();
}

}  // namespace wellwright
