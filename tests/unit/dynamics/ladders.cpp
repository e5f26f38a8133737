// SPDX-License-Identifier: Apache-2.0
// Closed forms of motion: the oscillator, the doublet out of resonance; both routes to the observables; where
// a ladder is one.
#include <catch2/catch.hpp>
#include <cmath>
#include <cstdio>
#include <string>

#include "support/hand_made_levels.hpp"
#include "wellwright/dynamics.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::solve;
using hand_made::well;

namespace {

constexpr double pi = 3.14159265358979323846;

Dynamics run(const Study& study, const Levels& levels, const Start& start, double duration, int samples) {
  Notes notes;
  return superpose(hand_made::with_start(study, start, duration, samples), levels, transitions(levels),
                   nullptr, notes);
}

}  // namespace

TEST_CASE("In a parabolic well <z> swings as a cosine, whatever the packet") {
  // Levels are the Hermite functions by their recurrence, so that only the motion is tested. Ehrenfest:
  // <z> - z0 = A cos(w t) + hbar k / (m w) sin(w t), exactly.
  const double quantum = 0.02, m = 0.067, L = 120, middle = 60;
  Study study = hand_made::study({{well, L}}, Bands::one);
  Levels levels = solve(study);
  std::vector<double> cuts;
  for (int i = 1; i < 24; ++i) cuts.push_back(i / 24.0);
  const Grid grid = make_grid({0, L}, {cuts}, 14);
  const int count = 30;
  const double width = std::sqrt(2 * constants::hbar2_over_2m0 / (m * quantum));  // sqrt(hbar / m w)
  levels.profile = make_profile(study, Carrier::electron, grid);
  levels.envelope.resize(grid.rows(), count);
  levels.energy.resize(count);
  levels.layer_probability.setOnes(count, 1);
  levels.mean_position.setConstant(count, middle);
  for (int n = 0; n < count; ++n) {
    levels.energy[n] = quantum * (n + 0.5);
    for (int r = 0; r < grid.rows(); ++r) {
      const double x = (grid.z[r] - middle) / width;
      levels.envelope(r, n) = n == 0   ? std::exp(-0.5 * x * x) / std::sqrt(std::sqrt(pi) * width)
                              : n == 1 ? std::sqrt(2.0) * x * levels.envelope(r, 0)
                                       : std::sqrt(2.0 / n) * x * levels.envelope(r, n - 1) -
                                             std::sqrt((n - 1.0) / n) * levels.envelope(r, n - 2);
    }
  }
  const double period = constants::planck / quantum, k = 0.05, from = 40;
  const Dynamics d = run(study, levels, PacketStart{from, 0.8 * width, k}, 2 * period, 81);
  CHECK(d.captured_norm > 1 - 1e-9);
  const double swing = k * width * width;  // hbar k / m w
  for (int t = 0; t < 81; ++t) {
    const double phase = 2 * pi * d.time[t] / period;
    CHECK(d.mean_position[t] ==
          Approx(middle + (from - middle) * std::cos(phase) + swing * std::sin(phase)).margin(1e-4));
  }
  REQUIRE(d.classical_period);
  CHECK(*d.classical_period == Approx(period).epsilon(1e-9));
  CHECK_FALSE(d.revival_time);
}

TEST_CASE("A doublet out of resonance leaves the first well by 4U^2 / (delta^2 + 4U^2)") {
  // U = 1.7238 meV, delta = 5 meV: splitting 6.0734 meV, period 0.68095 ps, largest transfer 0.32224; the
  // closed form of two levels (e.g. C. Cohen-Tannoudji et al., Quantum Mechanics, ch. IV).
  const double U = 1.7238e-3, delta = 5e-3;
  Study study = hand_made::double_well(Bands::one);
  study.model.levels.count = 2;
  Levels levels = solve(study);
  const double splitting = std::hypot(delta, 2 * U);
  levels.energy[0] = 0.05;
  levels.energy[1] = 0.05 + splitting;
  // The site state of higher energy in the eigenstates: mixing angle theta, tan 2 theta = 2U / delta.
  const double theta = 0.5 * std::atan2(2 * U, delta);
  const MixStart site{{{1, std::sin(theta), 0}, {2, std::cos(theta), 0}}};
  const double period = constants::planck / splitting;
  CHECK(1e3 * splitting == Approx(6.0734).epsilon(1e-5));
  CHECK(period == Approx(0.68095).epsilon(1e-5));
  const Dynamics d = run(study, levels, site, period, 201);
  REQUIRE(d.beats.size() == 1);
  CHECK(d.beats[0].period == Approx(period).epsilon(1e-12));
  CHECK(1 - d.survival.minCoeff() == Approx(0.32224).epsilon(1e-4));
  for (int t = 0; t < 201; t += 20) {
    const double left = 0.32224 * std::pow(std::sin(pi * d.time[t] / period), 2);
    CHECK(1 - d.survival[t] == Approx(left).margin(1e-5));
  }
}

TEST_CASE("Many levels and few take different routes to the same observables") {
  // 80 levels go by the density at the nodes; by hand, <t|z|t> from the moment matrix.
  Study study = hand_made::double_well(Bands::two, 0.001);
  study.model.levels.count = 80;
  const Levels levels = solve(study);
  MixStart mix;
  for (int k = 1; k <= 80; ++k) mix.parts.push_back({k, 1.0 / k, 0.7 * k});
  const Dynamics d = run(study, levels, mix, 1, 2101);  // more than one block
  const Eigen::MatrixXcd a = amplitudes_in_time(levels, d);
  const Eigen::MatrixXd z = levels.moment(levels.profile.grid.z);
  for (int t = 0; t < 2101; t += 150)
    CHECK(d.mean_position[t] == Approx((a.col(t).adjoint() * z * a.col(t))(0).real()).margin(1e-7));
  CHECK((d.layer_probability.colwise().sum().array() - 1).abs().maxCoeff() < 1e-9);
  // The same amplitudes cut to eight go by pairs.
  mix.parts.resize(8);
  const Dynamics few = run(study, levels, mix, 1, 2101);
  const Eigen::MatrixXcd b = amplitudes_in_time(levels, few);
  for (int t = 0; t < 2101; t += 150)
    CHECK(few.mean_position[t] == Approx((b.col(t).adjoint() * z * b.col(t))(0).real()).margin(1e-9));
}

TEST_CASE("A doublet below a far third level is no ladder") {
  Study study =
      hand_made::study({{barrier, 20}, {well, 9}, {barrier, 4}, {well, 9}, {barrier, 20}}, Bands::one);
  study.model.levels.count = 4;
  const Levels levels = solve(study);
  const Dynamics d = run(study, levels, MixStart{{{1, 1, 0}, {2, 1, 0}, {3, 1, 0}}}, 1, 11);
  CHECK_FALSE(d.classical_period);
  CHECK_FALSE(d.revival_time);
  CHECK_FALSE(d.beats.empty());
}

TEST_CASE("A packet far narrower than any element is measured by its area") {
  // <n|g> = (8 pi s^2)^(1/4) psi_n(z0) as s goes to zero; captured is its square sum, here far below one
  // half.
  Study study = hand_made::study({{well, 40}}, Bands::one);
  const Levels levels = solve(study);
  for (const double spread : {1e-3, 1e-6, 1e-9}) {
    std::string said;
    try {
      run(study, levels, PacketStart{17.3, spread, 0}, 1, 3);
    } catch (const InputError& error) {
      said = error.sentence();
    }
    double captured = 0;
    for (int n = 1; n <= 6; ++n)
      captured += std::sqrt(8 * pi) * spread * (2.0 / 40) * std::pow(std::sin(n * pi * 17.3 / 40), 2);
    char text[80];
    std::snprintf(text, sizeof text, "only %.1f %% of the packet", 100 * captured);
    CHECK(said.find(text) != std::string::npos);
  }
}

TEST_CASE("A start outside the levels held is warned of") {
  Study study = hand_made::study({{well, 40}}, Bands::one);
  study.model.levels.count = 7;
  const Levels levels = solve(study);
  DynamicsRequest request;
  request.start = PacketStart{18, 2.2, 0};
  study.dynamics = request;
  Notes notes;
  const Dynamics d = superpose(study, levels, transitions(levels), nullptr, notes);
  REQUIRE(d.captured_norm < 0.99);
  REQUIRE(notes.warnings().size() == 1);
  CHECK(notes.warnings()[0].find("of the start state") != std::string::npos);
  CHECK(d.amplitude.norm() == Approx(1));
}
