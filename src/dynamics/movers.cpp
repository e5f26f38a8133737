// SPDX-License-Identifier: Apache-2.0
// Amplitudes in time, for all times or in blocks that stand together in a file.
#include "dynamics/movers.hpp"

#include <algorithm>
#include <cmath>
#include <complex>

#include "wellwright/dynamics.hpp"

namespace wellwright {
namespace {

constexpr Eigen::Index most_times = 1024;          // formed together
constexpr Eigen::Index most_amplitudes = 1 << 18;  // of one block: 4 MB

}  // namespace

Movers::Movers(const Levels& levels, const Eigen::VectorXcd& all) {
  std::vector<Eigen::Index> moving;
  for (Eigen::Index k = 0; k < all.size(); ++k)
    if (all[k] != 0.0) moving.push_back(k);
  energy = levels.energy(moving);
  amplitude = all(moving);
  components.emplace_back(levels.envelope(Eigen::all, moving));
  for (const Eigen::MatrixXd& chi : levels.companion) components.emplace_back(chi(Eigen::all, moving));
}

Eigen::Index times_together(Eigen::Index rows) {
  return std::clamp<Eigen::Index>(most_values / std::max<Eigen::Index>(rows, 1), 1, most_times);
}

void phases(const Eigen::VectorXd& energy, const Eigen::VectorXcd& amplitude,
            const Eigen::Ref<const Eigen::VectorXd>& time, Eigen::MatrixXcd& out) {
  out.resize(energy.size(), time.size());
  for (Eigen::Index t = 0; t < time.size(); ++t)
    for (Eigen::Index k = 0; k < out.rows(); ++k)
      out(k, t) =
          amplitude[k] == 0.0 ? 0.0 : amplitude[k] * std::polar(1.0, -energy[k] * time[t] / constants::hbar);
}

Eigen::MatrixXcd amplitudes_in_time(const Levels& levels, const Dynamics& dynamics) {
  Eigen::MatrixXcd out;
  phases(levels.energy, dynamics.amplitude, dynamics.time, out);
  return out;
}

void amplitudes_in_blocks(
    const Levels& levels, const Dynamics& dynamics,
    const std::function<void(int first_level, int first_time, const Eigen::MatrixXcd& block)>& take) {
  const Eigen::Index times = dynamics.time.size();
  if (times == 0) return;
  // Some levels at all times, or one level at some times.
  const Eigen::Index wide = std::min(times, most_amplitudes),
                     high = std::max<Eigen::Index>(1, most_amplitudes / times);
  Eigen::MatrixXcd block;
  for (Eigen::Index level = 0; level < levels.count(); level += high) {
    const auto rows = std::min<Eigen::Index>(high, levels.count() - level);
    for (Eigen::Index time = 0; time < times; time += wide) {
      const auto columns = std::min(wide, times - time);
      phases(levels.energy.segment(level, rows), dynamics.amplitude.segment(level, rows),
             dynamics.time.segment(time, columns), block);
      take(static_cast<int>(level), static_cast<int>(time), block);
    }
  }
}

}  // namespace wellwright
