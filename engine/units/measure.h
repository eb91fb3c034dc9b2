// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "units/quantity.h"

#include <span>
#include <string_view>

namespace headroom {

/// What can be watched in a run and limited by a user. The sign of each is stated in its row's
/// `help`. Results, limits, lanes and files all name a measured thing by one of these.
enum class Measure {
    level,             ///< water level of a reservoir or chamber [m above datum]
    head,              ///< piezometric level at a point or along a conduit [m above datum]
    pressureHead,      ///< head minus axis elevation, gauge [m]
    discharge,         ///< through a conduit (from → to), a unit, or into a chamber [m³/s]
    velocity,          ///< in a conduit, from → to [m/s]
    speed,             ///< of a unit, of rated [pu]
    opening,           ///< servo stroke 0…1
    openingRate,       ///< [1/s], opening positive
    shaftPower,        ///< turbine shaft [W]
    terminalPower,     ///< generator terminals [W]
    gridPower,         ///< given to the grid [W]
    netHead,           ///< of a unit [m]
    draftPressureHead, ///< gauge pressure head at the runner outlet [m]
    frequency,         ///< of the grid [Hz]
    frequencyRate,     ///< of the grid [Hz/s]
    pressureRate,      ///< rate of change of head at a point [m/s]
    openingTravel,     ///< accumulated servo travel [strokes]
};

struct MeasureInfo {
    Measure measure;
    std::string_view key;   ///< in files, "draftPressureHead"
    std::string_view label; ///< "Draft-tube pressure head"
    Quantity quantity;
    std::string_view help;  ///< what it is, where it is taken, what positive means
};

std::span<const MeasureInfo> measures();
const MeasureInfo& info(Measure measure);

} // namespace headroom
