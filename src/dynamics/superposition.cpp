// SPDX-License-Identifier: Apache-2.0
// The superposition of levels in time: each amplitude gathers the phase exp(-i E t / hbar).
#include <fmt/format.h>

#include <algorithm>

#include "dynamics/movers.hpp"
#include "dynamics/observed.hpp"
#include "dynamics/periods.hpp"
#include "dynamics/starts.hpp"

namespace wellwright {
namespace {

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

}  // namespace

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

}  // namespace wellwright
