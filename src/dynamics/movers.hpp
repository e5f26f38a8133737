// SPDX-License-Identifier: Apache-2.0
// The levels that take part in a motion, and their amplitudes at some times; private to the room.
#pragma once

#include <Eigen/Core>
#include <vector>

#include "wellwright/levels.hpp"

namespace wellwright {

inline constexpr Eigen::Index most_values = 1 << 22;  ///< of one working matrix: 32 MB

/// The levels whose amplitude is not zero: a mix of two of a thousand costs as two.
struct Movers {
  Movers(const Levels& levels, const Eigen::VectorXcd& all);
  Eigen::Index count() const { return energy.size(); }

  Eigen::VectorXd energy;
  Eigen::VectorXcd amplitude;
  std::vector<Eigen::MatrixXd> components;  ///< psi, then each chi: (element-local node, mover)
};

/// Times that can be formed together when a working matrix has this many rows.
Eigen::Index times_together(Eigen::Index rows);

/// c_k exp(-i E_k t / hbar) at some times: (level, time).
void phases(const Eigen::VectorXd& energy, const Eigen::VectorXcd& amplitude,
            const Eigen::Ref<const Eigen::VectorXd>& time, Eigen::MatrixXcd& out);

}  // namespace wellwright
