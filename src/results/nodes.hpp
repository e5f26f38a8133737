// SPDX-License-Identifier: Apache-2.0
// The strictly increasing z axis of a file from element-local nodes; private to the room.
#pragma once

#include <Eigen/Core>
#include <vector>

#include "wellwright/grid.hpp"

namespace wellwright {

/// Points of a grid for a file: an interface between layers stands as two points 1e-6 nm to either side, a
/// boundary between elements of one layer as one.
class FileNodes {
 public:
  explicit FileNodes(const Grid& grid);
  const Eigen::VectorXd& z() const { return z_; }
  const Eigen::VectorXd& weight() const { return weight_; }
  /// Columns of element-local values at the points: the mean of both sides where two nodes are one point.
  Eigen::MatrixXd take(const Eigen::MatrixXd& local) const;

 private:
  std::vector<std::pair<int, int>> rows_;
  Eigen::VectorXd z_, weight_;
};

}  // namespace wellwright
