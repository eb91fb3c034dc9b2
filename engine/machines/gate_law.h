// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "numerics/table.h"

namespace headroom::machines {

/// Relative opening τ of the guide vanes over servo stroke (both shares of one; τ = 1 gives rated
/// flow at rated head and speed). Rises strictly, passes through (0, 0), has a continuous slope.
class GateLaw {
public:
    /// `curve` begins at (0, 0); checked by the chart's calibration.
    explicit GateLaw(numerics::MonotoneCurve curve) : curve_(std::move(curve)) {}

    double relativeOpening(double stroke) const { return curve_.value(stroke); }
    double slope(double stroke) const { return curve_.slope(stroke); } ///< dτ/dstroke
    double stroke(double relativeOpening) const { return curve_.inverse(relativeOpening); }
    double largestOpening() const { return curve_.y().back(); }

private:
    numerics::MonotoneCurve curve_;
};

} // namespace headroom::machines
