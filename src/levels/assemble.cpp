// SPDX-License-Identifier: Apache-2.0
// Components chi, orthonormality in the full product, groups, signs, and where each level lives.
#include "levels/assemble.hpp"

#include <Eigen/Eigenvalues>
#include <algorithm>
#include <cmath>

namespace wellwright {
namespace {

constexpr double group_width = 1e-10;    // [eV]
constexpr double extremum_share = 0.05;  // of the largest, for the sign
constexpr double fine_overlap = 1e-14;   // deviation from orthonormality that is left alone
constexpr double small_overlap = 1e-9;   // whose square is nothing

// <i|g|j> over all components with weights w g.
Eigen::MatrixXd weighted_product(const Levels& levels, const Eigen::VectorXd& w) {
  Eigen::MatrixXd product = levels.envelope.transpose() * (w.asDiagonal() * levels.envelope);
  for (const Eigen::MatrixXd& chi : levels.companion)
    product.noalias() += chi.transpose() * (w.asDiagonal() * chi);
  return product;
}

void transform(Levels& levels, Eigen::Index first, const Eigen::MatrixXd& by) {
  const auto turn = [&](Eigen::MatrixXd& columns) {
    columns.middleCols(first, by.rows()) = (columns.middleCols(first, by.rows()) * by).eval();
  };
  turn(levels.envelope);
  for (Eigen::MatrixXd& chi : levels.companion) turn(chi);
}

// Loewdin's symmetric orthonormalisation: the nearest orthonormal set. Iteration leaves nearly equal levels
// orthogonal only to rounding over their distance.
void orthonormalise(Levels& levels) {
  const Eigen::MatrixXd gram = weighted_product(levels, levels.profile.grid.weight);
  const auto n = gram.rows();
  const Eigen::MatrixXd unit = Eigen::MatrixXd::Identity(n, n);
  const double deviation = (gram - unit).cwiseAbs().maxCoeff();
  if (deviation < fine_overlap) return;
  if (static_cast<double>(n) * deviation < small_overlap)
    return transform(levels, 0, 1.5 * unit - 0.5 * gram);
  const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver(gram);
  transform(levels, 0, solver.operatorInverseSqrt());
}

void find_groups(Levels& levels) {
  const int n = levels.count();
  levels.group.assign(static_cast<std::size_t>(n), 0);
  const Eigen::VectorXd wz = levels.profile.grid.weight.cwiseProduct(levels.profile.grid.z);
  int number = 0;
  for (int i = 0; i < n;) {
    int end = i + 1;
    while (end < n && levels.energy[end] - levels.energy[end - 1] < group_width) ++end;
    ++number;
    for (int j = i; j < end; ++j) levels.group[static_cast<std::size_t>(j)] = number;
    if (end - i > 1 && levels.profile.ends == Ends::hard) {
      Levels part;
      part.envelope = levels.envelope.middleCols(i, end - i);
      for (const Eigen::MatrixXd& chi : levels.companion)
        part.companion.push_back(chi.middleCols(i, end - i));
      const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver(weighted_product(part, wz));
      transform(levels, i, solver.eigenvectors());  // eigenvalues rise: ordered by mean position
    }
    i = end;
  }
}

// Going up, the first extremum of psi above 5 % of the largest is positive.
double sign_of(const Eigen::VectorXd& psi) {
  const double least = extremum_share * psi.cwiseAbs().maxCoeff();
  double before = 0;
  for (Eigen::Index i = 0; i < psi.size(); ++i) {
    const double here = std::abs(psi[i]);
    Eigen::Index next = i + 1;
    while (next < psi.size() && psi[next] == psi[i]) ++next;  // a boundary between elements stands twice
    const double after = next < psi.size() ? std::abs(psi[next]) : 0;
    if (here > least && here >= before && here >= after) return psi[i] < 0 ? -1 : 1;
    before = here;
    i = next - 1;
  }
  return 1;
}

}  // namespace

Eigen::VectorXd density_of(const Hamiltonian& hamiltonian, double energy, const Eigen::VectorXd& psi) {
  const Profile& profile = hamiltonian.profile();
  const Eigen::VectorXd local = scatter(profile.grid, psi);
  Eigen::VectorXd density = local.cwiseAbs2();
  if (profile.at.poles() > 0) {
    const Eigen::VectorXd squared_slope = slope_of(profile.grid, local).col(0).cwiseAbs2();
    for (int j = 0; j < profile.at.poles(); ++j)
      density.array() += constants::hbar2_over_2m0 * profile.at.b.col(j).array() * squared_slope.array() /
                         (energy - profile.at.v.col(j).array()).square();
  }
  return density / profile.grid.weight.dot(density);
}

Levels assemble(const Hamiltonian& hamiltonian, const Pairs& pairs) {
  Levels levels;
  levels.profile = hamiltonian.profile();
  const Profile& profile = levels.profile;
  const Grid& grid = profile.grid;
  const Coefficients& at = profile.at;
  const int n = pairs.count(), poles = at.poles();
  levels.energy = pairs.energy;
  levels.residual = pairs.residual;
  levels.error_estimate.setZero(n);
  levels.envelope.resize(grid.rows(), n);
  for (int i = 0; i < n; ++i) levels.envelope.col(i) = scatter(grid, pairs.psi.col(i));
  if (poles > 0) {
    const Eigen::MatrixXd slope = slope_of(grid, levels.envelope);
    for (int j = 0; j < poles; ++j) {
      Eigen::MatrixXd chi(grid.rows(), n);
      const Eigen::ArrayXd s = (constants::hbar2_over_2m0 * at.b.col(j)).cwiseSqrt();
      for (int i = 0; i < n; ++i)
        chi.col(i) = s * slope.col(i).array() / (pairs.energy[i] - at.v.col(j).array());
      levels.companion.push_back(std::move(chi));
    }
  }
  const Eigen::VectorXd norm = (grid.weight.transpose() * levels.density()).cwiseSqrt().transpose();
  for (int i = 0; i < n; ++i) {
    levels.envelope.col(i) /= norm[i];
    for (Eigen::MatrixXd& chi : levels.companion) chi.col(i) /= norm[i];
  }
  if (n > 0) {
    orthonormalise(levels);
    find_groups(levels);
  }

  levels.conduction_fraction.resize(n);
  levels.mean_position.resize(n);
  levels.spread.resize(n);
  levels.in_plane_mass.resize(n);
  levels.bound.assign(static_cast<std::size_t>(n), 0);
  int layers = 0;
  for (const int layer : grid.layer) layers = std::max(layers, layer + 1);
  levels.layer_probability.setZero(n, layers);
  const double edge = profile.ends == Ends::hard ? std::min(at.edge[0], at.edge[at.edge.size() - 1])
                                                 : at.edge.maxCoeff();  // a cell has no outer edges
  const Eigen::MatrixXd density = levels.density();
  for (int i = 0; i < n; ++i) {
    const double sign = sign_of(levels.envelope.col(i));
    levels.envelope.col(i) *= sign;
    for (Eigen::MatrixXd& chi : levels.companion) chi.col(i) *= sign;
    const Eigen::VectorXd weighted = grid.weight.cwiseProduct(density.col(i));
    const Eigen::VectorXd psi2 = grid.weight.cwiseProduct(levels.envelope.col(i).cwiseAbs2());
    levels.conduction_fraction[i] = psi2.sum();
    const double z = weighted.dot(grid.z);
    levels.mean_position[i] = z;
    levels.spread[i] = std::sqrt(std::max(weighted.dot((grid.z.array() - z).square().matrix()), 0.0));
    Eigen::ArrayXd inverse_mass = at.a0.array();
    for (int j = 0; j < poles; ++j)
      inverse_mass += at.b.col(j).array() / (levels.energy[i] - at.v.col(j).array());
    levels.in_plane_mass[i] = 1 / psi2.dot((inverse_mass * at.in_plane.array()).matrix());
    levels.bound[static_cast<std::size_t>(i)] = levels.energy[i] < edge ? 1 : 0;
    for (int e = 0; e < grid.elements(); ++e)
      levels.layer_probability(i, grid.layer[static_cast<std::size_t>(e)]) +=
          weighted.segment(e * (grid.degree + 1), grid.degree + 1).sum();
  }
  return levels;
}

Levels chosen(const Levels& levels, const std::vector<int>& indices) {
  Levels out;
  out.profile = levels.profile;
  out.certificate = levels.certificate;
  out.potential = levels.potential;
  const auto pick = [&](const Eigen::VectorXd& all) {
    Eigen::VectorXd some(static_cast<Eigen::Index>(indices.size()));
    for (std::size_t i = 0; i < indices.size(); ++i) some[static_cast<Eigen::Index>(i)] = all[indices[i]];
    return some;
  };
  const auto pick_columns = [&](const Eigen::MatrixXd& all) {
    Eigen::MatrixXd some(all.rows(), static_cast<Eigen::Index>(indices.size()));
    for (std::size_t i = 0; i < indices.size(); ++i)
      some.col(static_cast<Eigen::Index>(i)) = all.col(indices[i]);
    return some;
  };
  out.energy = pick(levels.energy);
  out.error_estimate = pick(levels.error_estimate);
  out.residual = pick(levels.residual);
  out.conduction_fraction = pick(levels.conduction_fraction);
  out.mean_position = pick(levels.mean_position);
  out.spread = pick(levels.spread);
  out.in_plane_mass = pick(levels.in_plane_mass);
  int last = -1, number = 0;
  for (const int i : indices) {
    const int group = levels.group[static_cast<std::size_t>(i)];
    if (group != last) ++number;
    last = group;
    out.group.push_back(number);
    out.bound.push_back(levels.bound[static_cast<std::size_t>(i)]);
  }
  out.envelope = pick_columns(levels.envelope);
  for (const Eigen::MatrixXd& chi : levels.companion) out.companion.push_back(pick_columns(chi));
  out.layer_probability = pick_columns(levels.layer_probability.transpose()).transpose();
  return out;
}

Eigen::MatrixXd Levels::density() const {
  Eigen::MatrixXd sum = envelope.cwiseAbs2();
  for (const Eigen::MatrixXd& chi : companion) sum += chi.cwiseAbs2();
  return sum;
}

Eigen::MatrixXd Levels::moment(const Eigen::VectorXd& g) const {
  return weighted_product(*this, profile.grid.weight.cwiseProduct(g));
}

}  // namespace wellwright
