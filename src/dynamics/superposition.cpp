// SPDX-License-Identifier: Apache-2.0
// The superposition of levels in time: each amplitude gathers the phase exp(-i E t / hbar).
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <complex>

#include "dynamics/starts.hpp"

namespace wellwright {
namespace {

constexpr int block = 1024;           // times formed together at most
constexpr int most_values = 1 << 22;  // of one working matrix: 32 MB
constexpr double least_beat = 1e-6;   // [nm] weaker beats are left out
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

// The levels that take part, those whose amplitude is not zero: a mix of two of a thousand costs as two.
struct Movers {
  Eigen::VectorXd energy;
  Eigen::VectorXcd amplitude;
  std::vector<Eigen::MatrixXd> components;  // psi, then each chi: (element-local node, mover)

  Movers(const Levels& levels, const Eigen::VectorXcd& all) {
    std::vector<Eigen::Index> moving;
    for (Eigen::Index k = 0; k < all.size(); ++k)
      if (all[k] != 0.0) moving.push_back(k);
    energy = levels.energy(moving);
    amplitude = all(moving);
    components.emplace_back(levels.envelope(Eigen::all, moving));
    for (const Eigen::MatrixXd& chi : levels.companion) components.emplace_back(chi(Eigen::all, moving));
  }
  Eigen::Index count() const { return energy.size(); }
};

// Times that can be formed together when a working matrix has this many rows.
Eigen::Index times_together(Eigen::Index rows) {
  return std::clamp<Eigen::Index>(most_values / std::max<Eigen::Index>(rows, 1), 1, block);
}

// c_k exp(-i E_k t / hbar) for some times.
void phases(const Eigen::VectorXd& energy, const Eigen::VectorXcd& amplitude,
            const Eigen::Ref<const Eigen::VectorXd>& time, Eigen::MatrixXcd& out) {
  out.resize(energy.size(), time.size());
  for (Eigen::Index t = 0; t < time.size(); ++t)
    for (Eigen::Index k = 0; k < out.rows(); ++k)
      out(k, t) = amplitude[k] * std::polar(1.0, -energy[k] * time[t] / constants::hbar);
}

// Layer probabilities and, last row, <z> at some times: of few levels as sums over pairs, (what, pair) times
// (pair, time); of many from the density at the nodes, whose work grows with the levels and not with their
// pairs.
class Observed {
 public:
  Observed(const Grid& grid, const Movers& movers, int layers)
      : grid_(&grid), movers_(&movers), rows_(layers + 1), pairs_(movers.count() * (movers.count() + 1) / 2) {
    const auto components = static_cast<Eigen::Index>(movers.components.size());
    by_pairs_ =
        pairs_ * (rows_ + 1) < 2 * components * grid.rows() * movers.count() && pairs_ * rows_ < most_values;
    if (!by_pairs_) return;
    of_pair_.setZero(rows_, pairs_);
    Eigen::VectorXd product;
    for (Eigen::Index i = 0, pair = 0; i < movers.count(); ++i)
      for (Eigen::Index j = 0; j <= i; ++j, ++pair) {
        product.setZero(grid.rows());
        for (const Eigen::MatrixXd& part : movers.components)
          product += part.col(i).cwiseProduct(part.col(j));
        of_pair_.col(pair) = integrals(product);
      }
  }

  Eigen::Index times() const { return times_together(by_pairs_ ? pairs_ : grid_->rows()); }

  void at(const Eigen::MatrixXcd& a, Eigen::MatrixXd& values) {
    if (by_pairs_) {
      interference_.resize(pairs_, a.cols());
      for (Eigen::Index t = 0; t < a.cols(); ++t)
        for (Eigen::Index i = 0, pair = 0; i < a.rows(); ++i)
          for (Eigen::Index j = 0; j <= i; ++j, ++pair)
            interference_(pair, t) = (i == j ? 1 : 2) * (std::conj(a(i, t)) * a(j, t)).real();
      values.noalias() = of_pair_ * interference_;
      return;
    }
    squares(movers_->components, a, work_);
    values = integrals(work_.density);
  }

  struct Work {
    Eigen::MatrixXd real, imaginary, part, density;
  };
  // Sum over components of |component * a|^2: (point, time).
  static void squares(const std::vector<Eigen::MatrixXd>& components, const Eigen::MatrixXcd& a, Work& w) {
    w.real = a.real();
    w.imaginary = a.imag();
    w.density.setZero(components.front().rows(), a.cols());
    for (const Eigen::MatrixXd& component : components)
      for (const Eigen::MatrixXd* times : {&w.real, &w.imaginary}) {
        w.part.noalias() = component * *times;
        w.density += w.part.cwiseAbs2();
      }
  }

 private:
  // Of element-local densities in columns: the integral over each layer, then that of z times the density.
  Eigen::MatrixXd integrals(const Eigen::MatrixXd& density) const {
    Eigen::MatrixXd out = Eigen::MatrixXd::Zero(rows_, density.cols());
    const int n = grid_->degree + 1;
    for (int e = 0; e < grid_->elements(); ++e)
      out.row(grid_->layer[static_cast<std::size_t>(e)]) +=
          grid_->weight.segment(e * n, n).transpose() * density.middleRows(e * n, n);
    out.row(rows_ - 1) = grid_->weight.cwiseProduct(grid_->z).transpose() * density;
    return out;
  }

  const Grid* grid_;
  const Movers* movers_;
  Eigen::Index rows_, pairs_;
  bool by_pairs_ = true;
  Eigen::MatrixXd of_pair_, interference_;
  Work work_;
};

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

// Classical period h / |E'(n)| and revival time 2 h / |E''(n)| by central differences at the level n nearest
// to the mean of k |c_k|^2. Defined where n and both its neighbours carry the state and the distance of the
// levels changes slowly, |E''| < |E'|: a doublet below a far third level is no ladder. Source: R.W. Robinett,
// Phys. Rep. 392, 1 (2004), doi:10.1016/j.physrep.2003.11.002.
void find_periods(const Levels& levels, Dynamics& dynamics) {
  constexpr double carries = 1e-3, equal_distances = 1e-6;
  const Eigen::VectorXd weight = dynamics.amplitude.cwiseAbs2();
  const double mean =
      weight.dot(Eigen::VectorXd::LinSpaced(weight.size(), 0, static_cast<double>(weight.size() - 1)));
  const auto n = static_cast<Eigen::Index>(std::lround(mean));
  if (n < 1 || n + 1 >= weight.size() || weight.segment(n - 1, 3).minCoeff() < carries) return;
  const double first = 0.5 * (levels.energy[n + 1] - levels.energy[n - 1]);
  const double second = levels.energy[n + 1] - 2 * levels.energy[n] + levels.energy[n - 1];
  if (!(std::abs(second) < first)) return;
  dynamics.classical_period = constants::planck / first;
  if (std::abs(second) > equal_distances * first)
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
  phases(levels.energy, dynamics.amplitude, dynamics.time, out);
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
  const int layers = static_cast<int>(levels.layer_probability.cols());
  dynamics.layer_probability.resize(layers, request.samples);

  const Grid& grid = levels.profile.grid;
  const Movers movers(levels, dynamics.amplitude);
  Observed observed(grid, movers, layers);
  Eigen::MatrixXcd a;
  Eigen::MatrixXd values;
  for (Eigen::Index first = 0; first < request.samples; first += observed.times()) {
    const auto count = std::min<Eigen::Index>(observed.times(), request.samples - first);
    phases(movers.energy, movers.amplitude, dynamics.time.segment(first, count), a);
    observed.at(a, values);
    dynamics.layer_probability.middleCols(first, count) = values.topRows(layers);
    dynamics.mean_position.segment(first, count) = values.row(layers).transpose();
    dynamics.survival.segment(first, count) = (movers.amplitude.adjoint() * a).cwiseAbs2().transpose();
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
  Movers movers(levels, dynamics.amplitude);
  for (Eigen::MatrixXd& component : movers.components)
    component = interpolate(levels.profile.grid, component, dynamics.density_z);
  Eigen::MatrixXcd a;
  Observed::Work work;
  Eigen::MatrixXd density;
  const Eigen::Index step = times_together(points);
  for (Eigen::Index first = 0; first < dynamics.time.size(); first += step) {
    const auto count = std::min<Eigen::Index>(step, dynamics.time.size() - first);
    phases(movers.energy, movers.amplitude, dynamics.time.segment(first, count), a);
    Observed::squares(movers.components, a, work);
    density = work.density.transpose();
    take(static_cast<int>(first), density);
  }
}

}  // namespace wellwright
