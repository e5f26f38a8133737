// SPDX-License-Identifier: Apache-2.0
// Gauss-Lobatto-Legendre nodes, weights and derivative matrices.
#include <array>
#include <cassert>
#include <cmath>
#include <numbers>

#include "wellwright/grid.hpp"

namespace wellwright {
namespace {

struct Legendre {
  double value, previous;  // P_n and P_(n-1)
};

Legendre legendre(int n, double x) {
  double previous = 1, value = x;
  if (n == 0) return {1, 0};
  for (int k = 1; k < n; ++k) {
    const double next = ((2 * k + 1) * x * value - k * previous) / (k + 1);
    previous = value;
    value = next;
  }
  return {value, previous};
}

ReferenceElement make_reference_element(int p) {
  ReferenceElement element;
  element.degree = p;
  element.nodes.resize(p + 1);
  element.weights.resize(p + 1);
  element.derivative.resize(p + 1, p + 1);
  // The inner nodes are the zeros of P_p'; Newton on (1 - x^2) P_p' = p (P_(p-1) - x P_p) from Chebyshev
  // points.
  for (int i = 0; i <= p; ++i) {
    double x = -std::cos(std::numbers::pi * i / p);
    if (i > 0 && i < p) {
      for (int step = 0; step < 50; ++step) {
        const auto [value, previous] = legendre(p, x);
        const double change = (previous - x * value) / ((p + 1) * value);
        x += change;
        if (std::abs(change) < 1e-16) break;
      }
    }
    element.nodes[i] = x;
  }
  for (int i = 0; i <= p / 2; ++i) {  // exact mirror symmetry
    const double x = 0.5 * (element.nodes[p - i] - element.nodes[i]);
    element.nodes[p - i] = x;
    element.nodes[i] = -x;
  }
  Eigen::VectorXd value(p + 1);
  for (int i = 0; i <= p; ++i) {
    value[i] = legendre(p, element.nodes[i]).value;
    element.weights[i] = 2.0 / (p * (p + 1) * value[i] * value[i]);
  }
  for (int i = 0; i <= p; ++i) {
    double sum = 0;
    for (int j = 0; j <= p; ++j) {
      if (i == j) continue;
      const double d = value[i] / (value[j] * (element.nodes[i] - element.nodes[j]));
      element.derivative(i, j) = d;
      sum += d;
    }
    element.derivative(i, i) = -sum;  // a constant has no derivative, to the last digit
  }
  return element;
}

}  // namespace

const ReferenceElement& reference_element(int degree) {
  static const auto all = [] {
    std::array<ReferenceElement, highest_degree + 1> made;
    for (int p = 1; p <= highest_degree; ++p) made[static_cast<std::size_t>(p)] = make_reference_element(p);
    return made;
  }();
  assert(degree >= 1 && degree <= highest_degree);
  return all[static_cast<std::size_t>(degree)];
}

}  // namespace wellwright
