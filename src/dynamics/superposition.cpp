// SPDX-License-Identifier: Apache-2.0
// The superposition of levels in time: each amplitude gathers the phase exp(-i E t / hbar).
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <complex>

#include "dynamics/starts.hpp"

namespace wellwright {
namespace {

constexpr int block = 1024;          // times formed together
constexpr double least_beat = 1e-6;  // [nm] weaker beats are left out
constexpr double enough_captured = 0.99;

Started start_of(const Study& study, const Levels& levels, const Levels* holes, Notes& notes) {
  const DynamicsRequest& request = *study.dynamics;
  const Place& place = request.place;
  if (levels.count() == 0)
    throw InputError("there are no levels to superpose", place, "ask for other levels under model: levels");
  return std::visit(
      [&](const auto& start) -> Started {
        using Kind = std::decay_t<decltype(start)>;
        if constexpr (std::is_same_v<Kind, PacketStart>)
          return start_packet(start, levels, place);
        else if constexpr (std::is_same_v<Kind, MixStart>)
          return start_mix(start, levels, place);
        else if constexpr (std::is_same_v<Kind, LocalizedStart>)
          return start_localized(start, levels, place);
        else if constexpr (std::is_same_v<Kind, FieldStepStart>)
          return start_field_step(start, study, levels, place, notes);
        else {
          if (!holes) throw InputError("a photoexcited start needs hole levels", place);
          return start_photoexcited(start, levels, *holes, place, notes);
        }
      },
      request.start);
}

// c_k exp(-i E_k t / hbar) for some times; phases are counted from the first level, which changes no
// observable.
void phases(const Levels& levels, const Eigen::VectorXcd& amplitude,
            const Eigen::Ref<const Eigen::VectorXd>& time, Eigen::MatrixXcd& out) {
  out.resize(levels.count(), time.size());
  for (Eigen::Index t = 0; t < time.size(); ++t)
    for (Eigen::Index k = 0; k < out.rows(); ++k)
      out(k, t) = amplitude[k] * std::polar(1.0, -levels.energy[k] * time[t] / constants::hbar);
}

std::vector<Beat> beats_of(const Levels& levels, const Transitions& transitions,
                           const Eigen::VectorXcd& amplitude) {
  std::vector<Beat> beats;
  for (int i = 0; i < levels.count(); ++i)
    for (int j = i + 1; j < levels.count(); ++j) {
      const double size =
          4 * std::abs(amplitude[i]) * std::abs(amplitude[j]) * std::abs(transitions.dipole(i, j));
      if (!(size > least_beat) || std::isnan(transitions.beat_period(i, j))) continue;
      beats.push_back({i + 1, j + 1, transitions.energy(i, j), transitions.beat_period(i, j),
                       transitions.frequency(i, j), size});
    }
  std::stable_sort(beats.begin(), beats.end(),
                   [](const Beat& a, const Beat& b) { return a.dipole_amplitude > b.dipole_amplitude; });
  return beats;
}

// Classical period h / |E'(n)| and revival time 2 h / |E''(n)| around the mean level, by differences of
// neighbours. Defined where at least three neighbouring levels carry the state (R.W. Robinett, Phys. Rep.
// 392, 1 (2004)).
void find_periods(const Levels& levels, Dynamics& dynamics) {
  constexpr double carries = 1e-3;
  const Eigen::VectorXd weight = dynamics.amplitude.cwiseAbs2();
  double mean = 0;
  int carrying = 0;
  for (Eigen::Index k = 0; k < weight.size(); ++k) {
    mean += static_cast<double>(k) * weight[k];
    if (weight[k] > carries) ++carrying;
  }
  const auto n = static_cast<Eigen::Index>(std::lround(mean));
  if (carrying < 3 || n < 1 || n + 1 >= weight.size()) return;
  const double first = 0.5 * (levels.energy[n + 1] - levels.energy[n - 1]);
  const double second = levels.energy[n + 1] - 2 * levels.energy[n] + levels.energy[n - 1];
  dynamics.classical_period = constants::planck / std::abs(first);
  if (std::abs(second) > 1e-6 * std::abs(first))
    dynamics.revival_time = 2 * constants::planck / std::abs(second);
}

// Points of the map: a quarter of a nanometre apart, within bounds.
std::vector<double> map_points(double length) {
  const int count = std::clamp(static_cast<int>(std::ceil(length / 0.25)) + 1, 201, 801);
  std::vector<double> z(static_cast<std::size_t>(count));
  for (int i = 0; i < count; ++i) z[static_cast<std::size_t>(i)] = length * i / (count - 1);
  return z;
}

}  // namespace

Eigen::MatrixXcd amplitudes_in_time(const Levels& levels, const Dynamics& dynamics) {
  Eigen::MatrixXcd out;
  phases(levels, dynamics.amplitude, dynamics.time, out);
  return out;
}

Dynamics superpose(const Study& study, const Levels& levels, const Transitions& transitions,
                   const Levels* holes, Notes& notes) {
  const DynamicsRequest& request = *study.dynamics;
  const Started started = start_of(study, levels, holes, notes);
  Dynamics dynamics;
  dynamics.amplitude = started.amplitude;
  dynamics.captured_norm = started.captured;
  if (started.captured < enough_captured)
    notes.warn(fmt::format("the levels hold {:.1f} % of the start state; amplitudes are rescaled to one",
                           100 * started.captured));
  dynamics.time = Eigen::VectorXd::LinSpaced(request.samples, 0, request.duration);
  dynamics.mean_position.resize(request.samples);
  dynamics.survival.resize(request.samples);
  const int n = levels.count(), layers = static_cast<int>(levels.layer_probability.cols());
  dynamics.layer_probability.resize(layers, request.samples);

  // Every observable is a sum over pairs: (what, pair) times (pair, time).
  const Grid& grid = levels.profile.grid;
  const int pairs = n * (n + 1) / 2;
  Eigen::MatrixXd observed = Eigen::MatrixXd::Zero(layers + 1, pairs);
  for (int i = 0, pair = 0; i < n; ++i)
    for (int j = 0; j <= i; ++j, ++pair) {
      Eigen::VectorXd product = levels.envelope.col(i).cwiseProduct(levels.envelope.col(j));
      for (const Eigen::MatrixXd& chi : levels.companion) product += chi.col(i).cwiseProduct(chi.col(j));
      product = product.cwiseProduct(grid.weight);
      for (int e = 0; e < grid.elements(); ++e)
        observed(grid.layer[static_cast<std::size_t>(e)], pair) +=
            product.segment(e * (grid.degree + 1), grid.degree + 1).sum();
      observed(layers, pair) = product.dot(grid.z);
    }
  Eigen::MatrixXcd a;
  Eigen::MatrixXd interference, values;
  for (int first = 0; first < request.samples; first += block) {
    const int count = std::min(block, request.samples - first);
    phases(levels, dynamics.amplitude, dynamics.time.segment(first, count), a);
    interference.resize(pairs, count);
    for (int t = 0; t < count; ++t)
      for (int i = 0, pair = 0; i < n; ++i)
        for (int j = 0; j <= i; ++j, ++pair)
          interference(pair, t) = (i == j ? 1 : 2) * (std::conj(a(i, t)) * a(j, t)).real();
    values.noalias() = observed * interference;
    dynamics.layer_probability.middleCols(first, count) = values.topRows(layers);
    dynamics.mean_position.segment(first, count) = values.row(layers).transpose();
    dynamics.survival.segment(first, count) = (dynamics.amplitude.adjoint() * a).cwiseAbs2().transpose();
  }
  dynamics.beats = beats_of(levels, transitions, dynamics.amplitude);
  find_periods(levels, dynamics);
  if (request.density_map) dynamics.density_z = map_points(grid.boundaries.back());
  return dynamics;
}

void density_map(const Levels& levels, const Dynamics& dynamics,
                 const std::function<void(int first_time, const Eigen::MatrixXd& block)>& take) {
  const auto points = static_cast<Eigen::Index>(dynamics.density_z.size());
  if (points == 0) return;
  std::vector<Eigen::MatrixXd> components{
      interpolate(levels.profile.grid, levels.envelope, dynamics.density_z)};
  for (const Eigen::MatrixXd& chi : levels.companion)
    components.push_back(interpolate(levels.profile.grid, chi, dynamics.density_z));
  Eigen::MatrixXcd a;
  Eigen::MatrixXd real, imaginary, sum, density, part;
  for (int first = 0; first < dynamics.time.size(); first += block) {
    const auto count = std::min<Eigen::Index>(block, dynamics.time.size() - first);
    phases(levels, dynamics.amplitude, dynamics.time.segment(first, count), a);
    real = a.real();
    imaginary = a.imag();
    sum.setZero(points, count);
    for (const Eigen::MatrixXd& component : components)
      for (const Eigen::MatrixXd* times : {&real, &imaginary}) {
        part.noalias() = component * *times;
        sum += part.cwiseAbs2();
      }
    density = sum.transpose();
    take(first, density);
  }
}

}  // namespace wellwright
