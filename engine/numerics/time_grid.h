// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cmath>
#include <cstdint>

namespace headroom::numerics {

/// Counted time: instant n is start + n·step, never a sum of steps, so that a long run does not
/// drift and two runs with the same grid meet at the same instants bit for bit.
struct TimeGrid {
    double start_s = 0.0;
    double step_s = 0.0;    ///< > 0
    std::int64_t steps = 0; ///< number of steps; the last instant is at(steps)

    double at(std::int64_t n) const { return start_s + static_cast<double>(n) * step_s; }
    double end_s() const { return at(steps); }

    /// The grid over [start, start + duration]; the last instant is the first at or after the end
    /// (a remainder below a millionth of a step is rounding, not another step).
    static TimeGrid over(double start_s, double duration_s, double step_s) {
        constexpr double rounding = 1e-6;
        const double count = std::ceil(duration_s / step_s - rounding);
        return {start_s, step_s, static_cast<std::int64_t>(count > 0.0 ? count : 0.0)};
    }
    /// The step in which `time_s` lies: the n with at(n) < time ≤ at(n + 1), −1 at or before start.
    std::int64_t stepOf(double time_s) const {
        if (!(time_s > start_s)) {
            return -1;
        }
        auto n = static_cast<std::int64_t>(std::ceil((time_s - start_s) / step_s)) - 1;
        while (n > 0 && at(n) >= time_s) {
            --n;
        }
        while (at(n + 1) < time_s) {
            ++n;
        }
        return n;
    }
    /// Fraction of step n after which `time_s` lies, 0…1.
    double fraction(std::int64_t n, double time_s) const { return (time_s - at(n)) / step_s; }
};

} // namespace headroom::numerics
