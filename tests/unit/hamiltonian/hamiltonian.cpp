// SPDX-License-Identifier: Apache-2.0
// T(E) applied, factored and counted, against a dense matrix assembled here from the weak form.
#include "wellwright/hamiltonian.hpp"

#include <Eigen/Cholesky>
#include <Eigen/Eigenvalues>
#include <Eigen/LU>
#include <catch2/catch.hpp>
#include <cmath>

#include "support/hand_made.hpp"

using namespace wellwright;

namespace {

// T(E) over global nodes 0..N without ends, column by column from hat functions of the nodes.
Eigen::MatrixXd dense(const Profile& profile, double E, double k) {
  const Grid& grid = profile.grid;
  const ReferenceElement& r = reference_element(grid.degree);
  const int p = grid.degree, n = p + 1;
  Eigen::MatrixXd T = Eigen::MatrixXd::Zero(grid.elements() * p + 1, grid.elements() * p + 1);
  for (int e = 0; e < grid.elements(); ++e)
    for (int q = 0; q < n; ++q) {
      const int row = e * n + q;
      double inverse_mass = profile.at.a0[row];
      for (int j = 0; j < profile.at.poles(); ++j)
        inverse_mass += profile.at.b(row, j) / (E - profile.at.v(row, j));
      const double c = constants::hbar2_over_2m0 * inverse_mass, s = 2 / grid.width(e);
      for (int i = 0; i < n; ++i)
        for (int j = 0; j < n; ++j)
          T(e * p + i, e * p + j) += grid.weight[row] * c * s * s * r.derivative(q, i) * r.derivative(q, j);
      T(e * p + q, e * p + q) +=
          grid.weight[row] * (profile.at.edge[row] - E + c * profile.at.in_plane[row] * k * k);
    }
  return T;
}

Eigen::MatrixXd with_ends(const Eigen::MatrixXd& T, Ends ends) {
  const Eigen::Index N = T.rows() - 1;
  if (ends == Ends::hard) return T.block(1, 1, N - 1, N - 1);
  Eigen::MatrixXd C = T.topLeftCorner(N, N);
  C.row(0) += T.row(N).head(N);
  C.col(0) += T.col(N).head(N);
  C(0, 0) += T(N, N);
  return C;
}

int negatives(const Eigen::MatrixXd& T) {
  return static_cast<int>(
      (Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd>(T).eigenvalues().array() < 0).count());
}

}  // namespace

TEST_CASE("T(E) applied, solved and counted agrees with a dense matrix") {
  for (const Bands bands : {Bands::one, Bands::two, Bands::three})
    for (const Ends ends : {Ends::hard, Ends::periodic})
      for (const double k : {0.0, 0.3}) {
        Study study = hand_made::double_well(bands, ends == Ends::hard ? 0.0012 : 0);
        study.model.ends = ends;
        const Grid grid = make_grid(study.stack.faces(), {{0.4, 0.8}, {0.5}, {}, {0.5}, {0.3, 0.5}}, 7);
        const Profile profile = make_profile(study, Carrier::electron, grid);
        const Hamiltonian h(profile, k);
        Factors factors(h);
        for (const double E : {0.03, 0.11, 0.29, 0.8}) {
          CAPTURE(static_cast<int>(bands), static_cast<int>(ends), k, E);
          const Eigen::MatrixXd T = with_ends(dense(profile, E, k), ends);
          const double step = 1e-4;
          const Eigen::MatrixXd slope =
              with_ends((dense(profile, E - step, k) - dense(profile, E + step, k)) / (2 * step), ends);
          const Eigen::Index N = h.nodes() - 1, first = ends == Ends::hard ? 1 : 0, m = T.rows();
          Eigen::VectorXd x = Eigen::VectorXd::Zero(N + 1), y, s;
          for (Eigen::Index i = 0; i < m; ++i) x[first + i] = std::sin(2.0 * static_cast<double>(i * i) + 1);
          if (ends == Ends::periodic) x[N] = x[0];
          h.apply(E, x, y, &s);
          const Eigen::VectorXd inner = x.segment(first, m);
          CHECK((y.segment(first, m) - T * inner).norm() < 1e-11 * (T * inner).norm());
          CHECK((s.segment(first, m) - slope * inner).norm() < 1e-5 * (slope * inner).norm());
          Eigen::VectorXd alone;
          h.slope(E, x, alone);
          CHECK((alone - s).norm() <= 1e-15 * s.norm());
          factors.compute(E);
          CHECK(factors.negative() == negatives(T));
          Eigen::VectorXd load = Eigen::VectorXd::Zero(N + 1);
          load.segment(first, m) = inner;
          factors.solve(load);
          const Eigen::VectorXd exact = T.partialPivLu().solve(inner);
          CHECK((load.segment(first, m) - exact).norm() < 1e-9 * exact.norm());
          if (ends == Ends::periodic) CHECK(load[N] == load[0]);
        }
      }
}

TEST_CASE("Any number of elements fills the packs of four") {
  for (int elements = 1; elements <= 9; ++elements) {
    Study study = hand_made::study({{hand_made::well, 12}}, Bands::two, 0.003);
    std::vector<double> cuts;
    for (int i = 1; i < elements; ++i) cuts.push_back(static_cast<double>(i) / elements);
    const Grid grid = make_grid(study.stack.faces(), {cuts}, 5);
    const Profile profile = make_profile(study, Carrier::electron, grid);
    const Hamiltonian h(profile);
    Factors factors(h);
    const Eigen::MatrixXd T = with_ends(dense(profile, 0.3, 0), Ends::hard);
    factors.compute(0.3);
    CAPTURE(elements);
    CHECK(factors.negative() == negatives(T));
    Eigen::VectorXd x = Eigen::VectorXd::LinSpaced(h.nodes(), 1, 2);
    const Eigen::VectorXd load = x.segment(1, T.rows());
    factors.solve(x);
    CHECK((T * x.segment(1, T.rows()) - load).norm() < 1e-11 * load.norm());
    CHECK(x[0] == 0);
    CHECK(x[h.nodes() - 1] == 0);
  }
}

TEST_CASE("Condensed faces vanish at the levels of any Bloch phase") {
  Study study = hand_made::study({{hand_made::barrier, 4}, {hand_made::well, 7}}, Bands::two);
  study.model.ends = Ends::periodic;
  const Grid grid = make_grid(study.stack.faces(), {{0.5}, {0.5}}, 10);
  const Profile profile = make_profile(study, Carrier::electron, grid);
  const Hamiltonian h(profile);
  Factors factors(h);
  for (const double phase : {0.0, 1.1, 3.141592653589793}) {
    const double E = 0.05;
    const Eigen::MatrixXd T = dense(profile, E, 0);
    const Eigen::Index N = T.rows() - 1;
    Eigen::MatrixXcd C = T.topLeftCorner(N, N).cast<std::complex<double>>();
    const std::complex<double> turn = std::polar(1.0, phase);
    C.col(0) += turn * T.col(N).head(N);
    C.row(0) += std::conj(turn) * T.row(N).head(N);
    C(0, 0) += T(N, N);
    factors.compute(E, std::cos(phase));
    const auto eigenvalues = Eigen::SelfAdjointEigenSolver<Eigen::MatrixXcd>(C).eigenvalues();
    CHECK(factors.negative() == static_cast<int>((eigenvalues.array() < 0).count()));
    // det C = det(inner) * (S_00 + S_NN + 2 cos(phase) S_0N)
    const double face = factors.diagonal() + 2 * std::cos(phase) * factors.coupling();
    const double inner = T.block(1, 1, N - 1, N - 1).partialPivLu().determinant();
    CHECK(C.partialPivLu().determinant().real() / inner == Approx(face).epsilon(1e-8));
  }
}
