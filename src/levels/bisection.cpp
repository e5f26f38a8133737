// SPDX-License-Identifier: Apache-2.0
// Levels by counting: the shift below a level, bisection, and the cold solve that checks Lanczos by counts.
#include <algorithm>
#include <cmath>
#include <limits>
#include <random>

#include "levels/pairs.hpp"
#include "wellwright/diagnostics.hpp"

namespace wellwright {
namespace {

constexpr double finest = 1e-11;   // [eV] brackets are halved down to this
constexpr double furthest = 1e4;   // [eV] above the floor at which the search gives up
constexpr double nearness = 0.25;  // of the levels' spread: how near the shift lies below the lowest

}  // namespace

int levels_below(Factors& factors, double E) {
  factors.compute(E);
  return factors.negative();
}

double energy_below_level(Factors& factors, int first, int count, double floor) {
  double low = floor, high = std::numeric_limits<double>::infinity(), top = floor;
  int below_low = levels_below(factors, floor);
  for (double step = 0.1;; step *= 2) {
    if (step > furthest)
      throw NotConverged("no further level was found; the stack holds too few on this grid");
    top = floor + step;
    const int below = levels_below(factors, top);
    if (below <= first) {
      low = top;
      below_low = below;
    } else {
      high = std::min(high, top);
    }
    if (below >= first + count) break;
  }
  while ((below_low < first || high - low > nearness * (top - low)) && high - low > finest) {
    const double middle = 0.5 * (low + high);
    const int below = levels_below(factors, middle);
    if (below <= first) {
      low = middle;
      below_low = below;
    } else {
      high = middle;
      if (below >= first + count) top = middle;
    }
  }
  return low;
}

Pairs cold_levels(const Hamiltonian& hamiltonian, Factors& factors, int first, int count, double floor,
                  double enough) {
  if (Pairs pairs = isolated_levels(hamiltonian, factors, first, count, floor, enough);
      pairs.count() == count)
    return pairs;
  const double shift = energy_below_level(factors, first, count, floor);
  if (levels_below(factors, shift) == first) {
    Pairs pairs = lanczos(hamiltonian, factors, shift, count);
    Rayleigh rayleigh(hamiltonian, factors);
    if (pairs.count() == count && rayleigh.polish_all(pairs, enough)) {
      const double above = pairs.energy[count - 1] + std::max(1e-9, 4 * rayleigh.floor());
      if (levels_below(factors, above) == first + count) return pairs;
      // The uppermost may be one of a group that goes on; what lies below it must be complete.
      for (int i = count - 1; i > 0; --i) {
        const double gap = pairs.energy[i] - pairs.energy[i - 1];
        if (gap < 1e-8) continue;
        if (levels_below(factors, pairs.energy[i - 1] + 0.5 * gap) == first + i &&
            levels_below(factors, pairs.energy[i] - 0.01 * gap) == first + i)
          return pairs;
        break;
      }
    }
  }
  return bisection(hamiltonian, factors, first, count, floor);
}

Pairs bisection(const Hamiltonian& hamiltonian, Factors& factors, int first, int count, double floor) {
  const auto n = static_cast<std::size_t>(count);
  std::vector<double> low(n, floor), high(n, 0);
  double top = floor, step = 0.05;
  for (;; step *= 2) {
    top = floor + step;
    if (levels_below(factors, top) >= first + count) break;
    if (step > furthest)
      throw NotConverged("no further level was found; the stack holds too few on this grid");
  }
  std::fill(high.begin(), high.end(), top);
  for (std::size_t k = 0; k < n; ++k)
    while (high[k] - low[k] > finest) {
      const double E = 0.5 * (low[k] + high[k]);
      if (E <= low[k] || E >= high[k]) break;
      const int below = levels_below(factors, E);
      for (std::size_t i = k; i < n; ++i)
        if (below > first + static_cast<int>(i))
          high[i] = std::min(high[i], E);
        else
          low[i] = std::max(low[i], E);
    }
  Pairs pairs;
  pairs.energy.resize(count);
  pairs.residual.setZero(count);
  pairs.psi.resize(hamiltonian.nodes(), count);
  for (std::size_t k = 0; k < n; ++k) pairs.energy[static_cast<Eigen::Index>(k)] = 0.5 * (low[k] + high[k]);
  std::mt19937 random(1);  // the same start every time
  std::normal_distribution<double> normal;
  const bool periodic = hamiltonian.profile().ends == Ends::periodic;
  const Eigen::Index N = hamiltonian.nodes() - 1;
  const Eigen::VectorXd mass = lumped_mass(hamiltonian);
  Eigen::VectorXd x(N + 1);
  for (int k = 0; k < count; ++k) {  // two steps of inverse iteration beside the level
    for (Eigen::Index i = 0; i <= N; ++i) x[i] = normal(random) * mass[i];
    factors.compute(pairs.energy[k] + finest);
    for (int twice = 0; twice < 2; ++twice) {
      factors.solve(x);
      x /= x.cwiseAbs().maxCoeff();
      if (twice == 0) x = x.cwiseProduct(mass).eval();
    }
    if (periodic) x[N] = x[0];
    pairs.psi.col(k) = x;
  }
  Rayleigh rayleigh(hamiltonian, factors);
  if (!rayleigh.polish_all(pairs)) throw NotConverged("the iteration for the levels does not converge");
  return pairs;
}

}  // namespace wellwright
