// SPDX-License-Identifier: Apache-2.0
// Studies made in memory, for tests of the rooms that need neither files nor the material table: two media
// with numbers of their own, resolved by hand.
#pragma once

#include <vector>

#include "wellwright/study.hpp"

namespace hand_made {

struct Medium {
  double edge = 0, mass = 0.067, gap = 1.5, split_off = 0.34;
};
inline constexpr Medium well{}, barrier{0.25, 0.092, 1.9, 0.34};

inline wellwright::BandParameters bands_of(const Medium& medium) {
  wellwright::BandParameters b;
  b.conduction_band_edge = medium.edge;
  b.band_gap = medium.gap;
  b.spin_orbit_splitting = medium.split_off;
  b.mean_valence_edge = b.heavy_hole_edge = b.light_hole_edge = medium.edge - medium.gap;
  b.split_off_edge = b.mean_valence_edge - medium.split_off;
  b.electron_mass = b.electron_in_plane_mass = medium.mass;
  b.heavy_hole_mass = 0.35;
  b.heavy_hole_in_plane_mass = 0.11;
  b.light_hole_mass = 0.09;
  b.light_hole_in_plane_mass = 0.21;
  return b;
}

struct Slab {
  Medium medium;
  double thickness;
};

inline wellwright::Study study(const std::vector<Slab>& slabs, wellwright::Bands bands, double field = 0) {
  wellwright::Study s;
  for (const Slab& slab : slabs) {
    wellwright::Layer layer;
    layer.thickness = slab.thickness;
    s.stack.layers.push_back(layer);
    s.stack.bands.push_back(bands_of(slab.medium));
  }
  s.field = field;
  s.model.bands = bands;
  return s;
}

/// Two unequal wells between 20 nm barriers.
inline wellwright::Study double_well(wellwright::Bands bands, double field = 0.001) {
  return study({{barrier, 20}, {well, 14.5}, {barrier, 2.5}, {well, 10}, {barrier, 20}}, bands, field);
}

/// The study with a start for its dynamics.
inline wellwright::Study with_start(wellwright::Study study, const wellwright::Start& start, double duration,
                                    int samples) {
  wellwright::DynamicsRequest request;
  request.start = start;
  request.duration = duration;
  request.samples = samples;
  study.dynamics = request;
  return study;
}

}  // namespace hand_made
