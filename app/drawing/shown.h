// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/selection.h"
#include "studies/board.h"

#include <memory>
#include <vector>

namespace headroom::drawing {

/// What a picture of one run shows: the variant, its study, and what is known of the run.
struct Shown {
    int option = -1; ///< clamped to what the project has
    std::shared_ptr<const plant::Variant> variant;
    const plant::Study* study = nullptr; ///< nullptr: the project has none
    plant::LoadClass loadClass = plant::LoadClass::normal;
    std::shared_ptr<const results::Run> run; ///< nullptr: geometry only
    std::vector<results::Verdict> verdicts;  ///< empty without a run
    /// Level of each reservoir at the start of the study.
    std::vector<double> level_m() const;
    /// Verdict of a limit, or nullptr.
    const results::Verdict* verdict(int limit) const;
    /// The chosen limit if it has a verdict, else the worst one, else nullptr.
    const results::Verdict* leading(int chosenLimit) const;
};

Shown shown(const studies::Snapshot& snapshot, const studies::Cell* inHand,
            const Selection& selection);

} // namespace headroom::drawing
