// SPDX-License-Identifier: Apache-2.0
// Density with the three-dimensional density of states. The Fermi integral is that of J. Bednarczyk, J.
// Bednarczyk, Phys. Lett. A 64, 409 (1978), good to 0.4 %: enough for a start.
#include "charge/classical.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace wellwright {
namespace {

constexpr double warmest = 2e-3;  // [eV] kT at least, so that the start is smooth

double fermi_half(double eta) {
  const double v = std::pow(eta, 4) + 50 + 33.6 * eta * (1 - 0.68 * std::exp(-0.17 * (eta + 1) * (eta + 1)));
  return 1 / (std::exp(-eta) + 1.329340388179137 * std::pow(v, -0.375));
}

}  // namespace

ClassicalGas::ClassicalGas(const Study& study, const Grid& grid, Eigen::VectorXd edge, Eigen::VectorXd mass,
                           bool holes)
    : grid_(&grid),
      edge_(std::move(edge)),
      mass_(std::move(mass)),
      hole_edge_(grid.rows()),
      hole_mass_(grid.rows()),
      holes_(holes),
      kT_(std::max(constants::boltzmann * study.carrier_temperature, warmest)) {
  for (int row = 0; row < grid.rows(); ++row) {
    const auto layer =
        static_cast<std::size_t>(grid.layer[static_cast<std::size_t>(row / (grid.degree + 1))]);
    const BandParameters& bands = study.stack.bands[layer];
    hole_edge_[row] = bands.heavy_hole_edge + study.field * grid.z[row];
    hole_mass_[row] = std::isfinite(bands.heavy_hole_mass) ? bands.heavy_hole_mass : 0.5;
  }
}

double ClassicalGas::density(double filling, double mass) const {
  const double states = 2 * std::pow(mass * kT_ / (4 * std::numbers::pi * constants::hbar2_over_2m0), 1.5);
  return states * fermi_half(filling / kT_);
}

std::pair<double, double> ClassicalGas::charge(int row, double fermi, double shift) const {
  const double step = 1e-4 * kT_, at = fermi - edge_[row] - shift, n = density(at, mass_[row]);
  double charge = -n, slope = (density(at + step, mass_[row]) - n) / step;
  if (holes_) {
    const double up = hole_edge_[row] + shift - fermi, p = density(up, hole_mass_[row]);
    charge += p;
    slope += (density(up + step, hole_mass_[row]) - p) / step;
  }
  return {charge, slope};
}

double ClassicalGas::neutral_fermi(double fixed) const {
  double low = edge_.minCoeff() - 3, high = edge_.maxCoeff() + 3;
  for (int i = 0; i < 200; ++i) {
    const double middle = 0.5 * (low + high);
    double sum = fixed;
    for (int row = 0; row < grid_->rows(); ++row) sum += grid_->weight[row] * charge(row, middle, 0).first;
    (sum > 0 ? low : high) = middle;
  }
  return 0.5 * (low + high);
}

}  // namespace wellwright
