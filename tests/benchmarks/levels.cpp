// SPDX-License-Identifier: Apache-2.0
// Time of certified levels against LAPACK on finite differences of the same error, and against the number of
// layers.
#include <benchmark/benchmark.h>

#include <cstdio>
#include <ctime>

#include "finite_differences.hpp"
#include "support/shooting.hpp"
#include "support/study_builder.hpp"

namespace {

constexpr int wanted = 4;
constexpr double allowed = 1e-7;  // eV: the error that both sides are held to

plain::Stack double_well(int bands) {
  const plain::Medium w{0, 0.067, 1.519, 0.341}, b{0.16, 0.0836, 1.79, 0.332};
  return {{plain::uniform(b, 20), plain::uniform(w, 14.5), plain::uniform(b, 2.5), plain::uniform(w, 10),
           plain::uniform(b, 20)},
          0.0008,
          bands};
}

plain::Stack many_layers(int layers) {
  plain::Stack stack;
  const plain::Medium w{0, 0.067, 1.519, 0.341}, b{0.16, 0.0836, 1.79, 0.332};
  for (int i = 0; i < layers; ++i)
    stack.layers.push_back(plain::uniform(i % 2 == 0 ? b : w, i % 2 == 0 ? 2.5 : 8));
  return stack;
}

double largest_error(const std::vector<double>& energy) {
  static const auto exact = shooting::Shooter(double_well(1)).levels(0, wanted);
  double error = 0;
  for (std::size_t n = 0; n < wanted; ++n)
    error = std::max(error, std::abs(energy[n] - static_cast<double>(exact[n])));
  return error;
}

/// The coarsest grid whose four levels are all within the allowed error.
const FiniteDifferences& fine_enough() {
  static const FiniteDifferences matrix = [] {
    for (int cells = 4;; ++cells) {  // cells in half a nanometre, which divides every layer
      auto candidate = finite_differences(double_well(1), 0.5 / cells);
      if (largest_error(by_bisection(candidate, wanted).energy) < allowed) return candidate;
    }
  }();
  return matrix;
}

void certified_levels(benchmark::State& state) {
  const auto study = plain::study_of(double_well(static_cast<int>(state.range(0))), "4", "0.1 ueV");
  for (auto _ : state) {
    wellwright::Notes notes;
    benchmark::DoNotOptimize(wellwright::solve_levels(study, wellwright::Carrier::electron, notes, {}));
  }
}
BENCHMARK(certified_levels)->ArgName("bands")->DenseRange(1, 3)->Unit(benchmark::kMicrosecond);

void lapack_bisection(benchmark::State& state) {
  for (auto _ : state) benchmark::DoNotOptimize(by_bisection(fine_enough(), wanted));
}
BENCHMARK(lapack_bisection)->Unit(benchmark::kMicrosecond);

void lapack_dstevr(benchmark::State& state) {
  for (auto _ : state) benchmark::DoNotOptimize(by_dstevr(fine_enough(), wanted));
}
BENCHMARK(lapack_dstevr)->Unit(benchmark::kMicrosecond);

// Six levels of a superlattice with so many layers, the groups of its miniband left aside by a field of none.
void levels_of_layers(benchmark::State& state) {
  const auto study = plain::study_of(many_layers(static_cast<int>(state.range(0))), "4", "1 ueV");
  for (auto _ : state) {
    wellwright::Notes notes;
    benchmark::DoNotOptimize(wellwright::solve_levels(study, wellwright::Carrier::electron, notes, {}));
  }
  state.SetComplexityN(state.range(0));
}
BENCHMARK(levels_of_layers)
    ->ArgName("layers")
    ->Arg(11)
    ->Arg(31)
    ->Arg(101)
    ->Arg(301)
    ->Arg(1001)
    ->Unit(benchmark::kMicrosecond)
    ->Complexity();

/// Processor time of one run [us], the best of several batches, so that other work on the machine does not
/// count.
template <class Work>
double best_time(Work work) {
  double best = 1e300;
  for (int batch = 0; batch < 10; ++batch) {
    const std::clock_t start = std::clock();
    int runs = 0;
    while (std::clock() - start < CLOCKS_PER_SEC / 50) {
      benchmark::DoNotOptimize(work());
      ++runs;
    }
    best = std::min(best, 1e6 * static_cast<double>(std::clock() - start) / CLOCKS_PER_SEC / runs);
  }
  return best;
}

void print_ratio() {
  const auto study = plain::study_of(double_well(1), "4", "0.1 ueV");
  wellwright::Notes notes;
  const auto levels = wellwright::solve_levels(study, wellwright::Carrier::electron, notes, {});
  const double own = largest_error({levels.energy.data(), levels.energy.data() + levels.count()});
  const FiniteDifferences& matrix = fine_enough();
  const double theirs = largest_error(by_bisection(matrix, wanted).energy);
  const double ours_us =
      best_time([&] { return wellwright::solve_levels(study, wellwright::Carrier::electron, notes, {}); });
  const double bisection_us = best_time([&] { return by_bisection(matrix, wanted); });
  const double dstevr_us = best_time([&] { return by_dstevr(matrix, wanted); });
  std::printf("\nfour levels with vectors, error below %.0e eV:\n", allowed);
  std::printf("  certified levels       %10.1f us   error %.1e eV, %s\n", ours_us, own,
              levels.certificate.certified ? "certified" : "not certified");
  std::printf("  dstebz + dstein        %10.1f us   error %.1e eV, %zu nodes   ratio %.0f\n", bisection_us,
              theirs, matrix.diagonal.size(), bisection_us / ours_us);
  std::printf("  dstevr                 %10.1f us   ratio %.0f\n", dstevr_us, dstevr_us / ours_us);
}

}  // namespace

int main(int argc, char** argv) {
  benchmark::Initialize(&argc, argv);
  benchmark::RunSpecifiedBenchmarks();
  print_ratio();
}
