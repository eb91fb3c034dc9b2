// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/waterway_layout.h"
#include "limits/bounds.h"
#include "results/verdict.h"

#include <vector>

/// Limits that can be read as a head somewhere along the waterway, for Section and Ribbon.
namespace headroom::drawing {

/// A place where a limit bounds the head.
struct BoundPlace {
    int limit = -1;
    double chainage_m = 0.0;
    double head_m = 0.0;      ///< the bound as declared, as a head
    double allowance_m = 0.0; ///< what the verdict adds to the computed head there, ≥ 0
};

/// Bounds of one side along one conduit. Between its places the bound is drawn straight, as a
/// guide for the eye; it judges only at the places.
struct BoundLine {
    int conduit = -1;
    bool upper = true;
    bool wholeConduit = false;      ///< declared along the whole conduit: judges everywhere
    std::vector<BoundPlace> places; ///< chainage rising

    bool covers(double chainage_m) const;
    /// Bound for a computed head: declared less what is added, straight between the places.
    double effective_m(double chainage_m) const;
};

/// A bound on the level in a chamber.
struct ChamberBound {
    int limit = -1;
    int chamber = -1;
    bool upper = true;
    double level_m = 0.0;
};

struct HeadBounds {
    std::vector<BoundLine> lines;
    std::vector<ChamberBound> chambers;
};

/// `verdicts`: of the cell shown, for allowances; may be empty.
HeadBounds headBounds(const plant::Variant& variant, plant::LoadClass loadClass,
                      const std::vector<results::Verdict>& verdicts);

} // namespace headroom::drawing
