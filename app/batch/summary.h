// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"

#include <string>
#include <vector>

namespace headroom::batch {

/// Printed under every result.
inline constexpr const char* caution =
    "Study result. It supports a decision by responsible engineers; it does not permit operation.";

/// The results as text for people: the sentence of the whole, the Board with marks in words, the
/// worst limits of each cell with margin ± uncertainty, limits without owner, what happened in
/// the runs, the definition sheet, the caution.
std::string summaryText(const studies::Snapshot& snapshot,
                        const std::vector<studies::Cell>& cells);

} // namespace headroom::batch
