// SPDX-License-Identifier: Apache-2.0
// The studies of stacks.yaml, one for each carrier and band model.
#pragma once

#include <yaml-cpp/yaml.h>

#include <string>
#include <vector>

#include "wellwright/levels.hpp"

struct IdentityCase {
  std::string name;  // "coupled wells in a field, electron, two"
  wellwright::Study study;
  wellwright::Carrier carrier = wellwright::Carrier::electron;
  bool one_band() const {
    return carrier != wellwright::Carrier::electron || study.model.bands == wellwright::Bands::one;
  }
};

inline std::vector<IdentityCase> identity_cases() {
  static const wellwright::MaterialTable table;
  std::vector<IdentityCase> cases;
  for (const YAML::Node& entry : YAML::LoadFile(TEST_ROOT "/identities/stacks.yaml"))
    for (const YAML::Node& carrier : entry["carriers"])
      for (const YAML::Node& bands : entry["bands"]) {
        const std::string carrier_name = carrier.as<std::string>(), bands_name = bands.as<std::string>();
        if (carrier_name != "electron" && bands_name != "one") continue;
        wellwright::Notes notes;
        IdentityCase c;
        c.name = entry["name"].as<std::string>() + ", " + carrier_name + ", " + bands_name;
        c.study = wellwright::read_study(
            entry["study"].as<std::string>(), "study.yaml", table,
            {"model.carrier=" + carrier_name, "model.bands=" + bands_name, "model.accuracy=1e-10 eV"}, notes);
        c.carrier = c.study.model.carriers.front();
        cases.push_back(std::move(c));
      }
  return cases;
}

inline wellwright::Levels solve(const IdentityCase& c) {
  wellwright::Notes notes;
  return wellwright::solve_levels(c.study, c.carrier, notes, {});
}

/// The same stack grown the other way round, in the reversed field.
inline wellwright::Study mirrored(const wellwright::Study& study) {
  wellwright::Study mirror = study;
  mirror.field = -study.field;
  if (mirror.bias) mirror.bias = -*study.bias;
  std::vector<wellwright::Layer>& layers = mirror.stack.layers;
  std::vector<wellwright::Layer> reversed(layers.rbegin(), layers.rend());
  for (auto& layer : reversed)
    if (layer.grading) std::swap(layer.material, layer.grading->to);
  layers = reversed;
  wellwright::resolve_stack(mirror.stack, true);
  return mirror;
}
