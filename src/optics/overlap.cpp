// SPDX-License-Identifier: Apache-2.0
// Overlaps of functions on two grids of one stack, and electron-hole pairs.
#include <algorithm>
#include <cmath>

#include "wellwright/optics.hpp"

namespace wellwright {

Grid common_grid(const Grid& one, const Grid& other) {
  std::vector<double> all = one.boundaries;
  all.insert(all.end(), other.boundaries.begin(), other.boundaries.end());
  std::sort(all.begin(), all.end());
  const double close = 1e-12 * std::max(1.0, all.back());
  std::vector<double> boundaries{all.front()};
  for (const double z : all)
    if (z - boundaries.back() > close) boundaries.push_back(z);
  // Exact for the product of both: degree p + q needs nodes for 2 d - 1 >= p + q.
  const int degree = std::min(highest_degree, (one.degree + other.degree + 2) / 2);
  return make_grid(boundaries, {}, degree);
}

Interband interband(const Levels& electrons, const Levels& holes) {
  Interband pairs;
  pairs.hole = holes.profile.carrier;
  // Electron energies count from the zero of energy, the lowest conduction edge of the table's media.
  pairs.gap = -holes.profile.hole_edge;
  const Grid grid = common_grid(electrons.profile.grid, holes.profile.grid);
  const Eigen::MatrixXd e = interpolate(electrons.profile.grid, electrons.envelope, grid);
  const Eigen::MatrixXd h = interpolate(holes.profile.grid, holes.envelope, grid);
  pairs.overlap = e.transpose() * (grid.weight.asDiagonal() * h);
  pairs.energy =
      electrons.energy.replicate(1, holes.count()) + holes.energy.transpose().replicate(electrons.count(), 1);
  pairs.energy.array() += pairs.gap;
  return pairs;
}

}  // namespace wellwright
