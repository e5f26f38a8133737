// SPDX-License-Identifier: Apache-2.0
// The density in space and time, in blocks of times.
#include <algorithm>
#include <cmath>

#include "dynamics/observed.hpp"
#include "wellwright/dynamics.hpp"

namespace wellwright {

std::vector<double> map_points(double length) {
  const int count = std::clamp(static_cast<int>(std::ceil(length / 0.25)) + 1, 201, 801);
  std::vector<double> z(static_cast<std::size_t>(count));
  for (int i = 0; i < count; ++i) z[static_cast<std::size_t>(i)] = length * i / (count - 1);
  return z;
}

void density_map(const Levels& levels, const Dynamics& dynamics,
                 const std::function<void(int first_time, const RowMatrix& block)>& take) {
  const auto points = static_cast<Eigen::Index>(dynamics.density_z.size());
  if (points == 0) return;
  Movers movers(levels, dynamics.amplitude);
  for (Eigen::MatrixXd& component : movers.components)
    component = interpolate(levels.profile.grid, component, dynamics.density_z);
  Eigen::MatrixXcd a;
  Density density;
  // Few enough that all working matrices stay in the cache, and their memory is used again from block to
  // block.
  constexpr Eigen::Index together = 1 << 15;
  const Eigen::Index step = std::max<Eigen::Index>(1, together / points);
  for (Eigen::Index first = 0; first < dynamics.time.size(); first += step) {
    const auto count = std::min<Eigen::Index>(step, dynamics.time.size() - first);
    phases(movers.energy, movers.amplitude, dynamics.time.segment(first, count), a);
    density.form(movers.components, a);
    take(static_cast<int>(first), density.value);
  }
}

}  // namespace wellwright
