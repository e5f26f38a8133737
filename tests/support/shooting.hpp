// SPDX-License-Identifier: Apache-2.0
// Levels of a layer stack by shooting: an independent reference in long double that shares no code with the
// program.
#pragma once

#include <algorithm>
#include <array>
#include <stdexcept>
#include <vector>

#include "support/plain_stack.hpp"

/// The wave equation is integrated from the bottom wall as (psi, w = (K/m) psi') with a Taylor series of
/// order 26 at every step; psi and w are continuous at interfaces, which is the BenDaniel-Duke condition. By
/// Sturm's theorem the number of zeros of psi inside the stack is the number of levels below E, so that a
/// level is found by bisection on whole numbers and none can be missed. One-way shooting is backward stable
/// for energies: a rounding error of psi at z acts like a potential step of the same relative size there.
/// Graded layers with a power q = r/n are integrated in s, t = s^n, where they are polynomials.
namespace shooting {

using plain::K;
using plain::Layer;
using plain::Medium;
using plain::Real;
using plain::Stack;

inline constexpr int order = 26;

/// A power series cut after `order`.
struct Series {
  std::array<Real, order + 1> c{};
  static Series constant(Real value) {
    Series s;
    s.c[0] = value;
    return s;
  }
};
inline Series operator+(Series a, const Series& b) {
  for (std::size_t i = 0; i < a.c.size(); ++i) a.c[i] += b.c[i];
  return a;
}
inline Series operator*(Real f, Series a) {
  for (Real& x : a.c) x *= f;
  return a;
}
inline Series operator-(const Series& a, const Series& b) {
  return a + Real(-1) * b;
}
inline std::size_t last_term(const Series& a) {
  std::size_t n = a.c.size();
  while (n > 1 && a.c[n - 1] == 0) --n;
  return n;
}
inline Series operator*(const Series& a, const Series& b) {
  Series p;
  const std::size_t na = last_term(a), nb = last_term(b);
  for (std::size_t i = 0; i < na; ++i)
    for (std::size_t j = 0; j < nb && i + j < p.c.size(); ++j) p.c[i + j] += a.c[i] * b.c[j];
  return p;
}
inline Series operator/(const Series& a, const Series& b) {
  Series q;
  const std::size_t nb = last_term(b);
  for (std::size_t i = 0; i < q.c.size(); ++i) {
    Real sum = a.c[i];
    for (std::size_t j = 1; j < std::min(nb, i + 1); ++j) sum -= b.c[j] * q.c[i - j];
    q.c[i] = sum / b.c[0];
    if (nb == 1 && i + 1 >= last_term(a)) break;
  }
  return q;
}

/// (s0 + sigma)^n as a series in sigma.
inline Series power(Real s0, int n) {
  Series s = Series::constant(1), base = Series::constant(s0);
  base.c[1] = 1;
  for (int i = 0; i < n; ++i) s = s * base;
  return s;
}

struct State {
  Real psi = 0, w = 1;
};

class Shooter {
 public:
  explicit Shooter(const Stack& stack, Real k = 0) : stack_(stack), k_(k) {
    Real z = 0;
    lowest_edge_ = highest_edge_ = stack.layers.front().medium.edge;
    highest_pole_ = -plain::infinite;
    for (const Layer& layer : stack.layers) {
      faces_.push_back(z);
      for (const auto& [medium, at] :
           {std::pair{layer.medium, z}, std::pair{layer.top, z + layer.thickness}}) {
        const Real U = medium.edge + stack.tilt() * at;
        lowest_edge_ = std::min(lowest_edge_, U);
        highest_edge_ = std::max(highest_edge_, U);
        if (stack.bands > 1) {
          highest_pole_ = std::max(highest_pole_, U - medium.gap + medium.valence_shift);
          if (stack.bands > 2)
            highest_pole_ =
                std::max(highest_pole_, U - medium.gap - medium.split_off + medium.split_off_shift);
        }
      }
      if (!layer.graded) {  // the other face of a uniform layer
        lowest_edge_ = std::min(lowest_edge_, Real(layer.medium.edge) + stack.tilt() * (z + layer.thickness));
      }
      z += layer.thickness;
    }
  }

  Real lowest_edge() const { return lowest_edge_; }
  Real highest_edge() const { return highest_edge_; }
  Real highest_pole() const { return highest_pole_; }

  /// (psi, w) at the top from (psi, w) at the bottom; `zeros` counts the sign changes of psi on the way.
  State shoot(Real E, State state, int* zeros = nullptr) const {
    for (std::size_t i = 0; i < stack_.layers.size(); ++i)
      state = through(stack_.layers[i], faces_[i], E, state, zeros);
    return state;
  }

  /// Levels below E between hard walls; E above every pole.
  int count(Real E) const {
    if (E <= highest_pole_) throw std::domain_error("shooting counts only above every pole");
    int zeros = 0;
    shoot(E, {0, 1}, &zeros);
    return zeros;
  }

  /// Level n, counted from 0, to the last bits.
  Real level(int n) const {
    const Real floor = std::max(lowest_edge_, highest_pole_ + 1e-6L);
    Real low = floor, step = 0.05L;
    while (count(low + step) <= n) low += step, step *= 2;
    Real high = low + step;
    const auto fine = [&] { return high - low < 1e-17L * (1 + std::abs(high)); };
    for (int below = count(low), above = count(high); !fine() && (below != n || above != n + 1);) {
      const Real middle = low + (high - low) / 2;
      const int here = count(middle);
      (here > n ? high : low) = middle;
      (here > n ? above : below) = here;
    }
    // Alone in its bracket: Ridders' steps on psi at the top wall, which changes sign at the level.
    Real at_low = shoot(low, {0, 1}).psi, at_high = shoot(high, {0, 1}).psi, last = plain::infinite;
    for (int i = 0; i < 60 && !fine(); ++i) {
      const Real middle = low + (high - low) / 2, at_middle = shoot(middle, {0, 1}).psi;
      const Real root = std::sqrt(at_middle * at_middle - at_low * at_high);
      const Real next = middle + (middle - low) * ((at_low > at_high ? 1 : -1) * at_middle / root);
      if (!(std::abs(next - last) > 1e-18L)) return next;
      last = next;
      const Real at_next = shoot(next, {0, 1}).psi;
      for (const auto& [E, f] : {std::pair{middle, at_middle}, {next, at_next}})
        if (E > low && E < high) {
          if ((f < 0) == (at_low < 0))
            low = E, at_low = f;
          else
            high = E, at_high = f;
        }
    }
    return low + (high - low) / 2;
  }

  std::vector<Real> levels(int first, int count_wanted) const {
    std::vector<Real> all;
    for (int n = first; n < first + count_wanted; ++n) all.push_back(level(n));
    return all;
  }

  /// Half the trace of the matrix that carries (psi, w) over the stack: cos of the Bloch phase.
  Real half_trace(Real E) const { return (shoot(E, {1, 0}).psi + shoot(E, {0, 1}).w) / 2; }

  /// Level of band `n` (from 0) at a Bloch phase whose cosine is given. The levels between hard walls lie in
  /// the gaps, one in each, so between two of them the half trace passes the value once.
  Real bloch_level(int n, Real cos_phase) const {
    Real high = level(n), low = n > 0 ? level(n - 1) : std::max(lowest_edge_, highest_pole_ + 1e-6L);
    const Real wanted =
        n % 2 == 0 ? 1 : -1;  // the half trace falls in bands 0, 2, ... and rises in 1, 3, ...
    for (int i = 0; i < 100 && high - low > 1e-18L; ++i) {
      const Real middle = low + (high - low) / 2;
      ((half_trace(middle) - cos_phase) * wanted > 0 ? low : high) = middle;
    }
    return low + (high - low) / 2;
  }

 private:
  State through(const Layer& layer, Real bottom, Real E, State state, int* zeros) const {
    const bool flat = !layer.graded;
    const bool vertex_on_top = layer.graded && layer.top.edge < layer.medium.edge;
    const Medium& vertex = vertex_on_top ? layer.top : layer.medium;
    const Medium& far = vertex_on_top ? layer.medium : layer.top;
    int n = 1;
    while (!flat && std::abs(n * layer.power - std::round(n * layer.power)) > 1e-9) ++n;
    const int r = flat ? 0 : static_cast<int>(std::lround(n * layer.power));
    // In s from the vertex: z = z_vertex + direction L s^n.
    const Real direction = vertex_on_top ? -1 : 1, L = layer.thickness;
    const Real z_vertex = vertex_on_top ? bottom + L : bottom;
    Real s = vertex_on_top ? 1 : 0;
    const Real end = 1 - s;

    // One radian a step at most, so that psi has one zero at most between two looks.
    Real fastest = 0;
    for (int i = 0; i <= 8; ++i) {
      const Real t = Real(i) / 8;
      const Real z = z_vertex + direction * L * std::pow(t, n);
      const Real part = flat ? 0 : std::pow(t, r);
      Medium m = vertex;
      m.edge += static_cast<double>(part * (far.edge - vertex.edge) + stack_.tilt() * z);
      m.gap += static_cast<double>(part * (far.gap - vertex.gap));
      m.split_off += static_cast<double>(part * (far.split_off - vertex.split_off));
      m.valence_shift += static_cast<double>(part * (far.valence_shift - vertex.valence_shift));
      m.split_off_shift += static_cast<double>(part * (far.split_off_shift - vertex.split_off_shift));
      m.mass += static_cast<double>(part * (far.mass - vertex.mass));
      const Real inverse = plain::inverse_mass(m, stack_.bands, E);
      fastest = std::max(fastest, std::abs((E - m.edge) / (K * inverse)) + k_ * k_);
    }
    const Real longest = 1 / (n * L * std::sqrt(1.3L * fastest + 1e-6L));

    while (std::abs(end - s) > 0) {
      const Series z = Series::constant(z_vertex) + direction * L * power(s, n);
      const Series slope = direction * L * n * power(s, n - 1);
      const Series part = flat ? Series{} : power(s, r);
      const auto run = [&](double from, double to) {
        return Series::constant(from) + Real(Real(to) - from) * part;
      };
      const Series U = run(vertex.edge, far.edge) + Real(stack_.tilt()) * z;
      const Series gap = run(vertex.gap, far.gap);
      const Series above_valence =
          Series::constant(E) - U + gap - run(vertex.valence_shift, far.valence_shift);
      const Series mass = mass_at(
          run(vertex.mass, far.mass), gap, run(vertex.split_off, far.split_off), above_valence,
          run(vertex.split_off_shift - vertex.valence_shift, far.split_off_shift - far.valence_shift));
      Series excess = U - Series::constant(E);
      if (k_ > 0) {  // the in-plane mass keeps its ratio to the mass along z
        const Series ratio = run(vertex.mass, far.mass) / run(vertex.across(), far.across());
        excess = excess + (K * k_ * k_) * (ratio / mass);
      }
      const Series A = (1 / K) * (slope * mass), B = slope * excess;
      Series psi = Series::constant(state.psi), w = Series::constant(state.w);
      const std::size_t na = last_term(A), nb = last_term(B);
      for (std::size_t i = 0; i < order; ++i) {
        Real a = 0, b = 0;
        for (std::size_t j = 0; j < std::min(na, i + 1); ++j) a += A.c[j] * w.c[i - j];
        for (std::size_t j = 0; j < std::min(nb, i + 1); ++j) b += B.c[j] * psi.c[i - j];
        psi.c[i + 1] = a / static_cast<Real>(i + 1);
        w.c[i + 1] = b / static_cast<Real>(i + 1);
      }
      // The last terms stay below 1e-21 of the largest: as many as can vanish in a row, since z and the
      // grading are powers of s.
      Real h = std::min(longest, std::abs(end - s));
      const auto looked_at = static_cast<std::size_t>(std::max(2, n + 1));
      const auto limit = [&](const Series& f) {
        for (std::size_t i = order + 1 - looked_at; i <= order; ++i)
          while (std::abs(f.c[i]) * std::pow(h, static_cast<Real>(i)) >
                 1e-21L * (std::abs(f.c[0]) + std::abs(f.c[1]) * h))
            h *= 0.9L;
      };
      limit(psi);
      limit(w);
      const bool last = h >= std::abs(end - s);
      const Real sigma = end > s ? h : -h;
      State next{0, 0};
      for (std::size_t i = order + 1; i-- > 0;) {
        next.psi = next.psi * sigma + psi.c[i];
        next.w = next.w * sigma + w.c[i];
      }
      if (zeros && ((next.psi < 0 && state.psi > 0) || (next.psi > 0 && state.psi < 0) ||
                    (next.psi == 0 && state.psi != 0)))
        ++*zeros;
      state = next;
      s = last ? end : s + sigma;
    }
    return state;
  }

  // m(E) from the energy above the upper pole; `shift` moves the lower pole from it; see plain::inverse_mass.
  Series mass_at(const Series& mass, const Series& gap, const Series& split_off, const Series& above_valence,
                 const Series& shift) const {
    if (stack_.bands == 1) return mass;
    if (stack_.bands == 2) return mass * above_valence / gap;
    const Series lower = gap + split_off, above_split_off = above_valence + split_off - shift;
    // P = 3 Eg (Eg + so) / (m* (3 Eg + 2 so))
    return mass * (Real(2) * lower + gap) * above_valence * above_split_off /
           (gap * lower * (Real(2) * above_split_off + above_valence));
  }

  Stack stack_;
  Real k_;
  std::vector<Real> faces_;
  Real lowest_edge_ = 0, highest_edge_ = 0, highest_pole_ = 0;
};

}  // namespace shooting
