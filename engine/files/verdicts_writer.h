// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"

#include <functional>
#include <string>
#include <vector>

namespace headroom::files {

/// The text of `verdicts.json`: a list with one object for each limit of each cell, in the order
/// of the cells. Bound, extreme, margin, reserve and uncertainties are in the limit's file unit,
/// named by "unit"; times in seconds; share without unit. What is not known is null.
/// @param tracePath path of a cell's trace file beside the list, "" if it has none
std::string writeVerdicts(const studies::Snapshot& snapshot,
                          const std::vector<studies::Cell>& cells,
                          const std::function<std::string(const studies::Cell&)>& tracePath);

} // namespace headroom::files
