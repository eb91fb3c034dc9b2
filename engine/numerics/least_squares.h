// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <functional>
#include <span>
#include <vector>

namespace headroom::numerics {

/// Fills `residuals` (a fixed number) from `unknowns`; returns false where they cannot be formed.
using Residuals =
    std::function<bool(std::span<const double> unknowns, std::span<double> residuals)>;

struct LeastSquaresProblem {
    Residuals residuals;
    int residualCount = 0;
    std::vector<double> start, lower, upper; ///< one each per unknown; lower < upper
};

struct LeastSquaresOptions {
    int mostIterations = 200;
    double relativeDecrease = 1e-14; ///< stop when an accepted step gains less than this share
    double smallestStep = 1e-12;     ///< of each unknown's range
};

struct LeastSquaresFit {
    std::vector<double> unknowns, residuals;
    double sumOfSquares = 0.0;
    int iterations = 0;
    bool converged = false; ///< false: stopped by the iteration count or no residuals at the start
};

/// Minimises the sum of squared residuals inside the bounds: damped Gauss–Newton steps
/// (Levenberg 1944, Marquardt 1963) with central differences; an unknown at a bound whose
/// gradient points outwards is held there, and steps are cut back to the box.
/// For a handful of unknowns; residuals should be scaled to be of order one.
LeastSquaresFit fitBounded(const LeastSquaresProblem& problem,
                           const LeastSquaresOptions& options = {});

} // namespace headroom::numerics
