// SPDX-License-Identifier: Apache-2.0
// First division of the stack into elements.
#include <algorithm>
#include <cmath>
#include <numbers>

#include "profile/point.hpp"

namespace wellwright {
namespace {

// With degree p the energy of exp(ikz) is wrong by (p! / (2p)!)^2 (kh)^2p / (2p + 1) of itself: 4e-8 for kh =
// 5 and p = 8 (M. Ainsworth, SIAM J. Numer. Anal. 42, 553 (2004)). A decaying tail weighs less.
constexpr double radians_per_element = 5, decay_lengths_per_element = 7;
constexpr double shrink = 0.2;  // elements towards a face where the grading is not analytic
constexpr int shrinking_elements = 8;
constexpr double narrowest = 1e-5;  // [nm] of a shrinking element: boundaries are known to 1e-14 nm
constexpr double mass_floor = 1e-3;

struct Slab {  // one layer as the division sees it
  double thickness, low, high, mass;
};

std::vector<Slab> slabs_of(const Study& study, Carrier carrier) {
  const Stack& stack = study.stack;
  double hole_edge = 0;
  if (carrier != Carrier::electron) {
    hole_edge = -1e300;
    for (std::size_t i = 0; i < stack.layers.size(); ++i) {
      hole_edge = std::max(hole_edge, hole_edge_of(stack.bands[i], carrier));
      if (stack.layers[i].grading)
        hole_edge = std::max(hole_edge, hole_edge_of(bands_in_layer(stack, static_cast<int>(i), 1), carrier));
    }
  }
  const double slope = carrier == Carrier::electron ? study.field : -study.field;
  std::vector<Slab> slabs;
  double z = 0;
  for (std::size_t i = 0; i < stack.layers.size(); ++i) {
    const Layer& layer = stack.layers[i];
    const Point bottom = point_of(stack.bands[i], carrier, Bands::one, hole_edge);
    Point top = bottom;
    if (layer.grading)
      top = point_of(bands_in_layer(stack, static_cast<int>(i), 1), carrier, Bands::one, hole_edge);
    const double u0 = bottom.edge + slope * z, u1 = top.edge + slope * (z + layer.thickness);
    slabs.push_back({layer.thickness, std::min(u0, u1), std::max(u0, u1),
                     std::max(1 / std::min(bottom.a0, top.a0), mass_floor)});
    z += layer.thickness;
  }
  return slabs;
}

// States below E in the WKB sense: (1/pi) sum of k L, with the edge spread evenly between low and high.
double states_below(const std::vector<Slab>& slabs, double E) {
  double sum = 0;
  for (const Slab& slab : slabs) {
    const double above = E - 0.5 * (slab.low + slab.high);
    const double room = above > 0 ? above : E > slab.low ? 0.5 * (E - slab.low) : 0;
    sum += slab.thickness * std::sqrt(room * slab.mass / constants::hbar2_over_2m0);
  }
  return sum / std::numbers::pi;
}

double energy_for(const std::vector<Slab>& slabs, int count) {
  double low = 1e300;
  for (const Slab& slab : slabs) low = std::min(low, slab.low);
  double step = 1e-3;
  while (states_below(slabs, low + step) < count + 1 && step < 1e3) step *= 1.5;
  return low + step;
}

}  // namespace

double guessed_top(const Study& study, Carrier carrier, int count) {
  return energy_for(slabs_of(study, carrier), count);
}

std::vector<std::vector<double>> first_cuts(const Study& study, Carrier carrier, double top) {
  const Stack& stack = study.stack;
  const auto slabs = slabs_of(study, carrier);
  double lowest = 1e300;
  for (const Slab& slab : slabs) lowest = std::min(lowest, slab.low);
  const double smear = stack.interdiffusion;
  std::vector<std::vector<double>> cuts(slabs.size());
  for (std::size_t i = 0; i < slabs.size(); ++i) {
    const Slab& slab = slabs[i];
    const auto wave_number = [&](double energy) {
      return std::sqrt(std::max(energy, 1e-3) * slab.mass / constants::hbar2_over_2m0);
    };
    double largest = std::min(radians_per_element / wave_number(top - slab.low),
                              decay_lengths_per_element / wave_number(slab.high - lowest));
    if (smear > 0) largest = std::min(largest, std::max(2 * smear, slab.thickness / 400));
    const int pieces = std::clamp(static_cast<int>(std::ceil(slab.thickness / largest - 1e-9)), 1, 4000);
    for (int j = 1; j < pieces; ++j) cuts[i].push_back(static_cast<double>(j) / pieces);
    if (!stack.layers[i].grading) continue;
    const double power = stack.layers[i].grading->power;
    if (power == std::floor(power)) continue;
    double part = 1.0 / pieces;
    for (int j = 0; j < shrinking_elements; ++j) {
      part *= shrink;
      if (part * slab.thickness < narrowest) break;
      cuts[i].push_back(stack.layers[i].grading->vertex_on_top ? 1 - part : part);
    }
    std::sort(cuts[i].begin(), cuts[i].end());
  }
  return cuts;
}

std::vector<std::vector<double>> halved(const std::vector<std::vector<double>>& cuts) {
  auto finer = cuts;
  for (auto& layer : finer) {
    std::vector<double> all{0};
    all.insert(all.end(), layer.begin(), layer.end());
    all.push_back(1);
    layer.clear();
    for (std::size_t j = 0; j + 1 < all.size(); ++j) {
      if (j > 0) layer.push_back(all[j]);
      layer.push_back(0.5 * (all[j] + all[j + 1]));
    }
  }
  return finer;
}

}  // namespace wellwright
