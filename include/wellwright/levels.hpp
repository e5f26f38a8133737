// SPDX-License-Identifier: Apache-2.0
// Eigenpairs of the BenDaniel-Duke operator with their certificate, dispersion and derivatives.
#pragma once

#include <Eigen/Core>
#include <memory>
#include <string>
#include <vector>

#include "wellwright/hamiltonian.hpp"
#include "wellwright/profile.hpp"

namespace wellwright {

/// What is known for certain about a set of levels.
struct Certificate {
  bool certified = false;
  int count_below = 0;                       ///< levels of the operator below window_bottom
  double window_bottom = 0, window_top = 0;  ///< [eV]: between them there are exactly the levels listed
  std::string reason;                        ///< why not certified; empty when it is
};

/// Levels of one carrier, lowest first; level index 0-based in memory, 1-based for users.
struct Levels {
  Profile profile;                         ///< on the final grid
  Eigen::VectorXd energy;                  ///< [eV], in the carrier's own energy (holes positive downward)
  Eigen::VectorXd error_estimate;          ///< [eV]
  Eigen::VectorXd residual;                ///< [eV]
  Eigen::VectorXd conduction_fraction;     ///< weight of psi in the full product
  Eigen::VectorXd mean_position, spread;   ///< <z>, rms [nm], all components
  Eigen::VectorXd in_plane_mass;           ///< [m0]
  std::vector<int> group;                  ///< number of the group (from 1) of levels closer than 1e-10 eV
  std::vector<int> bound;                  ///< 1: below the lower of the two outer edges; 0: box level
  Eigen::MatrixXd envelope;                ///< psi (element-local node, level) [nm^-1/2]
  std::vector<Eigen::MatrixXd> companion;  ///< chi_j (element-local node, level), one a pole
  Eigen::MatrixXd layer_probability;       ///< (level, layer), all components
  Certificate certificate;
  std::shared_ptr<const Potential> potential;  ///< in which they were solved; null: none

  int count() const { return static_cast<int>(energy.size()); }
  /// Probability density of all components (element-local node, level) [1/nm]: sum(weight density) = 1.
  Eigen::MatrixXd density() const;
  /// Full-product overlap matrix <i|j> with weight function g(z) at the nodes (1: orthonormality, z:
  /// dipoles).
  Eigen::MatrixXd moment(const Eigen::VectorXd& g) const;
};

/// Solves the study's level request for one carrier in `potential`, refining until the estimate meets
/// `accuracy`. Throws NotConverged, Stopped.
Levels solve_levels(const Study& study, Carrier carrier, Notes& notes, const Progress& progress,
                    const Potential& potential = {});

/// The lowest `count` levels of a profile on its own grid, without refinement or certificate; from `near`,
/// levels of a neighbouring profile on the same grid, where given and close enough. Throws NotConverged.
Levels levels_on_profile(const Profile& profile, int count, const Levels* near = nullptr);

/// The lowest `count` levels above every valence edge on one given grid, without refinement [eV]; for tables
/// of the order of convergence. Throws NotConverged.
Eigen::VectorXd energies_on_grid(const Study& study, Carrier carrier, const Grid& grid, int count);

/// E(k) of each level: row level, column k [nm^-1].
struct Dispersion {
  Eigen::VectorXd k;
  Eigen::MatrixXd energy;  ///< [eV]
};
/// Throws NotConverged, Stopped.
Dispersion in_plane_dispersion(const Levels& levels, const Eigen::VectorXd& k, const Progress& progress = {});

/// Energies over the Bloch phase of a periodic stack: row band, column phase (0 to pi) [eV].
struct Minibands {
  Eigen::VectorXd bloch_phase;  ///< [rad], 0 to pi
  Eigen::MatrixXd energy;
};
Minibands minibands(const Levels& levels, int phases);

/// Derivatives of levels and of listed transitions (Hellmann-Feynman in the full product).
struct Sensitivity {
  Eigen::MatrixXd thickness,
      composition;        ///< (level, layer) [eV/nm], [eV]; NaN where the layer has no composition
  Eigen::VectorXd field;  ///< (level) [eV per V/nm]
  std::vector<std::pair<int, int>> transitions;                  ///< counted from 1
  Eigen::MatrixXd transition_thickness, transition_composition;  ///< (transition, layer)
  Eigen::VectorXd transition_field;
};
Sensitivity sensitivity(const Study& study, const Levels& levels,
                        const std::vector<std::pair<int, int>>& transitions);

}  // namespace wellwright
