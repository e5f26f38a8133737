// SPDX-License-Identifier: Apache-2.0
// Anderson's acceleration of a fixed-point iteration; private to the room.
#pragma once

#include <Eigen/Core>
#include <vector>

namespace wellwright {

/// From x_k and g(x_k) the next x: the combination of the last few steps whose residuals g - x cancel best.
/// Source: D.G. Anderson, J. ACM 12, 547 (1965); H.F. Walker, P. Ni, SIAM J. Numer. Anal. 49, 1715 (2011).
class Acceleration {
 public:
  Eigen::VectorXd next(const Eigen::VectorXd& x, const Eigen::VectorXd& g);

 private:
  std::vector<Eigen::VectorXd> images_, residuals_;
};

}  // namespace wellwright
