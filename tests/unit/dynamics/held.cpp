// SPDX-License-Identifier: Apache-2.0
// What the levels hold of a start: expansions, levels of a request, and pulses.
#include <Eigen/LU>
#include <catch2/catch.hpp>
#include <cmath>
#include <complex>
#include <cstdio>
#include <string>

#include "support/hand_made_levels.hpp"
#include "wellwright/dynamics.hpp"

using namespace wellwright;
using hand_made::barrier;
using hand_made::solve;
using hand_made::well;

namespace {

Dynamics run(const Study& study, const Levels& levels, const Start& start, Notes& notes,
             const Levels* holes = nullptr) {
  return superpose(hand_made::with_start(study, start, 1, 3), levels, transitions(levels), holes, notes);
}

Dynamics run(const Study& study, const Levels& levels, const Start& start, const Levels* holes = nullptr) {
  Notes notes;
  return run(study, levels, start, notes, holes);
}

std::string refusal(const Study& study, const Levels& levels, const Start& start,
                    const Levels* holes = nullptr) {
  try {
    run(study, levels, start, holes);
  } catch (const InputError& error) {
    return error.sentence();
  }
  return "";
}

}  // namespace

TEST_CASE("The expansion of a packet leaves a rest that is orthogonal to every envelope") {
  // Two bands: the Gram matrix G of the envelopes is not the identity, and amplitudes a obey G a ~ <psi|g>.
  // Both by the trapezoidal rule on 20,001 points, whose kinks at interfaces leave 1e-5.
  Study study = hand_made::double_well(Bands::two, 0);
  study.model.levels.count = 12;
  const Levels levels = solve(study);
  const Dynamics d = run(study, levels, PacketStart{27, 3, 0.1});
  const double length = study.stack.length(), dz = length / 20000;
  std::vector<double> z(20001);
  for (std::size_t i = 0; i < z.size(); ++i) z[i] = dz * static_cast<double>(i);
  const Eigen::MatrixXd psi = interpolate(levels.profile.grid, levels.envelope, z);
  Eigen::VectorXcd g(20001);
  for (Eigen::Index i = 0; i < g.size(); ++i) {
    const double x = z[static_cast<std::size_t>(i)] - 27;
    g[i] = std::pow(2 * 3.14159265358979323846 * 9, -0.25) * std::polar(std::exp(-x * x / 36), 0.1 * x);
  }
  const Eigen::VectorXcd overlap = dz * (psi.transpose() * g);
  const Eigen::MatrixXd gram = dz * (psi.transpose() * psi);
  REQUIRE((gram - Eigen::MatrixXd::Identity(12, 12)).cwiseAbs().maxCoeff() > 0.01);
  const Eigen::VectorXcd whole = gram.cast<std::complex<double>>().partialPivLu().solve(overlap);
  CHECK((d.amplitude - whole / whole.norm()).cwiseAbs().maxCoeff() < 1e-4);
  CHECK(d.captured_norm == Approx(overlap.dot(whole).real()).epsilon(1e-4));
}

TEST_CASE("A packet faster than any level held is in none of them, however coarse the levels' grid") {
  // Six levels of 40 nm reach k = 0.47 nm^-1; exp(-(k s)^2) is below 1e-15 from k = 2 on.
  const Study study = hand_made::study({{well, 40}}, Bands::one);
  const Levels levels = solve(study);
  for (double k = 2; k < 60; k *= 1.1) {
    CAPTURE(k);
    CHECK(refusal(study, levels, PacketStart{20, 3, k}) == "the levels hold only 0.0 % of the packet");
  }
}

TEST_CASE("Parts of a mix that name one level add up, phases and all") {
  const Study study = hand_made::double_well(Bands::one);
  const Levels levels = solve(study);
  const double quarter = 0.5 * 3.14159265358979323846;
  const Dynamics d = run(study, levels, MixStart{{{2, 3, 0}, {2, 4, quarter}}});
  CHECK(d.amplitude[1].real() == Approx(0.6).epsilon(1e-14));
  CHECK(d.amplitude[1].imag() == Approx(0.8).epsilon(1e-14));
}

TEST_CASE("A start localized in two layers holds no less there than any level, its largest part positive") {
  const Study study =
      hand_made::study({{barrier, 20}, {well, 9}, {barrier, 2}, {well, 9}, {barrier, 20}}, Bands::two);
  const Levels levels = solve(study);
  const Dynamics d = run(study, levels, LocalizedStart{{1, 3}, 2});
  const double held = d.layer_probability(1, 0) + d.layer_probability(3, 0);
  for (int k = 0; k < 2; ++k)
    CHECK(held >= levels.layer_probability(k, 1) + levels.layer_probability(k, 3) - 1e-12);
  for (const int layer : {0, 1, 2, 3, 4}) {
    const Dynamics one = run(study, levels, LocalizedStart{{layer}, 3});
    Eigen::Index largest = 0;
    one.amplitude.cwiseAbs().maxCoeff(&largest);
    CHECK(one.amplitude[largest].real() > 0);
  }
}

TEST_CASE("A level before a field step is counted the way the study asks for its levels") {
  // The lowest level lives in the wide well; the study asks for those of the narrow one alone.
  Study study = hand_made::double_well(Bands::two, 0.001);
  study.model.levels.count = 1;
  study.model.levels.in_layers = {3};
  const Levels levels = solve(study);
  REQUIRE(levels.count() == 1);
  REQUIRE(levels.layer_probability(0, 3) > 0.5);
  CHECK(run(study, levels, FieldStepStart{0.001, 1}).captured_norm == Approx(1).epsilon(1e-9));
}

TEST_CASE("A level before a field step that the levels do not hold at all is said") {
  // Hard walls and no change of field: the second level is orthogonal to the window's only level, the third.
  Study study = hand_made::study({{well, 20}}, Bands::one);
  const Levels all = solve(study);
  study.model.levels = {};
  study.model.levels.count.reset();
  study.model.levels.above = 0.5 * (all.energy[1] + all.energy[2]);
  study.model.levels.below = 0.5 * (all.energy[2] + all.energy[3]);
  const Levels window = solve(study);
  REQUIRE(window.count() == 1);
  CHECK(refusal(study, window, FieldStepStart{0, 2}) ==
        "the levels hold nothing of level 2 at the start's field");
  CHECK(run(study, window, FieldStepStart{0, 3}).captured_norm == Approx(1).epsilon(1e-9));
}

TEST_CASE(
    "A pulse of no stated energy takes the strongest line and says so; far from all lines it is refused") {
  const Study study = hand_made::double_well(Bands::one, 0.001);
  const Levels electrons = solve(study), holes = solve(study, Carrier::heavy_hole);
  const Interband pairs = interband(electrons, holes);
  Eigen::Index strongest = 0;
  pairs.overlap.col(0).cwiseAbs().maxCoeff(&strongest);
  REQUIRE(strongest != 0);
  PhotoexcitedStart pulse;
  pulse.duration = 0.3;
  Notes notes;
  const Dynamics tuned = run(study, electrons, pulse, notes, &holes);
  REQUIRE(notes.assumptions().size() == 1);
  char text[80];
  std::snprintf(text, sizeof text, "tuned to the strongest line, %.2f meV", 1e3 * pairs.energy(strongest, 0));
  CHECK(notes.assumptions()[0].find(text) != std::string::npos);
  pulse.photon_energy = pairs.energy(strongest, 0);
  Notes silent;
  CHECK(run(study, electrons, pulse, silent, &holes).amplitude == tuned.amplitude);
  CHECK(silent.assumptions().empty());
  pulse.photon_energy = 1.0;
  CHECK(refusal(study, electrons, pulse, &holes) == "the pulse at 1000.00 meV reaches no level");
}

TEST_CASE("What a pulse could lift beyond the levels held counts as not captured") {
  // One band: the levels span the sum of their squared overlaps with the hole. A pulse shorter than every
  // beat lifts all of that envelope; a longer one lifts at most the rest, at the spectrum of the last line
  // held.
  Study study = hand_made::study({{barrier, 20}, {well, 9}, {barrier, 20}}, Bands::one, 0.006);
  study.model.levels.count = 2;
  const Levels electrons = solve(study);
  study.model.levels.count = 3;
  const Levels holes = solve(study, Carrier::heavy_hole);
  const Interband pairs = interband(electrons, holes);
  const Eigen::VectorXd overlap = pairs.overlap.col(1), line = pairs.energy.col(1);
  REQUIRE(1 - overlap.squaredNorm() > 1e-3);
  PhotoexcitedStart pulse;
  pulse.level = 2;
  pulse.photon_energy = line[0];
  pulse.duration = 1e-5;
  CHECK(run(study, electrons, pulse, &holes).captured_norm == Approx(overlap.squaredNorm()).epsilon(1e-6));
  // Power spectrum at the second line: one half, where (dE T)^2 = 4 (ln 2)^2 hbar^2.
  pulse.duration = 2 * std::log(2.0) * constants::hbar / (line[1] - line[0]);
  const double reached = overlap[0] * overlap[0] + 0.5 * overlap[1] * overlap[1];
  const double beyond = 0.5 * (1 - overlap.squaredNorm());
  CHECK(run(study, electrons, pulse, &holes).captured_norm ==
        Approx(reached / (reached + beyond)).epsilon(1e-9));
}
