// SPDX-License-Identifier: Apache-2.0
// Donors, acceptors, and the bound charge of polarization: sheets at interior interfaces, -dP/dz in gradings.
#include <algorithm>
#include <cmath>

#include "charge/poisson.hpp"

namespace wellwright {

FixedCharge fixed_charge(const Study& study, const Grid& grid) {
  const Stack& stack = study.stack;
  const int n = grid.degree + 1, elements = grid.elements();
  FixedCharge charge;
  charge.density.setZero(grid.rows());
  charge.sheet.setZero(elements + 1);
  for (const Layer& layer : stack.layers) {
    charge.donors += layer.donors;
    charge.acceptors += layer.acceptors;
  }
  const auto faces = stack.faces();
  Eigen::VectorXd P = Eigen::VectorXd::Zero(grid.rows());
  for (int e = 0; e < elements; ++e) {
    const int number = grid.layer[static_cast<std::size_t>(e)];
    const auto at = static_cast<std::size_t>(number);
    const Layer& layer = stack.layers[at];
    charge.density.segment(e * n, n).setConstant((layer.donors - layer.acceptors) / layer.thickness);
    if (!study.model.polarization) continue;
    for (int i = 0; i < n; ++i) {
      const int row = e * n + i;
      P[row] = layer.grading
                   ? bands_in_layer(stack, number,
                                    std::clamp((grid.z[row] - faces[at]) / layer.thickness, 0.0, 1.0))
                         .polarization
                   : stack.bands[at].polarization;
    }
  }
  if (!study.model.polarization || P.isZero(0)) return charge;
  const Eigen::VectorXd slope = slope_of(grid, P);
  charge.density -= slope;
  for (int e = 1; e < elements; ++e) charge.sheet[e] = P[e * n - 1] - P[e * n];
  if (stack.periodic) charge.sheet[0] = P[grid.rows() - 1] - P[0];
  charge.polarization = charge.sheet.sum() - grid.weight.dot(slope);
  if (std::abs(charge.polarization) < 1e-12 * charge.sheet.cwiseAbs().sum())
    charge.polarization = 0;  // rounding
  return charge;
}

}  // namespace wellwright
