// SPDX-License-Identifier: Apache-2.0
// From eigenpairs to Levels: components, groups, signs and the numbers of each level; private to the room.
#pragma once

#include "levels/pairs.hpp"
#include "wellwright/levels.hpp"

namespace wellwright {

/// Levels on the operator's grid from its pairs; energies and residuals are taken over, estimates and
/// certificate are left to the caller.
Levels assemble(const Hamiltonian& hamiltonian, const Pairs& pairs);

/// The levels with these indices alone; certificate and profile are kept.
Levels chosen(const Levels& levels, const std::vector<int>& indices);

/// Density of all components of one pair at the element-local nodes [1/nm], normalised in the full product.
Eigen::VectorXd density_of(const Hamiltonian& hamiltonian, double energy, const Eigen::VectorXd& psi);

}  // namespace wellwright
