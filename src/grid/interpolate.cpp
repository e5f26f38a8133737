// SPDX-License-Identifier: Apache-2.0
// Barycentric Lagrange interpolation inside elements.
#include <algorithm>
#include <array>
#include <cmath>
#include <mutex>

#include "wellwright/grid.hpp"

namespace wellwright {
namespace {

// Barycentric weights of the GLL nodes (J.-P. Berrut, L.N. Trefethen, SIAM Rev. 46, 501 (2004)).
Eigen::VectorXd barycentric_weights(const Eigen::VectorXd& nodes) {
  const auto n = nodes.size();
  Eigen::VectorXd w = Eigen::VectorXd::Ones(n);
  for (Eigen::Index i = 0; i < n; ++i)
    for (Eigen::Index j = 0; j < n; ++j)
      if (i != j) w[i] /= 2 * (nodes[i] - nodes[j]);  // the factor 2 keeps the products near one
  return w;
}

// Row of interpolation weights for the point x of the reference element.
void interpolation_row(const Eigen::VectorXd& nodes, const Eigen::VectorXd& w, double x,
                       Eigen::VectorXd& row) {
  for (Eigen::Index i = 0; i < nodes.size(); ++i) {
    if (x == nodes[i]) {
      row.setZero();
      row[i] = 1;
      return;
    }
    row[i] = w[i] / (x - nodes[i]);
  }
  row /= row.sum();
}

Eigen::MatrixXd make_between_degrees(int from, int to) {
  const ReferenceElement &here = reference_element(from), &there = reference_element(to);
  const Eigen::VectorXd w = barycentric_weights(here.nodes);
  Eigen::MatrixXd matrix(to + 1, from + 1);
  Eigen::VectorXd row(from + 1);
  for (int i = 0; i <= to; ++i) {
    interpolation_row(here.nodes, w, there.nodes[i], row);
    matrix.row(i) = row.transpose();
  }
  return matrix;
}

// Values at the nodes of degree `to` from those at the nodes of degree `from`; each matrix is made once.
const Eigen::MatrixXd& between_degrees(int from, int to) {
  constexpr std::size_t degrees = highest_degree + 1;
  static std::array<Eigen::MatrixXd, degrees * degrees> all;
  static std::array<std::once_flag, degrees * degrees> made;
  const std::size_t at = static_cast<std::size_t>(from) * degrees + static_cast<std::size_t>(to);
  std::call_once(made[at], [&] { all[at] = make_between_degrees(from, to); });
  return all[at];
}

int element_at(const Grid& grid, double z) {
  const auto& b = grid.boundaries;
  const auto after = std::upper_bound(b.begin(), b.end(), z);
  return std::clamp(static_cast<int>(after - b.begin()) - 1, 0, grid.elements() - 1);
}

class Interpolator {
 public:
  Interpolator(const Grid& grid, const Eigen::MatrixXd& values)
      : grid_(grid),
        values_(values),
        nodes_(reference_element(grid.degree).nodes),
        w_(barycentric_weights(nodes_)),
        row_(grid.degree + 1) {}
  template <class Out>
  void at(int element, double z, Out out) {
    const double left = grid_.boundaries[static_cast<std::size_t>(element)];
    const double x = std::clamp(2 * (z - left) / grid_.width(element) - 1, -1.0, 1.0);
    interpolation_row(nodes_, w_, x, row_);
    out.noalias() = row_.transpose() * values_.middleRows(element * (grid_.degree + 1), grid_.degree + 1);
  }

 private:
  const Grid& grid_;
  const Eigen::MatrixXd& values_;
  const Eigen::VectorXd& nodes_;
  Eigen::VectorXd w_, row_;
};

}  // namespace

Eigen::MatrixXd interpolate(const Grid& from, const Eigen::MatrixXd& values, const Grid& to) {
  Eigen::MatrixXd out(to.rows(), values.cols());
  if (from.boundaries == to.boundaries) {  // another degree on the same elements: one small matrix for all
    const Eigen::MatrixXd& matrix = between_degrees(from.degree, to.degree);
    for (int e = 0; e < to.elements(); ++e)
      out.middleRows(e * (to.degree + 1), to.degree + 1) =
          matrix.lazyProduct(values.middleRows(e * (from.degree + 1), from.degree + 1));
    return out;
  }
  Interpolator interpolator(from, values);
  int source = 0;
  for (int e = 0; e < to.elements(); ++e) {
    const double middle =
        0.5 * (to.boundaries[static_cast<std::size_t>(e)] + to.boundaries[static_cast<std::size_t>(e) + 1]);
    while (source + 1 < from.elements() && from.boundaries[static_cast<std::size_t>(source) + 1] < middle)
      ++source;
    for (int i = 0; i <= to.degree; ++i) {
      const int row = e * (to.degree + 1) + i;
      interpolator.at(source, to.z[row], out.row(row));
    }
  }
  return out;
}

Eigen::MatrixXd interpolate(const Grid& from, const Eigen::MatrixXd& values,
                            const std::vector<double>& points) {
  Eigen::MatrixXd out(static_cast<Eigen::Index>(points.size()), values.cols());
  Interpolator interpolator(from, values);
  for (std::size_t i = 0; i < points.size(); ++i)
    interpolator.at(element_at(from, points[i]), points[i], out.row(static_cast<Eigen::Index>(i)));
  return out;
}

Eigen::MatrixXd raise_degree(const Grid& from, const Eigen::MatrixXd& nodal, int degree) {
  const Eigen::MatrixXd& matrix = between_degrees(from.degree, degree);
  const int elements = from.elements();
  Eigen::MatrixXd out(elements * degree + 1, nodal.cols());
  for (Eigen::Index column = 0; column < nodal.cols(); ++column) {
    // Columns of these matrices are elements; those on the right share their boundaries.
    using Strided = Eigen::OuterStride<>;
    const Eigen::Map<const Eigen::MatrixXd, 0, Strided> x(&nodal(0, column), from.degree + 1, elements,
                                                          Strided(from.degree));
    Eigen::Map<Eigen::MatrixXd, 0, Strided> y(&out(0, column), degree, elements, Strided(degree));
    y.noalias() = matrix.topRows(degree) * x;
    out(elements * degree, column) = nodal(elements * from.degree, column);
  }
  return out;
}

}  // namespace wellwright
