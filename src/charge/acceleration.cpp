// SPDX-License-Identifier: Apache-2.0
// Anderson's acceleration by least squares over the last steps.
#include "charge/acceleration.hpp"

#include <Eigen/QR>

namespace wellwright {
namespace {

constexpr std::size_t remembered = 5;

}  // namespace

Eigen::VectorXd Acceleration::next(const Eigen::VectorXd& x, const Eigen::VectorXd& g) {
  images_.push_back(g);
  residuals_.push_back(g - x);
  if (images_.size() > remembered + 1) {
    images_.erase(images_.begin());
    residuals_.erase(residuals_.begin());
  }
  const auto m = static_cast<Eigen::Index>(images_.size()) - 1;
  if (m == 0) return g;
  Eigen::MatrixXd change(x.size(), m), of_images(x.size(), m);
  for (Eigen::Index j = 0; j < m; ++j) {
    const auto at = static_cast<std::size_t>(j);
    change.col(j) = residuals_[at + 1] - residuals_[at];
    of_images.col(j) = images_[at + 1] - images_[at];
  }
  const Eigen::VectorXd share = change.colPivHouseholderQr().solve(residuals_.back());
  return g - of_images * share;
}

}  // namespace wellwright
