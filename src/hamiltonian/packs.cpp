// SPDX-License-Identifier: Apache-2.0
// Coefficients of the elements in packs of four, and what depends on the degree alone.
#include "hamiltonian/packs.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <memory>
#include <mutex>

namespace wellwright {
namespace {

DegreeTables make_tables(int p) {
  const ReferenceElement& reference = reference_element(p);
  DegreeTables t;
  const int n = t.nodes = p + 1;
  for (int i = 1; i < p; ++i) t.order.push_back(i);
  t.order.push_back(0);
  t.order.push_back(p);
  for (int j = 0, start = 0; j <= n; start += n - j, ++j) t.column.push_back(start);
  for (int q = 0; q < n; ++q)
    for (int i = 0; i < n; ++i) t.derivative.push_back(reference.derivative(q, i));
  for (int i = 0; i < n; ++i)
    for (int q = 0; q < n; ++q) t.transposed.push_back(reference.derivative(q, i));
  for (int q = 0; q < n; ++q)
    for (int j = 0; j < n; ++j)
      for (int i = j; i < n; ++i)
        t.products.push_back(reference.weights[q] * reference.derivative(q, t.order[i]) *
                             reference.derivative(q, t.order[j]));
  const std::size_t triangle = static_cast<std::size_t>(t.triangle());
  t.uniform.assign(triangle, 0);
  for (std::size_t at = 0; at < t.products.size(); ++at) t.uniform[at % triangle] += t.products[at];
  for (int i = 0; i < n; ++i) {
    double sum = 0;
    for (int j = 0; j < n; ++j) {
      double entry = 0;
      for (int q = 0; q < n; ++q)
        entry += reference.weights[q] * reference.derivative(q, i) * reference.derivative(q, j);
      sum += std::abs(entry);
    }
    t.largest_row = std::max(t.largest_row, sum / reference.weights[i]);
  }
  return t;
}

}  // namespace

const DegreeTables& degree_tables(int degree) {
  static std::array<std::unique_ptr<const DegreeTables>, highest_degree + 1> all;
  static std::array<std::once_flag, highest_degree + 1> made;
  const auto at = static_cast<std::size_t>(degree);
  std::call_once(made[at], [&] { all[at] = std::make_unique<const DegreeTables>(make_tables(degree)); });
  return *all[at];
}

Packs::Packs(const Profile& profile, double k)
    : tables(&degree_tables(profile.grid.degree)),
      elements(profile.grid.elements()),
      count((elements + lanes - 1) / lanes),
      poles(profile.at.poles()) {
  const Grid& grid = profile.grid;
  const Coefficients& at = profile.at;
  const int n = tables->nodes;
  const auto rows = static_cast<std::size_t>(count * n);
  for (auto* column : {&weight, &edge, &a0, &across}) column->resize(rows);
  b.resize(rows * static_cast<std::size_t>(poles));
  v.resize(b.size());
  scale.resize(static_cast<std::size_t>(count));
  same_mass.assign(static_cast<std::size_t>(count), true);
  for (int slot = 0; slot < count * lanes; ++slot) {
    const int e = std::min(slot, elements - 1), pack = slot / lanes, t = slot % lanes;
    scale[static_cast<std::size_t>(pack)][t] = 2 / grid.width(e);
    bool same = true;
    for (int i = 0; i < n; ++i) {
      const auto to = static_cast<std::size_t>(pack * n + i);
      const int row = e * n + i, first = e * n;
      weight[to][t] = grid.weight[row];
      edge[to][t] = at.edge[row];
      a0[to][t] = constants::hbar2_over_2m0 * at.a0[row];
      across[to][t] = k * k * at.in_plane[row];
      same = same && at.a0[row] == at.a0[first];
      for (int j = 0; j < poles; ++j) {
        const auto pole = to * static_cast<std::size_t>(poles) + static_cast<std::size_t>(j);
        b[pole][t] = constants::hbar2_over_2m0 * at.b(row, j);
        v[pole][t] = at.v(row, j);
        same = same && at.b(row, j) == at.b(first, j) && at.v(row, j) == at.v(first, j);
      }
    }
    if (!same) same_mass[static_cast<std::size_t>(pack)] = false;
  }
}

}  // namespace wellwright
