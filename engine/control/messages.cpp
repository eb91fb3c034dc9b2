// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/messages.h"

#include <array>

namespace headroom::control {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 13> all{
        &servoTimeNotPositive, &servoNegative,     &servoStages,          &servoRange,
        &servoCushion,         &governorNegative,  &governorNoAction,     &governorNoFilter,
        &governorLimit,        &governorNotNumber, &temporaryDroopValues, &noSeriesForm,
        &noIntegralForm};
    return all;
}

} // namespace headroom::control
