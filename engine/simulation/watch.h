// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "hydraulics/elastic_sweep.h"
#include "results/run.h"

#include <array>
#include <cstdint>
#include <vector>

/// Extremes of many values at every step, each with the two values before and after it.
namespace headroom::simulation {

class Watch {
public:
    Watch(std::size_t width, const hydraulics::SweepLoops& loops);

    /// Where the values of step `n` are to be written.
    double* row(std::int64_t n) { return ring_.data() + slot(n) * width_; }
    const double* row(std::int64_t n) const { return ring_.data() + slot(n) * width_; }
    /// Takes the values of step `n` in; steps come one after the other from 0.
    void take(std::int64_t n);
    /// After the last step: extremes near the end get what there is around them.
    void finish(std::int64_t last);

    results::Extreme least(std::size_t index, double step_s) const;
    results::Extreme greatest(std::size_t index, double step_s) const;

private:
    static constexpr std::int64_t depth = 5;
    using Around = std::array<double, depth>;
    std::size_t slot(std::int64_t n) const { return static_cast<std::size_t>(n % depth); }
    void capture(std::int64_t centre, std::int64_t last, std::size_t index, Around& around);

    std::size_t width_;
    const hydraulics::SweepLoops& loops_;
    std::vector<double> ring_;
    std::vector<double> highest_, highestAt_, lowest_, lowestAt_;
    std::vector<Around> aroundHighest_, aroundLowest_;
};

} // namespace headroom::simulation
