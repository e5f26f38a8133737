// SPDX-License-Identifier: Apache-2.0
// Start states expanded in the levels.
#include "dynamics/starts.hpp"

#include <fmt/format.h>

#include <Eigen/Cholesky>
#include <Eigen/Eigenvalues>
#include <algorithm>
#include <cmath>
#include <complex>
#include <numbers>

namespace wellwright {
namespace {

using std::complex;

Started normalised(Eigen::VectorXcd amplitude, double captured) {
  const double norm = amplitude.norm();
  if (norm > 0) amplitude /= norm;
  return {std::move(amplitude), captured};
}

void check_level(int level, const Levels& levels, const Place& place) {
  if (level >= 1 && level <= levels.count()) return;
  throw InputError(fmt::format("the start asks for level {}, and {} {} computed", level, levels.count(),
                               levels.count() == 1 ? "level is" : "levels are"),
                   place, "ask for more levels under model: levels");
}

constexpr int far = 12;               // spreads: beyond, the density is below 1e-31 of its peak
constexpr double most_pieces = 4000;  // cuts of a packet; finer waves than these are in no level

// The levels' grid, cut about the centre into pieces in which a packet of this width and wavenumber is
// smooth.
Grid grid_for(const Grid& grid, const PacketStart& packet) {
  const double close = 1e-12 * std::max(1.0, grid.boundaries.back());
  const double wave = packet.wavenumber == 0 ? 1e300 : 4 / std::abs(packet.wavenumber);
  const double extent = std::min(2 * far * packet.spread, grid.boundaries.back());
  const double piece = std::max({std::min(2 * packet.spread, wave), extent / most_pieces, 10 * close});
  std::vector<double> all = grid.boundaries;
  const int reach =
      static_cast<int>(std::ceil(std::min(far * packet.spread, grid.boundaries.back()) / piece));
  for (int i = -reach; i <= reach; ++i) {
    const double z = packet.centre + i * piece;
    if (z > 0 && z < grid.boundaries.back()) all.push_back(z);
  }
  std::sort(all.begin(), all.end());
  std::vector<double> boundaries{all.front()};
  for (const double z : all)
    if (z - boundaries.back() > close) boundaries.push_back(z);
  boundaries.back() = grid.boundaries.back();
  return make_grid(boundaries, {}, std::max(grid.degree, 16));
}

// Least-squares expansion of an envelope in the levels' envelopes from its overlaps with them: the Gram
// matrix is not the identity where the mass depends on energy. Column 0: real parts.
Eigen::MatrixXd expanded(const Levels& levels, const Eigen::MatrixXd& overlap) {
  const Eigen::MatrixXd gram =
      levels.envelope.transpose() * (levels.profile.grid.weight.asDiagonal() * levels.envelope);
  return gram.ldlt().solve(overlap);
}

}  // namespace

// Gaussian exp(-(z - z0)^2 / 4 s^2 + i k z): |psi|^2 has the rms width s. It is an envelope alone; its
// amplitudes are its least-squares expansion in the levels' envelopes, whose Gram matrix is not the identity
// where the mass depends on energy.
Started start_packet(const PacketStart& packet, const Levels& levels, const Place& place) {
  const Grid& own = levels.profile.grid;
  const double length = own.boundaries.back();
  if (packet.centre < 0 || packet.centre > length)
    throw InputError(fmt::format("the packet's centre, {:g} nm, lies outside the stack", packet.centre),
                     place, fmt::format("the stack reaches from 0 to {:g} nm", length));
  const Grid grid = grid_for(own, packet);
  const Eigen::MatrixXd psi = interpolate(own, levels.envelope, grid);
  Eigen::VectorXcd g(grid.rows());
  const double peak = std::pow(2 * std::numbers::pi * packet.spread * packet.spread, -0.25);
  for (int r = 0; r < grid.rows(); ++r) {
    const double x = (grid.z[r] - packet.centre) / packet.spread;
    g[r] = peak * std::exp(-0.25 * x * x) * std::polar(1.0, packet.wavenumber * (grid.z[r] - packet.centre));
  }
  const Eigen::VectorXcd overlap = psi.transpose() * (grid.weight.asDiagonal() * g);
  Eigen::MatrixXd parts(overlap.size(), 2);
  parts << overlap.real(), overlap.imag();
  parts = expanded(levels, parts);
  Eigen::VectorXcd amplitude(overlap.size());
  amplitude.real() = parts.col(0);
  amplitude.imag() = parts.col(1);
  const double captured =
      std::clamp(overlap.dot(amplitude).real(), 0.0, 1.0);  // one minus the squared residual
  if (captured < 0.5)
    throw InputError(
        fmt::format("the levels hold only {:.1f} % of the packet", 100 * captured), place,
        fmt::format("ask for more levels than {}, or make the packet wider or slower", levels.count()));
  return normalised(std::move(amplitude), captured);
}

Started start_mix(const MixStart& mix, const Levels& levels, const Place& place) {
  Eigen::VectorXcd amplitude = Eigen::VectorXcd::Zero(levels.count());
  for (const MixStart::Part& part : mix.parts) {
    check_level(part.level, levels, place);
    amplitude[part.level - 1] += std::polar(1.0, part.phase) * part.amplitude;
  }
  if (amplitude.norm() == 0) throw InputError("all amplitudes of the mix are zero", place);
  return normalised(std::move(amplitude), 1);
}

// The combination of the lowest levels with the largest probability in the layers: the top eigenvector of
// that probability's matrix.
Started start_localized(const LocalizedStart& start, const Levels& levels, const Place& place) {
  check_level(start.levels, levels, place);
  const Grid& grid = levels.profile.grid;
  Eigen::VectorXd inside = Eigen::VectorXd::Zero(grid.rows());
  for (int e = 0; e < grid.elements(); ++e)
    for (const int layer : start.layers)
      if (grid.layer[static_cast<std::size_t>(e)] == layer)
        inside.segment(e * (grid.degree + 1), grid.degree + 1).setOnes();
  const Eigen::MatrixXd probability = levels.moment(inside).topLeftCorner(start.levels, start.levels);
  const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver(probability);
  Eigen::VectorXd best = solver.eigenvectors().col(start.levels - 1);
  Eigen::Index largest = 0;
  best.cwiseAbs().maxCoeff(&largest);
  if (best[largest] < 0) best = -best;
  Eigen::VectorXcd amplitude = Eigen::VectorXcd::Zero(levels.count());
  amplitude.head(start.levels) = best.cast<complex<double>>();
  return normalised(std::move(amplitude), 1);
}

// A level of the stack at another field, overlapped in the full product.
Started start_field_step(const FieldStepStart& start, const Study& study, const Levels& levels,
                         const Place& place, Notes& notes) {
  Study before = study;
  before.field = start.field;
  before.bias.reset();
  if (before.model.levels.in_layers.empty()) {
    before.model.levels = LevelRequest{};
    before.model.levels.count = start.level;
  } else {
    before.model.levels.count = std::max(before.model.levels.count.value_or(1), start.level);
  }
  const Levels other = solve_levels(before, levels.profile.carrier, notes, {},
                                    levels.potential ? *levels.potential : Potential{});
  if (levels.potential)
    notes.assume(
        "the charge stays where it is while the field steps: the start is solved in the same potential");
  check_level(start.level, other, place);
  const int index = start.level - 1;
  const Grid grid = common_grid(levels.profile.grid, other.profile.grid);
  const auto product = [&](const Eigen::MatrixXd& mine, const Eigen::MatrixXd& theirs) -> Eigen::VectorXd {
    const Eigen::MatrixXd a = interpolate(levels.profile.grid, mine, grid);
    const Eigen::VectorXd b = interpolate(other.profile.grid, theirs.col(index), grid);
    return a.transpose() * (grid.weight.asDiagonal() * b);
  };
  Eigen::VectorXd overlap = product(levels.envelope, other.envelope);
  for (std::size_t j = 0; j < levels.companion.size(); ++j)
    overlap += product(levels.companion[j], other.companion[j]);
  const double captured = std::min(overlap.squaredNorm(), 1.0);
  if (captured < 1e-6)
    throw InputError(fmt::format("the levels hold nothing of level {} at the start's field", start.level),
                     place, "ask for more levels, or for those in other layers");
  return normalised(overlap.cast<complex<double>>(), captured);
}

// A Gaussian pulse, full width T of its intensity, lifts the hole's envelope into the electron levels:
// amplitude <psi_k|hole> exp(-(dE T)^2 / (8 ln 2 hbar^2)), dE the distance of the line from the photon
// energy.
Started start_photoexcited(const PhotoexcitedStart& start, const Levels& levels, const Levels& holes,
                           const Place& place, Notes& notes) {
  check_level(start.level, holes, place);
  const Interband pairs = interband(levels, holes);
  const Eigen::VectorXd overlap = pairs.overlap.col(start.level - 1);
  const Eigen::VectorXd line = pairs.energy.col(start.level - 1);
  Eigen::Index strongest = 0;
  overlap.cwiseAbs().maxCoeff(&strongest);
  const double photon = start.photon_energy.value_or(line[strongest]);
  if (!start.photon_energy)
    notes.assume(fmt::format("the exciting pulse is tuned to the strongest line, {:.2f} meV", 1e3 * photon));
  const double scale =
      start.duration * start.duration / (8 * std::numbers::ln2 * constants::hbar * constants::hbar);
  const auto spectrum = [&](double energy) {
    return std::exp(-(energy - photon) * (energy - photon) * scale);
  };
  Eigen::VectorXcd amplitude(levels.count());
  for (Eigen::Index k = 0; k < amplitude.size(); ++k) amplitude[k] = overlap[k] * spectrum(line[k]);
  const double reached = amplitude.squaredNorm();
  if (reached < 1e-12) {
    Eigen::Index nearest_line = 0;
    (line.array() - photon).abs().minCoeff(&nearest_line);
    throw InputError(fmt::format("the pulse at {:.2f} meV reaches no level", 1e3 * photon), place,
                     fmt::format("the nearest line lies at {:.2f} meV, with overlap {:.3f}",
                                 1e3 * line[nearest_line], std::abs(overlap[nearest_line])));
  }
  // What the levels left out could add at most: the part of the hole's envelope that they do not span, at
  // the spectrum above the last line.
  const double last = line[line.size() - 1];
  const double spanned = overlap.dot(expanded(levels, overlap).col(0));
  const double beyond = std::max(0.0, 1 - spanned) * std::pow(photon > last ? 1.0 : spectrum(last), 2);
  return normalised(std::move(amplitude), reached / (reached + beyond));
}

}  // namespace wellwright
