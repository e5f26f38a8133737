// SPDX-License-Identifier: Apache-2.0
// How the coefficients move with compositions and, through the smearing, with thicknesses.
#include <algorithm>
#include <cmath>
#include <limits>

#include "profile/point.hpp"

namespace wellwright {
namespace {

// Central difference of sixth order: f' = sum_k c_k (f(kh) - f(-kh)) / h.
constexpr double weights[3] = {3.0 / 4, -3.0 / 20, 1.0 / 60};
constexpr double composition_step = 4e-3;  // truncation ~ h^6 f^(7)/140, rounding ~ eps/h
constexpr double smearing_step = 0.04;     // in smearing lengths; the profile varies over one of them
constexpr double smearing_reach = 8.5;     // a Gaussian is below 1e-16 beyond

Study without_text(const Study& study) {
  Study copy = study;
  copy.text.clear();
  return copy;
}

struct Rows {
  int first = 0, count = 0;
};

Rows rows_between(const Grid& grid, double from, double to) {
  const double* begin = grid.z.data();
  const double* end = begin + grid.z.size();
  const auto first = std::lower_bound(begin, end, from) - begin;
  const auto last = std::upper_bound(begin, end, to) - begin;
  return {static_cast<int>(first), static_cast<int>(std::max<std::ptrdiff_t>(last - first, 0))};
}

MaterialDerivative zero(Rows rows, int poles) {
  MaterialDerivative d;
  d.first_row = rows.first;
  d.edge.setZero(rows.count);
  d.a0.setZero(rows.count);
  d.b.setZero(rows.count, poles);
  d.v.setZero(rows.count, poles);
  return d;
}

void add(MaterialDerivative& d, int i, double factor, const Point& point) {
  d.edge[i] += factor * point.edge;
  d.a0[i] += factor * point.a0;
  for (Eigen::Index j = 0; j < d.b.cols(); ++j) {
    d.b(i, j) += factor * point.b[static_cast<std::size_t>(j)];
    d.v(i, j) += factor * point.v[static_cast<std::size_t>(j)];
  }
}

}  // namespace

ProfileDerivatives::ProfileDerivatives(const Study& study, const Profile& profile)
    : study_(&study), profile_(&profile), work_(without_text(study)) {}

MaterialDerivative ProfileDerivatives::composition(int layer, bool far_end) {
  const Grid& grid = profile_->grid;
  const auto i = static_cast<std::size_t>(layer);
  Stack& stack = work_.stack;
  const Stack& original = study_->stack;
  const auto faces = original.faces();
  const double reach = smearing_reach * original.interdiffusion;
  const Rows rows = rows_between(grid, faces[i] - reach, faces[i + 1] + reach);
  MaterialDerivative d = zero(rows, profile_->at.poles());
  Alloy& alloy = far_end ? stack.layers[i].grading->to : stack.layers[i].material;
  const Alloy kept = alloy;
  const BandParameters kept_bands = stack.bands[i];
  const double x = kept.composition();
  const bool smeared = original.interdiffusion > 0, graded = original.layers[i].grading.has_value();
  for (int k = 1; k <= 3; ++k)
    for (const int side : {1, -1}) {
      alloy = kept.with_composition(x + side * k * composition_step);
      const double factor = side * weights[k - 1] / composition_step;
      if (!smeared && !graded) {
        const Point point = point_of(bands_in_layer(stack, layer, 0), profile_->carrier, profile_->bands,
                                     profile_->hole_edge);
        for (int r = 0; r < rows.count; ++r)
          if (grid.layer[static_cast<std::size_t>((rows.first + r) / (grid.degree + 1))] == layer)
            add(d, r, factor, point);
        continue;
      }
      for (int r = 0; r < rows.count; ++r) {
        const int row = rows.first + r;
        if (!smeared && grid.layer[static_cast<std::size_t>(row / (grid.degree + 1))] != layer) continue;
        const double z = grid.z[row];
        const BandParameters parameters =
            smeared ? bands_smeared(stack, z)
                    : bands_in_layer(stack, layer,
                                     std::clamp((z - faces[i]) / stack.layers[i].thickness, 0.0, 1.0));
        add(d, r, factor, point_of(parameters, profile_->carrier, profile_->bands, profile_->hole_edge));
      }
    }
  alloy = kept;
  stack.bands[i] = kept_bands;
  return d;
}

MaterialDerivative ProfileDerivatives::thickness(int layer) {
  const Stack& original = study_->stack;
  const auto i = static_cast<std::size_t>(layer);
  if (original.interdiffusion <= 0) return zero({}, profile_->at.poles());
  const Grid& grid = profile_->grid;
  const auto faces = original.faces();
  const double reach = smearing_reach * original.interdiffusion;
  const Rows rows = rows_between(grid, faces[i] - reach, faces[i + 1] + reach);
  MaterialDerivative d = zero(rows, profile_->at.poles());
  Stack& stack = work_.stack;
  const double thickness = original.layers[i].thickness;
  const double step = std::min(smearing_step * original.interdiffusion, thickness / 8);
  for (int k = 1; k <= 3; ++k)
    for (const int side : {1, -1}) {
      const double change = side * k * step;
      stack.layers[i].thickness = thickness + change;
      const double factor = side * weights[k - 1] / step;
      for (int r = 0; r < rows.count; ++r) {
        const double z = grid.z[rows.first + r];
        const double along = std::clamp((z - faces[i]) / thickness, 0.0, 1.0);
        add(d, r, factor,
            point_of(bands_smeared(stack, z + along * change), profile_->carrier, profile_->bands,
                     profile_->hole_edge));
      }
    }
  stack.layers[i].thickness = thickness;
  return d;
}

}  // namespace wellwright
