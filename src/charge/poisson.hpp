// SPDX-License-Identifier: Apache-2.0
// Poisson's equation for the potential energy of an electron on the elements; private to the room.
//
//   d/dz (eps_r dV/dz) = (e^2 / eps0) (p - n + ND - NA + sheets),   V = -e phi
//
// in weak form, so that eps_r dV/dz is continuous and jumps by (e^2 / eps0) sigma at a sheet without being
// told.
#pragma once

#include <Eigen/SparseCholesky>
#include <optional>

#include "wellwright/charge.hpp"

namespace wellwright {

/// Charge that does not move, in units of e.
struct FixedCharge {
  Eigen::VectorXd density;  ///< element-local nodes [nm^-3]: donors - acceptors, polarization of gradings
  Eigen::VectorXd sheet;    ///< element boundaries [nm^-2]: polarization
  double donors = 0, acceptors = 0;  ///< sheet densities [nm^-2]
  double polarization = 0;           ///< sum of all polarization charge [nm^-2]
  double total() const { return donors - acceptors + polarization; }
};
FixedCharge fixed_charge(const Study& study, const Grid& grid);

/// What holds the potential at the faces, in the frame in which V is solved.
struct Hold {
  std::optional<double> bottom, top;  ///< V at the face [eV]; absent: no field of the stack's own outside
  bool periodic = false;
};

class Poisson {
 public:
  /// `permittivity` at the element-local nodes.
  Poisson(const Grid& grid, const Eigen::VectorXd& permittivity, const Hold& hold);

  int nodes() const { return static_cast<int>(mass_.size()); }
  /// Load of a charge density at the local nodes [nm^-3] and of sheets at the boundaries: global nodes
  /// [nm^-2].
  Eigen::VectorXd load(const Eigen::VectorXd& density) const;
  Eigen::VectorXd load_of_sheets(const Eigen::VectorXd& sheet) const;
  /// Stiffness times V plus (e^2/eps0) charge: zero at the solution, and zero where V is held.
  Eigen::VectorXd residual(const Eigen::VectorXd& V, const Eigen::VectorXd& charge) const;
  /// Solves (stiffness + (e^2/eps0) diag(response)) x = right, x = 0 where V is held. `response` over global
  /// nodes [nm^-2/eV], not negative. Where nothing holds the level of V and nothing responds, x is 0 at the
  /// bottom.
  void factor(const Eigen::VectorXd& response);
  Eigen::VectorXd solve(const Eigen::VectorXd& right) const;
  bool held(int node) const { return held_[static_cast<std::size_t>(node)]; }
  bool floating() const;  ///< nothing holds the level of V
  /// The one global node of each element-local node, node N on node 0 when periodic.
  int node_of(int row) const { return node_[static_cast<std::size_t>(row)]; }
  /// Values at the element-local nodes.
  Eigen::VectorXd scatter(const Eigen::VectorXd& global) const;

 private:
  const Grid* grid_;
  std::vector<int> node_;
  std::vector<bool> held_;
  Eigen::VectorXd mass_;
  Eigen::SparseMatrix<double> stiffness_;
  Eigen::SimplicialLDLT<Eigen::SparseMatrix<double>> factors_;
  bool pinned_bottom_ = false;  ///< node 0 held only to make the matrix regular
};

}  // namespace wellwright
