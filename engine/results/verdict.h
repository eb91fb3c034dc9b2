// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "results/run.h"

#include <optional>
#include <string_view>

namespace headroom::results {

/// Exactly one for each run and limit; tested in the order of studies-and-limits.
enum class Mark { held, tight, undecided, broken, notValid, notRun, notApplicable };

std::string_view name(Mark mark); ///< as in files: "held" … "notApplicable"

/// One limit judged on one run.
struct Verdict {
    int limit = -1;                   ///< position in the variant's limits
    Mark mark = Mark::notRun;
    Measure measure = Measure::level;
    Place place;                      ///< where the extreme was found
    bool upper = true;                ///< which side governs
    int boundClass = 0;               ///< class whose value judged (plant::LoadClass as int)
    double bound = 0.0;               ///< [SI]
    double extreme = 0.0;             ///< computed value, allowance included [SI]
    double allowance = 0.0;           ///< part of `extreme` that was added [SI]
    double time_s = 0.0;
    double rest = 0.0;                ///< where the quantity rests [SI]
    /// M, positive inside [SI]: bound against extreme; for a limit that allows a time outside,
    /// bound against the value that is exceeded for just that time.
    double margin = 0.0;
    double numerical = 0.0;           ///< U_num [SI]
    double model = 0.0;               ///< U_mod [SI]
    double uncertainty = 0.0;         ///< U [SI]
    double reserve = 0.0;             ///< R [SI]
    double share = 0.0;               ///< m; for a timed limit the worse of distance and time share
    double outside_s = 0.0;           ///< time outside the bound; for a timed limit as it counts
    double outsideLeast_s = 0.0;      ///< the same for the bound moved outward by U
    double outsideMost_s = 0.0;       ///< the same for the bound moved inward by U
    bool outsideKnown = true;         ///< false: beyond the bound, and no trace tells how long
    bool alreadyBrokenAtRest = false;
    bool unsignedLimit = false;
    std::optional<Finding> reason;    ///< for notValid, notApplicable, notRun
};

} // namespace headroom::results
