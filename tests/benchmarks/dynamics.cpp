// SPDX-License-Identifier: Apache-2.0
// Time of the density map and of the observables of a superposition against levels, samples and layers.
#include <benchmark/benchmark.h>

#include "support/hand_made.hpp"
#include "wellwright/dynamics.hpp"

namespace {

using namespace wellwright;

struct Made {
  Study study;
  Levels levels;
  Transitions lines;
};

Made made(int level_count, int samples) {
  Made m;
  m.study = hand_made::double_well(Bands::two, 0.0008);
  m.study.model.levels.count = level_count;
  DynamicsRequest request;
  MixStart mix;
  for (int k = 1; k <= level_count; ++k) mix.parts.push_back({k, 1.0 / k, 0.3 * k});
  request.start = mix;
  request.samples = samples;
  m.study.dynamics = request;
  Notes notes;
  m.levels = solve_levels(m.study, Carrier::electron, notes, {});
  m.lines = transitions(m.levels);
  return m;
}

/// |psi(z, t)|^2 at 400 places and `samples` times.
void density_of(benchmark::State& state) {
  const Made m = made(static_cast<int>(state.range(0)), static_cast<int>(state.range(1)));
  Notes notes;
  Dynamics dynamics = superpose(m.study, m.levels, m.lines, nullptr, notes);
  dynamics.density_z.resize(400);
  for (std::size_t i = 0; i < 400; ++i)
    dynamics.density_z[i] = m.study.stack.length() * static_cast<double>(i) / 399;
  for (auto _ : state) {
    double sum = 0;
    density_map(m.levels, dynamics, [&](int, const Eigen::MatrixXd& block) { sum += block(0, 0); });
    benchmark::DoNotOptimize(sum);
  }
}
BENCHMARK(density_of)
    ->ArgNames({"levels", "samples"})
    ->Args({10, 10'000})
    ->Args({10, 100'000})
    ->Args({60, 10'000})
    ->Unit(benchmark::kMillisecond);

/// <z>, survival and layer probabilities.
void observables(benchmark::State& state) {
  const Made m = made(static_cast<int>(state.range(0)), static_cast<int>(state.range(1)));
  for (auto _ : state) {
    Notes notes;
    benchmark::DoNotOptimize(superpose(m.study, m.levels, m.lines, nullptr, notes));
  }
}
BENCHMARK(observables)
    ->ArgNames({"levels", "samples"})
    ->Args({2, 1'000'000})
    ->Args({10, 10'000})
    ->Args({10, 1'000'000})
    ->Args({100, 10'000})
    ->Unit(benchmark::kMillisecond);

}  // namespace

BENCHMARK_MAIN();
