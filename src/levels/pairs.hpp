// SPDX-License-Identifier: Apache-2.0
// Eigenpairs on one grid and the ways to them: Rayleigh iteration, Lanczos, bisection; private to the room.
#pragma once

#include <Eigen/Core>
#include <vector>

#include "wellwright/hamiltonian.hpp"

namespace wellwright {

/// Eigenpairs of T(E), lowest first. Envelopes over global nodes, normalised in the full product:
/// psi' (-dT/dE) psi = 1.
struct Pairs {
  Eigen::VectorXd energy, residual;  ///< [eV]
  Eigen::MatrixXd psi;               ///< (global node, level)
  int count() const { return static_cast<int>(energy.size()); }
};

/// Levels closer than this are iterated as a block: their components chi may then be taken at one energy,
/// which costs an error of its square over the gap, below 1e-13 eV.
inline constexpr double cluster_width = 1e-7;

/// Diagonal of the mass matrix over global nodes; 0 where the ends hold a node (periodic: node N is node 0).
Eigen::VectorXd lumped_mass(const Hamiltonian& hamiltonian);

/// Rayleigh quotient iteration on the nonlinear T(E); holds its work space, so that iterating allocates
/// nothing.
class Rayleigh {
 public:
  Rayleigh(const Hamiltonian& hamiltonian, Factors& factors);
  /// Improves one pair in place until its residual, as the factors give it, is `enough` [eV], which is above
  /// floor(). The energy is then good to residual^2 over the distance to the next level. False when it does
  /// not converge.
  bool improve(double& energy, Eigen::Ref<Eigen::VectorXd> psi, double& residual, double enough);
  /// The same to rounding, with the residual of T(E) applied.
  bool polish(double& energy, Eigen::Ref<Eigen::VectorXd> psi, double& residual);
  /// Polishes a cluster of levels within about cluster_width: block inverse iteration and Rayleigh-Ritz.
  bool polish_block(Eigen::Ref<Eigen::VectorXd> energy, Eigen::Ref<Eigen::MatrixXd> psi,
                    Eigen::Ref<Eigen::VectorXd> residual);
  /// Sorts the pairs and polishes all of them, or improves them where `enough` does, clusters as blocks.
  /// False when a pair does not converge or two pairs fall on one level.
  bool polish_all(Pairs& pairs, double enough = 0);
  /// Residual that counts as converged [eV].
  double floor() const { return floor_; }

 private:
  double norm_of(const Eigen::VectorXd& residual) const;

  const Hamiltonian* h_;
  Factors* factors_;
  Eigen::VectorXd mass_, inverse_mass_;  // lumped; 0 where the ends hold a node
  Eigen::VectorXd x_, y_, slope_;
  double floor_;
  double stagnation_;  // below this a residual that falls no more is rounding
};

/// Levels below E, one factorisation each; E lies above every pole.
int levels_below(Factors& factors, double E);

/// An energy with exactly `first` levels below it, near the `count` levels that follow as measured by their
/// spread (except where levels coincide); `floor` has no more than `first` levels below it.
double energy_below_level(Factors& factors, int first, int count, double floor);

/// The `count` levels from number `first` (0-based from the lowest) by shift-invert Lanczos, checked by
/// counts; by bisection where Lanczos misses one. Residuals as in Rayleigh::polish. Throws NotConverged.
Pairs cold_levels(const Hamiltonian& hamiltonian, Factors& factors, int first, int count, double floor,
                  double enough = 0);

/// Levels `first` .. `first + count - 1` by counts and inverse iteration; none when two of them lie too close
/// to be parted. Throws NotConverged when there are not so many.
Pairs isolated_levels(const Hamiltonian& hamiltonian, Factors& factors, int first, int count, double floor,
                      double enough);

/// Shift-invert Lanczos on (psi, chi): the `count` levels just above `shift`; fewer when it did not converge.
Pairs lanczos(const Hamiltonian& hamiltonian, Factors& factors, double shift, int count);

/// Bisection on counts and (block) inverse iteration.
Pairs bisection(const Hamiltonian& hamiltonian, Factors& factors, int first, int count, double floor);

}  // namespace wellwright
