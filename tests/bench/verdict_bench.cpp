// SPDX-License-Identifier: GPL-3.0-or-later
#include "demo.h"
#include "limits/judge.h"
#include "studies/board.h"
#include "studies/runner.h"

#include <benchmark/benchmark.h>

using namespace headroom;

namespace {

/// One cell from nothing to its verdicts: first run, repeat with divided cells, judging.
void verdictWithRepeat(benchmark::State& state) {
    const auto plant = bench::demoPlant(plant::ConduitModel::automatic);
    const auto study = bench::demoStudy("Full rejection", 600.0);
    const auto base = plant::variant(bench::demo(), -1);
    for (auto _ : state) {
        const auto first = simulation::run(*bench::compiled(plant, study, {}));
        const auto repeat = simulation::run(
            *bench::compiled(plant, study, {.refinement = 2, .keepTraces = false, .keepLines = false}));
        auto verdicts = limits::judge(base, study, &first, &repeat);
        benchmark::DoNotOptimize(verdicts.data());
    }
}
BENCHMARK(verdictWithRepeat)->Unit(benchmark::kMillisecond);

void judgingAlone(benchmark::State& state) {
    const auto plant = bench::demoPlant(plant::ConduitModel::automatic);
    const auto study = bench::demoStudy("Full rejection", 600.0);
    const auto base = plant::variant(bench::demo(), -1);
    const auto first = simulation::run(*bench::compiled(plant, study, {}));
    const auto repeat = simulation::run(*bench::compiled(plant, study, {.refinement = 2}));
    for (auto _ : state) {
        auto verdicts = limits::judge(base, study, &first, &repeat);
        benchmark::DoNotOptimize(verdicts.data());
    }
}
BENCHMARK(judgingAlone)->Unit(benchmark::kMicrosecond);

/// The whole Board of the demo through the runner, all workers.
void wholeBoard(benchmark::State& state) {
    const auto snapshot = studies::makeSnapshot(plant::bind(bench::demo().tree));
    std::vector<studies::Runner::Wanted> cells;
    for (int option = -1; option < snapshot->options(); ++option) {
        for (int study = 0; study < snapshot->studies(); ++study) {
            cells.push_back({option, study});
        }
    }
    for (auto _ : state) {
        const auto store = studies::makeMemoryStore();
        studies::Runner runner(*store, static_cast<int>(state.range(0)), {});
        runner.want(snapshot, cells);
        runner.waitUntilIdle();
    }
    state.counters["cells_of_board"] = static_cast<double>(cells.size());
}
BENCHMARK(wholeBoard)->Arg(1)->Arg(2)->Unit(benchmark::kMillisecond)->UseRealTime()->Iterations(1);

} // namespace
