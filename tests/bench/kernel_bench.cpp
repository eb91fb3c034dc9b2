// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/elastic_row.h"

#include <benchmark/benchmark.h>

#include <array>

using namespace headroom;

namespace {

/// The yardstick: a dependent chain of one million multiplications and additions.
void calibration(benchmark::State& state) {
    constexpr int links = 1'000'000;
    for (auto _ : state) {
        double value = 0.5;
        for (int i = 0; i < links; ++i) {
            value = value * 0.999999 + 1e-7;
        }
        benchmark::DoNotOptimize(value);
    }
    state.counters["ns_per_link"] = benchmark::Counter(
        links, benchmark::Counter::kIsIterationInvariantRate | benchmark::Counter::kInvert);
}
BENCHMARK(calibration)->Unit(benchmark::kMillisecond);

/// One step of all inner nodes of one conduit of 1000 cells.
void cellKernel(benchmark::State& state) {
    constexpr std::array sets{hydraulics::InstructionSet::baseline, hydraulics::InstructionSet::avx2,
                              hydraulics::InstructionSet::avx512};
    const auto set = sets[static_cast<std::size_t>(state.range(0))];
    state.SetLabel(std::string(hydraulics::nameOf(set)));
    if (!hydraulics::available(set)) {
        state.SkipWithError("not on this machine");
        return;
    }
    constexpr int cells = 1000;
    hydraulics::ElasticCell cell;
    cell.impedance_sm2 = 3.5;
    cell.friction = {{*hydraulics::FrictionLaw::make({32.0, 1.497}, hydraulics::FrictionLaw::Strickler{34.0}), 11.0}};
    const hydraulics::ElasticRows rows({hydraulics::uniformConduit(cells, cell)}, 0.01);
    auto water = rows.state();
    const double end_m = rows.setRest(water, 0, 500.0, 55.0);
    for (auto _ : state) {
        rows.sweep(water, set);
        rows.setStart(water, 0, 500.0, 55.0);
        rows.setEnd(water, 0, end_m, 55.0);
        rows.advance(water);
        benchmark::ClobberMemory();
    }
    state.counters["ns_per_cell"] = benchmark::Counter(
        cells, benchmark::Counter::kIsIterationInvariantRate | benchmark::Counter::kInvert);
}
BENCHMARK(cellKernel)->DenseRange(0, 2);

} // namespace
