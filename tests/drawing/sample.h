// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"
#include "drawing/selection.h"
#include "studies/board.h"

#include <memory>
#include <vector>

/// Invented test data for the pictures: a plant, its board and runs whose numbers are made of sines
/// here, not computed. Nothing of it is a result.
namespace headroom::drawing::test {

/// Starts Qt on the offscreen platform, once.
void startGui();

/// Reservoir, tunnel, shaft, penstock, one unit, tailwater; limits of all kinds; four options.
plant::Project sampleProject();
/// Two penstocks on the same way, three units, a tailrace with a chamber of its own.
plant::Project branchedProject();
/// Only a reservoir, and a tunnel to a point: work in progress.
plant::Project startedProject();

std::shared_ptr<const studies::Snapshot> snapshotOf(plant::Project project);

/// A run with envelopes along every conduit and traces at chamber and unit; invented.
std::shared_ptr<const results::Run> sampleRun(const plant::Plant& plant, double low_m = 456.1);

/// A cell that is done, with one verdict a limit; the first broken, then tight, undecided, held.
studies::Cell doneCell(const studies::Snapshot& snapshot, int option, int study);
/// The whole board: every state occurs.
std::vector<studies::Cell> sampleCells(const studies::Snapshot& snapshot);

} // namespace headroom::drawing::test
