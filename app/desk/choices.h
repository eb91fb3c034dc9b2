// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/board_model.h"

/// What the selection becomes when something is pressed. Pure functions of what is there now, so
/// that Board, Strip, Section, Lanes and keys all mean the same.
namespace headroom::desk {

using drawing::Selection;

/// A cell comes into the hand, its worst limit and that limit's time with it. The run that was in
/// the hand gives way unless it is the base's; options compared on one study follow to another.
Selection withCell(const BoardModel& board, const Selection& now, CellId cell);
/// The worst limit of the run in the hand and that limit's time; unchanged while nothing is judged.
Selection withWorst(const BoardModel& board, Selection now);
/// A limit is chosen; the cursor goes to its extreme in the run in the hand.
Selection withLimit(const BoardModel& board, const Selection& now, int limit);
/// A cell joins the comparison or leaves it; the one in the hand stays first.
Selection toggled(const Selection& now, CellId cell);
/// The option comes into the hand with the same study.
Selection withOption(const BoardModel& board, const Selection& now, int option);
/// The next cell, study by study, whose mark is not held; the present one if there is none.
CellId nextProblem(const BoardModel& board, CellId from);
/// The cell whose verdict is worst among those judged, the base's first; nothing if none is.
std::optional<CellId> worstCell(const BoardModel& board);
/// What is shown while the user has not chosen anything: the base's worst cell so far, and the
/// same study in the two options that leave most.
Selection unasked(const BoardModel& board, const Selection& now);
/// Drops what is not there any more after the project changed.
Selection fitted(const BoardModel& board, Selection now);

/// The verdict of a limit in the run in the hand, or nullptr.
const results::Verdict* verdictOf(const BoardModel& board, const Selection& now);

} // namespace headroom::desk
