// SPDX-License-Identifier: Apache-2.0
// Band parameters of the layers and inside them, and the zero of energy.
#include <algorithm>
#include <cmath>
#include <limits>
#include <map>

#include "stack/blend.hpp"

namespace wellwright {
namespace {

using Fractions = std::array<double, 9>;

// Alloys that resolve to the same values: the same name and the same fractions.
struct AlloyKey {
  std::string text;
  Fractions fraction;
  auto operator<=>(const AlloyKey&) const = default;
};
AlloyKey key_of(const Alloy& alloy) {
  return {alloy.is_medium() ? alloy.medium : alloy.text, alloy.fraction};
}

template <class Value>
class Cache {
 public:
  template <class Make>
  const Value& get(const Alloy& alloy, Make make) {
    if (last_ != values_.end() && last_->first == key_of(alloy)) return last_->second;
    AlloyKey key = key_of(alloy);
    last_ = values_.find(key);
    if (last_ == values_.end()) last_ = values_.emplace(std::move(key), make(alloy)).first;
    return last_->second;
  }

 private:
  std::map<AlloyKey, Value> values_;
  typename std::map<AlloyKey, Value>::iterator last_ = values_.end();
};

// Every alloy at a face of a layer, bottom to top, each once.
std::vector<Alloy> alloys_of(const Stack& stack) {
  std::vector<Alloy> alloys;
  Cache<bool> seen;
  const auto take = [&](const Alloy& alloy) {
    seen.get(alloy, [&](const Alloy& fresh) {
      alloys.push_back(fresh);
      return true;
    });
  };
  for (const Layer& layer : stack.layers) {
    take(layer.material);
    if (layer.grading) take(layer.grading->to);
  }
  return alloys;
}

// The unstrained gap of the alloy of lowest gap, to which offset_ratio refers.
double reference_gap(const MaterialTable& table, Environment environment, const std::vector<Alloy>& alloys) {
  environment.strain = false;
  environment.offset_ratio.reset();
  double lowest = std::numeric_limits<double>::infinity();
  for (const Alloy& alloy : alloys)
    if (!alloy.is_medium() && !table.edge_is_final(alloy))
      lowest = std::min(lowest, table.resolve(alloy, environment).band_gap);
  return std::isfinite(lowest) ? lowest : 0;
}

// The lowest strained conduction edge among the media of the table, without overrides; 0 where there is none.
double find_zero(const Stack& stack, const std::vector<Alloy>& alloys) {
  const MaterialTable& plain = stack.scale_table ? *stack.scale_table : *stack.table;
  if (std::all_of(alloys.begin(), alloys.end(),
                  [&](const Alloy& a) { return stack.table->edge_is_final(a); }))
    return 0;  // the numbers of the study are the scale
  Environment environment = stack.environment;
  std::vector<Alloy> tabled;
  for (const Alloy& alloy : alloys)
    if (!alloy.is_medium()) tabled.push_back(alloy);
  if (environment.offset_ratio) environment.offset_reference_gap = reference_gap(plain, environment, tabled);
  double lowest = std::numeric_limits<double>::infinity();
  for (const Alloy& alloy : tabled)
    lowest = std::min(lowest, plain.resolve(alloy, environment).conduction_band_edge);
  return std::isfinite(lowest) ? lowest : 0;
}

}  // namespace

double part_of_way(const Grading& grading, double t) {
  const auto power = [&](double s) {
    if (grading.power == 1) return s;
    if (grading.power == 2) return s * s;
    return s < 0 ? -std::pow(-s, grading.power) : std::pow(s, grading.power);  // continued past the vertex
  };
  return grading.vertex_on_top ? 1 - power(1 - t) : power(t);
}

BandParameters bands_of(const Stack& stack, const Alloy& alloy) {
  BandParameters bands = stack.table->resolve(alloy, stack.environment);
  if (!stack.table->edge_is_final(alloy))
    for (const auto edge : all_edges) bands.*edge -= stack.zero_of_energy;
  return bands;
}

BandParameters correction_of(const Stack& stack, const Alloy& alloy) {
  BandParameters correction;
  if (!stack.scale_table) return correction;
  add(correction, 1, bands_of(stack, alloy));
  add(correction, -1, bands_of(stack, mixture(alloy.fraction)));
  for (const auto member : all_parameters)  // what the mixture does not know, its neighbours do not either
    if (!std::isfinite(correction.*member)) correction.*member = 0;
  return correction;
}

BandParameters bands_in_layer(const Stack& stack, int layer, double t) {
  const Layer& at = stack.layers[static_cast<std::size_t>(layer)];
  if (!at.grading) return bands_of(stack, at.material);
  const double part = part_of_way(*at.grading, t);
  const Alloy &from = at.material, &to = at.grading->to;
  if (!from.is_medium() && !to.is_medium()) {
    Fractions fraction{};
    for (std::size_t e = 0; e < fraction.size(); ++e)
      fraction[e] = (1 - part) * from.fraction[e] + part * to.fraction[e];
    BandParameters bands = bands_of(stack, mixture(fraction));
    if (stack.scale_table) {
      add(bands, 1 - part, correction_of(stack, from));
      add(bands, part, correction_of(stack, to));
    }
    return bands;
  }
  BandParameters bands;
  add(bands, 1 - part, bands_of(stack, from));
  add(bands, part, bands_of(stack, to));
  return bands;
}

void resolve_stack(Stack& stack, bool keep_zero) {
  const auto alloys = alloys_of(stack);
  if (stack.environment.offset_ratio)
    stack.environment.offset_reference_gap = reference_gap(*stack.table, stack.environment, alloys);
  if (!keep_zero) stack.zero_of_energy = find_zero(stack, alloys);
  Cache<BandParameters> bands;
  Cache<double> monolayers;
  const auto resolved = [&](const Alloy& alloy) -> const BandParameters& {
    return bands.get(alloy, [&](const Alloy& fresh) { return bands_of(stack, fresh); });
  };
  const auto monolayer = [&](const Alloy& alloy) {
    return monolayers.get(
        alloy, [&](const Alloy& fresh) { return stack.table->monolayer(fresh, stack.environment); });
  };
  stack.bands.resize(stack.layers.size());
  for (std::size_t i = 0; i < stack.layers.size(); ++i) {
    Layer& layer = stack.layers[i];
    layer.monolayer = monolayer(layer.material);
    stack.bands[i] = resolved(layer.material);
    if (!layer.grading) continue;
    layer.monolayer = 0.5 * (layer.monolayer + monolayer(layer.grading->to));
    layer.grading->vertex_on_top =
        resolved(layer.grading->to).conduction_band_edge < stack.bands[i].conduction_band_edge;
  }
}

}  // namespace wellwright
