// SPDX-License-Identifier: Apache-2.0
// Spectral elements with Gauss-Lobatto-Legendre nodes, every interface an element boundary.
#pragma once

#include <Eigen/Core>
#include <vector>

namespace wellwright {

/// Gauss-Lobatto-Legendre nodes on [-1, 1], their weights, and the derivative matrix (node, basis function).
/// Source: C. Canuto et al., Spectral Methods: Fundamentals in Single Domains, Springer (2006), ch. 2.
struct ReferenceElement {
  int degree = 0;
  Eigen::VectorXd nodes, weights;
  Eigen::MatrixXd derivative;
};

inline constexpr int highest_degree = 24;

/// The reference element of `degree` (1 to highest_degree), made once.
const ReferenceElement& reference_element(int degree);

/// Elements of one degree. Arrays over nodes are element-local: element e holds rows e*(p+1) .. e*(p+1)+p, so
/// that a boundary between two elements stands twice and coefficients may jump there.
struct Grid {
  int degree = 0;
  std::vector<double> boundaries;  ///< element boundaries [nm], size elements + 1
  std::vector<int> layer;          ///< layer (0-based) of each element
  Eigen::VectorXd z;               ///< element-local nodes [nm]
  Eigen::VectorXd weight;          ///< quadrature weights [nm]: sum(weight f) is the integral of f

  int elements() const { return static_cast<int>(layer.size()); }
  int rows() const { return elements() * (degree + 1); }  ///< element-local nodes
  double width(int element) const { return boundaries[element + 1] - boundaries[element]; }
};

/// Element boundaries as parts of their layer: `cuts[i]` holds the inner cuts of layer i, increasing, in (0,
/// 1).
Grid make_grid(const std::vector<double>& faces, const std::vector<std::vector<double>>& cuts, int degree);

/// d/dz of element-local functions [1/nm], each column by itself.
Eigen::MatrixXd slope_of(const Grid& grid, const Eigen::MatrixXd& local);

/// Values of an element-local function on `to` from its values on `from`, where both have the same boundaries
/// or `to` refines `from` in degree or elements. Columns are functions.
Eigen::MatrixXd interpolate(const Grid& from, const Eigen::MatrixXd& values, const Grid& to);

/// Values at the global nodes (each element boundary once) of the same elements with another degree. Columns
/// are functions.
Eigen::MatrixXd raise_degree(const Grid& from, const Eigen::MatrixXd& nodal, int degree);

/// Values at arbitrary increasing points z [nm]; row: point, column: function.
Eigen::MatrixXd interpolate(const Grid& from, const Eigen::MatrixXd& values,
                            const std::vector<double>& points);

}  // namespace wellwright
