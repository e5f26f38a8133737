// SPDX-License-Identifier: Apache-2.0
// The BenDaniel-Duke operator T(E) on spectral elements: assembly, ends, factors with inertia, and the full
// product.
#pragma once

#include <Eigen/Core>
#include <memory>

#include "wellwright/profile.hpp"

namespace wellwright {

struct Packs;  // private to the room

/// T(E) = hbar^2/2m0 D' [1/m(E, z)] D + U - E in weak form, with in-plane momentum k. The unknowns are the
/// values of psi at the global nodes 0..N (hard ends: nodes 0 and N are zero; periodic ends: psi_N = exp(i
/// phase) psi_0). Eliminating the components chi_j from the linear Hermitian problem in (psi, chi) gives
/// exactly this T(E). Source: D.J. BenDaniel, C.B. Duke, Phys. Rev. 152, 683 (1966); C. Sirtori et al., Phys.
/// Rev. B 50, 8663 (1994).
class Hamiltonian {
 public:
  explicit Hamiltonian(const Profile& profile, double k = 0);

  const Profile& profile() const { return *profile_; }
  int nodes() const;  ///< global nodes N + 1
  int poles() const;
  double k() const { return k_; }
  /// The highest pole anywhere: above it the count of negative pivots is the count of levels [eV].
  double highest_pole() const { return highest_pole_; }
  double norm() const { return norm_; }  ///< bound of the mass-scaled operator [eV]
  /// The same without the elements that shrink towards a face: there the envelope is smooth on the layer's
  /// own elements, and what rounding does to an energy goes by those [eV].
  double rounding_norm() const { return rounding_norm_; }
  double lowest_edge() const { return lowest_edge_; }
  double highest_edge() const { return highest_edge_; }

  /// y = T(E) x and, when `slope` is given, slope = -T'(E) x; vectors over global nodes.
  void apply(double E, const Eigen::VectorXd& x, Eigen::VectorXd& y, Eigen::VectorXd* slope = nullptr) const;
  /// out = -T'(E) x alone.
  void slope(double E, const Eigen::VectorXd& x, Eigen::VectorXd& out) const;

  /// The elements as the room's arithmetic takes them.
  const Packs& packs() const { return *packs_; }

 private:
  void hold_ends(Eigen::VectorXd& y) const;

  const Profile* profile_;
  double k_;
  std::shared_ptr<const Packs> packs_;
  double highest_pole_, norm_, rounding_norm_, lowest_edge_, highest_edge_;
};

/// LDL' factors of T(E): the inner nodes of each element are eliminated, four elements at a time, then the
/// chain of element boundaries, so that the work and the memory are linear in the elements. Reused for many
/// energies without allocation.
class Factors {
 public:
  explicit Factors(const Hamiltonian& hamiltonian);
  ~Factors();
  /// Factors T(E) for Bloch phase with this cosine (periodic ends; 1 is phase 0).
  void compute(double E, double cos_phase = 1);
  /// Negative pivots: the levels below E when E is above every pole (Sylvester's law of inertia).
  int negative() const { return negative_; }
  /// x <- T(E)^-1 x over global nodes (hard ends: x is zero at both ends before and after; periodic ends,
  /// phase 0: node N repeats node 0 and carries no load).
  void solve(Eigen::VectorXd& x) const;
  /// Periodic ends: S_00 + S_NN and S_0N of the stack condensed to its two faces, for any Bloch phase:
  /// levels of phase p obey diagonal() + 2 cos(p) coupling() = 0.
  double diagonal() const { return face_[0] + face_[2]; }
  double coupling() const { return face_[1]; }
  /// Negative pivots of the inner nodes alone (without the face).
  int inner_negative() const { return inner_negative_; }

 private:
  struct Parts;
  void eliminate_chain(double cos_phase);

  const Hamiltonian* h_;
  int p_, elements_;
  bool periodic_;
  double tiny_;
  int negative_ = 0, inner_negative_ = 0;
  double face_[3] = {0, 0, 0};  // S00, S0N, SNN
  double last_ = 0;             // pivot of the identified face node
  std::unique_ptr<Parts> parts_;
};

/// From element-local to global nodes and back.
Eigen::VectorXd gather(const Grid& grid, const Eigen::VectorXd& local);
Eigen::VectorXd scatter(const Grid& grid, const Eigen::VectorXd& global);

}  // namespace wellwright
