// SPDX-License-Identifier: Apache-2.0
// Small words for tests against published values: read a study, solve it, find levels by where they live,
// print a row.
#pragma once

#include <cmath>
#include <cstdio>
#include <string>
#include <vector>

#include "wellwright/levels.hpp"

namespace published {

inline wellwright::Study read(const std::string& text) {
  static const wellwright::MaterialTable table;
  wellwright::Notes notes;
  return wellwright::read_study(text, "study.yaml", table, {}, notes);
}

inline wellwright::Levels solve(const wellwright::Study& study,
                                wellwright::Carrier carrier = wellwright::Carrier::electron) {
  wellwright::Notes notes;
  return wellwright::solve_levels(study, carrier, notes, {});
}

/// Probability of `level` in all layers of this name.
inline double probability(const wellwright::Study& study, const wellwright::Levels& levels, int level,
                          const std::string& name) {
  double sum = 0;
  for (const int layer : wellwright::find_layers(study.stack, name, {}))
    sum += levels.layer_probability(level, layer);
  return sum;
}

/// Dipoles between all levels [nm].
inline Eigen::MatrixXd dipoles(const wellwright::Levels& levels) {
  return levels.moment(levels.profile.grid.z);
}

/// Oscillator strength (free electron mass) of a transition [1].
inline double strength(double energy, double dipole) {
  return energy * dipole * dipole / wellwright::constants::hbar2_over_2m0;
}

/// The level of `among` with the largest dipole to `from`.
inline int strongest(const Eigen::MatrixXd& dipole, int from, const std::vector<int>& among) {
  int best = among.front();
  for (const int level : among)
    if (std::abs(dipole(from, level)) > std::abs(dipole(from, best))) best = level;
  return best;
}

/// One line of the printed table.
inline void row(const char* what, double printed, double computed, const char* unit) {
  std::printf("  %-58s %9.3f %9.3f %-5s %+7.1f %%\n", what, printed, computed, unit,
              100 * (computed / printed - 1));
}

}  // namespace published
