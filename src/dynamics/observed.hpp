// SPDX-License-Identifier: Apache-2.0
// What a superposition shows at some times: layer probabilities, <z>, the density; private to the room.
#pragma once

#include "dynamics/movers.hpp"
#include "wellwright/dynamics.hpp"

namespace wellwright {

/// Densities of superpositions, with the matrices they are formed in kept from block to block.
struct Density {
  /// Sum over components of |component * a|^2: `value` becomes (time, point) for components (point, mover)
  /// and amplitudes (mover, time).
  void form(const std::vector<Eigen::MatrixXd>& components, const Eigen::MatrixXcd& a);

  RowMatrix value, part;
  Eigen::MatrixXd real, imaginary;
};

/// Layer probabilities and, last row, <z> [nm] at some times: of few levels as sums over pairs, (what, pair)
/// times (pair, time); of many from the density at the nodes, whose work grows with the levels and not with
/// their pairs.
class Observed {
 public:
  Observed(const Grid& grid, const Movers& movers, int layers);
  /// Times that may be asked for together.
  Eigen::Index times() const { return times_together(by_pairs_ ? pairs_ : grid_->rows()); }
  /// `values` becomes (layer and <z>, time) for amplitudes (mover, time).
  void at(const Eigen::MatrixXcd& a, Eigen::MatrixXd& values);

 private:
  Eigen::MatrixXd integrals(const Eigen::Ref<const Eigen::MatrixXd>& density) const;

  const Grid* grid_;
  const Movers* movers_;
  Eigen::Index rows_, pairs_;
  bool by_pairs_ = true;
  Eigen::MatrixXd of_pair_, interference_;
  Density density_;
};

/// Points of the density map [nm]: a quarter of a nanometre apart, within bounds.
std::vector<double> map_points(double length);

}  // namespace wellwright
