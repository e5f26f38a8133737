// SPDX-License-Identifier: Apache-2.0
// Start states: amplitudes, what the levels hold of them, and the mistakes a start can hold.
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made_levels.hpp"
#include "wellwright/dynamics.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::solve;
using hand_made::well;

namespace {

Dynamics run(const Study& study, const Start& start, const Levels& levels, const Levels* holes = nullptr) {
  Notes notes;
  return superpose(hand_made::with_start(study, start, 1, 11), levels, transitions(levels), holes, notes);
}

std::string trouble(const Study& study, const Start& start, const Levels& levels) {
  try {
    run(study, start, levels);
  } catch (const InputError& error) {
    return error.what();
  }
  return "";
}

}  // namespace

TEST_CASE("A packet's amplitudes in a hard-wall well are its overlap integrals in closed form") {
  // With both tails far inside the walls, <n|g> of a Gaussian of width s at z0 is
  // sqrt(2/L) (8 pi s^2)^(1/4) exp(-(n pi s / L)^2) sin(n pi z0 / L).
  Study study = hand_made::study({{well, 40}}, Bands::one);
  study.model.levels.count = 24;
  const Levels levels = solve(study);
  const PacketStart packet{18, 1.8, 0};
  const Dynamics d = run(study, packet, levels);
  const double pi = 3.14159265358979323846, L = 40;
  for (int n = 1; n <= 24; ++n) {
    const double q = n * pi / L;
    const double exact = std::sqrt(2 / L) * std::pow(8 * pi * 1.8 * 1.8, 0.25) *
                         std::exp(-q * q * 1.8 * 1.8) * std::sin(q * 18);
    // Envelopes begin upward at the substrate, as the sine does.
    CHECK(d.amplitude[n - 1].real() * std::sqrt(d.captured_norm) == Approx(exact).margin(1e-8));
    CHECK(std::abs(d.amplitude[n - 1].imag()) < 1e-12);
  }
  CHECK(d.captured_norm > 1 - 1e-4);
}

TEST_CASE("A moving packet has the momentum it was given") {
  Study study = hand_made::study({{well, 60}}, Bands::one);
  study.model.levels.count = 40;
  const Levels levels = solve(study);
  DynamicsRequest request;
  request.start = PacketStart{30, 4, 0.25};
  request.samples = 3;
  request.duration = 2e-3;
  study.dynamics = request;
  Notes notes;
  const Dynamics d = superpose(study, levels, transitions(levels), nullptr, notes);
  // <z> moves with hbar k / m = (2 hbar^2/2m0) k / (m hbar).
  const double speed = 2 * constants::hbar2_over_2m0 * 0.25 / 0.067 / constants::hbar;
  CHECK((d.mean_position[2] - d.mean_position[0]) / 2e-3 == Approx(speed).epsilon(1e-4));
}

TEST_CASE(
    "With an energy-dependent mass a packet is a least-squares expansion, normalised over all components") {
  Study study = hand_made::double_well(Bands::two, 0);
  study.model.levels.count = 25;
  const Levels levels = solve(study);
  const Dynamics d = run(study, PacketStart{27, 3, 0}, levels);
  CHECK(d.amplitude.norm() == Approx(1).epsilon(1e-13));
  CHECK(d.captured_norm > 0.99);
  CHECK(d.captured_norm <= 1);
  // The residual is orthogonal to every envelope: checked through the captured norm of a subset, which must
  // not grow.
  study.model.levels.count = 12;
  CHECK(run(study, PacketStart{27, 3, 0}, solve(study)).captured_norm <= d.captured_norm + 1e-12);
}

TEST_CASE("A localized start has the largest probability in its layer that its levels can give") {
  Study study =
      hand_made::study({{barrier, 20}, {well, 9}, {barrier, 2}, {well, 9}, {barrier, 20}}, Bands::two);
  study.model.levels.count = 4;
  const Levels levels = solve(study);
  const Dynamics d = run(study, LocalizedStart{{1}, 2}, levels);
  // Two even wells: half of each level of the doublet.
  CHECK(std::norm(d.amplitude[0]) == Approx(0.5).margin(1e-2));
  CHECK(std::norm(d.amplitude[1]) == Approx(0.5).margin(1e-2));
  const double best = d.layer_probability(1, 0);
  for (const double angle : {0.2, 0.7, 1.2, -0.4}) {
    const MixStart mix{{{1, std::cos(angle), 0}, {2, std::sin(angle), 0}}};
    CHECK(run(study, mix, levels).layer_probability(1, 0) <= best + 1e-12);
  }
}

TEST_CASE("A field step to the same field is the level itself") {
  const Study study = hand_made::double_well(Bands::three, 0.001);
  const Levels levels = solve(study);
  const Dynamics same = run(study, FieldStepStart{0.001, 2}, levels);
  CHECK(std::abs(same.amplitude[1]) == Approx(1).epsilon(1e-9));
  CHECK(same.captured_norm == Approx(1).epsilon(1e-9));
  CHECK(same.beats.empty());
  const Dynamics other = run(study, FieldStepStart{-0.0015, 1}, levels);
  CHECK(other.captured_norm > 0.9);
  CHECK(other.captured_norm < 1);
  CHECK_FALSE(other.beats.empty());
}

TEST_CASE("A short pulse lifts the hole's envelope; a long one only the levels in its spectrum") {
  Study study = hand_made::double_well(Bands::one, 0.001);
  study.model.levels.count = 5;
  const Levels electrons = solve(study);
  const Levels holes = solve(study, Carrier::heavy_hole);
  const Interband pairs = interband(electrons, holes);
  PhotoexcitedStart start;
  start.level = 1;
  start.photon_energy = pairs.energy(1, 0);
  start.duration = 1e-4;  // shorter than any beat: all lines alike
  const Dynamics broad = run(study, start, electrons, &holes);
  for (int k = 0; k < 5; ++k)
    CHECK(std::abs(broad.amplitude[k]) ==
          Approx(std::abs(pairs.overlap(k, 0)) / pairs.overlap.col(0).norm()).margin(1e-3));
  start.duration = 5;
  const Dynamics narrow = run(study, start, electrons, &holes);
  CHECK(std::abs(narrow.amplitude[1]) > 0.999);
  // The spectrum of a pulse of full width T (intensity) weighs populations with exp(-dE^2 T^2 / (4 ln2
  // hbar^2)).
  const double away = electrons.energy[2] - electrons.energy[1];
  start.duration = 2 * constants::hbar / away;
  const Dynamics half = run(study, start, electrons, &holes);
  const double exponent =
      away * away * start.duration * start.duration / (8 * std::log(2.0) * constants::hbar * constants::hbar);
  const double ratio = std::norm(half.amplitude[2]) / std::norm(half.amplitude[1]);
  CHECK(
      ratio ==
      Approx(std::exp(-2 * exponent) * std::pow(pairs.overlap(2, 0) / pairs.overlap(1, 0), 2)).epsilon(1e-9));
}

TEST_CASE("Mistakes of a start are said") {
  const Study study = hand_made::double_well(Bands::two);
  const Levels levels = solve(study);
  CHECK(trouble(study, PacketStart{90, 3, 0}, levels).find("outside the stack") != std::string::npos);
  CHECK(trouble(study, PacketStart{27, 0.3, 0}, levels).find("hold only") != std::string::npos);
  CHECK(trouble(study, MixStart{{{1, 1, 0}, {9, 1, 0}}}, levels).find("level 9") != std::string::npos);
  CHECK(trouble(study, MixStart{{{1, 0, 0}}}, levels).find("zero") != std::string::npos);
  CHECK(trouble(study, LocalizedStart{{1}, 8}, levels).find("level 8") != std::string::npos);
}
