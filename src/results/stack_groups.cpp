// SPDX-License-Identifier: Apache-2.0
// /layers and /profile.
#include <limits>

#include "results/groups.hpp"
#include "results/nodes.hpp"

namespace wellwright {
namespace {

constexpr double undefined = std::numeric_limits<double>::quiet_NaN();
constexpr double per_cm3 = 1e21;  // nm^-3

}  // namespace

void write_layers(const hdf5::Group& root, const Answer& answer) {
  const Stack& stack = answer.study.stack;
  const auto n = static_cast<Eigen::Index>(stack.layers.size());
  hdf5::Group group = root.child("layers");
  group.count_axis("layer", stack.layers.size(), "layer, counted from 1 at the substrate");
  std::vector<std::string> name, material;
  Eigen::VectorXd bottom(n), thickness(n), monolayers(n), edge(n), mass(n), gap(n), strain(n), donors(n);
  const auto faces = stack.faces();
  for (Eigen::Index i = 0; i < n; ++i) {
    const auto at = static_cast<std::size_t>(i);
    const Layer& layer = stack.layers[at];
    name.push_back(layer.name.empty() ? ""
                   : layer.copy > 0   ? layer.name + "[" + std::to_string(layer.copy) + "]"
                                      : layer.name);
    material.push_back(layer.grading ? layer.material.text + " to " + layer.grading->to.text
                                     : layer.material.text);
    bottom[i] = faces[at];
    thickness[i] = layer.thickness;
    monolayers[i] = layer.thickness / layer.monolayer;
    const BandParameters& bands = stack.bands[at];
    edge[i] = bands.conduction_band_edge;
    mass[i] = bands.electron_mass;
    gap[i] = bands.band_gap;
    strain[i] = stack.environment.strain && stack.table && !layer.material.is_medium()
                    ? stack.table->strain(layer.material, stack.environment).in_plane
                    : 0;
    donors[i] = per_cm2 * layer.donors;
  }
  const std::string at_bottom = "of the material at the bottom face, without field";
  group.write("name", {"layer"}, name, {"", "name given in the study, with its copy in a repeat"});
  group.write("material", {"layer"}, material, {"", "material, of a graded layer from bottom to top"});
  group.vector("bottom", "layer", bottom,
               {"nm", "distance of the bottom face from the substrate side of the stack"});
  group.vector("thickness", "layer", thickness, {"nm", "thickness"});
  group.vector("monolayers", "layer", monolayers,
               {"1", "thickness in monolayers",
                "of the layer's own strained lattice at 300 K; NaN where the lattice is not known"});
  group.vector("conduction_band_edge", "layer", edge, {"eV", "conduction band edge", at_bottom});
  group.vector("electron_mass", "layer", mass,
               {"1", "electron mass along z", "in free electron masses, " + at_bottom});
  group.vector("band_gap", "layer", gap, {"eV", "unstrained gap at the lattice temperature", at_bottom});
  group.vector("in_plane_strain", "layer", strain,
               {"1", "in-plane strain", "(a_substrate - a) / a; 0 where strain is off"});
  group.vector("donor_sheet_density", "layer", donors, {"cm-2", "sheet density of donors"});
}

void write_profile(const hdf5::Group& root, const Answer& answer) {
  const EdgeProfile& edges = answer.edges;
  const FileNodes nodes(edges.grid);
  hdf5::Group group = root.child("profile");
  group.axis("z", nodes.z(), {"nm", "position along growth, 0 at the face next to the substrate"});
  const auto write = [&](const char* name, const Eigen::VectorXd& values, const hdf5::Words& words) {
    group.vector(name, "z", nodes.take(values), words);
  };
  group.vector("weight", "z", nodes.weight(),
               {"nm", "quadrature weight: sum(weight f) is the integral of f"});
  const std::string axis = "on the electron-energy axis, field included";
  write("conduction_band_edge", edges.conduction_band_edge, {"eV", "conduction band edge", axis});
  write("heavy_hole_band_edge", edges.heavy_hole_band_edge, {"eV", "heavy-hole band edge", axis});
  write("light_hole_band_edge", edges.light_hole_band_edge, {"eV", "light-hole band edge", axis});
  const Eigen::VectorXd zero = Eigen::VectorXd::Zero(edges.grid.rows());
  const Eigen::VectorXd unknown = Eigen::VectorXd::Constant(edges.grid.rows(), undefined);
  const auto from_charge = [&](const Eigen::VectorXd& values) -> Eigen::VectorXd {
    return interpolate(answer.charge->grid, values, edges.grid);
  };
  const bool bends = answer.charge && !answer.charge->potential.empty();
  write("potential", bends ? Eigen::VectorXd(-from_charge(answer.charge->potential.energy)) : zero,
        {"V", "electrostatic potential of the stack's own charge",
         bends ? "0 at the bottom face, applied field aside" : "left out: zero"});
  const char* none = answer.charge ? "" : "NaN: the stack holds no charge";
  write("electron_density",
        answer.charge ? Eigen::VectorXd(per_cm3 * from_charge(answer.charge->electron_density)) : unknown,
        {"cm-3", "electron density", none});
  write("hole_density",
        answer.charge ? Eigen::VectorXd(per_cm3 * from_charge(answer.charge->hole_density)) : unknown,
        {"cm-3", "hole density", none});
  write("donor_density", per_cm3 * edges.donor_density, {"cm-3", "density of ionised donors"});
  write("acceptor_density", per_cm3 * edges.acceptor_density, {"cm-3", "density of ionised acceptors"});
}

void write_charge(const hdf5::Group& root, const Charge& charge) {
  hdf5::Group group = root.child("charge");
  group.count_axis("iteration", charge.history.size(), "step of the loop, counted from 1");
  const auto steps = static_cast<Eigen::Index>(charge.history.size());
  Eigen::VectorXd change(steps), fermi(steps);
  for (Eigen::Index i = 0; i < steps; ++i) {
    change[i] = charge.history[static_cast<std::size_t>(i)].change;
    fermi[i] = charge.history[static_cast<std::size_t>(i)].fermi_level;
  }
  group.vector(
      "change", "iteration", change,
      {"eV", "largest change of a level that holds charge, and of the Fermi level", "NaN in the first step"});
  group.vector("fermi_level", "iteration", fermi, {"eV", "Fermi level", "on the electron-energy axis"});
  group.attribute("fermi_level", charge.fermi_level);
  group.attribute("neutrality", charge.neutrality);
  group.attribute("donor_sheet_density", per_cm2 * charge.donor_sheet_density);
}

}  // namespace wellwright
