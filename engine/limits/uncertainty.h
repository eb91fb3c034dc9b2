// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"
#include "plant/plant.h"
#include "results/run.h"

namespace headroom::limits {

/// The parts of U, all ≥ 0 and in the unit of the limit's measure.
struct Uncertainty {
    double numerical = 0.0;  ///< U_num, from the repeat with divided cells
    double parameters = 0.0; ///< U_par, from a spread of the inputs; 0 if none was run
    double model = 0.0;      ///< U_mod, declared, and never 0 for a synthetic chart
    /// U = √(U_num² + U_par² + U_mod²).
    double total() const;
};

/// U_num = |X_h − X_{h/2}| + S, with S the largest change in one step within two steps of the
/// extreme of the finer run, whose value is the one reported.
/// Why S: Richardson's difference alone covered the truth in a third of trial cases only;
/// `resources/theory/verdicts.md`, section "Numerical uncertainty".
double numericalUncertainty(double coarse, double fine, double largestStep);

/// S of an extreme that both runs tracked: the largest change in one step within two steps of it in
/// the finer run. Of quantities that jump by their nature (electrical power at a breaker, rates at
/// a dead time's end) up to two changes that are as large with the halved step as before are left
/// out: both runs resolve such a jump, and its size is no error. `verdicts.md`, same section.
double stepNear(Measure measure, const results::Extreme& coarse, const results::Extreme& fine);

/// What a synthetic Francis chart leaves open in the speed of its unit [pu of rated] and in the
/// heads beside it [m] when the project gives no own values. Spread of a rejection over the free
/// shape parameters of the chart (runaway speed, no-load and standstill flow), derived here.
inline constexpr double chartSpeedUncertainty_pu = 0.007;
inline constexpr double chartHeadUncertainty_m = 0.4;

/// U_mod of a limit: the larger of what the user declared and of what the synthetic charts of the
/// units beside the place leave open. `place` is where the limit is watched.
double modelUncertainty(const plant::Limit& limit, const plant::Plant& plant,
                        const results::Place& place);

} // namespace headroom::limits
