// SPDX-License-Identifier: Apache-2.0
// What the operator sees at the nodes: band edge, inverse-mass poles, in the field, for one carrier.
#pragma once

#include <Eigen/Core>
#include <vector>

#include "wellwright/grid.hpp"
#include "wellwright/study.hpp"

namespace wellwright {

/// 1/m(E, z) = a0(z) + sum_j b_j(z) / (E - v_j(z)); all in the tilted energy of this carrier. Rows:
/// element-local nodes.
struct Coefficients {
  Eigen::VectorXd edge;      ///< U [eV]: conduction edge, or for holes Ev_max - Ev, with field
  Eigen::VectorXd a0;        ///< [1/m0]
  Eigen::MatrixXd b;         ///< (node, pole) [eV/m0]
  Eigen::MatrixXd v;         ///< (node, pole) [eV]
  Eigen::VectorXd in_plane;  ///< ratio of the in-plane to the z inverse mass
  int poles() const { return static_cast<int>(b.cols()); }
};

/// Potential energy of an electron in the field of the stack's own charge and polarization, a polynomial on
/// each element.
struct Potential {
  Grid grid;               ///< its boundaries hold every layer face
  Eigen::VectorXd energy;  ///< element-local nodes [eV]: -e phi, applied field aside; shifts all bands
  Eigen::VectorXd exchange_correlation;  ///< [eV], of electrons only; empty: none
  bool empty() const { return energy.size() == 0; }
};

/// The profile of one carrier on one grid.
struct Profile {
  Grid grid;
  Carrier carrier = Carrier::electron;
  Bands bands = Bands::two;
  Ends ends = Ends::hard;
  double field = 0;      ///< F [V/nm]
  double hole_edge = 0;  ///< Ev_max for holes [eV from the zero]
  Coefficients at;
};

/// How the coefficients of some rows move with one parameter of the stack at fixed place inside their
/// elements. Rows outside first_row .. first_row + edge.size() do not move (other than by geometry and
/// field).
struct MaterialDerivative {
  int first_row = 0;
  Eigen::VectorXd edge, a0;
  Eigen::MatrixXd b, v;
};

/// The profile of `carrier` on `grid`, with `potential` in every band.
Profile make_profile(const Study& study, Carrier carrier, const Grid& grid, const Potential& potential = {});
/// Adds a potential energy of electrons and their exchange-correlation energy [eV], at the element-local
/// nodes of the profile's grid, to all its bands; holes see the first with the sign turned and not the
/// second.
void add_potential(Profile& profile, const Eigen::VectorXd& energy,
                   const Eigen::VectorXd& exchange_correlation);
/// The cuts of a grid that follows these layer faces.
std::vector<std::vector<double>> cuts_of(const Grid& grid, const std::vector<double>& faces);

/// Derivatives of the coefficients, by central differences of sixth order of the material table's smooth
/// functions (relative error about 1e-11). The zero of energy and the reference gap of `offset_ratio` stay
/// fixed.
class ProfileDerivatives {
 public:
  ProfileDerivatives(const Study& study, const Profile& profile);
  /// With the composition of layer `layer` (0-based; `far_end`: of the `to` end of a graded layer). The layer
  /// must have one.
  MaterialDerivative composition(int layer, bool far_end);
  /// With the thickness of `layer`: what is left beside geometry and field, the change of the smeared
  /// fractions near its faces. Empty without interdiffusion.
  MaterialDerivative thickness(int layer);

 private:
  const Study* study_;
  const Profile* profile_;
  Study work_;  // a copy whose layers are moved and put back
};

/// First division of the layers into elements, as cuts for make_grid, for levels up to `top` [eV] in the
/// carrier's own energy: an element spans about five radians or seven decay lengths. Elements shrink by 1/5
/// towards a face at which a grading is not analytic, and are no longer than two smearing lengths near a
/// smeared interface.
std::vector<std::vector<double>> first_cuts(const Study& study, Carrier carrier, double top);
/// An energy below which about `count` levels lie, by counting half waves [eV].
double guessed_top(const Study& study, Carrier carrier, int count);
/// Every element halved.
std::vector<std::vector<double>> halved(const std::vector<std::vector<double>>& cuts);

/// Band edges on the electron-energy axis, densities and permittivity at the nodes of `grid`, for files and
/// figures.
struct EdgeProfile {
  Grid grid;
  Eigen::VectorXd conduction_band_edge, heavy_hole_band_edge, light_hole_band_edge;  ///< [eV], field included
  Eigen::VectorXd donor_density, acceptor_density;                                   ///< [nm^-3]
};
EdgeProfile edge_profile(const Study& study, const Grid& grid, const Potential& potential = {});

}  // namespace wellwright
