// SPDX-License-Identifier: Apache-2.0
// Wells whose levels are roots of a closed equation, solved by bisection to the last bit of a long double.
#pragma once

#include <boost/math/special_functions/airy.hpp>
#include <functional>
#include <utility>
#include <vector>

#include "support/plain_stack.hpp"

namespace closed {

using plain::K;
using plain::Medium;
using plain::pi;
using plain::Real;

/// The root of f between a and b, where f has one sign at a and the other at b.
template <class F>
Real root_between(F f, Real a, Real b) {
  const bool rising = f(a) < f(b);
  for (int i = 0; i < 200; ++i) {
    const Real middle = a + (b - a) / 2;
    if (middle == a || middle == b) break;
    ((f(middle) < 0) == rising ? a : b) = middle;
  }
  return a + (b - a) / 2;
}

/// E_n of a box with hard walls: hbar^2 pi^2 n^2 / 2 m L^2.
inline Real infinite_well(Real L, Real m, int n) {
  return K / m * (n * pi / L) * (n * pi / L);
}

/// Bound levels of a well of width L between equal barriers, BenDaniel-Duke matching, masses at the level's
/// own energy: k L - 2 atan(r) = (n - 1) pi with r = kappa m_w / (k m_b), the left side rising with E.
/// Barriers of finite thickness that end at hard walls turn kappa into kappa coth(kappa d). The well's edge
/// is the lower one. Source: G. Bastard, Wave Mechanics Applied to Semiconductor Heterostructures (1988), ch.
/// III.
inline std::vector<Real> finite_well(const Medium& well, const Medium& barrier, Real L, int bands = 1,
                                     Real d = plain::infinite) {
  const auto phase = [&](Real E) {
    const Real w = plain::inverse_mass(well, bands, E), b = plain::inverse_mass(barrier, bands, E);
    const Real k = std::sqrt((E - well.edge) / (K * w)), kappa = std::sqrt((barrier.edge - E) / (K * b));
    return k * L - 2 * std::atan2(b * kappa / std::tanh(kappa * d), w * k);
  };
  std::vector<Real> levels;
  const Real V = Real(barrier.edge) - well.edge, bottom = well.edge + V * 1e-15L,
             top = barrier.edge - V * 1e-15L;
  for (int n = 0; phase(top) > n * pi; ++n)
    levels.push_back(root_between([&](Real E) { return phase(E) - n * pi; }, bottom, top));
  return levels;
}

/// Levels of two equal wells of width a with a barrier of thickness b between them and the same material
/// outside: even and odd pairs in turn. The middle of the barrier is a mirror, where the slope or the value
/// vanishes.
inline std::vector<Real> double_well(const Medium& well, const Medium& barrier, Real a, Real b, int bands = 1,
                                     Real d = plain::infinite) {
  const auto phase = [&](Real E, bool odd) {
    const Real w = plain::inverse_mass(well, bands, E), v = plain::inverse_mass(barrier, bands, E);
    const Real k = std::sqrt((E - well.edge) / (K * w)), kappa = std::sqrt((barrier.edge - E) / (K * v));
    const Real t = std::tanh(kappa * b / 2);
    return k * a - std::atan2(v * kappa / std::tanh(kappa * d), w * k) -
           std::atan2(v * kappa * (odd ? 1 / t : t), w * k);
  };
  std::vector<Real> levels;
  const Real V = Real(barrier.edge) - well.edge, bottom = well.edge + V * 1e-15L,
             top = barrier.edge - V * 1e-15L;
  for (int n = 0; phase(top, n % 2 == 1) > (n / 2) * pi; ++n)
    levels.push_back(root_between([&](Real E) { return phase(E, n % 2 == 1) - (n / 2) * pi; }, bottom, top));
  return levels;
}

/// hbar omega of a parabola that rises by D from the centre to the edges of a full width W.
inline Real oscillator_quantum(Real W, Real D, Real m) {
  return std::sqrt(16 * K * D / m) / W;
}

/// E_n above a hard wall in a linear potential of slope F [eV/nm]: c_n (K/m)^(1/3) F^(2/3), -c_n the zeros of
/// Ai.
inline Real triangular_well(Real m, Real F, int n) {
  return -boost::math::airy_ai_zero<Real>(n) * std::cbrt(K / m * F * F);
}

/// Levels of a hard box of length L in a linear potential F z: Ai(x0) Bi(xL) = Ai(xL) Bi(x0), x = (F z - E) /
/// (F l), l^3 = K / (m F). The first `count` roots above the bottom, found on a scan of `step` [eV].
inline std::vector<Real> tilted_box(Real L, Real m, Real F, int count, Real step) {
  const Real l = std::cbrt(K / (m * F));
  const auto f = [&](Real E) {
    const Real x0 = -E / (F * l), xL = (F * L - E) / (F * l);
    return boost::math::airy_ai(x0) * boost::math::airy_bi(xL) -
           boost::math::airy_ai(xL) * boost::math::airy_bi(x0);
  };
  std::vector<Real> levels;
  for (Real E = step; static_cast<int>(levels.size()) < count; E += step)
    if ((f(E) < 0) != (f(E + step) < 0)) levels.push_back(root_between(f, E, E + step));
  return levels;
}

/// cos(q d) of a superlattice of wells a and barriers b as a function of energy, below and above the barrier:
/// cos(ka) cosh(kappa b) + (x - 1/x)/2 sin(ka) sinh(kappa b), x = kappa m_w / (k m_b).
/// Source: G. Bastard (1988), ch. I; M. Helm, Semicond. Sci. Technol. 10, 557 (1995).
inline Real kronig_penney(const Medium& well, const Medium& barrier, Real a, Real b, int bands, Real E) {
  const Real w = plain::inverse_mass(well, bands, E), v = plain::inverse_mass(barrier, bands, E);
  const Real k2 = (E - well.edge) / (K * w), q2 = (barrier.edge - E) / (K * v);
  const Real k = std::sqrt(k2), wk = w * k;
  const Real C = q2 >= 0 ? std::cosh(std::sqrt(q2) * b) : std::cos(std::sqrt(-q2) * b);
  // sinh(kappa b)/kappa and its other side of the barrier top
  const Real S = q2 > 0   ? std::sinh(std::sqrt(q2) * b) / std::sqrt(q2)
                 : q2 < 0 ? std::sin(std::sqrt(-q2) * b) / std::sqrt(-q2)
                          : b;
  // (x - 1/x) sinh = (v q2 / wk - wk / v) S
  return std::cos(k * a) * C + (v * q2 / wk - wk / v) / 2 * std::sin(k * a) * S;
}

/// Lower and upper edge of the first `count` minibands, found on a scan of `step` [eV] from the well's edge.
inline std::vector<std::pair<Real, Real>> miniband_edges(const Medium& well, const Medium& barrier, Real a,
                                                         Real b, int bands, int count, Real step) {
  const auto f = [&](Real E) { return kronig_penney(well, barrier, a, b, bands, E); };
  std::vector<Real> edges;
  for (Real E = well.edge + step / 7; static_cast<int>(edges.size()) < 2 * count; E += step)
    for (const Real side : {f(E) < f(E + step) ? -1 : 1, f(E) < f(E + step) ? 1 : -1})
      if ((f(E) < side) != (f(E + step) < side))
        edges.push_back(root_between([&](Real x) { return f(x) - side; }, E, E + step));
  std::vector<std::pair<Real, Real>> bands_found;
  for (int i = 0; i < count; ++i)
    bands_found.emplace_back(edges[static_cast<std::size_t>(2 * i)],
                             edges[static_cast<std::size_t>(2 * i) + 1]);
  return bands_found;
}

/// Dipole of an infinite well, 8 L i j / (pi^2 (i^2 - j^2)^2) for i + j odd.
inline Real infinite_well_dipole(Real L, int i, int j) {
  if ((i + j) % 2 == 0) return 0;
  const Real difference = Real(i) * i - Real(j) * j;
  return 8 * L * i * j / (pi * pi * difference * difference);
}

}  // namespace closed
