// SPDX-License-Identifier: Apache-2.0
// Grids from layer faces and cuts.
#include "wellwright/grid.hpp"

namespace wellwright {

Grid make_grid(const std::vector<double>& faces, const std::vector<std::vector<double>>& cuts, int degree) {
  Grid grid;
  grid.degree = degree;
  grid.boundaries.push_back(faces.front());
  for (std::size_t i = 0; i + 1 < faces.size(); ++i) {
    const double bottom = faces[i], thickness = faces[i + 1] - faces[i];
    if (i < cuts.size())
      for (const double cut : cuts[i]) {
        grid.boundaries.push_back(bottom + cut * thickness);
        grid.layer.push_back(static_cast<int>(i));
      }
    grid.boundaries.push_back(faces[i + 1]);
    grid.layer.push_back(static_cast<int>(i));
  }
  const ReferenceElement& reference = reference_element(degree);
  grid.z.resize(grid.rows());
  grid.weight.resize(grid.rows());
  for (int e = 0; e < grid.elements(); ++e) {
    const double half = 0.5 * grid.width(e);
    const double left = grid.boundaries[static_cast<std::size_t>(e)];
    for (int i = 0; i <= degree; ++i) {
      const int row = e * (degree + 1) + i;
      grid.z[row] = i == degree ? grid.boundaries[static_cast<std::size_t>(e) + 1]
                                : left + half * (1 + reference.nodes[i]);
      grid.weight[row] = half * reference.weights[i];
    }
  }
  return grid;
}

Eigen::MatrixXd slope_of(const Grid& grid, const Eigen::MatrixXd& local) {
  const int n = grid.degree + 1;
  const ReferenceElement& reference = reference_element(grid.degree);
  Eigen::MatrixXd slope(local.rows(), local.cols());
  for (int e = 0; e < grid.elements(); ++e)
    slope.middleRows(e * n, n).noalias() =
        (2 / grid.width(e)) * (reference.derivative * local.middleRows(e * n, n));
  return slope;
}

}  // namespace wellwright
