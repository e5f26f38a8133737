// SPDX-License-Identifier: Apache-2.0
// Laws of the full product, the sum over psi and its companions: orthonormality, probabilities, dipoles,
// derivatives.
#include <catch2/catch.hpp>

#include "cases.hpp"

using namespace wellwright;

// 1e-10: rounding of sums over some thousand nodes, with room for levels 1e-5 eV apart behind 60 nm of
// barrier.
TEST_CASE("levels are orthonormal in the full product") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    CHECK(levels.certificate.certified);
    const Eigen::MatrixXd overlap = levels.moment(Eigen::VectorXd::Ones(levels.profile.grid.rows()));
    CHECK((overlap - Eigen::MatrixXd::Identity(levels.count(), levels.count())).cwiseAbs().maxCoeff() <
          1e-10);
  }
}

TEST_CASE("probabilities of layers, densities, mean position and spread agree") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    const Grid& grid = levels.profile.grid;
    const Eigen::MatrixXd density = levels.density();
    CHECK(((grid.weight.transpose() * density).array() - 1).abs().maxCoeff() < 1e-10);
    CHECK((levels.layer_probability.rowwise().sum().array() - 1).abs().maxCoeff() < 1e-10);
    const Eigen::VectorXd mean = density.transpose() * grid.weight.cwiseProduct(grid.z);
    const Eigen::VectorXd square = density.transpose() * grid.weight.cwiseProduct(grid.z.cwiseAbs2());
    const double length = grid.boundaries.back();
    CHECK((mean - levels.mean_position).cwiseAbs().maxCoeff() < 1e-9 * length);
    const Eigen::VectorXd spread = (square - mean.cwiseAbs2()).cwiseSqrt();
    CHECK((spread - levels.spread).cwiseAbs().maxCoeff() < 1e-6 * length);  // a difference of squares
    // The weight of psi is the part of the norm that the companions leave.
    const Eigen::VectorXd weight = levels.envelope.cwiseAbs2().transpose() * grid.weight;
    CHECK((weight - levels.conduction_fraction).cwiseAbs().maxCoeff() < 1e-10);
    if (c.one_band()) CHECK((levels.conduction_fraction.array() - 1).abs().maxCoeff() < 1e-10);
  }
}

// <i|[H, z]|j> taken with the fluxes w = (hbar^2/2m0) psi'/m(E): z_ij = int (w_i psi_j - psi_i w_j) / (E_i -
// E_j), the dipole of an energy-dependent mass, equals the sum over all components. Source: C. Sirtori, F.
// Capasso, J. Faist, S. Scandolo, Phys. Rev. B 50, 8663 (1994), there with normalised two-band envelopes.
TEST_CASE("the dipole of the energy-dependent mass is the dipole of all components") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    const Grid& grid = levels.profile.grid;
    const Coefficients& at = levels.profile.at;
    const Eigen::MatrixXd dipole = levels.moment(grid.z);
    const int n = grid.degree + 1, count = levels.count();
    Eigen::MatrixXd flux(grid.rows(), count);
    for (int e = 0; e < grid.elements(); ++e) {
      const Eigen::MatrixXd slope = reference_element(grid.degree).derivative *
                                    levels.envelope.middleRows(e * n, n) * (2 / grid.width(e));
      for (int i = 0; i < n; ++i)
        for (int level = 0; level < count; ++level) {
          const int row = e * n + i;
          double inverse_mass = at.a0[row];
          for (int pole = 0; pole < at.poles(); ++pole)
            inverse_mass += at.b(row, pole) / (levels.energy[level] - at.v(row, pole));
          flux(row, level) = constants::hbar2_over_2m0 * inverse_mass * slope(i, level);
        }
    }
    const Eigen::MatrixXd current = flux.transpose() * grid.weight.asDiagonal() * levels.envelope;
    for (int i = 0; i < count; ++i)
      for (int j = 0; j < i; ++j) {
        const double distance = levels.energy[i] - levels.energy[j];
        if (distance < 1e-4) continue;  // the quotient loses its digits
        CAPTURE(i, j, distance);
        CHECK((current(i, j) - current(j, i)) / distance ==
              Approx(dipole(i, j)).margin(2e-8 / distance * 1e-2));
      }
  }
}

// d E/d F = <z> for electrons and -<z> for holes, since the whole operator is tilted with U and its poles.
TEST_CASE("the slope with the field is the mean position") {
  for (const IdentityCase& c : identity_cases()) {
    CAPTURE(c.name);
    const Levels levels = solve(c);
    const auto slopes = sensitivity(c.study, levels, {});
    const double sign = c.carrier == Carrier::electron ? 1 : -1;
    CHECK((slopes.field - sign * levels.mean_position).cwiseAbs().maxCoeff() < 1e-8);
  }
}

// Stretching every layer by s at field F/s scales the kinetic energy alone, as s^-2:
// sum_i d_i dE/dd_i - F dE/dF = -2 <T>, with <T> = E - <U>, for one band. Smeared interfaces do not stretch
// along.
TEST_CASE("the virial law of stretched layers") {
  for (const IdentityCase& c : identity_cases()) {
    if (!c.one_band() || c.study.stack.interdiffusion > 0) continue;
    CAPTURE(c.name);
    const Levels levels = solve(c);
    const auto slopes = sensitivity(c.study, levels, {});
    Eigen::VectorXd thickness(c.study.stack.layers.size());
    for (std::size_t i = 0; i < c.study.stack.layers.size(); ++i)
      thickness[static_cast<int>(i)] = c.study.stack.layers[i].thickness;
    const Eigen::VectorXd potential =
        levels.density().transpose() * levels.profile.grid.weight.cwiseProduct(levels.profile.at.edge);
    const Eigen::VectorXd stretch = slopes.thickness * thickness - c.study.field * slopes.field;
    CHECK((stretch + 2 * (levels.energy - potential)).cwiseAbs().maxCoeff() < 1e-9);
  }
}
