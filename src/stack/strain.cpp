// SPDX-License-Identifier: Apache-2.0
// Net strain of a stack and the critical thicknesses of its layers.
#include <algorithm>
#include <cmath>
#include <limits>
#include <map>

#include "stack/blend.hpp"

namespace wellwright {
namespace {

// In-plane stress of a biaxially strained layer is M e: M = c11 + c12 - 2 c12^2/c11 on (001),
// c11 + c12 - 2 c13^2/c33 on (0001). J. F. Nye, Physical Properties of Crystals, Oxford (1957).
double biaxial_modulus(const Stack& stack, const Alloy& alloy) {
  const auto value = [&](const char* key) { return stack.table->value(alloy, key, stack.environment); };
  const double c11 = value("c11"), c12 = value("c12");
  if (stack.environment.growth_plane == GrowthPlane::zinc_blende_001) return c11 + c12 - 2 * c12 * c12 / c11;
  const double c13 = value("c13"), c33 = value("c33");
  return c11 + c12 - 2 * c13 * c13 / c33;
}

constexpr double unstrained =
    1e-6;  // in-plane strain below which no dislocation is worth its energy in any layer

struct Seen {
  Alloy alloy;
  StrainState state;
  double modulus = 0, total = 0, run = 0;
  std::size_t layer = 0;
  bool at_top = false;
};

}  // namespace

StrainReport strain_report(const Stack& stack) {
  StrainReport report;
  if (!stack.environment.strain || !stack.environment.substrate) return report;
  std::vector<Seen> seen;
  std::map<std::pair<std::string, std::array<double, 9>>, std::size_t> index;
  const auto find = [&](const Alloy& alloy) -> Seen& {
    const auto [at, unknown] = index.emplace(std::pair(alloy.text, alloy.fraction), seen.size());
    if (!unknown) return seen[at->second];
    Seen fresh;
    fresh.alloy = alloy;
    fresh.state = stack.table->strain(alloy, stack.environment);
    fresh.modulus = biaxial_modulus(stack, alloy);
    seen.push_back(fresh);
    return seen.back();
  };
  const auto same = [](const Layer& a, const Layer& b) {
    return !a.grading && !b.grading && a.material.text == b.material.text &&
           a.material.fraction == b.material.fraction;
  };
  const std::size_t count = stack.layers.size();
  for (std::size_t i = 0; i < count;) {
    std::size_t end = i + 1;
    double run = stack.layers[i].thickness;
    while (end < count && same(stack.layers[i], stack.layers[end])) run += stack.layers[end++].thickness;
    const Layer& layer = stack.layers[i];
    if (layer.grading) {  // half the thickness to each end: the mean of a linear grade
      find(layer.material).total += 0.5 * run;
      find(layer.grading->to).total += 0.5 * run;
    } else {
      Seen& known = find(layer.material);
      known.total += run;
      if (run > known.run) {
        known.run = run;
        known.layer = i;
        known.at_top = end == count;
      }
    }
    i = end;
  }
  double length = 0, stiffness = 0;
  for (const Seen& known : seen) {
    if (!std::isfinite(known.state.in_plane)) continue;
    length += known.total;
    report.mean_strain += known.total * known.state.in_plane;
    stiffness += known.total * known.modulus;
    report.stress_weighted_strain += known.total * known.modulus * known.state.in_plane;
    if (known.run <= 0 || std::abs(known.state.in_plane) < unstrained) continue;
    StrainReport::Row row;
    row.layer = static_cast<int>(known.layer);
    row.run = known.run;
    row.state = known.state;
    row.critical =
        known.at_top ? known.state.critical_thickness_overlayer : known.state.critical_thickness_buried;
    row.over = row.run > row.critical;
    report.rows.push_back(row);
  }
  if (length > 0) report.mean_strain /= length;
  if (stiffness > 0) report.stress_weighted_strain /= stiffness;
  return report;
}

}  // namespace wellwright
