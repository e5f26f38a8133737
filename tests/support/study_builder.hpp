// SPDX-License-Identifier: Apache-2.0
// A study file and a Study from a plain stack, every medium defined outright, so that no table value enters.
#pragma once

#include <cstdio>
#include <map>
#include <string>

#include "support/plain_stack.hpp"
#include "wellwright/levels.hpp"

namespace plain {

/// All digits of a double, so that the program reads the same number.
inline std::string digits(double value) {
  char text[40];
  std::snprintf(text, sizeof text, "%.17g", value);
  return text;
}

/// `medium` as the electron or the hole of this stack sees it. For holes the valence edge lies at -edge and
/// the conduction edge at 1.5 eV + edge, so that a grading starts from the same face for both.
inline std::string medium_yaml(const Medium& medium, const Stack& stack) {
  const bool electron = stack.carrier == Carrier::electron;
  const double gap = electron ? medium.gap : 1.5 + 2 * medium.edge;
  std::string text = "{conduction_band_edge: " + digits(electron ? medium.edge : 1.5 + medium.edge) +
                     " eV, band_gap: " + digits(gap) +
                     " eV, spin_orbit_splitting: " + digits(medium.split_off) + " eV, permittivity: 12.9";
  const char* kind = electron                               ? "electron"
                     : stack.carrier == Carrier::heavy_hole ? "heavy_hole"
                                                            : "light_hole";
  text += ", " + std::string(kind) + "_mass: " + digits(medium.mass) + ", " + kind +
          "_in_plane_mass: " + digits(medium.across());
  return text + "}";
}

/// The study file of a stack; `levels` as in model: levels.
inline std::string study_yaml(const Stack& stack, const std::string& levels, const std::string& accuracy) {
  std::map<std::string, std::string> names;
  std::string materials, layers;
  const auto name_of = [&](const Medium& medium) {
    const std::string text = medium_yaml(medium, stack);
    const auto found = names.find(text);
    if (found != names.end()) return found->second;
    std::string name = "Medium";
    name += std::to_string(names.size() + 1);
    materials += "  ";
    materials += name;
    materials += ": ";
    materials += text;
    materials += "\n";
    return names[text] = name;
  };
  for (const Layer& layer : stack.layers) {
    const std::string bottom = name_of(layer.medium);
    layers += "  - {";
    if (layer.graded)
      layers += "graded: {from: " + bottom + ", to: " + name_of(layer.top) +
                ", shape: {power: " + digits(layer.power) + "}}";
    else
      layers += "material: " + bottom;
    if (!layer.name.empty()) layers += ", name: " + layer.name;
    layers += ", thickness: " + digits(layer.thickness) + " nm}\n";
  }
  const char* carriers[] = {"electron", "heavy hole", "light hole"};
  const char* bands[] = {"one", "two", "three"};
  std::string text = "materials:\n" + materials + "layers:\n" + layers;
  if (stack.field != 0) text += "field: " + digits(stack.field) + " V/nm\n";
  text += "model:\n  carrier: " + std::string(carriers[static_cast<int>(stack.carrier)]) +
          "\n  bands: " + bands[stack.bands - 1] + "\n  ends: " + (stack.periodic ? "periodic" : "hard") +
          "\n  levels: " + levels + "\n  accuracy: " + accuracy + "\n";
  return text;
}

inline wellwright::Study study_of(const Stack& stack, const std::string& levels = "6",
                                  const std::string& accuracy = "1e-9 eV") {
  static const wellwright::MaterialTable table;
  wellwright::Notes notes;
  return wellwright::read_study(study_yaml(stack, levels, accuracy), "study.yaml", table, {}, notes);
}

inline wellwright::Carrier carrier_of(const Stack& stack) {
  constexpr wellwright::Carrier carriers[] = {wellwright::Carrier::electron, wellwright::Carrier::heavy_hole,
                                              wellwright::Carrier::light_hole};
  return carriers[static_cast<int>(stack.carrier)];
}

/// What the references need to know of a study of uniform, unsmeared layers, table values included.
inline Stack stack_of(const wellwright::Study& study, wellwright::Carrier carrier) {
  const wellwright::Stack& from = study.stack;
  Stack stack;
  stack.field = study.field;
  stack.carrier = static_cast<Carrier>(carrier);
  const bool electron = carrier == wellwright::Carrier::electron,
             heavy = stack.carrier == Carrier::heavy_hole;
  stack.bands = electron ? static_cast<int>(study.model.bands) : 1;
  stack.periodic = study.model.ends == wellwright::Ends::periodic;
  double highest = -1e300;
  for (const auto& b : from.bands) highest = std::max(highest, heavy ? b.heavy_hole_edge : b.light_hole_edge);
  for (std::size_t i = 0; i < from.layers.size(); ++i) {
    const wellwright::BandParameters& b = from.bands[i];
    Medium m;
    m.gap = b.band_gap, m.split_off = b.spin_orbit_splitting;
    if (electron) {
      m.edge = b.conduction_band_edge, m.mass = b.electron_mass, m.in_plane_mass = b.electron_in_plane_mass;
      const double upper = stack.bands == 3 ? b.light_hole_edge : b.mean_valence_edge;
      m.valence_shift = upper - (m.edge - m.gap);
      m.split_off_shift = b.split_off_edge - (m.edge - m.gap - m.split_off);
    } else {
      m.edge = highest - (heavy ? b.heavy_hole_edge : b.light_hole_edge);
      m.mass = heavy ? b.heavy_hole_mass : b.light_hole_mass;
      m.in_plane_mass = heavy ? b.heavy_hole_in_plane_mass : b.light_hole_in_plane_mass;
    }
    stack.layers.push_back(uniform(m, from.layers[i].thickness));
  }
  return stack;
}

/// Levels of a plain stack as the program finds them.
inline wellwright::Levels levels_of(const Stack& stack, const std::string& levels = "6",
                                    const std::string& accuracy = "1e-9 eV") {
  wellwright::Notes notes;
  return wellwright::solve_levels(study_of(stack, levels, accuracy), carrier_of(stack), notes, {});
}

}  // namespace plain
