// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"
#include "plant/plant.h"
#include "results/run.h"

#include <optional>

namespace headroom::limits {

enum class Side { lower, upper };

/// What one run says about one side of one limit, before any allowance [SI of the measure].
struct Evidence {
    results::Place place;                   ///< where the extreme was found
    double rest = 0.0;
    double extreme = 0.0;
    double time_s = 0.0;
    double largestStep = 0.0;               ///< largest change in one step around the extreme
    /// The extreme with its neighbours as the run tracked it, before `scale` and `offset`;
    /// nullptr: from a trace or an envelope.
    const results::Extreme* tracked = nullptr;
    const results::Trace* trace = nullptr;  ///< nullptr: no trace at this place
    double scale = 1.0;                     ///< > 0; a traced value times this …
    double offset = 0.0;                    ///< … plus this is the measure
    double interval_s = 0.0;                ///< of the trace
};

/// The evidence of the time until `until_s`. Nothing if the run has no such measure there, or if
/// its extreme lies later and no trace tells what was before. Along a whole conduit the worst of
/// stations and corners of the axis answers.
std::optional<Evidence> evidence(const plant::Limit& limit, const results::Place& place, Side side,
                                 const results::Run& run, const plant::Plant& plant,
                                 double until_s);

/// Whether the run computes this measure at this place at all.
bool recorded(const plant::Limit& limit, const results::Place& place, const results::Run& run,
              const plant::Plant& plant);

} // namespace headroom::limits
