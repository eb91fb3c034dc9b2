// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"
#include "plant/plant.h"
#include "results/run.h"

#include <optional>
#include <string>

namespace headroom::limits {

/// Where a limit is watched, or nothing if this plant lacks the place. A head or pressure head
/// asked for at a unit is taken at its inlet; grid measures need no place.
std::optional<results::Place> placeOf(const plant::Limit& limit, const plant::Plant& plant);

/// The user's name of a place: "Surge shaft", "Penstock at 5250 m", "grid".
std::string nameOf(const results::Place& place, const plant::Plant& plant);

} // namespace headroom::limits
