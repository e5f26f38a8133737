// SPDX-License-Identifier: Apache-2.0
// The loops over packs of elements, compiled twice: for every processor, and for those with wider registers.
// Both do the same operations in the same order, so that results are equal to the last bit.
#include <algorithm>
#include <cmath>
#include <type_traits>

#include "hamiltonian/packs.hpp"

#if defined(__x86_64__) && defined(__GNUC__) && !defined(__clang__) && !defined(__SANITIZE_ADDRESS__)
#define WELLWRIGHT_WIDE __attribute__((target_clones("avx2", "default")))
#else
#define WELLWRIGHT_WIDE
#endif
#if defined(__GNUC__) && !defined(__clang__)
#define UNROLL _Pragma("GCC unroll 16")
#else
#define UNROLL
#endif

namespace wellwright {
namespace {

constexpr int most_nodes = highest_degree + 1;

// Where the four elements of a pack begin among the global nodes; lanes beyond the last repeat it.
struct Begin {
  std::ptrdiff_t at[lanes];
  int valid;
  Begin(const Packs& packs, int pack) : valid(packs.valid(pack)) {
    for (int t = 0; t < lanes; ++t)
      at[t] = static_cast<std::ptrdiff_t>(std::min(lanes * pack + t, packs.elements - 1)) *
              (packs.tables->nodes - 1);
  }
};

[[gnu::always_inline]] inline void gather(Lanes& to, const double* x, const Begin& begin, int node) {
  to = Lanes{x[begin.at[0] + node], x[begin.at[1] + node], x[begin.at[2] + node], x[begin.at[3] + node]};
}

[[gnu::always_inline]] inline void add(double* x, const Begin& begin, int node, const Lanes& from) {
  for (int t = 0; t < begin.valid; ++t) x[begin.at[t] + node] += from[t];
}

[[gnu::always_inline]] inline void put(double* x, const Begin& begin, int node, const Lanes& from) {
  for (int t = 0; t < begin.valid; ++t) x[begin.at[t] + node] = from[t];
}

// hbar^2/2m of one node of a pack and, with `slope`, its derivative in E with the sign turned.
[[gnu::always_inline]] inline void stiffness(const Packs& packs, std::size_t at, double E, Lanes& c,
                                             Lanes* slope) {
  c = packs.a0[at];
  if (slope) *slope = Lanes{};
  const auto poles = static_cast<std::size_t>(packs.poles);
  for (std::size_t j = at * poles; j < (at + 1) * poles; ++j) {
    const Lanes inverse = 1 / (E - packs.v[j]), share = packs.b[j] * inverse;
    c += share;
    if (slope) *slope += share * inverse;
  }
}

template <int fixed>
[[gnu::always_inline]] inline void apply(const Packs& packs, double E, const double* x, double* y,
                                         double* slope) {
  const int n = fixed > 0 ? fixed : packs.tables->nodes;
  const double* D = packs.tables->derivative.data();
  const double* Dt = packs.tables->transposed.data();
  const bool flows = slope && packs.poles > 0;  // -T'(E) moves the stiffness too
  Lanes u[most_nodes], flux[most_nodes], d_flux[most_nodes], mass[most_nodes], d_mass[most_nodes];
  for (int pack = 0; pack < packs.count; ++pack) {
    const Begin begin(packs, pack);
    const Lanes scale = packs.scale[static_cast<std::size_t>(pack)], scale2 = scale * scale;
    for (int i = 0; i < n; ++i) gather(u[i], x, begin, i);
    if (!y && !flows) {  // -T'(E) is the mass
      for (int i = 0; i < n; ++i)
        add(slope, begin, i, packs.weight[static_cast<std::size_t>(pack * n + i)] * u[i]);
      continue;
    }
    for (int q = 0; q < n; ++q) {
      const auto at = static_cast<std::size_t>(pack * n + q);
      Lanes c, dc, sum{};
      stiffness(packs, at, E, c, &dc);
      for (int i = 0; i < n; ++i) sum += D[q * n + i] * u[i];
      sum *= scale2 * packs.weight[at];
      flux[q] = sum * c;
      d_flux[q] = sum * dc;
      mass[q] = packs.weight[at] * (packs.edge[at] - E + packs.across[at] * c);
      d_mass[q] = packs.weight[at] * (1 + packs.across[at] * dc);
    }
    for (int i = 0; i < n; ++i) {
      if (y) {
        Lanes sum = mass[i] * u[i];
        for (int q = 0; q < n; ++q) sum += Dt[i * n + q] * flux[q];
        add(y, begin, i, sum);
      }
      if (slope) {
        Lanes sum = d_mass[i] * u[i];
        if (flows)
          for (int q = 0; q < n; ++q) sum += Dt[i * n + q] * d_flux[q];
        add(slope, begin, i, sum);
      }
    }
  }
}

// Without pivoting: a pivot vanishes only where E is a level of the stack cut off at that node. Then it is
// replaced by a tiny number, as LAPACK's Sturm counts do (LAPACK Working Note 172), and the levels themselves
// are taken from T(E) applied, never from its factors. The number stays far below rounding: at a level the
// last pivot is rounding of its own element, which may be much wider than the one that makes the norm.
template <int fixed>
[[gnu::always_inline]] inline int eliminate(const Packs& packs, double E, double tiny, Lanes* factor,
                                            Face* condensed) {
  const DegreeTables& tables = *packs.tables;
  const int n = fixed > 0 ? fixed : tables.nodes, inner = n - 2, triangle = tables.triangle();
  const int* column_of = tables.column.data();
  int negative = 0;
  for (int pack = 0; pack < packs.count; ++pack, factor += column_of[inner]) {
    const Lanes scale = packs.scale[static_cast<std::size_t>(pack)];
    Lanes stiff[most_nodes] = {}, potential[most_nodes], pivot[most_nodes], ll{}, lr{}, rr{};
    const bool same_mass = packs.same_mass[static_cast<std::size_t>(pack)];
    for (int i = 0; i < n; ++i) {
      const auto at = static_cast<std::size_t>(pack * n + i);
      if (i == 0 || !same_mass) stiffness(packs, at, E, stiff[i], nullptr);
      const Lanes c = stiff[same_mass ? 0 : i];
      potential[i] = packs.weight[at] * (packs.edge[at] - E + packs.across[at] * c);
    }
    const Lanes c = scale * stiff[0], zero{};
    auto negative_lanes = zero < zero;
    Lanes column[most_nodes];  // of what is left when the nodes before are eliminated
    UNROLL for (int j = 0; j < n; ++j) {
      const int start = column_of[j] - j;
      UNROLL for (int i = j; i < n; ++i) if (same_mass) {
        column[i] = c * tables.uniform[static_cast<std::size_t>(start + i)];
      }
      else {
        const double* product = tables.products.data() + start + i;
        Lanes sum = stiff[0] * *product;
        for (int q = 1; q < n; ++q) sum += stiff[q] * product[q * triangle];
        column[i] = scale * sum;
      }
      column[j] += potential[tables.order[static_cast<std::size_t>(j)]];
      for (int k = 0; k < j && k < inner; ++k) {
        const Lanes* before = factor + column_of[k] - k;
        const Lanes a = pivot[k] * before[j];
        UNROLL for (int i = j; i < n; ++i) column[i] -= a * before[i];
      }
      if (j == inner) {
        ll = column[inner];
        lr = column[inner + 1];
      } else if (j > inner) {
        rr = column[inner + 1];
      } else {
        Lanes d = column[j];
        d = d < 0 ? (d > -tiny ? zero - tiny : d) : (d < tiny ? zero + tiny : d);
        negative_lanes -= d < 0;  // a true lane is -1
        pivot[j] = d;
        const Lanes inverse = 1 / d;
        Lanes* unit = factor + column_of[j] - j;
        unit[j] = inverse;
        UNROLL for (int i = j + 1; i < n; ++i) unit[i] = column[i] * inverse;
      }
    }
    const int valid = packs.valid(pack);
    for (int t = 0; t < valid; ++t) negative += static_cast<int>(negative_lanes[t]);
    for (int t = 0; t < valid; ++t) condensed[lanes * pack + t] = {ll[t], lr[t], rr[t]};
  }
  return negative;
}

template <int fixed>
[[gnu::always_inline]] inline void reduce(const Packs& packs, const Lanes* factor, double* value) {
  const DegreeTables& tables = *packs.tables;
  const int n = fixed > 0 ? fixed : tables.nodes, inner = n - 2;
  const int* column_of = tables.column.data();
  Lanes load[most_nodes];  // inner nodes, then left and right
  for (int pack = 0; pack < packs.count; ++pack, factor += column_of[inner]) {
    const Begin begin(packs, pack);
    for (int j = 0; j < inner; ++j) gather(load[j], value, begin, j + 1);
    load[inner] = load[inner + 1] = Lanes{};
    for (int j = 0; j < inner; ++j) {
      const Lanes* unit = factor + column_of[j];
      const Lanes here = load[j];
      for (int i = 1; i < n - j; ++i) load[j + i] -= unit[i] * here;
    }
    for (int j = 0; j < inner; ++j) put(value, begin, j + 1, load[j]);
    add(value, begin, 0, load[inner]);
    add(value, begin, n - 1, load[inner + 1]);
  }
}

template <int fixed>
[[gnu::always_inline]] inline void restore(const Packs& packs, const Lanes* factor, double* value) {
  const DegreeTables& tables = *packs.tables;
  const int n = fixed > 0 ? fixed : tables.nodes, inner = n - 2;
  const int* column_of = tables.column.data();
  Lanes load[most_nodes];
  for (int pack = 0; pack < packs.count; ++pack, factor += column_of[inner]) {
    const Begin begin(packs, pack);
    for (int j = 0; j < n; ++j) gather(load[j], value, begin, tables.order[static_cast<std::size_t>(j)]);
    for (int j = inner - 1; j >= 0; --j) {
      const Lanes* unit = factor + column_of[j];
      Lanes here = load[j] * unit[0];
      for (int i = 1; i < n - j; ++i) here -= unit[i] * load[j + i];
      load[j] = here;
    }
    for (int j = 0; j < inner; ++j) put(value, begin, j + 1, load[j]);
  }
}

// Calls `kernel` with the node count of the usual degrees as a constant, so that their loops unroll.
template <class Kernel>
[[gnu::always_inline]] inline auto by_nodes(const Packs& packs, Kernel kernel) {
  switch (packs.tables->nodes) {
    case 6:
      return kernel(std::integral_constant<int, 6>{});
    case 8:
      return kernel(std::integral_constant<int, 8>{});
    case 10:
      return kernel(std::integral_constant<int, 10>{});
    default:
      return kernel(std::integral_constant<int, 0>{});
  }
}

}  // namespace

WELLWRIGHT_WIDE void apply_packs(const Packs& packs, double E, const double* x, double* y, double* slope) {
  by_nodes(
      packs, [&](auto n) __attribute__((always_inline)) { apply<n>(packs, E, x, y, slope); });
}
WELLWRIGHT_WIDE int eliminate_packs(const Packs& packs, double E, double tiny, Lanes* factor,
                                    Face* condensed) {
  return by_nodes(
      packs, [&](auto n)
                 __attribute__((always_inline)) { return eliminate<n>(packs, E, tiny, factor, condensed); });
}
WELLWRIGHT_WIDE void reduce_packs(const Packs& packs, const Lanes* factor, double* value) {
  by_nodes(
      packs, [&](auto n) __attribute__((always_inline)) { reduce<n>(packs, factor, value); });
}
WELLWRIGHT_WIDE void restore_packs(const Packs& packs, const Lanes* factor, double* value) {
  by_nodes(
      packs, [&](auto n) __attribute__((always_inline)) { restore<n>(packs, factor, value); });
}

}  // namespace wellwright
