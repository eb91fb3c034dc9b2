// SPDX-License-Identifier: GPL-3.0-or-later
#include "demo.h"

#include <benchmark/benchmark.h>

using namespace headroom;

namespace {

constexpr double duration_s = 600.0;

void wholePlant(benchmark::State& state, plant::ConduitModel headrace) {
    const auto model = bench::compiled(bench::demoPlant(headrace),
                                       bench::demoStudy("Full rejection", duration_s), {});
    double cells = 0.0;
    for (auto _ : state) {
        auto run = simulation::run(*model);
        cells = run.resolution.cells;
        benchmark::DoNotOptimize(run.channels.data());
    }
    state.counters["cells"] = cells;
    state.counters["times_real"] = benchmark::Counter(
        duration_s, benchmark::Counter::kIsIterationInvariantRate);
}
BENCHMARK_CAPTURE(wholePlant, rigidHeadrace, plant::ConduitModel::rigid)
    ->Unit(benchmark::kMillisecond);
BENCHMARK_CAPTURE(wholePlant, everythingElastic, plant::ConduitModel::elastic)
    ->Unit(benchmark::kMillisecond);

void compileAndRest(benchmark::State& state) {
    const auto plant = bench::demoPlant(plant::ConduitModel::elastic);
    const auto study = bench::demoStudy("Full rejection", duration_s);
    for (auto _ : state) {
        auto model = bench::compiled(plant, study, {});
        benchmark::DoNotOptimize(model.get());
    }
}
BENCHMARK(compileAndRest)->Unit(benchmark::kMillisecond);

} // namespace
