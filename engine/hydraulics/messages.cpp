// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/messages.h"

#include <array>

namespace headroom::hydraulics {

std::span<const Message* const> messages() {
    static constexpr std::array all{
        &boreNotPositive,    &roughnessOutOfRange,  &roughnessBeyondTests,  &stricklerNotPositive,
        &factorBelowZero,    &rateBelowZero,        &temperatureOutOfRange, &latitudeOutOfRange,
        &altitudeOutOfRange, &wallDimension,        &modulusNotPositive,    &poissonOutOfRange,
        &gasOutOfRange,      &chamberTooFewRows,    &chamberNotFinite,      &chamberAreaNotPositive,
        &chamberLevelsFall,  &chamberLevelRepeated, &chamberFloorAboveRim,
    };
    return all;
}

} // namespace headroom::hydraulics
