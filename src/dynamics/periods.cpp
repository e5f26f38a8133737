// SPDX-License-Identifier: Apache-2.0
// Beats of pairs, and the periods of a ladder of levels.
#include "dynamics/periods.hpp"

#include <algorithm>
#include <cmath>
#include <complex>

namespace wellwright {
namespace {
constexpr double least_beat = 1e-6;  // [nm] weaker beats are left out
}

std::vector<Beat> beats_of(const Levels& levels, const Transitions& transitions,
                           const Eigen::VectorXcd& amplitude) {
  std::vector<Beat> beats;
  for (int i = 0; i < levels.count(); ++i)
    for (int j = i + 1; j < levels.count(); ++j) {
      const double size =
          4 * std::abs(amplitude[i]) * std::abs(amplitude[j]) * std::abs(transitions.dipole(i, j));
      if (!(size > least_beat) || std::isnan(transitions.beat_period(i, j))) continue;
      beats.push_back({i + 1, j + 1, transitions.energy(i, j), transitions.beat_period(i, j),
                       transitions.frequency(i, j), size});
    }
  std::stable_sort(beats.begin(), beats.end(),
                   [](const Beat& a, const Beat& b) { return a.dipole_amplitude > b.dipole_amplitude; });
  return beats;
}

// Classical period h / |E'(n)| and revival time 2 h / |E''(n)| by central differences at the level n nearest
// to the mean of k |c_k|^2. Defined where n and both its neighbours carry the state and the distance of the
// levels changes slowly, |E''| < |E'|: a doublet below a far third level is no ladder. Source: R.W. Robinett,
// Phys. Rep. 392, 1 (2004), doi:10.1016/j.physrep.2003.11.002.
void find_periods(const Levels& levels, Dynamics& dynamics) {
  constexpr double carries = 1e-3, equal_distances = 1e-6;
  const Eigen::VectorXd weight = dynamics.amplitude.cwiseAbs2();
  const double mean =
      weight.dot(Eigen::VectorXd::LinSpaced(weight.size(), 0, static_cast<double>(weight.size() - 1)));
  const auto n = static_cast<Eigen::Index>(std::lround(mean));
  if (n < 1 || n + 1 >= weight.size() || weight.segment(n - 1, 3).minCoeff() < carries) return;
  const double first = 0.5 * (levels.energy[n + 1] - levels.energy[n - 1]);
  const double second = levels.energy[n + 1] - 2 * levels.energy[n] + levels.energy[n - 1];
  if (!(std::abs(second) < first)) return;
  dynamics.classical_period = constants::planck / first;
  if (std::abs(second) > equal_distances * first)
    dynamics.revival_time = 2 * constants::planck / std::abs(second);
}

}  // namespace wellwright
