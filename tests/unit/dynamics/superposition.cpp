// SPDX-License-Identifier: Apache-2.0
// The superposition in time: periods, revivals, observables and the map.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made.hpp"
#include "wellwright/dynamics.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::well;

namespace {

struct Run {
  Levels levels;
  Dynamics dynamics;
};

Run run(const Study& base, const Start& start, double duration, int samples) {
  const Study study = hand_made::with_start(base, start, duration, samples);
  Notes notes;
  Run out;
  out.levels = solve_levels(study, Carrier::electron, notes, {});
  out.dynamics = superpose(study, out.levels, transitions(out.levels), nullptr, notes);
  return out;
}

}  // namespace

TEST_CASE("Two levels beat with h / dE, 4 |c1 c2 z12| from peak to peak") {
  const Study study = hand_made::double_well(Bands::two);
  const MixStart mix{{{1, 1, 0}, {2, 1, 0.4}}};
  const Run probe = run(study, mix, 1, 2);
  const double period = constants::planck / (probe.levels.energy[1] - probe.levels.energy[0]);
  const Run full = run(study, mix, period, 401);
  const auto& d = full.dynamics;
  CHECK(std::arg(d.amplitude[0]) == 0);
  CHECK(std::arg(d.amplitude[1]) == Approx(0.4));
  REQUIRE(d.beats.size() == 1);
  CHECK(d.beats[0].period == Approx(period).epsilon(1e-12));
  CHECK(d.mean_position[400] == Approx(d.mean_position[0]).epsilon(1e-10));
  CHECK(d.survival[400] == Approx(1).epsilon(1e-10));
  CHECK(d.survival[200] == Approx(0).margin(1e-10));  // equal weights: half a period later nothing is left
  CHECK(d.mean_position.maxCoeff() - d.mean_position.minCoeff() ==
        Approx(d.beats[0].dipole_amplitude).epsilon(1e-4));
  CHECK((d.layer_probability.colwise().sum().array() - 1).abs().maxCoeff() < 1e-12);
}

TEST_CASE("A hard-wall well revives after h / E1") {
  // 20 nm, m = 0.067: E1 = 14.03098 meV, revival 0.2947527 ps, classical period T_rev / 2n
  // (R.W. Robinett, Phys. Rep. 392, 1 (2004); digits computed from the closed form with CODATA constants).
  Study study = hand_made::study({{well, 20}}, Bands::one);
  study.model.levels.count = 16;
  study.model.accuracy = 1e-11;
  const double revival = 0.2947527;
  const Run box = run(study, PacketStart{7, 1.6, 0.5}, revival, 201);
  CHECK(box.levels.energy[0] == Approx(0.01403098).epsilon(1e-6));
  REQUIRE(box.dynamics.revival_time);
  CHECK(*box.dynamics.revival_time == Approx(revival).epsilon(1e-6));
  CHECK(box.dynamics.survival[200] == Approx(1).margin(1e-5));
  CHECK(box.dynamics.survival.segment(20, 160).maxCoeff() < 0.99);
}

TEST_CASE("An eigenstate stays put") {
  const Run still = run(hand_made::double_well(Bands::three), MixStart{{{3, 2, 0}}}, 5, 50);
  const auto& d = still.dynamics;
  CHECK((d.mean_position.array() - still.levels.mean_position[2]).abs().maxCoeff() < 1e-12);
  CHECK((d.survival.array() - 1).abs().maxCoeff() < 1e-12);
  const Eigen::VectorXd in_layers = still.levels.layer_probability.row(2);
  CHECK((d.layer_probability.colwise() - in_layers).cwiseAbs().maxCoeff() < 1e-12);
  CHECK(d.beats.empty());
  CHECK_FALSE(d.classical_period);
}

TEST_CASE("Norm and mean energy are kept, and the map agrees with <z> and the layers") {
  Study study = hand_made::double_well(Bands::two);
  study.model.levels.count = 12;
  const Run r = run(study, PacketStart{27, 4, 0.1}, 3, 1500);
  const Eigen::MatrixXcd a = amplitudes_in_time(r.levels, r.dynamics);
  const Eigen::RowVectorXd norm = a.cwiseAbs2().colwise().sum();
  const Eigen::RowVectorXd energy = r.levels.energy.transpose() * a.cwiseAbs2();
  CHECK((norm.array() - 1).abs().maxCoeff() < 1e-12);
  CHECK((energy.array() - energy[0]).abs().maxCoeff() < 1e-13);
  int next = 0;
  const auto& z = r.dynamics.density_z;
  density_map(r.levels, r.dynamics, [&](int first, const Eigen::MatrixXd& block) {
    CHECK(first == next);
    next += static_cast<int>(block.rows());
    const double dz = z[1] - z[0];
    for (Eigen::Index t = 0; t < block.rows(); t += 211) {
      double sum = 0, mean = 0;  // the ends are zero: the trapezoidal rule is a plain sum
      for (Eigen::Index i = 0; i < block.cols(); ++i) {
        sum += dz * block(t, i);
        mean += dz * block(t, i) * z[static_cast<std::size_t>(i)];
      }
      // The components chi jump at interfaces, which a uniform sampling resolves to dz.
      CHECK(sum == Approx(1).margin(5e-3));
      CHECK(mean == Approx(r.dynamics.mean_position[first + t]).margin(0.1));
    }
  });
  CHECK(next == 1500);
}

TEST_CASE("Levels at equal distances have one classical period and no revival") {
  // U = 50 meV (x / 30 nm)^2 by fine steps would not be exact; here the harmonic ladder is built from its own
  // levels: equal distances make <z> a pure cosine whatever the start.
  Study study = hand_made::study({{well, 20}}, Bands::one);
  Notes notes;
  study.model.levels.count = 6;
  Levels ladder = solve_levels(study, Carrier::electron, notes, {});
  for (int n = 0; n < 6; ++n) ladder.energy[n] = 0.010 * (n + 0.5);
  Transitions t = transitions(ladder);
  DynamicsRequest request;
  request.start = MixStart{{{1, 0.5, 0}, {2, 1, 0.3}, {3, 1, 1}}};
  request.duration = constants::planck / 0.010;
  request.samples = 101;
  study.dynamics = request;
  const Dynamics d = superpose(study, ladder, t, nullptr, notes);
  CHECK(d.survival[100] == Approx(1).margin(1e-9));
  REQUIRE(d.classical_period);
  CHECK(*d.classical_period == Approx(constants::planck / 0.010).epsilon(1e-9));
  CHECK_FALSE(d.revival_time);  // equal distances: no second scale
}

TEST_CASE("Amplitudes in blocks are the amplitudes, each once, and a block stays small") {
  Run r = run(hand_made::double_well(Bands::one), MixStart{{{1, 1, 0}, {3, 1, 0.4}}}, 1, 2);
  REQUIRE(r.levels.count() >= 3);
  // Many levels at few times, and one level at a part of many times.
  for (const Eigen::Index times :
       {Eigen::Index{1}, Eigen::Index{7}, Eigen::Index{100000}, Eigen::Index{300001}}) {
    r.dynamics.time = Eigen::VectorXd::LinSpaced(times, 0, 1);
    const Eigen::MatrixXcd all = amplitudes_in_time(r.levels, r.dynamics);
    Eigen::MatrixXcd gathered = Eigen::MatrixXcd::Zero(all.rows(), all.cols());
    Eigen::Index values = 0, largest = 0;
    amplitudes_in_blocks(r.levels, r.dynamics, [&](int level, int time, const Eigen::MatrixXcd& block) {
      REQUIRE((block.cols() == times || block.rows() == 1));  // in one piece of a file
      gathered.block(level, time, block.rows(), block.cols()) += block;
      values += block.size();
      largest = std::max(largest, block.size());
    });
    CHECK((gathered == all));  // not printed: it may be a million numbers
    CHECK(values == all.size());
    CHECK(largest <= 1 << 18);
  }
}
