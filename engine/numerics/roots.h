// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cmath>
#include <optional>

namespace headroom::numerics {

/// A function's value and its derivative at one argument.
struct ValueAndSlope {
    double value = 0.0;
    double slope = 0.0;
};

struct RootOptions {
    double argumentTolerance = 1e-14; ///< stop when the bracket or the move is below this
    double valueTolerance = 0.0;      ///< stop when |f| is at or below this
    int mostEvaluations = 200;
};

/// The root of `function` (argument → ValueAndSlope) in [low, high] by Newton steps kept inside a
/// shrinking bracket; bisection where Newton leaves it or is slow. The ends must have values of
/// different sign (or zero); otherwise, or when a value is not finite, nothing is returned.
/// `start` is where to begin; outside the bracket it is replaced by the middle.
template <class Function>
std::optional<double> bracketedNewton(Function&& function, double low, double high, double start,
                                      const RootOptions& options = {}) {
    const double atLow = function(low).value;
    const double atHigh = function(high).value;
    if (atLow == 0.0) {
        return low;
    }
    if (atHigh == 0.0) {
        return high;
    }
    if (!(atLow * atHigh < 0.0)) {
        return std::nullopt;
    }
    const double rising = atLow < 0.0 ? 1.0 : -1.0;
    double x = start > low && start < high ? start : 0.5 * (low + high);
    double lastMove = high - low;
    for (int count = 0; count < options.mostEvaluations; ++count) {
        const ValueAndSlope f = function(x);
        if (!std::isfinite(f.value)) {
            return std::nullopt;
        }
        if (std::fabs(f.value) <= options.valueTolerance) {
            return x;
        }
        (rising * f.value < 0.0 ? low : high) = x;
        double next = x - f.value / f.slope;
        // Newton must stay inside and must at least halve its move; else the bracket is halved.
        if (!(next > low && next < high) || std::fabs(next - x) > 0.5 * std::fabs(lastMove)) {
            next = 0.5 * (low + high);
        }
        lastMove = next - x;
        if (std::fabs(lastMove) <= options.argumentTolerance) {
            return next;
        }
        x = next;
    }
    return x;
}

} // namespace headroom::numerics
