// SPDX-License-Identifier: Apache-2.0
// Electrons and holes without size quantisation, where the loop begins; private to the room.
#pragma once

#include <utility>

#include "wellwright/charge.hpp"

namespace wellwright {

/// The classical gas at the nodes of a grid in the study's own edges and field.
class ClassicalGas {
 public:
  /// `edge` and `mass` of the conduction band at the element-local nodes [eV], [m0].
  ClassicalGas(const Study& study, const Grid& grid, Eigen::VectorXd edge, Eigen::VectorXd mass, bool holes);
  /// Charge density and its derivative in V at a node, where V = shift [nm^-3], [nm^-3/eV].
  std::pair<double, double> charge(int row, double fermi, double shift) const;
  /// The Fermi level at which the gas in flat V balances a fixed charge [nm^-2].
  double neutral_fermi(double fixed) const;

 private:
  double density(double filling, double mass) const;

  const Grid* grid_;
  Eigen::VectorXd edge_, mass_, hole_edge_, hole_mass_;
  bool holes_;
  double kT_;
};

}  // namespace wellwright
