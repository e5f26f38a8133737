// SPDX-License-Identifier: Apache-2.0
// Finite differences of a one-band stack and the calls into LAPACK.
#include "finite_differences.hpp"

#include <cmath>
#include <stdexcept>

extern "C" {
void dstebz_(const char* range, const char* order, const int* n, const double* vl, const double* vu,
             const int* il, const int* iu, const double* abstol, const double* d, const double* e, int* m,
             int* nsplit, double* w, int* iblock, int* isplit, double* work, int* iwork, int* info,
             std::size_t, std::size_t);
void dstein_(const int* n, const double* d, const double* e, const int* m, const double* w, const int* iblock,
             const int* isplit, double* z, const int* ldz, double* work, int* iwork, int* ifail, int* info);
void dstevr_(const char* jobz, const char* range, const int* n, double* d, double* e, const double* vl,
             const double* vu, const int* il, const int* iu, const double* abstol, int* m, double* w,
             double* z, const int* ldz, int* isuppz, double* work, const int* lwork, int* iwork,
             const int* liwork, int* info, std::size_t, std::size_t);
}

FiniteDifferences finite_differences(const plain::Stack& stack, double step) {
  std::vector<double> edge, mass;  // of each cell
  double z = 0;
  for (const plain::Layer& layer : stack.layers) {
    const long cells = std::lround(layer.thickness / step);
    if (std::abs(static_cast<double>(cells) * step - layer.thickness) > 1e-9)
      throw std::invalid_argument("the step does not divide a layer");
    for (long i = 0; i < cells; ++i) {
      edge.push_back(layer.medium.edge);
      mass.push_back(layer.medium.mass);
    }
  }
  const double K = static_cast<double>(plain::K) / (step * step);
  FiniteDifferences matrix;
  matrix.step = step;
  for (std::size_t i = 1; i < edge.size(); ++i) {  // nodes between cells; the faces are walls
    z = static_cast<double>(i) * step;
    matrix.diagonal.push_back(K / mass[i - 1] + K / mass[i] + (edge[i - 1] + edge[i]) / 2 + stack.tilt() * z);
    if (i + 1 < edge.size()) matrix.off_diagonal.push_back(-K / mass[i]);
  }
  return matrix;
}

Eigenpairs by_bisection(const FiniteDifferences& matrix, int count) {
  const int n = static_cast<int>(matrix.diagonal.size()), first = 1;
  const double unused = 0, tolerance = 0;
  const auto size = static_cast<std::size_t>(n);
  int found = 0, splits = 0, info = 0;
  std::vector<double> energy(size), work(5 * size);
  std::vector<int> block(size), split(size), integers(3 * size), fail(static_cast<std::size_t>(count));
  dstebz_("I", "B", &n, &unused, &unused, &first, &count, &tolerance, matrix.diagonal.data(),
          matrix.off_diagonal.data(), &found, &splits, energy.data(), block.data(), split.data(), work.data(),
          integers.data(), &info, 1, 1);
  Eigenpairs pairs;
  pairs.vectors.resize(size * static_cast<std::size_t>(count));
  dstein_(&n, matrix.diagonal.data(), matrix.off_diagonal.data(), &found, energy.data(), block.data(),
          split.data(), pairs.vectors.data(), &n, work.data(), integers.data(), fail.data(), &info);
  energy.resize(static_cast<std::size_t>(found));
  pairs.energy = std::move(energy);
  return pairs;
}

Eigenpairs by_dstevr(const FiniteDifferences& matrix, int count) {
  const int n = static_cast<int>(matrix.diagonal.size()), first = 1, lwork = 20 * n, liwork = 10 * n;
  const double unused = 0, tolerance = 0;
  const auto size = static_cast<std::size_t>(n);
  std::vector<double> d = matrix.diagonal, e = matrix.off_diagonal, energy(size), work(20 * size);
  e.push_back(0);
  std::vector<int> support(2 * size), integers(10 * size);
  int found = 0, info = 0;
  Eigenpairs pairs;
  pairs.vectors.resize(size * static_cast<std::size_t>(count));
  dstevr_("V", "I", &n, d.data(), e.data(), &unused, &unused, &first, &count, &tolerance, &found,
          energy.data(), pairs.vectors.data(), &n, support.data(), work.data(), &lwork, integers.data(),
          &liwork, &info, 1, 1);
  energy.resize(static_cast<std::size_t>(found));
  pairs.energy = std::move(energy);
  return pairs;
}
