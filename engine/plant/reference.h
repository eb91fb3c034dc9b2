// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <string>

namespace headroom::plant {

/// The collections whose things can be referred to by name.
enum class Collection {
    none,
    points,
    reservoirs,
    conduits,
    chambers,
    units,
    limits,
    options,
    studies,
    events
};

/// A thing referred to by its name; `index` is its position in its collection once resolved.
struct Reference {
    std::string name;
    Collection collection = Collection::none;
    int index = -1; ///< -1: not resolved (a finding says why) or not given

    bool given() const { return !name.empty(); }
    bool resolved() const { return index >= 0; }
};

/// A place: a named thing, or a chainage along a conduit.
struct Location {
    Reference thing;         ///< point, reservoir, chamber, unit or conduit
    double chainage_m = 0.0; ///< used when `thing` is a conduit and `alongConduit`
    bool alongConduit = false;
};

} // namespace headroom::plant
