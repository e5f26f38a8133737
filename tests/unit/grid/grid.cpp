// SPDX-License-Identifier: Apache-2.0
// Nodes, weights, derivatives and interpolation of the spectral elements.
#include "wellwright/grid.hpp"

#include <catch2/catch.hpp>
#include <cmath>

using namespace wellwright;

TEST_CASE("Lobatto nodes and weights are the tabled ones") {
  // M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions (1964), table 25.6 (n = 5 and n = 6).
  const ReferenceElement& four = reference_element(4);
  CHECK(four.nodes[3] == Approx(std::sqrt(3.0 / 7)).epsilon(1e-15));
  CHECK(four.weights[0] == Approx(0.1).epsilon(1e-14));
  CHECK(four.weights[1] == Approx(49.0 / 90).epsilon(1e-14));
  CHECK(four.weights[2] == Approx(32.0 / 45).epsilon(1e-14));
  const ReferenceElement& five = reference_element(5);
  CHECK(five.nodes[4] == Approx(0.765055323929465).epsilon(1e-14));
  CHECK(five.nodes[3] == Approx(0.285231516480645).epsilon(1e-14));
  CHECK(five.weights[4] == Approx(0.378474956297847).epsilon(1e-14));
}

TEST_CASE("Quadrature is exact to degree 2p - 1 and no further; derivatives are exact to degree p") {
  for (int p = 1; p <= highest_degree; ++p) {
    const ReferenceElement& e = reference_element(p);
    CAPTURE(p);
    for (int power = 0; power <= 2 * p; ++power) {
      const double sum = e.weights.dot(e.nodes.array().pow(power).matrix());
      const double exact = power % 2 == 0 ? 2.0 / (power + 1) : 0;
      if (power < 2 * p)
        CHECK(sum == Approx(exact).margin(4e-15));
      else if (p < 10)
        CHECK(std::abs(sum - exact) > 1e-8);
    }
    for (int power = 1; power <= p; ++power) {
      const Eigen::VectorXd slope = e.derivative * e.nodes.array().pow(power).matrix();
      const Eigen::VectorXd exact = power * e.nodes.array().pow(power - 1).matrix();
      CHECK((slope - exact).cwiseAbs().maxCoeff() < 1e-11);
    }
  }
}

TEST_CASE("A grid has its boundaries at faces and cuts, and its weights sum to the length") {
  const Grid grid = make_grid({0, 10, 12.5, 40}, {{0.5}, {}, {0.2, 0.6}}, 7);
  CHECK(grid.boundaries == std::vector<double>{0, 5, 10, 12.5, 18, 29, 40});
  CHECK(grid.layer == std::vector<int>{0, 0, 1, 2, 2, 2});
  CHECK(grid.rows() == 6 * 8);
  CHECK(grid.weight.sum() == Approx(40).epsilon(1e-15));
  CHECK(grid.z[0] == 0);
  CHECK(grid.z[7] == grid.z[8]);  // a boundary stands twice
  CHECK(grid.z[grid.rows() - 1] == 40);
}

TEST_CASE("Interpolation between grids keeps polynomials and jumps at element boundaries") {
  const Grid coarse = make_grid({0, 3, 8}, {{}, {}}, 6);
  const Grid fine = make_grid({0, 3, 8}, {{0.5}, {0.25, 0.5}}, 9);
  const auto f = [](double z, int layer) { return layer == 0 ? std::pow(z - 1, 5) : 3 - z * z; };
  Eigen::MatrixXd values(coarse.rows(), 1);
  for (int r = 0; r < coarse.rows(); ++r) values(r, 0) = f(coarse.z[r], coarse.layer[r / 7]);
  const Eigen::MatrixXd out = interpolate(coarse, values, fine);
  for (int r = 0; r < fine.rows(); ++r)
    CHECK(out(r, 0) == Approx(f(fine.z[r], fine.layer[r / 10])).margin(1e-12));
  const Eigen::MatrixXd points = interpolate(coarse, values, std::vector<double>{0.7, 2.999, 3.001, 7.9});
  CHECK(points(0, 0) == Approx(f(0.7, 0)).margin(1e-13));
  CHECK(points(1, 0) == Approx(f(2.999, 0)).margin(1e-12));
  CHECK(points(2, 0) == Approx(f(3.001, 1)).margin(1e-12));
  CHECK(points(3, 0) == Approx(f(7.9, 1)).margin(1e-12));
}

TEST_CASE("A polynomial of the lower degree is kept when the degree rises") {
  const Grid low = make_grid({0, 3, 8}, {{0.4}, {0.25}}, 5), high = make_grid({0, 3, 8}, {{0.4}, {0.25}}, 8);
  const auto nodes = [](const Grid& grid) {
    Eigen::VectorXd z(grid.elements() * grid.degree + 1);
    for (int e = 0; e < grid.elements(); ++e)
      z.segment(e * grid.degree, grid.degree + 1) = grid.z.segment(e * (grid.degree + 1), grid.degree + 1);
    return z;
  };
  const auto values = [](const Eigen::VectorXd& z) {
    Eigen::MatrixXd f(z.size(), 2);
    f.col(0) = (0.3 * z.array() - 1).pow(5);
    f.col(1) = z.array().square() - 4 * z.array();
    return f;
  };
  const Eigen::MatrixXd raised = raise_degree(low, values(nodes(low)), 8);
  REQUIRE(raised.rows() == nodes(high).size());
  CHECK((raised - values(nodes(high))).cwiseAbs().maxCoeff() < 1e-13);
}
