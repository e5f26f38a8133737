// SPDX-License-Identifier: Apache-2.0
// Coefficients of one carrier at the nodes of a grid, and the edges for files and figures.
#include "wellwright/profile.hpp"

#include <algorithm>

#include "profile/point.hpp"

namespace wellwright {
namespace {

double highest_hole_edge(const Stack& stack, Carrier carrier) {
  double highest = -1e300;
  for (std::size_t i = 0; i < stack.layers.size(); ++i) {
    highest = std::max(highest, hole_edge_of(stack.bands[i], carrier));
    if (stack.layers[i].grading)
      highest = std::max(highest, hole_edge_of(bands_in_layer(stack, static_cast<int>(i), 1), carrier));
  }
  return highest;
}

// Calls use(row, parameters) for every element-local node.
template <class Use>
void for_each_node(const Stack& stack, const Grid& grid, Use use) {
  const auto faces = stack.faces();
  for (int e = 0; e < grid.elements(); ++e) {
    const int layer = grid.layer[static_cast<std::size_t>(e)];
    const auto i = static_cast<std::size_t>(layer);
    const bool smeared = stack.interdiffusion > 0;
    const bool graded = stack.layers[i].grading.has_value();
    for (int node = 0; node <= grid.degree; ++node) {
      const int row = e * (grid.degree + 1) + node;
      if (smeared)
        use(row, bands_smeared(stack, grid.z[row]));
      else if (graded)
        use(row, bands_in_layer(stack, layer,
                                std::clamp((grid.z[row] - faces[i]) / stack.layers[i].thickness, 0.0, 1.0)));
      else
        use(row, stack.bands[i]);
    }
  }
}

}  // namespace

Profile make_profile(const Study& study, Carrier carrier, const Grid& grid, const Potential& potential) {
  Profile profile;
  profile.grid = grid;
  profile.carrier = carrier;
  profile.bands = carrier == Carrier::electron ? study.model.bands : Bands::one;
  profile.ends = study.model.ends;
  profile.field = study.field;
  const bool hole = carrier != Carrier::electron;
  if (hole) profile.hole_edge = highest_hole_edge(study.stack, carrier);
  const int rows = grid.rows(), poles = poles_of(carrier, profile.bands);
  Coefficients& at = profile.at;
  at.edge.resize(rows);
  at.a0.resize(rows);
  at.in_plane.resize(rows);
  at.b.resize(rows, poles);
  at.v.resize(rows, poles);
  const double slope = hole ? -study.field : study.field;  // e F z lifts electrons, lowers holes
  for_each_node(study.stack, grid, [&](int row, const BandParameters& parameters) {
    const Point point = point_of(parameters, carrier, profile.bands, profile.hole_edge);
    const double tilt = slope * grid.z[row];
    at.edge[row] = point.edge + tilt;
    at.a0[row] = point.a0;
    at.in_plane[row] = point.in_plane;
    for (int j = 0; j < poles; ++j) {
      at.b(row, j) = point.b[static_cast<std::size_t>(j)];
      at.v(row, j) = point.v[static_cast<std::size_t>(j)] + tilt;
    }
  });
  if (!potential.empty())
    add_potential(profile, interpolate(potential.grid, potential.energy, grid),
                  potential.exchange_correlation.size() > 0
                      ? Eigen::VectorXd(interpolate(potential.grid, potential.exchange_correlation, grid))
                      : Eigen::VectorXd());
  return profile;
}

void add_potential(Profile& profile, const Eigen::VectorXd& energy,
                   const Eigen::VectorXd& exchange_correlation) {
  Eigen::VectorXd shift = energy;
  if (profile.carrier != Carrier::electron)
    shift = -energy;
  else if (exchange_correlation.size() > 0)
    shift += exchange_correlation;
  profile.at.edge += shift;
  profile.at.v.colwise() += shift;
}

std::vector<std::vector<double>> cuts_of(const Grid& grid, const std::vector<double>& faces) {
  std::vector<std::vector<double>> cuts(faces.size() - 1);
  for (int e = 1; e < grid.elements(); ++e) {
    const auto at = static_cast<std::size_t>(e);
    if (grid.layer[at] != grid.layer[at - 1]) continue;
    const auto layer = static_cast<std::size_t>(grid.layer[at]);
    cuts[layer].push_back((grid.boundaries[at] - faces[layer]) / (faces[layer + 1] - faces[layer]));
  }
  return cuts;
}

EdgeProfile edge_profile(const Study& study, const Grid& grid, const Potential& potential) {
  EdgeProfile edges;
  edges.grid = grid;
  for (auto* column : {&edges.conduction_band_edge, &edges.heavy_hole_band_edge, &edges.light_hole_band_edge,
                       &edges.donor_density, &edges.acceptor_density})
    column->setZero(grid.rows());
  for_each_node(study.stack, grid, [&](int row, const BandParameters& parameters) {
    const double tilt = study.field * grid.z[row];
    edges.conduction_band_edge[row] = parameters.conduction_band_edge + tilt;
    edges.heavy_hole_band_edge[row] = parameters.heavy_hole_edge + tilt;
    edges.light_hole_band_edge[row] = parameters.light_hole_edge + tilt;
  });
  if (!potential.empty()) {
    const Eigen::VectorXd energy = interpolate(potential.grid, potential.energy, grid);
    for (auto* edge : {&edges.conduction_band_edge, &edges.heavy_hole_band_edge, &edges.light_hole_band_edge})
      *edge += energy;
  }
  for (int row = 0; row < grid.rows(); ++row) {
    const Layer& layer =
        study.stack
            .layers[static_cast<std::size_t>(grid.layer[static_cast<std::size_t>(row / (grid.degree + 1))])];
    edges.donor_density[row] = layer.donors / layer.thickness;
    edges.acceptor_density[row] = layer.acceptors / layer.thickness;
  }
  return edges;
}

}  // namespace wellwright
