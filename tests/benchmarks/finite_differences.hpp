// SPDX-License-Identifier: Apache-2.0
// The usual way to levels, for comparison: second-order finite differences and LAPACK's tridiagonal solvers.
#pragma once

#include <vector>

#include "support/plain_stack.hpp"

/// Symmetric tridiagonal matrix of a one-band stack with hard walls on a grid of `step` [nm] that divides
/// every layer. The flux between two nodes sees the two half cells in series (BenDaniel-Duke), so the order
/// stays two at interfaces; a node on an interface takes the mean of both edges.
struct FiniteDifferences {
  std::vector<double> diagonal, off_diagonal;
  double step = 0;
};
FiniteDifferences finite_differences(const plain::Stack& stack, double step);

/// The lowest `count` eigenvalues and, column by column, their eigenvectors.
struct Eigenpairs {
  std::vector<double> energy, vectors;
};
/// dstebz + dstein: bisection to full accuracy, then inverse iteration.
Eigenpairs by_bisection(const FiniteDifferences& matrix, int count);
/// dstevr: relatively robust representations.
Eigenpairs by_dstevr(const FiniteDifferences& matrix, int count);
