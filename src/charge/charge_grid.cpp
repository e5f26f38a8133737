// SPDX-License-Identifier: Apache-2.0
// One division of the stack that serves every carrier.
#include "charge/charge_grid.hpp"

#include <algorithm>

namespace wellwright {
namespace {

constexpr int charge_degree = 12;
constexpr double reach_kT = 28;  // exp(-28): the tail of the carriers

}  // namespace

Grid charge_grid(const Study& study, const std::vector<Carrier>& carriers, int levels) {
  std::vector<double> all = study.stack.faces();
  const auto faces = all;
  for (const Carrier carrier : carriers) {
    const double top =
        guessed_top(study, carrier, levels) + reach_kT * constants::boltzmann * study.carrier_temperature / 4;
    const Grid one = make_grid(faces, first_cuts(study, carrier, top), 1);
    all.insert(all.end(), one.boundaries.begin(), one.boundaries.end());
  }
  std::sort(all.begin(), all.end());
  std::vector<std::vector<double>> cuts(faces.size() - 1);
  std::size_t layer = 0;
  double last = faces[0];
  for (const double z : all) {
    while (layer + 1 < faces.size() - 1 && z >= faces[layer + 1] - 1e-9) ++layer;
    const double thickness = faces[layer + 1] - faces[layer];
    if (z - faces[layer] < 1e-6 * thickness || faces[layer + 1] - z < 1e-6 * thickness) continue;
    if (!cuts[layer].empty() && z - last < 0.02 * thickness) continue;
    cuts[layer].push_back((z - faces[layer]) / thickness);
    last = z;
  }
  return make_grid(faces, cuts, charge_degree);
}

}  // namespace wellwright
