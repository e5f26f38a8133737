// SPDX-License-Identifier: Apache-2.0
// What the operator sees at the nodes: band edge, inverse-mass poles, in the field, for one carrier.
#pragma once

#include <Eigen/Core>
#include <vector>

#include "wellwright/grid.hpp"
#include "wellwright/study.hpp"

namespace wellwright {

/// 1/m(E, z) = a0(z) + sum_j b_j(z) / (E - v_j(z)); all in the tilted energy of this carrier. Rows: element-local nodes.
struct Coefficients {
  Eigen::VectorXd edge;        ///< U [eV]: conduction edge, or for holes Ev_max - Ev, with field
  Eigen::VectorXd a0;          ///< [1/m0]
  Eigen::MatrixXd b;           ///< (node, pole) [eV/m0]
  Eigen::MatrixXd v;           ///< (node, pole) [eV]
  Eigen::VectorXd in_plane;    ///< ratio of the in-plane to the z inverse mass
  int poles() const { return static_cast<int>(b.cols()); }
};

/// The profile of one carrier on one grid.
struct Profile {
  Grid grid;
  Carrier carrier = Carrier::electron;
  Bands bands = Bands::two;
  Ends ends = Ends::hard;
  double field = 0;            ///< F [V/nm]
  double hole_edge = 0;        ///< Ev_max for holes [eV from the zero]
  Coefficients at;
};

/// How the coefficients and the element widths move with one parameter of the stack.
struct ProfileDerivative {
  Eigen::VectorXd edge, a0;    ///< d/dparameter at fixed reference coordinate of each element
  Eigen::MatrixXd b, v;
  Eigen::VectorXd width;       ///< d(element width)/dparameter, per element
};

struct Parameter {
  enum class Kind { thickness, composition, composition_to, field } kind = Kind::field;
  int layer = 0;  ///< 0-based
};

/// The profile of `carrier` on `grid`.
Profile make_profile(const Study& study, Carrier carrier, const Grid& grid);
/// Its derivative; the key the user wrote (field or bias) stays fixed.
ProfileDerivative differentiate(const Study& study, const Profile& profile, const Parameter& parameter);

/// First division of the stack into elements for levels up to `top` [eV] (in the carrier's own energy).
Grid first_grid(const Study& study, Carrier carrier, double top, int degree);

/// Band edges on the electron-energy axis, densities and permittivity at the nodes of `grid`, for files and figures.
struct EdgeProfile {
  Grid grid;
  Eigen::VectorXd conduction_band_edge, heavy_hole_band_edge, light_hole_band_edge;  ///< [eV], field included
  Eigen::VectorXd donor_density, acceptor_density;                                   ///< [nm^-3]
};
EdgeProfile edge_profile(const Study& study, const Grid& grid);

}  // namespace wellwright
