// SPDX-License-Identifier: Apache-2.0
// The elements in packs of four: coefficients, reference matrices and the kernels over them; private to the
// room.
#pragma once

#include <cstddef>
#include <new>
#include <vector>

#include "wellwright/profile.hpp"

namespace wellwright {

/// The same number of four neighbouring elements: the arithmetic of all elements runs in packs of four.
using Lanes [[gnu::vector_size(32)]] = double;
inline constexpr int lanes = 4;

/// Memory on boundaries of 32 bytes, which kernels for wide registers ask for and the type alone does not.
template <class T>
struct WideAllocator {
  using value_type = T;
  static constexpr std::align_val_t boundary{32};
  WideAllocator() = default;
  template <class U>
  WideAllocator(const WideAllocator<U>&) {}
  T* allocate(std::size_t n) { return static_cast<T*>(::operator new(n * sizeof(T), boundary)); }
  void deallocate(T* memory, std::size_t) { ::operator delete(memory, boundary); }
  bool operator==(const WideAllocator&) const = default;
};
using LanesVector = std::vector<Lanes, WideAllocator<Lanes>>;

/// What depends on the degree alone. Inner nodes come first, then the left and the right face.
struct DegreeTables {
  int nodes = 0;                   // p + 1
  std::vector<int> order;          // local node at each place
  std::vector<int> column;         // where column j of the packed lower triangle starts
  std::vector<double> derivative;  // D_qi at [q * nodes + i]
  std::vector<double> transposed;  // D_qi at [i * nodes + q]
  std::vector<double> products;    // w_q D_qi D_qj, packed within q
  std::vector<double> uniform;     // the same summed over q, for constant mass
  double largest_row = 0;          // largest sum of |w_q D_qi D_qj| over q and j, over w_i
  int triangle() const { return column.back(); }
};
const DegreeTables& degree_tables(int degree);

/// Coefficients of all elements, [pack * nodes + node]. Lanes beyond the last element repeat it.
struct Packs {
  Packs(const Profile& profile, double k);

  const DegreeTables* tables;
  int elements, count, poles;
  LanesVector weight;           // quadrature weight [nm]
  LanesVector edge;             // [eV]
  LanesVector a0;               // hbar^2/2m0 of a0 [eV nm^2]
  LanesVector across;           // k^2 times the ratio of in-plane to z inverse mass [1/nm^2]
  LanesVector b, v;             // [(pack * nodes + node) * poles + pole], b times hbar^2/2m0
  LanesVector scale;            // per pack: 2 / width [1/nm]
  std::vector<bool> same_mass;  // per pack: 1/m is constant within each element at every energy
  /// Elements of this pack that are there.
  int valid(int pack) const { return pack + 1 < count ? lanes : elements - lanes * (count - 1); }
};

/// y += T(E) x if y, slope += -T'(E) x if slope; over global nodes, ends not seen.
void apply_packs(const Packs& packs, double E, const double* x, double* y, double* slope);

/// An element condensed to its faces.
struct Face {
  double left_left = 0, left_right = 0, right_right = 0;
};

/// Eliminates the inner nodes of every element of T(E). `factor` takes for each pack
/// and inner node 1 / pivot and the column of the unit factor. Pivots below `tiny` are replaced by it.
/// Returns the number of negative pivots.
int eliminate_packs(const Packs& packs, double E, double tiny, Lanes* factor, Face* condensed);

/// Inner nodes of the load eliminated forward, and their values found backward; `value` over global nodes.
void reduce_packs(const Packs& packs, const Lanes* factor, double* value);
void restore_packs(const Packs& packs, const Lanes* factor, double* value);

}  // namespace wellwright
