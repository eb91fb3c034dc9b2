// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "batch/commands.h"
#include "studies/board.h"

#include <utility>
#include <vector>

namespace headroom::batch {

/// Cells as pairs (option, -1 is the base; study), options first, in the project's order.
using Cells = std::vector<std::pair<int, int>>;

/// The cells that a call names; findings name what is not there and the nearest that is.
/// `--part i/n` takes every n-th of them, beginning with the i-th.
Result<Cells> chosenCells(const Call& call, const studies::Snapshot& snapshot);

/// "As built – Full rejection".
std::string cellName(const studies::Snapshot& snapshot, int option, int study);

} // namespace headroom::batch
