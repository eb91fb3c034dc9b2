// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"
#include "plant/row_builder.h"

/// The rows of each struct, by the source that holds them. Only `fields.cpp` puts them together.
namespace headroom::plant::rows {

RowsOf<Site> siteRows();
RowsOf<Source> sourceRows();
RowsOf<Conduit> conduitRows();
RowsOf<Chamber> chamberRows();
RowsOf<Unit> unitRows();
RowsOf<Plant> plantRows();
RowsOf<Limit> limitRows();
RowsOf<Study> studyRows();

/// A place as a group: a conduit and a chainage along it.
RowsOf<Location> alongConduitRows();

/// Names of the load classes as the file writes them, mildest first.
std::vector<std::string_view> loadClassKeys();

/// Ranges that many rows share, as written in the file.
inline constexpr double lowestLevel_m = -1000.0, highestLevel_m = 9000.0;
inline constexpr double longestChainage_m = 500000.0;

/// A level or an elevation above the datum.
template <class Owner, class M>
Row<Owner> elevation(M Owner::*member, Words words) {
    return number(member, Quantity::elevation, words).range(lowestLevel_m, highestLevel_m);
}
template <class Owner, class M>
Row<Owner> chainage(M Owner::*member, Words words) {
    return number(member, Quantity::chainage, words).range(-longestChainage_m, longestChainage_m);
}

} // namespace headroom::plant::rows
