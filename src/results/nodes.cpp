// SPDX-License-Identifier: Apache-2.0
// From element-local nodes to the points of a file.
#include "results/nodes.hpp"

namespace wellwright {
namespace {
constexpr double aside = 1e-6;  // [nm] to either side of an interface
}

FileNodes::FileNodes(const Grid& grid) {
  const int n = grid.degree + 1;
  std::vector<double> z, weight;
  for (int e = 0; e < grid.elements(); ++e)
    for (int i = 0; i < n; ++i) {
      const int row = e * n + i;
      const auto layer = [&](int element) { return grid.layer[static_cast<std::size_t>(element)]; };
      if (i == 0 && e > 0 && layer(e) == layer(e - 1)) {
        rows_.back().second = row;
        weight.back() += grid.weight[row];
        continue;
      }
      double at = grid.z[row];
      if (i == 0 && e > 0) at += aside;
      if (i == grid.degree && e + 1 < grid.elements() && layer(e) != layer(e + 1)) at -= aside;
      rows_.emplace_back(row, row);
      z.push_back(at);
      weight.push_back(grid.weight[row]);
    }
  z_ = Eigen::Map<Eigen::VectorXd>(z.data(), static_cast<Eigen::Index>(z.size()));
  weight_ = Eigen::Map<Eigen::VectorXd>(weight.data(), static_cast<Eigen::Index>(weight.size()));
}

Eigen::MatrixXd FileNodes::take(const Eigen::MatrixXd& local) const {
  Eigen::MatrixXd out(static_cast<Eigen::Index>(rows_.size()), local.cols());
  for (std::size_t i = 0; i < rows_.size(); ++i)
    out.row(static_cast<Eigen::Index>(i)) = 0.5 * (local.row(rows_[i].first) + local.row(rows_[i].second));
  return out;
}

}  // namespace wellwright
