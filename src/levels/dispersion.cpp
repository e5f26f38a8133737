// SPDX-License-Identifier: Apache-2.0
// Energies over the in-plane momentum, and minibands over the Bloch phase.
#include <boost/math/tools/toms748_solve.hpp>  // for the root between two counts
#include <cmath>
#include <numbers>

#include "levels/pairs.hpp"
#include "wellwright/diagnostics.hpp"
#include "wellwright/levels.hpp"

namespace wellwright {
namespace {

constexpr double enough = 1e-9;   // [eV] residual of E(k): the energy is good to its square over the gaps
constexpr double furthest = 100;  // [eV] above a level at which the search for a band gives up

// Level number `index` (0-based) at a Bloch phase: the condensed faces give S_00 + S_NN + 2 cos(phase) S_0N =
// 0.
class Band {
 public:
  Band(Factors& factors, double cosine) : factors_(factors), cosine_(cosine) {}

  double level(int index, double low, double high) {
    double step = 1e-3;
    while (below(low) > index && step < furthest) low -= (step *= 2);
    step = 1e-3;
    while (below(high) <= index && step < furthest) high += (step *= 2);
    // Counts halve the bracket until no pole of the condensed faces is left inside it.
    int poles_low = inner(low), poles_high = inner(high);
    while (poles_low != poles_high || high - low > 1e-2) {
      const double middle = 0.5 * (low + high);
      if (middle <= low || middle >= high) return middle;
      if (below(middle) > index) {
        high = middle;
        poles_high = factors_.inner_negative();
      } else {
        low = middle;
        poles_low = factors_.inner_negative();
      }
    }
    const auto faces = [&](double E) {
      factors_.compute(E, cosine_);
      return factors_.diagonal() + 2 * cosine_ * factors_.coupling();
    };
    const double at_low = faces(low), at_high = faces(high);
    if (!(at_low * at_high < 0)) return 0.5 * (low + high);
    std::uintmax_t steps = 100;
    const auto close = boost::math::tools::eps_tolerance<double>(52);
    const auto bracket = boost::math::tools::toms748_solve(faces, low, high, at_low, at_high, close, steps);
    return 0.5 * (bracket.first + bracket.second);
  }

 private:
  int below(double E) {
    factors_.compute(E, cosine_);
    return factors_.negative();
  }
  int inner(double E) {
    factors_.compute(E, cosine_);
    return factors_.inner_negative();
  }

  Factors& factors_;
  double cosine_;
};

}  // namespace

Dispersion in_plane_dispersion(const Levels& levels, const Eigen::VectorXd& k, const Progress& progress) {
  Dispersion dispersion;
  dispersion.k = k;
  dispersion.energy.resize(levels.count(), k.size());
  const Grid& grid = levels.profile.grid;
  Eigen::MatrixXd psi(grid.elements() * grid.degree + 1, levels.count());
  for (int i = 0; i < levels.count(); ++i) psi.col(i) = gather(grid, levels.envelope.col(i));
  Eigen::VectorXd energy = levels.energy;
  for (Eigen::Index c = 0; c < k.size(); ++c) {
    if (progress && !progress(static_cast<double>(c) / static_cast<double>(k.size()), "in-plane dispersion"))
      throw Stopped();
    const Hamiltonian hamiltonian(levels.profile, k[c]);
    Factors factors(hamiltonian);
    Rayleigh rayleigh(hamiltonian, factors);
    // Each level is followed by itself; members of a group split by less than the group's width.
    const double last = c > 0 ? k[c - 1] : 0;
    for (int i = 0; i < levels.count(); ++i) {
      double residual = 0;
      energy[i] += constants::hbar2_over_2m0 * (k[c] * k[c] - last * last) / levels.in_plane_mass[i];
      if (!rayleigh.improve(energy[i], psi.col(i), residual, enough))
        throw NotConverged("the energies at in-plane momentum do not converge");
    }
    dispersion.energy.col(c) = energy;
  }
  return dispersion;
}

Minibands minibands(const Levels& levels, int phases) {
  Minibands bands;
  bands.bloch_phase = Eigen::VectorXd::LinSpaced(phases, 0, std::numbers::pi);
  bands.energy.resize(levels.count(), phases);
  const Hamiltonian hamiltonian(levels.profile);
  Factors factors(hamiltonian);
  for (int i = 0; i < levels.count(); ++i) {
    // The number of the band: levels below it at phase 0, members of a group in their order.
    int first = i;
    while (first > 0 &&
           levels.group[static_cast<std::size_t>(first - 1)] == levels.group[static_cast<std::size_t>(i)])
      --first;
    factors.compute(levels.energy[first] - std::max(1e-9, 10 * levels.residual[first]));
    const int index = factors.negative() + (i - first);
    bands.energy(i, 0) = levels.energy[i];
    double E = levels.energy[i];
    for (int c = 1; c < phases; ++c) {
      const double cosine = c == phases - 1 ? -1 : std::cos(bands.bloch_phase[c]);
      E = Band(factors, cosine).level(index, E - 1e-3, E + 1e-3);
      bands.energy(i, c) = E;
    }
  }
  return bands;
}

}  // namespace wellwright
