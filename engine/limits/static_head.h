// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/plant.h"
#include "plant/study.h"
#include "results/run.h"

#include <optional>

namespace headroom::limits {

/// Static head at a place [m]: what still water would press there in the study's starting levels.
/// At a unit or at its inlet: upstream reservoir less tailwater. Elsewhere: upstream reservoir
/// less the elevation of the axis (of a chamber: of its floor). The upstream reservoir is the
/// highest one that conduits connect to the place without passing a unit; nothing if there is none.
std::optional<double> staticHead_m(const plant::Plant& plant, const plant::Study& study,
                                   const results::Place& place);

/// Elevation of the axis of a conduit at a chainage [m], straight between its corners.
double axisElevation_m(const plant::Plant& plant, int conduit, double chainage_m);

} // namespace headroom::limits
