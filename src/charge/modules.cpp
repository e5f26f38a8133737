// SPDX-License-Identifier: Apache-2.0
// Modules, and the filling of any levels at the Fermi levels of a charge.
#include "charge/modules.hpp"

#include <algorithm>
#include <cmath>

#include "charge/subbands.hpp"

namespace wellwright {

std::vector<int> modules_of(const Study& study) {
  const auto& layers = study.stack.layers;
  std::vector<int> module(layers.size(), 0);
  if (study.model.filling == Filling::equilibrium) return module;
  int last = 0;
  for (std::size_t i = 0; i < layers.size(); ++i) {
    if (layers[i].copy > 0) last = layers[i].copy - 1;
    module[i] = last;
  }
  return module;
}

std::vector<int> modules_of_levels(const Levels& levels, const std::vector<int>& module_of_layer) {
  const int modules = *std::max_element(module_of_layer.begin(), module_of_layer.end()) + 1;
  std::vector<int> module;
  for (int i = 0; i < levels.count(); ++i) {
    Eigen::VectorXd share = Eigen::VectorXd::Zero(modules);
    for (Eigen::Index l = 0; l < levels.layer_probability.cols(); ++l)
      share[module_of_layer[static_cast<std::size_t>(l)]] += levels.layer_probability(i, l);
    Eigen::Index most = 0;
    share.maxCoeff(&most);
    module.push_back(static_cast<int>(most));
  }
  return module;
}

bool has_charge(const Study& study) {
  const Model& model = study.model;
  if (model.bottom.pinned || model.top.pinned) return true;
  for (const Layer& layer : study.stack.layers)
    if (layer.donors > 0 || layer.acceptors > 0) return true;
  if (!model.polarization) return false;
  return std::any_of(study.stack.bands.begin(), study.stack.bands.end(), [&](const BandParameters& bands) {
    return bands.polarization != study.stack.bands.front().polarization;
  });
}

Filled fill(const Study& study, const Levels& levels, const Dispersion& dispersion, const Charge& charge) {
  Filled filled;
  filled.carrier = levels.profile.carrier;
  filled.temperature = study.carrier_temperature;
  const std::vector<int> module = modules_of_levels(levels, modules_of(study));
  const bool electrons = filled.carrier == Carrier::electron;
  filled.fermi_level.resize(levels.count());
  filled.sheet_density.resize(levels.count());
  for (int i = 0; i < levels.count(); ++i) {
    const double fermi =
        charge.module_fermi_level[static_cast<std::size_t>(module[static_cast<std::size_t>(i)])];
    filled.fermi_level[i] = electrons ? fermi : levels.profile.hole_edge - fermi;
    const Eigen::VectorXd above = dispersion.energy.row(i).transpose().array() - levels.energy[i];
    filled.sheet_density[i] =
        subband_density(dispersion.k, above, filled.fermi_level[i] - levels.energy[i], filled.temperature);
  }
  return filled;
}

double widest_filled_k(const Charge& charge, Carrier carrier) {
  for (const Filled& filled : charge.filled)
    if (filled.carrier == carrier) return filled.widest_k;
  return 0;
}

}  // namespace wellwright
