// SPDX-License-Identifier: Apache-2.0
// The superposition of levels against two other routes through time: small Crank-Nicolson steps on finite
// differences, and the matrix exponential of the same operator (Eigen's unsupported module; N.J. Higham, SIAM
// J. Matrix Anal. Appl. 26, 1179 (2005)).
#include <Eigen/Dense>
#include <catch2/catch.hpp>
#include <cmath>
#include <complex>
#include <unsupported/Eigen/MatrixFunctions>

#include "support/hand_made.hpp"
#include "wellwright/dynamics.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::well;
using Complex = std::complex<double>;

namespace {

constexpr double centre = 24, spread = 3, duration = 0.4;

Study study_of(double field) {
  Study study = hand_made::study({{barrier, 15}, {well, 12}, {barrier, 2}, {well, 9}, {barrier, 15}},
                                 Bands::one, field);
  study.model.levels.count = 60;
  DynamicsRequest request;
  request.start = PacketStart{centre, spread, 0.15};
  request.duration = duration;
  request.samples = 5;
  study.dynamics = request;
  return study;
}

// BenDaniel-Duke finite differences with the flux between node centres (series resistance of the half cells).
struct FiniteDifferences {
  Eigen::VectorXd z, diagonal, off;
  double dz = 0;
};

FiniteDifferences finite_differences(const Study& study, double dz) {
  FiniteDifferences fd;
  const double L = study.stack.length();
  const int n = static_cast<int>(std::lround(L / dz)) - 1;
  fd.dz = dz;
  fd.z = Eigen::VectorXd::LinSpaced(n, dz, L - dz);
  const auto faces = study.stack.faces();
  const auto layer = [&](double z) {
    std::size_t i = 0;
    while (i + 1 < study.stack.layers.size() && z > faces[i + 1]) ++i;
    return i;
  };
  const auto mean = [&](double at, auto value) {  // of both sides on an interface
    return 0.5 * (value(layer(at - 1e-9)) + value(layer(at + 1e-9)));
  };
  fd.diagonal.resize(n);
  fd.off.resize(n - 1);
  const auto flux = [&](double left) {  // between left and left + dz
    const double m = 0.5 * (study.stack.bands[layer(left + 0.25 * dz)].electron_mass +
                            study.stack.bands[layer(left + 0.75 * dz)].electron_mass);
    return constants::hbar2_over_2m0 / (m * dz * dz);
  };
  for (int i = 0; i < n; ++i) {
    const double U = mean(fd.z[i], [&](std::size_t l) { return study.stack.bands[l].conduction_band_edge; }) +
                     study.field * fd.z[i];
    const double below = flux(fd.z[i] - dz), above = flux(fd.z[i]);
    fd.diagonal[i] = U + below + above;
    if (i + 1 < n) fd.off[i] = -above;
  }
  return fd;
}

// Steps of (1 + i H dt / 2 hbar) psi' = (1 - i H dt / 2 hbar) psi (J. Crank, P. Nicolson, Proc. Camb. Phil.
// Soc. 43, 50 (1947)); <z> at the end.
double crank_nicolson(const Study& study, double dz, int steps) {
  const FiniteDifferences fd = finite_differences(study, dz);
  const auto n = fd.z.size();
  Eigen::VectorXcd psi(n), right(n), c(n), d(n);
  for (Eigen::Index i = 0; i < n; ++i)
    psi[i] = std::exp(-0.25 * std::pow((fd.z[i] - centre) / spread, 2)) *
             std::polar(1.0, 0.15 * (fd.z[i] - centre));
  psi /= psi.norm();
  const Complex s(0, duration / steps / (2 * constants::hbar));
  for (int step = 0; step < steps; ++step) {
    for (Eigen::Index i = 0; i < n; ++i) {
      right[i] = psi[i] - s * fd.diagonal[i] * psi[i];
      if (i > 0) right[i] -= s * fd.off[i - 1] * psi[i - 1];
      if (i + 1 < n) right[i] -= s * fd.off[i] * psi[i + 1];
    }
    for (Eigen::Index i = 0; i < n; ++i) {  // Thomas
      const Complex below = i > 0 ? s * fd.off[i - 1] : Complex(0);
      const Complex pivot = 1.0 + s * fd.diagonal[i] - (i > 0 ? below * c[i - 1] : Complex(0));
      if (i + 1 < n) c[i] = s * fd.off[i] / pivot;
      d[i] = (right[i] - (i > 0 ? below * d[i - 1] : Complex(0))) / pivot;
    }
    psi[n - 1] = d[n - 1];
    for (Eigen::Index i = n - 2; i >= 0; --i) psi[i] = d[i] - c[i] * psi[i + 1];
  }
  return (psi.cwiseAbs2().array() * fd.z.array()).sum();
}

Dynamics superposed(const Study& study) {
  Notes notes;
  const Levels levels = solve_levels(study, Carrier::electron, notes, {});
  return superpose(study, levels, transitions(levels), nullptr, notes);
}

}  // namespace

TEST_CASE("Small steps in time and the superposition end at the same place") {
  for (const double field : {0.0, 0.002}) {
    const Study study = study_of(field);
    const Dynamics d = superposed(study);
    CHECK(d.captured_norm > 1 - 1e-5);
    // Both errors of the steps are of second order: extrapolated from two grids with equally refined steps.
    // What the 60 levels do not hold of the packet (7e-6, its kinks at the interfaces) moves <z> by some 2e-3
    // nm.
    const double coarse = crank_nicolson(study, 0.1, 2000), fine = crank_nicolson(study, 0.05, 4000);
    const double extrapolated = fine + (fine - coarse) / 3;
    CAPTURE(field, coarse, fine);
    CHECK(std::abs(d.mean_position[4] - fine) < 0.02);
    CHECK(d.mean_position[4] == Approx(extrapolated).margin(5e-3));
  }
}

TEST_CASE("The matrix exponential of the spectral operator and the superposition are the same state") {
  Study study = study_of(0.001);
  const Grid grid = make_grid(study.stack.faces(), first_cuts(study, Carrier::electron, 0.6), 12);
  const Profile profile = make_profile(study, Carrier::electron, grid);
  const Hamiltonian h(profile);
  const Eigen::Index N = h.nodes() - 1, n = N - 1;
  // The lumped operator, column by column; symmetric in the variables sqrt(mass) psi.
  Eigen::VectorXd root(n), y;
  const Eigen::VectorXd weight = [&] {
    Eigen::VectorXd w = Eigen::VectorXd::Zero(N + 1);
    for (int e = 0; e < grid.elements(); ++e)
      w.segment(e * grid.degree, grid.degree + 1) +=
          grid.weight.segment(e * (grid.degree + 1), grid.degree + 1);
    return w;
  }();
  for (Eigen::Index i = 0; i < n; ++i) root[i] = std::sqrt(weight[i + 1]);
  Eigen::MatrixXd H(n, n);
  for (Eigen::Index j = 0; j < n; ++j) {
    Eigen::VectorXd x = Eigen::VectorXd::Zero(N + 1);
    x[j + 1] = 1 / root[j];
    h.apply(0, x, y);
    H.col(j) = y.segment(1, n).cwiseQuotient(root);
  }
  H = (0.5 * (H + H.transpose())).eval();
  Eigen::VectorXcd start(n);
  const Eigen::VectorXd z = gather(grid, grid.z);
  for (Eigen::Index i = 0; i < n; ++i)
    start[i] = root[i] * std::exp(-0.25 * std::pow((z[i + 1] - centre) / spread, 2)) *
               std::polar(1.0, 0.15 * (z[i + 1] - centre));
  start /= start.norm();
  // Up to 0.1 ps by the exponential itself, in steps that its scaling can take.
  const double t = 0.1;
  const Eigen::MatrixXcd step = (Complex(0, -t / 64 / constants::hbar) * H.cast<Complex>()).exp();
  Eigen::VectorXcd psi = start;
  for (int i = 0; i < 64; ++i) psi = step * psi;
  study.dynamics->duration = t;
  const Dynamics d = superposed(study);
  const double mean = (psi.cwiseAbs2().array() * z.segment(1, n).array()).sum();
  CHECK(d.mean_position[4] == Approx(mean).margin(2e-4));
  CHECK(d.survival[4] == Approx(std::norm(start.dot(psi))).margin(1e-4));
}
