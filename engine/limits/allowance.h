// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "limits/evidence.h"

#include <algorithm>

namespace headroom::limits {

/// What is added to a computed value on the side of the bound, because it is not computed
/// (pulsation, scatter of a method): a fixed part and a share of the change from rest.
struct Added {
    Side side = Side::upper;
    double fixed = 0.0;       ///< ≥ 0, share of the static head times that head [SI]
    double shareOfRise = 0.0; ///< ≥ 0
    double rest = 0.0;        ///< where the quantity rests [SI]

    double sign() const { return side == Side::upper ? 1.0 : -1.0; }
    /// A computed value as it is compared with the bound.
    double to(double computed) const {
        const double change = std::max(0.0, sign() * (computed - rest));
        return computed + sign() * (fixed + shareOfRise * change);
    }
    /// The computed value that is compared as `compared`: the inverse of `to`.
    double from(double compared) const {
        const double change = sign() * (compared - rest) - fixed;
        return rest + sign() * (change > 0.0 ? change / (1.0 + shareOfRise) : change);
    }
    /// By how much the compared value moves with the computed one.
    double slope(double computed) const {
        return sign() * (computed - rest) > 0.0 ? 1.0 + shareOfRise : 1.0;
    }
};

} // namespace headroom::limits
