// SPDX-License-Identifier: Apache-2.0
// /levels, /dispersion, /minibands, /sensitivity, /transitions of one carrier, and /interband.
#include <limits>

#include "results/groups.hpp"
#include "results/names.hpp"
#include "results/nodes.hpp"

namespace wellwright {
namespace {

constexpr double undefined = std::numeric_limits<double>::quiet_NaN();
constexpr double kV_per_cm = 1e-4;  // V/nm

void write_levels(const hdf5::Group& root, const CarrierAnswer& part) {
  const Levels& levels = part.levels;
  const auto n = static_cast<Eigen::Index>(levels.count());
  const FileNodes nodes(levels.profile.grid);
  const bool hole = levels.profile.carrier != Carrier::electron;
  hdf5::Group group = root.child(group_of("levels", levels.profile.carrier));
  const Certificate& certificate = levels.certificate;
  group.attribute("certified", certificate.certified ? 1 : 0);
  group.attribute("count_below", certificate.count_below);
  group.attribute("window_bottom", certificate.window_bottom);
  group.attribute("window_top", certificate.window_top);
  if (!certificate.reason.empty()) group.attribute("reason", certificate.reason);
  group.count_axis("level", static_cast<std::size_t>(n), "level, counted from the lowest listed");
  group.axis("z", nodes.z(), {"nm", "position along growth, 0 at the face next to the substrate"});
  group.count_axis("layer", static_cast<std::size_t>(levels.layer_probability.cols()),
                   "layer, counted from 1 at the substrate");
  group.count_axis("component", levels.companion.size(),
                   "component beside the envelope, one for each pole of the inverse mass");
  const Eigen::VectorXd unknown = Eigen::VectorXd::Constant(n, undefined);
  const auto column = [&](const char* name, const Eigen::VectorXd& values, const hdf5::Words& words) {
    group.vector(name, "level", values, words);
  };
  column("energy", levels.energy,
         {"eV", "level energy",
          hole ? "positive downward from the highest unbiased valence edge of this kind of hole"
               : "from the zero of energy of the stack"});
  column("error_estimate", levels.error_estimate, {"eV", "estimated numerical error of the energy"});
  column("residual", levels.residual, {"eV", "residual norm of the eigenpair on its grid"});
  column("conduction_fraction", levels.conduction_fraction,
         {"1", "weight of the envelope in the product over all components"});
  column("mean_position", levels.mean_position, {"nm", "mean position"});
  column("spread", levels.spread, {"nm", "rms width of the probability density"});
  column("sheet_density", part.filled ? Eigen::VectorXd(per_cm2 * part.filled->sheet_density) : unknown,
         {"cm-2", "sheet density of carriers in the level",
          part.filled ? "both spins" : "NaN: the stack holds no charge"});
  column("in_plane_mass", levels.in_plane_mass, {"1", "in-plane mass", "in free electron masses"});
  column("level_width", unknown, {"eV", "full width of the level", "NaN: lifetimes are not computed"});
  group.write("bound", {"level"}, levels.bound,
              {"1", "1: below the lower of the two outer edges, 0: box level"});
  group.write("group", {"level"}, levels.group, {"1", "number of the group of levels closer than 1e-10 eV"});
  group.vector("weight", "z", nodes.weight(),
               {"nm", "quadrature weight: sum(weight probability_density) is 1"});
  const Eigen::MatrixXd density = nodes.take(levels.density());
  group.matrix("envelope", "level", "z", nodes.take(levels.envelope).transpose(),
               {"1", "envelope times the square root of 1 nm"});
  hdf5::RowMatrix companions(static_cast<Eigen::Index>(levels.companion.size()) * n, nodes.z().size());
  for (std::size_t j = 0; j < levels.companion.size(); ++j)
    companions.middleRows(static_cast<Eigen::Index>(j) * n, n) = nodes.take(levels.companion[j]).transpose();
  group.write("companion_envelope", {"component", "level", "z"}, companions.data(),
              {"1", "components beside the envelope, times the square root of 1 nm"});
  group.matrix("probability_density", "level", "z", density.transpose(),
               {"nm-1", "probability density of all components"});
  group.matrix("layer_probability", "level", "layer", levels.layer_probability,
               {"1", "probability in each layer"});
}

void write_dispersion(const hdf5::Group& root, const CarrierAnswer& part) {
  hdf5::Group group = root.child(group_of("dispersion", part.levels.profile.carrier));
  group.count_axis("level", static_cast<std::size_t>(part.levels.count()), "level");
  group.axis("k", part.dispersion.k, {"nm-1", "in-plane wavenumber"});
  group.matrix("energy", "level", "k", part.dispersion.energy,
               {"eV", "level energy at in-plane wavenumber k"});
}

void write_minibands(const hdf5::Group& root, const CarrierAnswer& part) {
  if (!part.minibands) return;
  hdf5::Group group = root.child(group_of("minibands", part.levels.profile.carrier));
  group.count_axis("band", static_cast<std::size_t>(part.levels.count()), "miniband");
  group.axis("bloch_phase", part.minibands->bloch_phase, {"rad", "Bloch phase over one period"});
  group.matrix("energy", "band", "bloch_phase", part.minibands->energy, {"eV", "miniband energy"});
}

void write_sensitivity(const hdf5::Group& root, const CarrierAnswer& part) {
  const Sensitivity& s = part.sensitivity;
  hdf5::Group group = root.child(group_of("sensitivity", part.levels.profile.carrier));
  group.count_axis("level", static_cast<std::size_t>(part.levels.count()), "level");
  group.count_axis("layer", static_cast<std::size_t>(part.levels.layer_probability.cols()),
                   "layer, counted from 1 at the substrate");
  group.count_axis("transition", s.transitions.size(), "listed transition");
  const std::string kept =
      "all other thicknesses in nm, compositions, temperature, the zero of energy and the field or bias as "
      "given are kept";
  const std::string none = kept + "; NaN where the layer has no composition";
  group.matrix("thickness_derivative", "level", "layer", s.thickness,
               {"eV nm-1", "derivative of the energy with the layer's thickness", kept});
  group.matrix("composition_derivative", "level", "layer", s.composition,
               {"eV", "derivative of the energy with the layer's composition", none});
  group.vector("field_derivative", "level", kV_per_cm * s.field,
               {"eV cm kV-1", "derivative of the energy with the field"});
  group.matrix("transition_thickness_derivative", "transition", "layer", s.transition_thickness,
               {"eV nm-1", "derivative of the transition energy with the layer's thickness", kept});
  group.matrix("transition_composition_derivative", "transition", "layer", s.transition_composition,
               {"eV", "derivative of the transition energy with the layer's composition", none});
  group.vector("transition_field_derivative", "transition", kV_per_cm * s.transition_field,
               {"eV cm kV-1", "derivative of the transition energy with the field"});
  std::vector<int> initial, final;
  for (const auto& [from, to] : s.transitions) {
    initial.push_back(from);
    final.push_back(to);
  }
  group.write("initial", {"transition"}, initial, {"1", "initial level"});
  group.write("final", {"transition"}, final, {"1", "final level"});
}

void write_transitions(const hdf5::Group& root, const CarrierAnswer& part) {
  const Transitions& t = part.transitions;
  hdf5::Group group = root.child(group_of("transitions", part.levels.profile.carrier));
  const auto n = static_cast<std::size_t>(part.levels.count());
  group.count_axis("initial", n, "initial level");
  group.count_axis("final", n, "final level");
  const auto matrix = [&](const char* name, const Eigen::MatrixXd& values, const hdf5::Words& words) {
    group.matrix(name, "initial", "final", values, words);
  };
  const std::string dipole = part.levels.profile.ends == Ends::periodic
                                 ? "velocity form at Bloch phase 0; NaN on the diagonal"
                                 : "all components";
  matrix("energy", t.energy, {"eV", "E_final - E_initial"});
  matrix("wavelength", t.wavelength, {"nm", "vacuum wavelength of the energy's size", "NaN on the diagonal"});
  matrix("frequency", t.frequency, {"THz", "frequency of the energy's size", "NaN on the diagonal"});
  matrix("dipole", t.dipole, {"nm", "matrix element of z", dipole});
  matrix("oscillator_strength", t.oscillator_strength,
         {"1", "oscillator strength", "for the free electron mass, negative downward"});
  matrix("beat_period", t.beat_period, {"ps", "h / |energy|", "NaN on the diagonal"});
}

}  // namespace

void write_carrier(const hdf5::Group& root, const CarrierAnswer& part) {
  write_levels(root, part);
  write_dispersion(root, part);
  write_sensitivity(root, part);
  write_minibands(root, part);
  write_transitions(root, part);
}

void write_interband(const hdf5::Group& root, const Interband& pairs) {
  hdf5::Group group = root.child(group_of("interband", pairs.hole));
  group.attribute("gap", pairs.gap);
  group.count_axis("electron_level", static_cast<std::size_t>(pairs.energy.rows()), "electron level");
  group.count_axis("hole_level", static_cast<std::size_t>(pairs.energy.cols()), "hole level");
  group.matrix("energy", "electron_level", "hole_level", pairs.energy,
               {"eV", "energy of the free electron-hole pair", "E_e + E_h + gap, without exciton binding"});
  group.matrix("overlap", "electron_level", "hole_level", pairs.overlap, {"1", "overlap of the envelopes"});
  const Eigen::MatrixXd unknown =
      Eigen::MatrixXd::Constant(pairs.energy.rows(), pairs.energy.cols(), undefined);
  group.matrix("exciton_binding", "electron_level", "hole_level", unknown,
               {"eV", "exciton binding energy", "NaN: not computed"});
}

}  // namespace wellwright
