// SPDX-License-Identifier: Apache-2.0
// Filled subbands, the potential of their charge, and the two made consistent.
#pragma once

#include <optional>
#include <vector>

#include "wellwright/levels.hpp"

namespace wellwright {

/// How the levels of one carrier are filled.
struct Filled {
  Carrier carrier = Carrier::electron;
  double temperature = 0;       ///< of the carriers [K]; 0 is the limit
  Eigen::VectorXd fermi_level;  ///< (level) [eV], in the carrier's own energy; one value but for `per module`
  Eigen::VectorXd sheet_density;  ///< (level), both spins [nm^-2]
  double widest_k = 0;            ///< of the dispersion used [1/nm]
};

/// Sheet density of one subband [nm^-2] with the dispersion E(k) - E(0) sampled at `k` [1/nm], at `fermi` -
/// E(0) = `filling` [eV] and `temperature` [K]; both spins.
double subband_density(const Eigen::VectorXd& k, const Eigen::VectorXd& above, double filling,
                       double temperature);

/// Exchange-correlation potential and its derivative in the density [eV], [eV nm^3].
struct LocalExchange {
  double potential = 0, derivative = 0;
};
/// Hedin and Lundqvist at a density [nm^-3] with the local mass [m0] and relative permittivity; zero below
/// 1e-12 nm^-3.
LocalExchange hedin_lundqvist(double density, double mass, double permittivity);

/// One step of the self-consistent loop.
struct ChargeStep {
  double change = 0;       ///< largest change of a level [eV]
  double fermi_level = 0;  ///< [eV]
};

/// The charge of a stack in equilibrium with its levels.
struct Charge {
  Potential potential;     ///< zero where no charge is asked for
  double fermi_level = 0;  ///< [eV] on the electron's axis; of the first module with `per module`
  std::vector<double> module_fermi_level;
  double donor_sheet_density = 0, acceptor_sheet_density = 0;  ///< [nm^-2]
  double neutrality = 0;  ///< (holes - electrons + donors - acceptors + faces) over the donors
  Grid grid;              ///< of the densities
  Eigen::VectorXd electron_density, hole_density;  ///< element-local nodes [nm^-3]
  std::vector<Filled> filled;                      ///< one a carrier
  std::vector<ChargeStep> history;
  bool converged = true;
};

/// Fills the study's levels and, with `charge: self-consistent`, makes levels and potential agree to 1e-7 eV.
/// The levels used are those of a grid of its own, as many as hold charge. `converged` is false when the loop
/// did not settle. Throws NotConverged, Stopped.
Charge solve_charge(const Study& study, const Progress& progress = {});
/// Whether the study has charge to solve: doping, polarization, pinned faces.
bool has_charge(const Study& study);
/// How levels of this study are filled at the Fermi levels of its charge.
Filled fill(const Study& study, const Levels& levels, const Dispersion& dispersion, const Charge& charge);
/// How far in k a dispersion must go so that the carriers of `charge` end inside it [1/nm].
double widest_filled_k(const Charge& charge, Carrier carrier);

}  // namespace wellwright
