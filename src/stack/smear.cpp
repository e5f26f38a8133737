// SPDX-License-Identifier: Apache-2.0
// Interdiffusion: sublattice fractions convolved with a Gaussian, the mixture resolved at each point.
#include <algorithm>
#include <cmath>
#include <numbers>

#include "stack/blend.hpp"

namespace wellwright {
namespace {

constexpr double reach = 8.5;  // smearing lengths; the Gaussian holds less than 2e-17 beyond

double density(double x) {
  return std::exp(-0.5 * x * x) / std::sqrt(2 * std::numbers::pi);
}
double below(double x) {
  return 0.5 * std::erfc(-x / std::numbers::sqrt2);
}
// The normal distribution between x0 <= x1, without cancellation in the upper tail.
double between(double x0, double x1) {
  return x0 > 0 ? below(-x0) - below(-x1) : below(x1) - below(x0);
}

// The eight-point Gauss-Legendre rule: M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions
// (1964), table 25.4.
constexpr double gauss_nodes[4] = {0.183434642495650, 0.525532409916329, 0.796666477413627,
                                   0.960289856497536};
constexpr double gauss_weights[4] = {0.362683783378362, 0.313706645877887, 0.222381034453374,
                                     0.101228536290376};

template <class Function>
double integral(double from, double to, Function f) {
  const double half = 0.5 * (to - from), middle = 0.5 * (to + from);
  double sum = 0;
  for (int i = 0; i < 4; ++i)
    sum += gauss_weights[i] * (f(middle - half * gauss_nodes[i]) + f(middle + half * gauss_nodes[i]));
  return half * sum;
}

// Integral of s^q times the normal density over x0 <= x <= x1, where s = c + e x runs from 0 at the vertex
// to 1.
double power_integral(double q, double c, double e, double x0, double x1) {
  const double m0 = between(x0, x1);
  if (q == 1) return c * m0 + e * (density(x0) - density(x1));
  if (q == 2) {
    const double m1 = density(x0) - density(x1);
    const double m2 = m0 + x0 * density(x0) - x1 * density(x1);
    return c * c * m0 + 2 * c * e * m1 + e * e * m2;
  }
  x0 = std::max(x0, -reach);
  x1 = std::min(x1, reach);
  if (x0 >= x1) return 0;
  const auto f = [&](double x) { return std::pow(std::max(c + e * x, 0.0), q) * density(x); };
  // Pieces of half a smearing length, shrinking towards the vertex, where s^q is not analytic.
  const double vertex = -c / e;
  double sum = 0;
  const auto smooth = [&](double from, double to) {
    const int pieces = std::max(1, static_cast<int>(std::ceil(2 * (to - from))));
    for (int i = 0; i < pieces; ++i)
      sum += integral(from + (to - from) * i / pieces, from + (to - from) * (i + 1) / pieces, f);
  };
  const bool from_below = std::abs(vertex - x0) < 1e-12, from_above = std::abs(vertex - x1) < 1e-12;
  if (!from_below && !from_above) {  // the vertex lies outside: distance sets the scale of the pieces
    double far = e > 0 ? x1 : x0, near = e > 0 ? x0 : x1;
    while (std::abs(far - vertex) > 2 * std::abs(near - vertex)) {
      const double next = vertex + 2 * (near - vertex);
      smooth(std::min(near, next), std::max(near, next));
      near = next;
    }
    smooth(std::min(near, far), std::max(near, far));
    return sum;
  }
  double width = x1 - x0;
  for (int i = 0; i < 24; ++i, width *= 0.25) {
    if (from_below)
      smooth(x0 + 0.25 * width, x0 + width);
    else
      smooth(x1 - width, x1 - 0.25 * width);
  }
  return sum;
}

// What the Gaussian gathers around one point.
class Gathered {
 public:
  explicit Gathered(const Stack& stack) : stack_(stack) {}

  void take(const Alloy& alloy, double weight) {
    if (weight == 0) return;
    if (alloy.is_medium()) {
      add(apart_, weight, bands_of(stack_, alloy));
      return;
    }
    for (std::size_t e = 0; e < fraction_.size(); ++e) fraction_[e] += weight * alloy.fraction[e];
    mixed_ += weight;
    if (stack_.scale_table) add(apart_, weight, correction_of(stack_, alloy));
  }

  BandParameters resolved() const {
    BandParameters bands = apart_;
    if (mixed_ <= 0) return bands;
    std::array<double, 9> fraction = fraction_;
    for (double& part : fraction) part /= mixed_;
    add(bands, mixed_, bands_of(stack_, mixture(fraction)));
    return bands;
  }

 private:
  const Stack& stack_;
  std::array<double, 9> fraction_{};
  double mixed_ = 0;
  BandParameters apart_{};
};

void take_layer(Gathered& gathered, const Layer& layer, double bottom, double z, double sigma) {
  const double x0 = (bottom - z) / sigma, x1 = (bottom + layer.thickness - z) / sigma;
  const double weight = between(x0, x1);
  if (!layer.grading) {
    gathered.take(layer.material, weight);
    return;
  }
  const Grading& grading = *layer.grading;
  const double e = sigma / layer.thickness;
  double to;
  if (grading.vertex_on_top)
    to = weight - power_integral(grading.power, e * x1, -e, x0, x1);
  else
    to = power_integral(grading.power, -e * x0, e, x0, x1);
  gathered.take(layer.material, weight - to);
  gathered.take(grading.to, to);
}

BandParameters smeared_at(const Stack& stack, const std::vector<double>& faces, double z) {
  const double sigma = stack.interdiffusion, length = faces.back();
  const double low = z - reach * sigma, high = z + reach * sigma;
  Gathered gathered(stack);
  const auto take_between = [&](double from, double to, double shift) {
    // Layers of the stack, shifted, that overlap from..to.
    auto face = std::upper_bound(faces.begin(), faces.end(), from - shift);
    std::size_t i = face == faces.begin() ? 0 : static_cast<std::size_t>(face - faces.begin()) - 1;
    for (; i < stack.layers.size() && faces[i] + shift < to; ++i)
      take_layer(gathered, stack.layers[i], faces[i] + shift, z, sigma);
  };
  if (stack.periodic) {
    const double first = std::floor(low / length), last = std::floor(high / length);
    for (double period = first; period <= last; ++period) take_between(low, high, period * length);
  } else {  // beyond its ends the stack is continued by what stands at its faces
    take_between(low, high, 0);
    const Layer& top = stack.layers.back();
    gathered.take(stack.layers.front().material, below(-z / sigma));
    gathered.take(top.grading ? top.grading->to : top.material, below((z - length) / sigma));
  }
  return gathered.resolved();
}

}  // namespace

BandParameters bands_smeared(const Stack& stack, double z) {
  return bands_smeared(stack, std::vector{z}).front();
}

std::vector<BandParameters> bands_smeared(const Stack& stack, const std::vector<double>& z) {
  const auto faces = stack.faces();
  std::vector<BandParameters> bands;
  bands.reserve(z.size());
  for (const double point : z) {
    if (stack.interdiffusion > 0) {
      bands.push_back(smeared_at(stack, faces, point));
      continue;
    }
    const auto face = std::upper_bound(faces.begin(), faces.end(), point);
    const auto layer = std::clamp<std::ptrdiff_t>(face - faces.begin() - 1, 0, std::ssize(stack.layers) - 1);
    const auto i = static_cast<std::size_t>(layer);
    bands.push_back(
        bands_in_layer(stack, static_cast<int>(layer), (point - faces[i]) / stack.layers[i].thickness));
  }
  return bands;
}

}  // namespace wellwright
