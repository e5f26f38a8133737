// SPDX-License-Identifier: Apache-2.0
// The parts inside the room: Lanczos and bisection find the same levels, and iterating allocates nothing.
#include <catch2/catch.hpp>
#include <cstdlib>
#include <new>

#include "levels/operator.hpp"
#include "support/hand_made.hpp"

#if defined(__GNUC__) && !defined(__clang__)
#pragma GCC diagnostic ignored "-Wmismatched-new-delete"  // both are ours and go by malloc and free
#endif

namespace {
long allocations = 0;
}
void* operator new(std::size_t size) {
  ++allocations;
  if (void* memory = std::malloc(size)) return memory;
  throw std::bad_alloc();
}
void operator delete(void* memory) noexcept {
  std::free(memory);
}
void operator delete(void* memory, std::size_t) noexcept {
  std::free(memory);
}

using namespace wellwright;

TEST_CASE("Lanczos and bisection by counts find the same levels") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three})
    for (const Ends ends : {Ends::hard, Ends::periodic}) {
      Study study = hand_made::double_well(bands, ends == Ends::hard ? 0.001 : 0);
      study.model.ends = ends;
      const Grid grid = make_grid(study.stack.faces(), first_cuts(study, Carrier::electron, 0.3), 8);
      Operator op(study, Carrier::electron, grid);
      Pairs by_lanczos = lanczos(op.hamiltonian, op.factors, 0.01, 7);
      REQUIRE(by_lanczos.count() == 7);
      REQUIRE(Rayleigh(op.hamiltonian, op.factors).polish_all(by_lanczos));
      const Pairs by_counts = bisection(op.hamiltonian, op.factors, 0, 7, op.floor.energy);
      CHECK((by_lanczos.energy - by_counts.energy).cwiseAbs().maxCoeff() < 1e-12);
      CHECK(by_counts.residual.maxCoeff() < 1e-11);
    }
}

TEST_CASE("Counts part the levels, and those too close to part are left to others") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three})
    for (const Ends ends : {Ends::hard, Ends::periodic}) {
      Study study = hand_made::double_well(bands, ends == Ends::hard ? 0.001 : 0);
      study.model.ends = ends;
      const Grid grid = make_grid(study.stack.faces(), first_cuts(study, Carrier::electron, 0.3), 9);
      Operator op(study, Carrier::electron, grid);
      const Pairs all = bisection(op.hamiltonian, op.factors, 0, 7, op.floor.energy);
      for (const int first : {0, 2, 4}) {
        const Pairs some = isolated_levels(op.hamiltonian, op.factors, first, 3, op.floor.energy, 1e-9);
        CAPTURE(static_cast<int>(bands), first);
        REQUIRE(some.count() == 3);
        CHECK((some.energy - all.energy.segment(first, 3)).cwiseAbs().maxCoeff() < 1e-11);
        CHECK(some.residual.maxCoeff() <= 1e-9);
      }
    }
  using hand_made::barrier, hand_made::well;
  const Study twins =
      hand_made::study({{barrier, 60}, {well, 8}, {barrier, 60}, {well, 8}, {barrier, 60}}, Bands::two);
  Operator op(twins, Carrier::electron,
              make_grid(twins.stack.faces(), first_cuts(twins, Carrier::electron, 0.3), 9));
  CHECK(isolated_levels(op.hamiltonian, op.factors, 0, 2, op.floor.energy, 1e-9).count() == 0);
  const Pairs both = cold_levels(op.hamiltonian, op.factors, 0, 2, op.floor.energy);
  REQUIRE(both.count() == 2);
  CHECK(both.energy[1] - both.energy[0] < 1e-10);
}

TEST_CASE("Bisection separates levels that coincide to rounding") {
  using hand_made::barrier, hand_made::well;
  const Study study = hand_made::study(
      {{barrier, 60}, {well, 8}, {barrier, 60}, {well, 8}, {barrier, 60}, {well, 8}, {barrier, 60}},
      Bands::two);
  const Grid grid = make_grid(study.stack.faces(), first_cuts(study, Carrier::electron, 0.3), 10);
  Operator op(study, Carrier::electron, grid);
  const Pairs pairs = bisection(op.hamiltonian, op.factors, 0, 6, op.floor.energy);
  CHECK(pairs.energy[2] - pairs.energy[0] < 1e-12);
  CHECK(pairs.energy[3] - pairs.energy[2] > 0.05);
  const Eigen::VectorXd mass = lumped_mass(op.hamiltonian);
  for (int i = 0; i < 3; ++i)
    for (int j = 0; j < i; ++j)
      CHECK(std::abs(pairs.psi.col(i).cwiseProduct(mass).dot(pairs.psi.col(j))) < 1e-8);
}

TEST_CASE("A warm solve does not allocate") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three}) {
    const Study study = hand_made::double_well(bands);
    const Grid grid = make_grid(study.stack.faces(), first_cuts(study, Carrier::electron, 0.3), 10);
    Operator op(study, Carrier::electron, grid);
    Pairs pairs = cold_levels(op.hamiltonian, op.factors, 0, 4, op.floor.energy);
    Rayleigh rayleigh(op.hamiltonian, op.factors);
    const double known = pairs.energy[1];
    pairs.energy[1] += 1e-4;  // as from a neighbour
    for (Eigen::Index i = 1; i < pairs.psi.rows() - 1; ++i)
      pairs.psi(i, 1) *= 1 + 1e-3 * static_cast<double>(i % 3);
    const long before = allocations;
    const bool fine = rayleigh.improve(pairs.energy[1], pairs.psi.col(1), pairs.residual[1], 1e-9) &&
                      rayleigh.polish(pairs.energy[1], pairs.psi.col(1), pairs.residual[1]);
    const int below = levels_below(op.factors, 0.5 * (pairs.energy[1] + pairs.energy[2]));
    const long after = allocations;
    CHECK(fine);
    CHECK(below == 2);
    CHECK(after == before);
    CHECK(pairs.energy[1] == Approx(known).epsilon(1e-12));
  }
}
