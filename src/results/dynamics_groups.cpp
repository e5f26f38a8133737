// SPDX-License-Identifier: Apache-2.0
// /dynamics with its density map, and /beats.
#include "results/groups.hpp"

namespace wellwright {
namespace {

void write_beats(const hdf5::Group& root, const Dynamics& dynamics) {
  hdf5::Group group = root.child("beats");
  group.count_axis("beat", dynamics.beats.size(), "beat, strongest first");
  const auto n = static_cast<Eigen::Index>(dynamics.beats.size());
  std::vector<int> lower, upper;
  Eigen::VectorXd energy(n), period(n), frequency(n), amplitude(n);
  for (Eigen::Index i = 0; i < n; ++i) {
    const Beat& beat = dynamics.beats[static_cast<std::size_t>(i)];
    lower.push_back(beat.lower);
    upper.push_back(beat.upper);
    energy[i] = beat.energy;
    period[i] = beat.period;
    frequency[i] = beat.frequency;
    amplitude[i] = beat.dipole_amplitude;
  }
  group.write("lower", {"beat"}, lower, {"1", "lower level"});
  group.write("upper", {"beat"}, upper, {"1", "upper level"});
  group.vector("energy", "beat", energy, {"eV", "distance of the two levels"});
  group.vector("period", "beat", period, {"ps", "beat period"});
  group.vector("frequency", "beat", frequency, {"THz", "beat frequency"});
  group.vector("dipole_amplitude", "beat", amplitude,
               {"nm", "peak to peak share of <z>", "4 |c_i c_j z_ij|"});
}

void write_density(hdf5::Group& parent, const Levels& levels, const Dynamics& dynamics) {
  hdf5::Group group = parent.child("density");
  group.axis("time", dynamics.time, {"ps", "time"});
  group.axis("z",
             Eigen::Map<const Eigen::VectorXd>(dynamics.density_z.data(),
                                               static_cast<Eigen::Index>(dynamics.density_z.size())),
             {"nm", "position along growth"});
  group.begin_blocks("probability_density", "time", "z", {"nm-1", "probability density of all components"});
  density_map(levels, dynamics, [&](int first, const RowMatrix& block) {
    group.write_block("probability_density", first, 0, block);
  });
}

// In blocks: all of them would be some gigabytes for many levels and a million times.
void write_amplitudes(hdf5::Group& group, const Levels& levels, const Dynamics& dynamics) {
  const auto begin = [&](const char* name, const char* long_name) {
    group.begin_blocks(name, "level", "time", {"1", long_name});
  };
  begin("amplitude_real", "real part of the level's amplitude");
  begin("amplitude_imag", "imaginary part of the level's amplitude");
  begin("population", "population of the level");
  amplitudes_in_blocks(levels, dynamics, [&](int level, int time, const Eigen::MatrixXcd& block) {
    group.write_block("amplitude_real", level, time, block.real());
    group.write_block("amplitude_imag", level, time, block.imag());
    group.write_block("population", level, time, block.cwiseAbs2());
  });
}

}  // namespace

void write_dynamics(const hdf5::Group& root, const Levels& levels, const Dynamics& dynamics) {
  hdf5::Group group = root.child("dynamics");
  group.attribute("captured_norm", dynamics.captured_norm);
  if (dynamics.classical_period) group.attribute("classical_period", *dynamics.classical_period);
  if (dynamics.revival_time) group.attribute("revival_time", *dynamics.revival_time);
  group.axis("time", dynamics.time, {"ps", "time"});
  group.count_axis("level", static_cast<std::size_t>(levels.count()), "level");
  group.count_axis("layer", static_cast<std::size_t>(dynamics.layer_probability.rows()),
                   "layer, counted from 1 at the substrate");
  write_amplitudes(group, levels, dynamics);
  group.vector("mean_position", "time", dynamics.mean_position, {"nm", "mean position"});
  group.vector("survival", "time", dynamics.survival, {"1", "probability of the start state"});
  group.begin_blocks("layer_probability", "layer", "time", {"1", "probability in each layer"});
  for (Eigen::Index layer = 0; layer < dynamics.layer_probability.rows(); ++layer)
    group.write_block("layer_probability", layer, 0, dynamics.layer_probability.row(layer));
  if (!dynamics.density_z.empty()) write_density(group, levels, dynamics);
  write_beats(root, dynamics);
}

}  // namespace wellwright
