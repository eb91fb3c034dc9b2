// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"

namespace headroom::studies {

/// One thing at rest [SI of the measure].
struct RestValue {
    Measure measure = Measure::level;
    results::Place place;
    double value = 0.0;
};

/// The starting state of one cell.
struct RestState {
    std::vector<RestValue> values;
    double residual = 0.0;   ///< largest scaled residual of the rest's equations
    bool standsStill = true; ///< undisturbed, it stays where it is

    std::optional<double> find(Measure measure, const results::Place& place) const;
};

/// Compiles and solves the rest of one cell without running it. Findings: why the cell cannot be
/// compiled, has no rest, or does not stand still.
Result<RestState> restState(const Snapshot& snapshot, int option, int study);

/// Everything that keeps cells from running and is seen without running them: each option and
/// study compiled and brought to rest. Equal findings are told once.
struct CellFindings {
    int option = -1, study = 0;
    Findings findings;
};
std::vector<CellFindings> checkCells(const Snapshot& snapshot,
                                     const std::vector<std::pair<int, int>>& cells);

} // namespace headroom::studies
