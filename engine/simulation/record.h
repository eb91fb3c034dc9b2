// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "hydraulics/elastic_sweep.h"
#include "results/run.h"

#include <cstdint>
#include <vector>

/// Traces and moving head lines. Rows are collected in a block and turned into columns block by
/// block, because a run writes instants and a reader wants quantities.
namespace headroom::simulation {

class Record {
public:
    struct Plan {
        std::size_t channels = 0, stations = 0;
        std::int64_t steps = 0, every = 1, lineEvery = 1;
        bool traces = true, lines = true;
    };
    Record(const Plan& plan, const hydraulics::SweepLoops& loops);

    /// Values of step `n`: channels first, then stations.
    void take(std::int64_t n, const double* row);
    void finish();

    results::Trace trace(std::size_t channel);
    /// Rows of `count` stations from `first` on, an instant each.
    std::vector<float> line(std::size_t first, std::size_t count) const;

private:
    void store(const double* row);
    void flush();

    Plan plan_;
    const hydraulics::SweepLoops& loops_;
    std::vector<double> low_, high_; // within the present interval
    std::vector<float> blockLow_, blockHigh_, blockLast_;
    std::size_t inBlock_ = 0;
    std::vector<results::Trace> traces_;
    std::vector<float> lines_; // instants × stations
    std::size_t lineCount_ = 0;
};

} // namespace headroom::simulation
