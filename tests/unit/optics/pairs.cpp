// SPDX-License-Identifier: Apache-2.0
// Electron-hole pairs and the common grid on which functions of two grids meet.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made.hpp"
#include "wellwright/optics.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::well;

namespace {

Levels solve(const Study& study, Carrier carrier) {
  Notes notes;
  return solve_levels(study, carrier, notes, {});
}

}  // namespace

TEST_CASE("A common grid integrates products of functions of two grids exactly") {
  const Grid one = make_grid({0, 4, 10}, {{0.3}, {}}, 5), other = make_grid({0, 4, 10}, {{}, {0.5, 0.8}}, 8);
  const Grid both = common_grid(one, other);
  CHECK(both.boundaries.size() == 6);  // 0, 1.2, 4, 7, 8.8, 10
  // x^5 and x^8 are functions of these grids; the integral of x^13 from 0 to 1 is 1/14.
  const Eigen::MatrixXd a = interpolate(one, (one.z.array() / 10).pow(5).matrix(), both);
  const Eigen::MatrixXd b = interpolate(other, (other.z.array() / 10).pow(8).matrix(), both);
  CHECK((both.weight.array() * a.col(0).array() * b.col(0).array()).sum() ==
        Approx(10.0 / 14).epsilon(1e-13));
}

TEST_CASE("Between hard walls electron and hole envelopes are the same sines") {
  const Study study = hand_made::study({{well, 12}}, Bands::one);
  const Levels electrons = solve(study, Carrier::electron), holes = solve(study, Carrier::heavy_hole);
  const Interband pairs = interband(electrons, holes);
  CHECK(pairs.hole == Carrier::heavy_hole);
  const Eigen::MatrixXd unit = Eigen::MatrixXd::Identity(6, 6);
  CHECK((pairs.overlap - unit).cwiseAbs().maxCoeff() < 1e-6);
  CHECK(pairs.gap == Approx(1.5));
  // Gap + E1 (1/m_e + 1/m_h) of the closed form.
  const double q = 3.14159265358979323846 / 12;
  const double energy = 1.5 + constants::hbar2_over_2m0 * q * q * (1 / 0.067 + 1 / 0.35);
  CHECK(pairs.energy(0, 0) == Approx(energy).margin(2e-6));
}

TEST_CASE("Pairs on different grids agree with sums over many points") {
  // Independent route: the trapezoidal rule on 20,001 points; kinks at interfaces leave (2.9e-3 nm)^2 of it.
  const Study study = hand_made::double_well(Bands::two, 0.0015);
  const Levels electrons = solve(study, Carrier::electron), holes = solve(study, Carrier::light_hole);
  const Interband pairs = interband(electrons, holes);
  const double length = study.stack.length();
  std::vector<double> z(20001);
  for (std::size_t i = 0; i < z.size(); ++i) z[i] = length * static_cast<double>(i) / 20000;
  const Eigen::MatrixXd e = interpolate(electrons.profile.grid, electrons.envelope, z),
                        h = interpolate(holes.profile.grid, holes.envelope, z);
  const Eigen::MatrixXd sums = e.transpose() * h * (length / 20000);
  CHECK((pairs.overlap - sums).cwiseAbs().maxCoeff() < 1e-6);
  for (int i = 0; i < electrons.count(); ++i)
    for (int j = 0; j < holes.count(); ++j)
      CHECK(pairs.energy(i, j) == Approx(electrons.energy[i] + holes.energy[j] + 1.5).epsilon(1e-14));
}

TEST_CASE("A field moves lines down and pulls the pair apart") {
  // The quantum-confined Stark shift of a symmetric well is even in the field and lowers the line (D.A.B.
  // Miller et al., Phys. Rev. Lett. 53, 2173 (1984)).
  const auto line = [](double field) {
    const Study study = hand_made::study({{barrier, 15}, {well, 10}, {barrier, 15}}, Bands::one, field);
    return interband(solve(study, Carrier::electron), solve(study, Carrier::heavy_hole));
  };
  const Interband none = line(0), up = line(0.004), down = line(-0.004);
  CHECK(up.energy(0, 0) < none.energy(0, 0) - 1e-3);
  CHECK(up.energy(0, 0) == Approx(down.energy(0, 0)).margin(4e-6));
  CHECK(std::abs(up.overlap(0, 0)) < std::abs(none.overlap(0, 0)));
}
