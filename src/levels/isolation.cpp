// SPDX-License-Identifier: Apache-2.0
// Levels parted by counts: a bracket around each that holds no other, then inverse iteration inside it. What
// is found is complete by construction; levels too close to part are left to Lanczos.
#include <algorithm>
#include <cmath>

#include "levels/pairs.hpp"
#include "wellwright/diagnostics.hpp"

namespace wellwright {
namespace {

constexpr double first_reach = 0.1;   // [eV] above the floor where the search for the uppermost begins
constexpr double furthest = 1e4;      // [eV] above the floor at which it gives up
constexpr double inseparable = 1e-7;  // [eV] narrowest bracket that is still halved
constexpr int solves = 2;             // of inverse iteration before the Rayleigh quotient takes over

/// Energies with the number of levels below each; both rise.
class Counts {
 public:
  Counts(Factors& factors, double floor) : factors_(&factors) {
    energy_.reserve(64);
    below_.reserve(64);
    add(floor);
  }
  int add(double E) {
    const int below = levels_below(*factors_, E);
    const auto at = std::lower_bound(energy_.begin(), energy_.end(), E) - energy_.begin();
    energy_.insert(energy_.begin() + at, E);
    below_.insert(below_.begin() + at, below);
    return below;
  }
  /// The narrowest known bracket around level number `level`; levels_in() of them are inside.
  void find(int level) {
    upper_ = static_cast<std::size_t>(std::upper_bound(below_.begin(), below_.end(), level) - below_.begin());
  }
  double low() const { return energy_[upper_ - 1]; }
  double high() const { return energy_[upper_]; }
  double width() const { return high() - low(); }
  double middle() const { return 0.5 * (low() + high()); }
  int levels_in() const { return below_[upper_] - below_[upper_ - 1]; }

 private:
  Factors* factors_;
  std::vector<double> energy_;
  std::vector<int> below_;
  std::size_t upper_ = 0;
};

// A start with something of every level in it, the same every time.
Eigen::VectorXd mixed_start(const Hamiltonian& hamiltonian) {
  Eigen::VectorXd x = lumped_mass(hamiltonian);
  double turn = 0.3;
  for (Eigen::Index i = 0; i < x.size(); ++i) {
    turn = std::fmod(turn + 0.6180339887498949, 1.0);  // low-discrepancy numbers of the golden ratio
    x[i] *= turn + 0.1;
  }
  return x;
}

}  // namespace

Pairs isolated_levels(const Hamiltonian& hamiltonian, Factors& factors, int first, int count, double floor,
                      double enough) {
  Pairs pairs;
  Counts counts(factors, floor);
  for (double reach = first_reach;; reach *= 2) {
    if (reach > furthest)
      throw NotConverged("no further level was found; the stack holds too few on this grid");
    if (counts.add(floor + reach) >= first + count) break;
  }
  const Eigen::VectorXd start = mixed_start(hamiltonian), mass = lumped_mass(hamiltonian);
  const bool periodic = hamiltonian.profile().ends == Ends::periodic;
  Rayleigh rayleigh(hamiltonian, factors);
  const bool to_rounding = enough <= rayleigh.floor();
  enough = std::max(enough, rayleigh.floor());
  pairs.energy.resize(count);
  pairs.residual.setZero(count);
  pairs.psi.resize(hamiltonian.nodes(), count);
  Eigen::VectorXd x(start.size());
  for (int i = 0; i < count; ++i)
    for (;;) {
      counts.find(first + i);
      const double E = counts.middle();
      if (counts.levels_in() > 1) {
        if (counts.width() < inseparable) return {};
        counts.add(E);
        continue;
      }
      x = start;
      factors.compute(E);
      for (int solve = 0; solve < solves; ++solve) {
        if (solve > 0) x = x.cwiseProduct(mass).eval() / x.cwiseAbs().maxCoeff();
        factors.solve(x);
      }
      if (periodic) x[x.size() - 1] = x[0];
      pairs.psi.col(i) = x / x.cwiseAbs().maxCoeff();
      pairs.energy[i] = E;
      if (rayleigh.improve(pairs.energy[i], pairs.psi.col(i), pairs.residual[i], enough) &&
          pairs.energy[i] > counts.low() && pairs.energy[i] < counts.high())
        break;
      if (counts.width() < inseparable) return {};
      counts.add(E);
    }
  if (to_rounding && !rayleigh.polish_all(pairs)) return {};
  return pairs;
}

}  // namespace wellwright
