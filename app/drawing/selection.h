// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/tree.h"

#include <vector>

namespace headroom::drawing {

/// A cell of the Board: option (-1: the base) and study.
struct CellId {
    int option = -1;
    int study = 0;
    bool operator==(const CellId&) const = default;
};

/// The one selection of the window. Parts show it and ask to change it; no part knows another.
struct Selection {
    std::vector<CellId> shown; ///< runs compared, the first is the one in the hand; at most six
    int limit = -1;            ///< position in the variant's limits of the run in the hand
    double time_s = 0.0;       ///< cursor
    plant::Path thing;         ///< thing or value under the slip, empty if none
    bool operator==(const Selection&) const = default;

    CellId inHand() const { return shown.empty() ? CellId{} : shown.front(); }
};

} // namespace headroom::drawing
