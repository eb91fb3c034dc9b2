// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "limits/evidence.h"

#include <optional>

namespace headroom::limits {

/// How long a trace was beyond a bound [s]; crossings are found within the recording interval.
struct Outside {
    double total_s = 0.0;   ///< all excursions together
    double longest_s = 0.0; ///< the longest one

    double counted_s(plant::TimeRule rule) const {
        return rule == plant::TimeRule::continuous ? longest_s : total_s;
    }
};

/// Time beyond `bound` [SI of the measure] until `until_s`. The trace is taken as straight from
/// instant to instant; where an interval went beyond both its ends, through its extreme in the
/// middle, so a short peak counts.
Outside timeOutside(const Evidence& evidence, Side side, double bound, double until_s);

/// The value beyond which the trace was for just `allowed_s` [SI of the measure]: for a limit that
/// allows that time, what the extreme is for one that allows none.
double valueExceededFor(const Evidence& evidence, Side side, plant::TimeRule rule,
                        double allowed_s, double until_s);

} // namespace headroom::limits
