// SPDX-License-Identifier: Apache-2.0
// The linear Hermitian problem in (psi, chi) as one full matrix, all of its eigenvalues at once: slow, and
// blind to nothing.
#pragma once

#include <Eigen/Dense>
#include <algorithm>
#include <boost/math/quadrature/gauss.hpp>
#include <vector>

#include "support/plain_stack.hpp"

/// psi in integrated Legendre polynomials on elements, zero at both walls; chi_j = sqrt(K b_j) psi' / (E -
/// v_j) in Legendre polynomials of one degree less; Gauss-Legendre quadrature. None of the three is the
/// program's choice.
namespace dense {

using plain::Layer;
using plain::Medium;
using plain::Stack;

inline constexpr int degree = 10;

/// Coefficients of the operator at a point: edge, a0, (b, v) of the poles.
struct Point {
  double edge = 0, a0 = 0, b[2] = {0, 0}, v[2] = {0, 0};
};

inline Point point_at(const Stack& stack, const Layer& layer, double bottom, double t) {
  Medium m = layer.medium;
  if (layer.graded) {
    const bool on_top = layer.top.edge < layer.medium.edge;
    const double part = on_top ? 1 - std::pow(1 - t, layer.power) : std::pow(t, layer.power);
    const auto run = [&](double Medium::*member) {
      m.*member += part * (layer.top.*member - layer.medium.*member);
    };
    for (auto member : {&Medium::edge, &Medium::mass, &Medium::gap, &Medium::split_off,
                        &Medium::valence_shift, &Medium::split_off_shift})
      run(member);
  }
  const double tilt = stack.tilt() * (bottom + t * layer.thickness);
  Point p;
  p.edge = m.edge + tilt;
  const double valence = p.edge - m.gap + m.valence_shift;
  if (stack.bands == 1) p.a0 = 1 / m.mass;
  if (stack.bands == 2) p.b[0] = m.gap / m.mass, p.v[0] = valence;
  if (stack.bands == 3) {
    const double P = 1 / m.mass / (2 / (3 * m.gap) + 1 / (3 * (m.gap + m.split_off)));
    p.b[0] = 2 * P / 3, p.v[0] = valence;
    p.b[1] = P / 3, p.v[1] = p.edge - m.gap - m.split_off + m.split_off_shift;
  }
  return p;
}

/// All eigenvalues, lowest first.
struct Spectrum {
  Eigen::VectorXd energy;
  int companions = 0;  ///< components chi: so many eigenvalues are valence-like when every pole lies below
  int below(double E) const {
    return static_cast<int>(std::lower_bound(energy.begin(), energy.end(), E) - energy.begin());
  }
};

/// `radians`: an element spans at most so much phase at `top` [eV].
inline Spectrum spectrum(const Stack& stack, double top, double radians = 3) {
  struct Element {
    const Layer* layer;
    double bottom, t0, t1;
  };
  std::vector<Element> elements;
  double bottom = 0, lowest = 1e300, highest = -1e300;
  for (const Layer& layer : stack.layers) {
    for (const double t : {0.0, 1.0}) {
      lowest = std::min(lowest, point_at(stack, layer, bottom, t).edge);
      highest = std::max(highest, point_at(stack, layer, bottom, t).edge);
    }
    bottom += layer.thickness;
  }
  bottom = 0;
  const double reach = std::max(top, highest) - lowest;
  for (const Layer& layer : stack.layers) {
    const double mass = 1 / static_cast<double>(std::min(plain::inverse_mass(layer.medium, stack.bands, top),
                                                         plain::inverse_mass(layer.top, stack.bands, top)));
    const double k = std::sqrt(reach * mass / static_cast<double>(plain::K));
    const int pieces = std::max(1, static_cast<int>(std::ceil(layer.thickness * k / radians)));
    for (int i = 0; i < pieces; ++i)
      elements.push_back({&layer, bottom, double(i) / pieces, double(i + 1) / pieces});
    bottom += layer.thickness;
  }

  using Rule = boost::math::quadrature::gauss<double, 15>;
  const int poles = stack.bands - 1, n = static_cast<int>(elements.size());
  const int psis = n * degree - 1, chis = n * poles * degree, size = psis + chis;
  Eigen::MatrixXd H = Eigen::MatrixXd::Zero(size, size), S = Eigen::MatrixXd::Zero(psis, psis);
  // Element unknowns: hats of its two faces, then bubbles. Faces 1..n-1 come first among the psis.
  const auto row_of = [&](int element, int local) {
    if (local == 0) return element > 0 ? element - 1 : -1;
    if (local == 1) return element < n - 1 ? element : -1;
    return n - 1 + element * (degree - 1) + local - 2;
  };
  for (int e = 0; e < n; ++e) {
    const Element& element = elements[static_cast<std::size_t>(e)];
    const double width = (element.t1 - element.t0) * element.layer->thickness;
    for (int q = -7; q <= 7; ++q) {
      const auto at = static_cast<std::size_t>(std::abs(q));
      const double x = (q < 0 ? -1 : 1) * Rule::abscissa()[at], weight = Rule::weights()[at] * width / 2;
      double P[degree + 2] = {1, x};  // Legendre polynomials
      for (int l = 1; l <= degree; ++l) P[l + 1] = ((2 * l + 1) * x * P[l] - l * P[l - 1]) / (l + 1);
      double f[degree + 1] = {(1 - x) / 2, (1 + x) / 2}, slope[degree + 1] = {-1 / width, 1 / width};
      for (int l = 1; l < degree; ++l) {
        f[l + 1] = (P[l + 1] - P[l - 1]) / std::sqrt(4 * l + 2);
        slope[l + 1] = std::sqrt((2 * l + 1) / 2.0) * P[l] * 2 / width;
      }
      const Point p = point_at(stack, *element.layer, element.bottom,
                               element.t0 + (x + 1) / 2 * (element.t1 - element.t0));
      const double K = static_cast<double>(plain::K);
      for (int i = 0; i <= degree; ++i) {
        const int row = row_of(e, i);
        if (row < 0) continue;
        for (int j = 0; j <= degree; ++j) {
          const int column = row_of(e, j);
          if (column < 0) continue;
          S(row, column) += weight * f[i] * f[j];
          H(row, column) += weight * (p.edge * f[i] * f[j] + K * p.a0 * slope[i] * slope[j]);
        }
      }
      for (int pole = 0; pole < poles; ++pole)
        for (int l = 0; l < degree; ++l) {
          const int row = psis + (e * poles + pole) * degree + l;
          const double chi = P[l] * std::sqrt((2 * l + 1) / width);
          for (int j = 0; j <= degree; ++j) {
            const int column = row_of(e, j);
            if (column >= 0) H(row, column) += weight * std::sqrt(K * p.b[pole]) * chi * slope[j];
          }
          for (int m = 0; m <= l; ++m)
            H(row, row - l + m) += weight * p.v[pole] * chi * P[m] * std::sqrt((2 * m + 1) / width);
        }
    }
  }
  // psi = L^-T x makes the overlap the unit matrix.
  const Eigen::LLT<Eigen::MatrixXd> factor(S);
  const auto L = factor.matrixL();
  H.topLeftCorner(psis, psis) = L.solve(L.solve(H.topLeftCorner(psis, psis)).transpose()).eval();
  if (chis > 0)
    H.bottomLeftCorner(chis, psis) = L.solve(H.bottomLeftCorner(chis, psis).transpose()).transpose().eval();
  const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver(
      H, Eigen::EigenvaluesOnly);  // reads the lower half
  Spectrum result;
  result.energy = solver.eigenvalues();
  result.companions = chis;
  return result;
}

}  // namespace dense
